package sheet

import (
	"fmt"
	"slices"
	"strings"

	"github.com/xuri/excelize/v2"

	"clampback/planner"
	"clampback/report"
)

// calculation is one joint's sheet while it is written.
type calculation struct {
	plan  planner.Plan
	sheet string
	cells map[string]string // symbol -> absolute reference on the sheet
	// Cells that the register links to.
	verdict, worst string
}

// calculationWidths are the columns: symbol, meaning, value, unit, source, kind,
// and for the checks two more.
var calculationWidths = []float64{12, 46, 14, 7, 48, 10, 9, 9}

// The rows of a calculation sheet.
const (
	verdictRow = 4
	headingRow = 6
	firstLine  = 7
)

// writer puts rows on a sheet one after the other.
type writer struct {
	stream *excelize.StreamWriter
	row    int
}

// put writes one row of cells and moves on.
func (w *writer) put(cells ...any) error { return w.putLines(1, cells...) }

// lineHeight is the height of a line of text, points.
const lineHeight = 15

// putLines is put for a row whose text wraps to so many lines: spreadsheet
// programs do not measure the rows of a streamed sheet.
func (w *writer) putLines(lines int, cells ...any) error {
	err := w.stream.SetRow(fmt.Sprintf("A%d", w.row), cells, excelize.RowOpts{Height: float64(lines) * lineHeight})
	w.row++
	return err
}

// linesOf estimates how many lines a text takes in a column of a width, which is
// in characters.
func linesOf(text string, width float64) int {
	return 1 + int(float64(len([]rune(text)))*0.95/width)
}

func cell(style int, value any) excelize.Cell { return excelize.Cell{StyleID: style, Value: value} }

func formula(style int, text string, cached any) excelize.Cell {
	return excelize.Cell{StyleID: style, Formula: text, Value: cached}
}

// writeCalculation writes a joint's sheet: verdict, every line of the trace, the
// checks, the assumptions.
func (b *book) writeCalculation(c *calculation, index int) error {
	stream, err := b.openSheet(c.sheet, index, page{landscape: false, titleRows: fmt.Sprintf("$%d:$%d", headingRow, headingRow),
		head: planner.Headings([]planner.Joint{c.plan.Joint})},
		calculationWidths)
	if err != nil {
		return err
	}
	w := &writer{stream, 1}
	c.cells = placeSymbols(c.plan.Trace)
	s := b.styles
	j := c.plan.Joint
	checksFrom := firstLine + len(c.plan.Trace) + 3
	checksTo := checksFrom + len(c.plan.Checks) - 1
	c.verdict = fmt.Sprintf("$C$%d", verdictRow)
	c.worst = fmt.Sprintf("MAX(%s!$F$%d:$F$%d)", quoted(c.sheet), checksFrom, checksTo)

	rows := [][]any{
		{cell(s.title, clean(c.plan.ID+"  "+c.plan.Name))},
		{cell(0, clean(j.Assembly+", revision "+report.OrNotStated(j.Revision)+", prepared by "+report.OrNotStated(j.PreparedBy)))},
		{cell(0, clean(report.Fasteners(j)))},
		{cell(s.bold, "Verdict"), nil, formula(s.warning, c.verdictFormula(checksFrom, checksTo),
			verdictWord(c.plan.Feasible))},
		{cell(0, "Framed cells are inputs, which the formulas follow; some go together (see About). "+caution)},
		{cell(s.heading, "symbol"), cell(s.heading, "meaning"), cell(s.heading, "value"), cell(s.heading, "unit"),
			cell(s.heading, "source"), cell(s.heading, "kind")},
	}
	for i, row := range rows {
		lines := 1
		if i == 0 || i == verdictRow-1 {
			lines = 2 // larger type
		}
		if err := w.putLines(lines, row...); err != nil {
			return err
		}
	}
	if err := b.writeTrace(w, c, index); err != nil {
		return err
	}
	if err := b.writeChecks(w, c); err != nil {
		return err
	}
	if err := b.writeLists(w, c.plan); err != nil {
		return err
	}
	return stream.Flush()
}

const caution = "Calculated, not tested on this joint; local codes and the judgement of a licensed engineer come first."

// The verdicts in words.
const (
	feasible   = "FEASIBLE"
	infeasible = "INFEASIBLE: do not tighten"
)

// verdictFormula is the verdict as the sheet finds it: a setting, which snug
// leaves something to tighten up to, and every check passed.
func (c *calculation) verdictFormula(from, to int) string {
	set := "T_A>0,T_S<T_A"
	if c.plan.Joint.Tightening.Method == planner.TorqueAndAngleMethod {
		set = "ang>0"
	}
	return fmt.Sprintf(`IF(AND(%s,COUNTIF($H$%d:$H$%d,"ok")=%d),"%s","%s")`, set, from, to, to-from+1, feasible, infeasible)
}

func verdictWord(ok bool) string {
	if ok {
		return feasible
	}
	return infeasible
}

