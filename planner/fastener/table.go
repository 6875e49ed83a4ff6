package fastener

import (
	"embed"
	"fmt"

	"clampback/planner/table"
)

//go:embed *.csv
var tables embed.FS

// source joins a row's source with how it was had, so that a reader of a
// plan can tell a value seen in print from one that was not.
func source(r table.Row) string {
	switch seen := r.Text("seen"); seen {
	case "seen":
		return r.Text("source")
	case "memory", "derived":
		return r.Text("source") + " (from memory)"
	default:
		panic(fmt.Sprintf("embedded fastener table: seen is %q", seen))
	}
}
