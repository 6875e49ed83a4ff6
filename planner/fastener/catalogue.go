package fastener

import (
	"fmt"
	"strings"

	"clampback/planner/table"
)

// catalogue holds the records of one table by designation and thread size.
type catalogue[T any] struct {
	what  string   // "head", "nut", ...
	kinds []string // designations in table order
	sizes map[string][]float64
	at    map[entry]T
}

// entry is one designation at one nominal diameter in mm.
type entry struct {
	kind     string
	diameter float64
}

func newCatalogue[T any](what string) *catalogue[T] {
	return &catalogue[T]{what: what, sizes: map[string][]float64{}, at: map[entry]T{}}
}

func (c *catalogue[T]) add(kind string, diameter float64, record T) {
	if _, known := c.sizes[kind]; !known {
		c.kinds = append(c.kinds, kind)
	}
	c.sizes[kind] = append(c.sizes[kind], diameter)
	c.at[entry{kind, diameter}] = record
}

// find returns the record, a *table.UnknownError for an unknown designation, or a
// plain error that names the sizes there are.
func (c *catalogue[T]) find(kind string, t Thread) (T, error) {
	if record, found := c.at[entry{kind, t.Diameter}]; found {
		return record, nil
	}
	var none T
	sizes, known := c.sizes[kind]
	if !known {
		return none, &table.UnknownError{Kind: c.what, Name: kind, Known: c.kindsAt(t)}
	}
	var names []string
	for _, d := range sizes {
		if isInchSize(d) == t.Inch {
			names = append(names, nominal(d))
		}
	}
	if len(names) == 0 {
		return none, &table.UnknownError{Kind: c.what, Name: kind, Known: c.kindsAt(t)}
	}
	return none, fmt.Errorf("no %s %q of size %s: the table has %s", c.what, kind, nominal(t.Diameter),
		strings.Join(names, ", "))
}

// kindsAt lists the designations that threads of that system have.
func (c *catalogue[T]) kindsAt(t Thread) []string {
	var kinds []string
	for _, kind := range c.kinds {
		for _, d := range c.sizes[kind] {
			if isInchSize(d) == t.Inch {
				kinds = append(kinds, kind)
				break
			}
		}
	}
	return kinds
}
