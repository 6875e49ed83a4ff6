package planner

import "strings"

// Fault is one thing that is wrong with a joint. Path names the field as the
// register spells it ("clamped[1].hole"), so that a reader can point at it.
type Fault struct {
	Path    string
	Message string // what is wrong, with the numbers
	Mend    string // how to put it right
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
