package group

import (
	"bytes"
	"errors"
	"fmt"
	"slices"
	"strconv"
	"strings"
	"unicode/utf8"

	"clampback/planner/quantity"
)

// MaxBolts is the highest number of a bolt in a table, MaxRows the most rows of
// one: every bolt of the largest joint in 200 load cases.
const (
	MaxBolts = 10_000
	MaxRows  = 200 * MaxBolts
)

// maxName is the longest name of a load case, characters.
const maxName = 200

// ReadCSV reads the bolt forces of a finite-element run; name is the file's, for
// the error. A line of heads, in any order,
//
//	load_case,bolt,axial (kN),transverse_x (kN),transverse_y (kN)
//
// is followed by a row for each bolt in each load case. The unit of a force stands
// in its head: N, kN, lbf or kip. A positive axial force opens the joint, the
// transverse ones are in the axes of the pattern, all are what the bolt gets of
// the load, without its preload. Blank lines and lines that begin with # say
// nothing; a field with a comma stands in quotes. Columns are separated by
// commas, and decimals by a point: a table with semicolons and decimal commas is
// refused, because 1.234 in it may be a thousand times 1,234.
//
// The shares are in the order in which the cases first stand in the table, each by
// bolt. Every case has the same bolts, each once. The error is a *ProblemsError.
func ReadCSV(name string, data []byte) ([]Share, error) {
	rows := min(bytes.Count(data, []byte("\n"))+1, MaxRows) // at most
	r := &reader{rest: bytes.TrimPrefix(data, []byte("\xef\xbb\xbf")), shares: make([]Share, 0, rows),
		index: map[string]int{}, rows: make(map[place]int32, rows)}
	if r.heads() {
		for !r.full() && r.next() {
			if r.judge() && !r.blank() && !r.row() {
				break
			}
		}
		r.complete()
	}
	if len(r.problems) > 0 {
		return nil, &ProblemsError{name, r.sorted()}
	}
	return r.ordered(), nil
}

// reader reads a table line by line.
type reader struct {
	rest   []byte
	number int // of the line that is read
	line   string
	cells  []cell // of the line, used again

	width   int             // how many columns there are
	caseAt  int             // the column of load_case
	boltAt  int             // the column of bolt
	forceAt [3]int          // the columns of the forces
	factor  [3]float64      // what brings each to N
	shares  []Share         // in the order of the rows
	cases   []loadCase      // in order of appearance
	index   map[string]int  // of a case by its name
	rows    map[place]int32 // the line of a bolt in a case
	bolts   []int           // every bolt of the table, ascending, when complete

	problems []Problem
}

// loadCase is a case of a table and where it first stands.
type loadCase struct {
	name   string
	bolts  int
	number int
	line   string
	offset int
}

// place is a bolt in a case, by the case's index.
type place struct{ loadCase, bolt int32 }

func cutLine(data []byte) (line, rest []byte, found bool) {
	line, rest, found = bytes.Cut(data, []byte("\n"))
	return bytes.TrimSuffix(line, []byte("\r")), rest, found
}

// The heads of the columns; those of forces have a unit behind them.
const (
	caseHead = "load_case"
	boltHead = "bolt"
)

var forceHeads = [3]string{"axial", "transverse_x", "transverse_y"}

const headExample = "begin with the line load_case,bolt,axial (kN),transverse_x (kN),transverse_y (kN)"

// heads reads the first line that says something, and reports whether rows can be
// read after it.
func (r *reader) heads() bool {
	for r.next() {
		if !r.judge() {
			return false
		}
		if !r.blank() {
			return r.readHeads()
		}
		if r.full() {
			return false
		}
	}
	if len(r.problems) == 0 {
		r.number, r.line = max(1, r.number), ""
		r.at(0, "the table is empty", headExample)
	}
	return false
}

func (r *reader) readHeads() bool {
	if i := strings.IndexAny(r.line, ";\t"); i >= 0 && !strings.Contains(r.line, ",") {
		what := map[byte]string{';': "semicolons", '\t': "tabs"}[r.line[i]]
		r.at(i, "the columns are separated by "+what, "separate columns with commas, and decimals with a point: save the table as "+
			"CSV in UTF-8 with English number settings")
		return false
	}
	cells, ok := r.split()
	if !ok {
		return false
	}
	r.width = len(cells)
	r.caseAt, r.boltAt, r.forceAt = -1, -1, [3]int{-1, -1, -1}
	for i, c := range cells {
		r.head(i, c)
	}
	if len(r.problems) == 0 {
		r.absent(caseHead, r.caseAt)
		r.absent(boltHead, r.boltAt)
		for k, head := range forceHeads {
			r.absent(head+" (kN)", r.forceAt[k])
		}
	}
	return len(r.problems) == 0
}

// absent notes that there is no column of a head.
func (r *reader) absent(head string, column int) {
	if column < 0 {
		mend := "add the column"
		if strings.HasSuffix(head, ")") {
			mend += ", with 0 where there is no such force"
		}
		r.at(0, "the table has no column "+head, mend+"; "+headExample)
	}
}

// head reads the head of a column: "axial (kN)".
func (r *reader) head(column int, c cell) {
	name, unit, hasUnit := strings.Cut(c.text, "(")
	name, unit = strings.TrimSpace(name), strings.TrimSpace(unit)
	var seen *int
	k := slices.Index(forceHeads[:], name)
	switch {
	case name == caseHead:
		seen = &r.caseAt
	case name == boltHead:
		seen = &r.boltAt
	case k >= 0:
		seen = &r.forceAt[k]
	case c.text == "":
		r.at(c.offset, fmt.Sprintf("column %d has no head", column+1), "name the column, or remove it")
		return
	default:
		r.at(c.offset, fmt.Sprintf("unknown column %q", c.text),
			"the columns are load_case, bolt, axial, transverse_x and transverse_y, forces with their unit: axial (kN)")
		return
	}
	if *seen >= 0 {
		r.at(c.offset, fmt.Sprintf("the column %s stands here twice", name), "keep one of them")
		return
	}
	*seen = column
	if k < 0 {
		if hasUnit {
			r.at(c.offset, fmt.Sprintf("the column %s has a unit", name), "write the head as "+name)
		}
		return
	}
	r.unit(k, c, unit, hasUnit)
}

