package sheet

import (
	"fmt"
	"slices"
	"strings"

	"github.com/xuri/excelize/v2"

	"clampback/planner"
	"clampback/report"
)

// page is how a sheet prints.
type page struct {
	landscape bool
	titleRows string // rows repeated on each page: "$6:$6"
	joint     planner.Joint
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
	title := cut(clean(p.joint.Assembly+", revision "+orNone(p.joint.Revision)), 100)
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

// column is one column of the register.
type column struct {
	heading string
	width   float64
	value   func(b *book, c *calculation) any
}

// registerHeading is the row of the register's headings.
const registerHeading = 5

// columns are those of the register. Numbers link to the joint's sheet, so that
// the register follows a changed input too.
var columns = []column{
	{"joint", 14, func(b *book, c *calculation) any {
		return formula(b.styles.text, fmt.Sprintf(`HYPERLINK("#%s!A1","%s")`, quoted(c.sheet), c.plan.ID), c.plan.ID)
	}},
	{"name", 32, func(b *book, c *calculation) any { return cell(b.styles.wrapped, clean(c.plan.Name)) }},
	{"bolts", 8, func(b *book, c *calculation) any { return cell(b.styles.computed["0"], c.plan.Count) }},
	{"bolt", 40, func(b *book, c *calculation) any { return cell(b.styles.wrapped, clean(report.Bolt(c.plan.Joint))) }},
	{"method", 16, func(b *book, c *calculation) any {
		return cell(b.styles.wrapped, string(c.plan.Joint.Tightening.Method))
	}},
	{"required residual clamp, N", 11, link("F_Kerf")},
	{"required preload, N", 11, link("F_Mreq")},
	{"highest preload tolerated, N", 11, link("F_lim")},
	{"torque low, N.m", 10, link("T_lo")},
	{"target torque, N.m", 10, setting("T_A", noneFormat)},
	{"torque high, N.m", 10, link("T_hi")},
	{"snug torque, N.m", 9, setting("T_S", noneFormat)},
	{"angle from snug, deg", 9, setting("ang", noneAngle)},
	{"worst check, used", 9, func(b *book, c *calculation) any {
		worst := 0.0
		for _, check := range c.plan.Checks {
			worst = max(worst, check.Utilisation)
		}
		return formula(b.styles.computed["0%"], c.worst, worst)
	}},
	{"verdict", 28, func(b *book, c *calculation) any {
		return formula(b.styles.verdict, quoted(c.sheet)+"!"+c.verdict, verdictWord(c.plan.Feasible))
	}},
	{"revision", 9, func(b *book, c *calculation) any {
		return cell(b.styles.wrapped, clean(orNone(c.plan.Joint.Revision)))
	}},
}

// link returns a column that shows a symbol of the joint's sheet.
func link(symbol string) func(*book, *calculation) any {
	return func(b *book, c *calculation) any {
		l, ok := c.line(symbol)
		if !ok {
			return cell(b.styles.text, "")
		}
		return formula(b.styles.computed[formatOf(l.Unit)], quoted(c.sheet)+"!"+c.cells[symbol], l.Value)
	}
}

// setting is link for what a joint is tightened by: none while the joint's sheet
// does not find it feasible.
func setting(symbol, format string) func(*book, *calculation) any {
	return func(b *book, c *calculation) any {
		l, ok := c.line(symbol)
		if !ok {
			return cell(b.styles.text, "")
		}
		value := 0.0
		if c.plan.Feasible {
			value = l.Value
		}
		sheet := quoted(c.sheet) + "!"
		return formula(b.styles.computed[format],
			fmt.Sprintf(`IF(%s="%s",%s,0)`, sheet+c.verdict, feasible, sheet+c.cells[symbol]), value)
	}
}

func (b *book) writeRegister(calculations []calculation) error {
	widths := make([]float64, len(columns))
	heading := make([]any, len(columns))
	for i, c := range columns {
		widths[i], heading[i] = c.width, cell(b.styles.heading, c.heading)
	}
	first := planner.Joint{}
	if len(calculations) > 0 {
		first = calculations[0].plan.Joint
	}
	if err := b.filterRegister(len(calculations)); err != nil {
		return err
	}
	stream, err := b.openSheet(registerSheet, 0, page{landscape: true,
		titleRows: fmt.Sprintf("$%d:$%d", registerHeading, registerHeading), joint: first}, widths)
	if err != nil {
		return err
	}
	panes := &excelize.Panes{Freeze: true, XSplit: 1, YSplit: registerHeading,
		TopLeftCell: fmt.Sprintf("B%d", registerHeading+1), ActivePane: "bottomRight"}
	if err := stream.SetPanes(panes); err != nil {
		return err
	}
	w := &writer{stream, 1}
	assembly, revision := planner.Headings(jointsOf(calculations))
	rows := [][]any{
		{cell(b.styles.title, "Joint register")},
		{cell(0, clean(assembly+", revision "+orNone(revision)+", prepared by "+orNone(first.PreparedBy)))},
		{cell(0, "Each joint has a sheet of its own, with every line of the calculation live. "+caution)},
		{},
		heading,
	}
	for i, row := range rows {
		lines := 1
		if i == 0 {
			lines = 2 // larger type
		}
		if i == registerHeading-1 {
			lines = 4 // the longest heading
		}
		if err := w.putLines(lines, row...); err != nil {
			return err
		}
	}
	for i := range calculations {
		row := make([]any, len(columns))
		for k, c := range columns {
			row[k] = c.value(b, &calculations[i])
		}
		p := calculations[i].plan
		lines := max(linesOf(p.Name, columns[1].width), linesOf(report.Bolt(p.Joint), columns[3].width))
		if err := w.putLines(lines, row...); err != nil {
			return err
		}
	}
	return stream.Flush()
}

// filterRegister puts a filter over the rows of the register.
func (b *book) filterRegister(joints int) error {
	if joints == 0 {
		return nil
	}
	corner, err := excelize.CoordinatesToCellName(len(columns), registerHeading+joints, true)
	if err != nil {
		return err
	}
	area := fmt.Sprintf("$A$%d:%s", registerHeading, corner)
	if err := b.file.AutoFilter(registerSheet, area, nil); err != nil {
		return err
	}
	b.dropFilterName()
	b.names = append(b.names, definedName{"_xlnm._FilterDatabase", 0, registerSheet + "!" + area})
	return nil
}

// dropFilterName removes the name that the library makes for the filter: names
// are defined together at the end.
func (b *book) dropFilterName() {
	if names := b.file.WorkBook.DefinedNames; names != nil {
		names.DefinedName = names.DefinedName[:0]
	}
}

func jointsOf(calculations []calculation) []planner.Joint {
	joints := make([]planner.Joint, len(calculations))
	for i, c := range calculations {
		joints[i] = c.plan.Joint
	}
	return joints
}

// writeAbout writes how to read the book, the cautions and the sources.
func (b *book) writeAbout(plans []planner.Plan) error {
	var joint planner.Joint
	if len(plans) > 0 {
		joint = plans[0].Joint
	}
	stream, err := b.openSheet(aboutSheet, len(plans)+1, page{joint: joint}, []float64{4, 110})
	if err != nil {
		return err
	}
	w := &writer{stream, 1}
	blocks := []struct {
		heading string
		lines   []string
	}{
		{"How to read this workbook", []string{
			"Register: one row a joint. Its numbers are links to the joint's own sheet.",
			"A joint's sheet: every line of the calculation with symbol, meaning, value, unit and source, from the inputs to the torque and the checks.",
			"Framed cells are inputs and can be changed; the formulas follow. The sheets are protected without a password against slips, not against intent.",
			"The formulas are a second statement of the calculation, independent of the program that planned the joints; the program's own values stand in the cells until the spreadsheet recalculates.",
			"What binds and the assumptions are text, as planned: they do not follow a changed input.",
			"Inputs do not follow each other. What one statement of the register fixes together is changed together by hand: a thickness and the length of engaged thread l_eng; a hole, D_Ki and d_in; an outer diameter, D_A and D_out; the thread and all that was looked up for it.",
			"A load of another kind (compression, slip, cycles) may need checks that the sheet does not hold: plan the joint anew.",
			"Units: N, mm, MPa, N.m, deg, degC. Torques of the trace are N.m.",
		}},
		{"Cautions", []string{
			caution,
			"A changed input is a new calculation: plan, check and release it before anyone tightens by it.",
			"An infeasible joint has no setting. Do not tighten it by any figure of its sheet.",
		}},
		{"Where the numbers come from", sourcesOf(plans)},
	}
	if err := w.put(cell(b.styles.title, "About this workbook")); err != nil {
		return err
	}
	for _, block := range blocks {
		if err := w.put(); err != nil {
			return err
		}
		if err := w.put(cell(b.styles.bold, block.heading)); err != nil {
			return err
		}
		for _, line := range block.lines {
			if err := w.putLines(linesOf(line, 110), nil, cell(b.styles.wrapped, clean(line))); err != nil {
				return err
			}
		}
	}
	return stream.Flush()
}

// sourcesOf lists every source that the plans cite, in order of the alphabet.
func sourcesOf(plans []planner.Plan) []string {
	seen := map[string]bool{}
	var all []string
	for _, p := range plans {
		for _, l := range p.Trace {
			if !seen[l.Source] {
				seen[l.Source] = true
				all = append(all, l.Source)
			}
		}
	}
	slices.Sort(all)
	return all
}
