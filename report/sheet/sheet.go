package sheet

import (
	"fmt"
	"io"
	"io/fs"

	"github.com/xuri/excelize/v2"

	"clampback/planner"
	"clampback/templates"
)

// Options says what the workbook is made with; the zero value is the usual.
type Options struct {
	Templates fs.FS // a folder that overrides the built-in formulas file by file; nil: none
}

// Write writes the workbook of all plans.
func Write(w io.Writer, plans []planner.Plan, o Options) error {
	f, err := readFormulas(templates.Folder(o.Templates))
	if err != nil {
		return err
	}
	b := &book{file: excelize.NewFile(), formulas: f}
	defer b.file.Close()
	if err := b.fill(plans); err != nil {
		return fmt.Errorf("writing the workbook: %w", err)
	}
	b.file.SetZipWriter(newSortedZip)
	return b.file.Write(w)
}

// book is the workbook while it is written.
type book struct {
	file     *excelize.File
	formulas formulas
	styles   styles
	names    []definedName
}

// definedName is a named cell; a name without sheet holds for the whole book.
type definedName struct {
	name   string
	sheet  int // index of the sheet it belongs to
	target string
}

func (b *book) fill(plans []planner.Plan) error {
	var err error
	if b.styles, err = newStyles(b.file); err != nil {
		return err
	}
	calculations := make([]calculation, len(plans))
	names := sheetNames(plans)
	for i, p := range plans {
		calculations[i] = calculation{plan: p, sheet: names[i]}
		if _, err := b.file.NewSheet(names[i]); err != nil {
			return err
		}
	}
	if _, err := b.file.NewSheet(aboutSheet); err != nil {
		return err
	}
	if err := b.file.SetSheetName("Sheet1", registerSheet); err != nil {
		return err
	}
	for i := range calculations {
		if err := b.writeCalculation(&calculations[i], i+1); err != nil {
			return fmt.Errorf("joint %s: %w", plans[i].ID, err)
		}
	}
	if err := b.writeRegister(calculations); err != nil {
		return err
	}
	if err := b.writeAbout(plans); err != nil {
		return err
	}
	if err := b.defineNames(); err != nil {
		return err
	}
	return b.properties()
}

// properties makes the book recalculate when it is opened, and its metadata
// the same every time.
func (b *book) properties() error {
	always := true
	if err := b.file.SetCalcProps(&excelize.CalcPropsOptions{FullCalcOnLoad: &always}); err != nil {
		return err
	}
	const date = "2026-01-01T00:00:00Z" // a fixed one: the book depends on the plans alone
	return b.file.SetDocProps(&excelize.DocProperties{Created: date, Modified: date, Creator: "clampback",
		LastModifiedBy: "clampback", Title: "Joint calculation"})
}

// defineNames adds all names at once: the library's own call compares each new
// name with all others, which takes minutes for a large register.
func (b *book) defineNames() error {
	if len(b.names) == 0 {
		return nil
	}
	first := b.names[0]
	// The first name makes the list; its element is then the pattern for the rest.
	if err := b.file.SetDefinedName(&excelize.DefinedName{Name: first.name, RefersTo: first.target}); err != nil {
		return fmt.Errorf("naming the cell %s: %w", first.name, err)
	}
	list := &b.file.WorkBook.DefinedNames.DefinedName
	pattern := (*list)[len(*list)-1]
	*list = (*list)[:len(*list)-1]
	for _, n := range b.names {
		pattern.Name, pattern.Data = n.name, n.target
		sheet := n.sheet
		pattern.LocalSheetID = &sheet
		*list = append(*list, pattern)
	}
	return nil
}