// line returns the line of a symbol, if the plan has it.
func (c *calculation) line(symbol string) (planner.Line, bool) {
	i := slices.IndexFunc(c.plan.Trace, func(l planner.Line) bool { return l.Symbol == symbol })
	if i < 0 {
		return planner.Line{}, false
	}
	return c.plan.Trace[i], true
}

// placeSymbols says in which cell each symbol's value stands.
func placeSymbols(trace []planner.Line) map[string]string {
	cells := make(map[string]string, len(trace))
	for i, l := range trace {
		cells[l.Symbol] = fmt.Sprintf("$C$%d", firstLine+i)
	}
	return cells
}

func (b *book) writeTrace(w *writer, c *calculation, index int) error {
	repeated := countRepeated(c.plan.Trace)
	for _, l := range c.plan.Trace {
		kind, value := "input", cell(b.styles.inputs[formatOf(l.Unit)], l.Value)
		if !l.Input {
			text, ok := b.formulas.lines[l.Rule]
			if !ok {
				return fmt.Errorf("calculation.csv has no rule %q for %s", l.Rule, l.Symbol)
			}
			expanded, err := repeated.expand(text, l.Index)
			if err != nil {
				return fmt.Errorf("calculation.csv, rule %q: %w", l.Rule, err)
			}
			kind, value = "computed", formula(b.styles.computed[formatOf(l.Unit)], expanded, l.Value)
		}
		b.names = append(b.names, definedName{l.Symbol, index, quoted(c.sheet) + "!" + c.cells[l.Symbol]})
		s := b.styles
		lines := max(linesOf(l.Meaning, calculationWidths[1]), linesOf(l.Source, calculationWidths[4]))
		err := w.putLines(lines, cell(s.text, l.Symbol), cell(s.wrapped, clean(l.Meaning)), value,
			cell(s.text, l.Unit), cell(s.wrapped, clean(l.Source)), cell(s.text, kind))
		if err != nil {
			return err
		}
	}
	return nil
}

func (b *book) writeChecks(w *writer, c *calculation) error {
	s := b.styles
	if err := w.put(); err != nil {
		return err
	}
	if err := w.put(cell(s.bold, "Checks"), nil, nil, nil, nil, nil); err != nil {
		return err
	}
	heading := []any{}
	for _, h := range []string{"", "check", "value", "unit", "limit", "used", "rule", "verdict"} {
		heading = append(heading, cell(s.heading, h))
	}
	if err := w.put(heading...); err != nil {
		return err
	}
	repeated := countRepeated(c.plan.Trace)
	for _, check := range c.plan.Checks {
		f, ok := b.formulas.checks[check.Rule]
		if !ok {
			return fmt.Errorf("checks.csv has no rule %q", check.Rule)
		}
		value, err := repeated.expand(f.value, check.Index)
		if err != nil {
			return fmt.Errorf("checks.csv, rule %q: %w", check.Rule, err)
		}
		limit, err := repeated.expand(f.limit, check.Index)
		if err != nil {
			return fmt.Errorf("checks.csv, rule %q: %w", check.Rule, err)
		}
		if err := w.put(b.checkRow(check, value, limit, w.row)...); err != nil {
			return err
		}
	}
	return nil
}

// checkRow is a check with its live value, limit, share used and verdict.
func (b *book) checkRow(check planner.Check, value, limit string, row int) []any {
	s := b.styles
	number := s.computed[formatOf(check.Unit)]
	over, under, rule := fmt.Sprintf("C%d", row), fmt.Sprintf("E%d", row), "at most"
	if check.AtLeast {
		over, under, rule = under, over, "at least"
	}
	used := fmt.Sprintf("IF(%s>0,MIN(999,%s/%s),999)", under, over, under)
	verdict := "ok"
	if !check.OK {
		verdict = "FAILS"
	}
	return []any{
		nil, cell(s.wrapped, check.Name), formula(number, value, check.Value), cell(s.text,
			check.Unit), formula(number, limit, check.Limit),
		formula(s.computed["0%"], used, check.Utilisation), cell(s.text, rule),
		formula(s.bold, fmt.Sprintf(`IF(F%d<=1+1E-9,"ok","FAILS")`, row), verdict),
	}
}

// writeLists writes what binds and what was assumed.
func (b *book) writeLists(w *writer, p planner.Plan) error {
	lists := []struct {
		heading string
		lines   []string
	}{{"What binds, as planned", p.Binds}, {"Assumptions, as planned", p.Assumptions}}
	if len(p.Governing) > 0 {
		var who []string
		for _, g := range p.Governing {
			who = append(who, fmt.Sprintf("%s: bolt %d in load case %s", g.For, g.Bolt, g.Case))
		}
		lists = append(lists, struct {
			heading string
			lines   []string
		}{"What governs, as planned: with other loads another bolt may, so plan anew", who})
	}
	for _, l := range lists {
		if err := w.put(); err != nil {
			return err
		}
		if err := w.put(cell(b.styles.bold, l.heading)); err != nil {
			return err
		}
		for _, line := range l.lines {
			if err := w.put(nil, cell(0, clean(strings.TrimSpace(line)))); err != nil {
				return err
			}
		}
	}
	return nil
}
