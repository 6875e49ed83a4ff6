package fastener

import (
	"strings"
	"sync"

	"clampback/planner/table"
)

// Caution is what to heed with a property class besides its strength.
type Caution struct {
	Kind   string // "hydrogen", "seizing"
	Text   string
	Source string
}

type classCaution struct {
	prefix string
	Caution
}

var cautions = sync.OnceValue(func() []classCaution {
	var all []classCaution
	for _, r := range table.Read(tables, "cautions.csv") {
		all = append(all, classCaution{r.Text("prefix"), Caution{r.Text("kind"), r.Text("caution"), r.Text("source")}})
	}
	return all
})

// Cautions returns what to heed with the class; none for most.
func (c PropertyClass) Cautions() []Caution {
	var found []Caution
	for _, k := range cautions() {
		if strings.HasPrefix(c.Name, k.prefix) {
			found = append(found, k.Caution)
		}
	}
	return found
}
