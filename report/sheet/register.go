package sheet

import (
	"fmt"

	"github.com/xuri/excelize/v2"

	"clampback/planner"
	"clampback/planner/quantity"
	"clampback/report"
)

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
	{"required residual clamp, N", 11, limit("F_Kerf", lower)},
	{"required preload, N", 11, limit("F_Mreq", lower)},
	{"highest preload tolerated, N", 11, limit("F_lim", upper)},
	{"torque low, N.m", 10, limit("T_lo", lower)},
	{"target torque, N.m", 10, setting("T_A", noneFormat)},
	{"torque high, N.m", 10, limit("T_hi", upper)},
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
		return cell(b.styles.wrapped, clean(report.OrNotStated(c.plan.Joint.Revision)))
	}},
}

// end is which end of a window a limit is. The register rounds limits inwards,
// so that none is read off wider than it is.
type end struct {
	formula string // of a cell and a number of decimals; with the rounding noise of quantity
	round   func(v, step float64) float64
}

var (
	lower = end{"ROUNDUP(%s*(1-1E-12),%d)", quantity.RoundUp}
	upper = end{"ROUNDDOWN(%s*(1+1E-12),%d)", quantity.RoundDown}
)

// limit returns a column that shows a limit of the joint's sheet, rounded inwards
// to 1 N or 0.01 N.m.
func limit(symbol string, e end) func(*book, *calculation) any {
	return func(b *book, c *calculation) any {
		l, ok := c.line(symbol)
		if !ok {
			return cell(b.styles.text, "")
		}
		decimals, step, format := 0, 1.0, "0"
		if l.Unit == "N.m" {
			decimals, step, format = 2, 0.01, "0.00"
		}
		text := fmt.Sprintf(e.formula, quoted(c.sheet)+"!"+c.cells[symbol], decimals)
		return formula(b.styles.computed[format], text, e.round(l.Value, step))
	}
}

// setting returns a column that shows what a joint is tightened by: none while
// the joint's sheet does not find it feasible.
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
	h := planner.Headings(jointsOf(calculations))
	if err := b.filterRegister(len(calculations)); err != nil {
		return err
	}
	stream, err := b.openSheet(registerSheet, 0, page{landscape: true,
		titleRows: fmt.Sprintf("$%d:$%d", registerHeading, registerHeading), head: h}, widths)
	if err != nil {
		return err
	}
	panes := &excelize.Panes{Freeze: true, XSplit: 1, YSplit: registerHeading,
		TopLeftCell: fmt.Sprintf("B%d", registerHeading+1), ActivePane: "bottomRight"}
	if err := stream.SetPanes(panes); err != nil {
		return err
	}
	w := &writer{stream, 1}
	rows := [][]any{
		{cell(b.styles.title, "Joint register")},
		{cell(0, clean(h.Assembly+", revision "+report.OrNotStated(h.Revision)+", prepared by "+report.OrNotStated(h.PreparedBy)))},
		{cell(0, "Limits are rounded inwards. For torque and angle the setting is the angle; its torques are those to expect at the end. "+caution)},
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
