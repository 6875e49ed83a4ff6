package sheet

import (
	"strings"

	"github.com/xuri/excelize/v2"

	"clampback/planner"
	"clampback/report"
)

// page is how a sheet prints.
type page struct {
	landscape bool
	titleRows string // rows repeated on each page: "$6:$6"
	head      planner.Heading
}

// openSheet prepares a sheet for writing: protection, print set-up, widths.
func (b *book) openSheet(name string, index int, p page, widths []float64) (*excelize.StreamWriter, error) {
	f := b.file
	orientation := "portrait"
	if p.landscape {
		orientation = "landscape"
	}
	a4, wide, high, fit := 9, 1, 0, true
	err := f.ProtectSheet(name, &excelize.SheetProtectionOptions{
		SelectLockedCells: true, SelectUnlockedCells: true, FormatCells: true, FormatColumns: true, FormatRows: true, AutoFilter: true, Sort: true,
	})
	if err != nil {
		return nil, err
	}
	if err := f.SetPageLayout(name, &excelize.PageLayoutOptions{Size: &a4, Orientation: &orientation,
		FitToWidth: &wide, FitToHeight: &high}); err != nil {
		return nil, err
	}
	if err := f.SetSheetProps(name, &excelize.SheetPropsOptions{FitToPage: &fit}); err != nil {
		return nil, err
	}
	title := cut(clean(p.head.Assembly+", revision "+report.OrNotStated(p.head.Revision)), 100)
	title = strings.ReplaceAll(title, "&", "&&") // & begins a code of the header
	if err := f.SetHeaderFooter(name, &excelize.HeaderFooterOptions{OddHeader: "&L" + title + "&R&A",
		OddFooter: "&LCalculated, not tested&RPage &P of &N"}); err != nil {
		return nil, err
	}
	stream, err := f.NewStreamWriter(name)
	if err != nil {
		return nil, err
	}
	for i, width := range widths {
		if err := stream.SetColWidth(i+1, i+1, width); err != nil {
			return nil, err
		}
	}
	if p.titleRows != "" {
		b.names = append(b.names, definedName{"_xlnm.Print_Titles", index, quoted(name) + "!" + p.titleRows})
	}
	return stream, nil
}

// cut shortens a text to so many characters.
func cut(s string, length int) string {
	r := []rune(s)
	return string(r[:min(len(r), length)])
}
