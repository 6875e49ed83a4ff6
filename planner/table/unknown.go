package table

import "fmt"

// UnknownError says that a designation is not in a table.
type UnknownError struct {
	Kind  string   // what was looked up: "thread", "material", ...
	Name  string   // the designation that was asked for
	Known []string // every designation of that kind, in table order
}

// Error names the kind and the designation; the known ones are left to the
// caller, who knows how much room there is.
func (e *UnknownError) Error() string {
	return fmt.Sprintf("unknown %s %q", e.Kind, e.Name)
}
