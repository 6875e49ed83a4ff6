package planner

import (
	"fmt"
	"strings"

	"clampback/planner/quantity"
)

// Fault is one thing that is wrong with a joint. Path names the field as the
// register spells it ("clamped[1].hole"), so that a reader can point at it.
type Fault struct {
	Path    string
	Rests   []string // the other fields the rule looked at: without them it says nothing
	Message string   // what is wrong, with the numbers
	Mend    string   // how to put it right
}

// FaultsError is every fault of one joint.
type FaultsError struct {
	ID     string
	Faults []Fault
}

// Error lists the faults on one line.
func (e *FaultsError) Error() string {
	texts := make([]string, len(e.Faults))
	for i, f := range e.Faults {
		texts[i] = f.Path + ": " + f.Message
	}
	return "joint " + e.ID + ": " + strings.Join(texts, "; ")
}

// place is the field that a rule judges, and the other fields it rests on. Its
// path is only put together for what fails.
type place struct {
	list  string // the list whose item is judged; empty: field is the whole path
	index int
	field string
	rests []string
}

func at(field string, rests ...string) place { return place{field: field, rests: rests} }

// itemOf is a field of a list's item: "clamped[1].hole".
func itemOf(list string, index int, field string, rests ...string) place {
	return place{list, index, field, rests}
}

func (p place) path() string {
	if p.list == "" {
		return p.field
	}
	return fmt.Sprintf("%s[%d].%s", p.list, p.index, p.field)
}

// measured is a value that messages print with its unit, when they are printed.
type measured struct {
	value     float64
	dimension quantity.Dimension
}

func (m measured) String() string { return quantity.Format(m.value, m.dimension) }

func mm(value float64) measured { return measured{value, quantity.Length} }

// bounds is what a number may be. Their ends lie far outside any joint: they
// catch slips of unit, and keep every result a finite number.
type bounds struct {
	dimension quantity.Dimension
	least     float64 // smallest value above 0
	most      float64
}

var (
	lengths    = bounds{quantity.Length, 0.01, 100e3}
	areas      = bounds{quantity.Area, 1e-4, 1e10}
	forces     = bounds{quantity.Force, 1e-3, 1e9}
	torques    = bounds{quantity.Torque, 1, 1e12}
	pressures  = bounds{quantity.Pressure, 1e-3, 1e6}
	moduli     = bounds{quantity.Pressure, 1, 2e6} // rubber to diamond
	cycleRange = bounds{quantity.Number, 1, 1e15}
)

// validator gathers faults.
type validator struct{ faults []Fault }

// require adds a fault unless ok.
func (v *validator) require(ok bool, where place, mend, format string, args ...any) bool {
	if !ok {
		v.faults = append(v.faults, Fault{where.path(), where.rests, fmt.Sprintf(format, args...), mend})
	}
	return ok
}

// positive requires a number above 0.
func (v *validator) positive(value float64, b bounds, where place, what, mend string) {
	if !v.require(value > 0, where, mend, "%s is %s; it must be above 0", what, measured{value, b.dimension}) {
		return
	}
	v.require(value >= b.least && value <= b.most, where, mend, "%s is %s; it must lie between %s and %s", what,
		measured{value, b.dimension}, measured{b.least, b.dimension}, measured{b.most, b.dimension})
}

// positiveOrNone requires a number above 0, or 0 for none.
func (v *validator) positiveOrNone(value float64, b bounds, where place, what, mend string) {
	if value != 0 {
		v.positive(value, b, where, what, mend)
	}
}

// notNegative requires a number of 0 or more.
func (v *validator) notNegative(value float64, b bounds, where place, what string) {
	const mend = "state it as a positive number, or leave it out"
	if v.require(value >= 0, where, mend, "%s is %s; it cannot be negative", what, measured{value, b.dimension}) {
		v.require(value <= b.most, where, mend, "%s is %s; it must be at most %s", what, measured{value, b.dimension},
			measured{b.most, b.dimension})
	}
}

// coefficient requires a possible coefficient of friction.
func (v *validator) coefficient(mu quantity.Range, where place, what, mend string) {
	const least, most = 0.001, 1
	text := quantity.Format(mu.Low, quantity.Ratio)
	if !mu.IsSingle() {
		text += " to " + quantity.Format(mu.High, quantity.Ratio)
	}
	v.require(mu.Low >= least && mu.High <= most && mu.Low <= mu.High, where, mend,
		"%s is %s; a coefficient of friction lies between %g and %d", what, text, least, most)
}