// unit reads the unit of a force.
func (r *reader) unit(k int, c cell, unit string, hasUnit bool) {
	write := fmt.Sprintf("write the head as %s (kN): N, kN, lbf or kip", forceHeads[k])
	name, closed := strings.CutSuffix(unit, ")")
	if !hasUnit || !closed || strings.TrimSpace(name) == "" {
		r.at(c.offset, fmt.Sprintf("the head %q states no unit", c.text), write)
		return
	}
	factor, err := quantity.Factor(strings.TrimSpace(name), quantity.Force)
	if err != nil {
		r.at(c.offset, forceHeads[k]+": "+err.Error(), write)
		return
	}
	r.factor[k] = factor
}

// row reads one row and reports whether reading may go on.
func (r *reader) row() bool {
	if len(r.shares) == MaxRows {
		r.at(0, fmt.Sprintf("the table has more than %d rows", MaxRows), "keep the load cases that matter, or split the joint")
		return false
	}
	cells, ok := r.split()
	if !ok {
		return true
	}
	if len(cells) != r.width {
		offset := len(r.line)
		if len(cells) > r.width {
			offset = cells[r.width].offset
		}
		r.at(offset, fmt.Sprintf("the row has %d fields, the head %d", len(cells), r.width),
			"give each row a field for each column, with decimals after a point")
		return true
	}
	before := len(r.problems)
	name := r.name(cells[r.caseAt])
	s := Share{Bolt: r.bolt(cells[r.boltAt])}
	for k, force := range []*float64{&s.Axial, &s.X, &s.Y} {
		*force = r.force(k, cells[r.forceAt[k]])
	}
	if len(r.problems) == before {
		r.keep(name, s, cells)
	}
	return true
}

// name reads the name of a load case, "" after a problem.
func (r *reader) name(c cell) string {
	name := c.text
	if strings.Contains(name, "  ") || strings.Contains(name, "\t") {
		name = strings.Join(strings.Fields(name), " ")
	}
	switch n := utf8.RuneCountInString(name); {
	case n == 0:
		r.at(c.offset, "load_case is empty", "name the load case in each row")
	case n > maxName:
		r.at(c.offset, fmt.Sprintf("load_case has %d characters", n), fmt.Sprintf("use at most %d", maxName))
	}
	return name
}

// bolt reads a bolt's number.
func (r *reader) bolt(c cell) int {
	if c.text == "" {
		r.at(c.offset, "bolt is empty", "state the number of the bolt, from 1")
		return 0
	}
	n, err := strconv.Atoi(c.text)
	switch {
	case errors.Is(err, strconv.ErrRange), err == nil && (n < 1 || n > MaxBolts):
		r.at(c.offset, fmt.Sprintf("bolt is %s", c.text), fmt.Sprintf("bolts are numbered from 1, to %d at most", MaxBolts))
	case err != nil || strconv.Itoa(n) != c.text: // not 04, +4, 4.0 or 4e0
		r.at(c.offset, fmt.Sprintf("bolt: %q is not a whole number", c.text), "write it as 8")
	}
	return n
}

// force reads a force in N.
func (r *reader) force(k int, c cell) float64 {
	switch c.text {
	case "":
		r.at(c.offset, forceHeads[k]+" is empty", "state 0 where there is no force")
		return 0
	case "0":
		return 0
	}
	v, err := strconv.ParseFloat(c.text, 64)
	if err != nil || v == 0 || strings.Trim(c.text, "0123456789.+-eE") != "" { // none, or one to look at
		v, err = quantity.Parse(c.text, quantity.Number)
	}
	if err != nil {
		mend := "write the number as 12.5 or 1.25e4, its unit in the head of the column"
		var e *quantity.Error
		if errors.As(err, &e) && strings.Contains(e.Message, "comma") {
			mend = e.Mend
		}
		r.at(c.offset, forceHeads[k]+": "+err.Error(), mend)
		return 0
	}
	v *= r.factor[k]
	if v > mostForce || v < -mostForce {
		r.at(c.offset, fmt.Sprintf("%s is %s; it must be at most %s", forceHeads[k], quantity.Format(v, quantity.Force),
			quantity.Format(mostForce, quantity.Force)), "check the unit in the head of the column")
	}
	return v
}

// keep takes a row in, unless it stands there already.
func (r *reader) keep(name string, s Share, cells []cell) {
	i, known := r.index[name]
	if !known {
		i = len(r.cases)
		name = strings.Clone(name) // without the rest of its line
		r.index[name] = i
		r.cases = append(r.cases, loadCase{name: name, number: r.number, line: r.line, offset: cells[r.caseAt].offset})
	}
	at := place{int32(i), int32(s.Bolt)}
	if line, twice := r.rows[at]; twice {
		r.at(cells[r.boltAt].offset, fmt.Sprintf("load case %q has bolt %d here and in line %d", name, s.Bolt, line),
			"keep one of the rows")
		return
	}
	r.rows[at] = int32(r.number)
	r.cases[i].bolts++
	s.Case = r.cases[i].name
	r.shares = append(r.shares, s)
}
