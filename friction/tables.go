package friction

import (
	"embed"
	"sync"

	"clampback/planner/quantity"
	"clampback/planner/table"
)

//go:embed *.csv
var tables embed.FS

// Condition is a named state of surfaces and lubricant with its friction.
type Condition struct {
	Name     string
	Thread   quantity.Range // mu_G
	Head     quantity.Range // mu_K
	Examples string         // what belongs to the condition, in words
	Source   string
}

// GuideScatter is a guide range of the tightening factor alpha_A.
type GuideScatter struct {
	Name   string
	Factor quantity.Range
	Source string

	leastFrictionFrom float64
}

// FindCondition returns the condition of that name, or a
// *table.UnknownError with the names there are.
func FindCondition(name string) (Condition, error) {
	var known []string
	for _, c := range conditions() {
		if c.Name == name {
			return c, nil
		}
		known = append(known, c.Name)
	}
	return Condition{}, &table.UnknownError{Kind: "friction condition", Name: name, Known: known}
}

// GuideFor returns the guide row of the tightening factor for a torque wrench
// with estimated friction whose least coefficient is leastFriction.
func GuideFor(leastFriction float64) GuideScatter {
	rows := guides()
	found := rows[0]
	for _, g := range rows {
		if leastFriction >= g.leastFrictionFrom {
			found = g
		}
	}
	return found
}

var conditions = sync.OnceValue(func() []Condition {
	var all []Condition
	for _, r := range table.Read(tables, "conditions.csv") {
		all = append(all, Condition{
			Name:     r.Text("name"),
			Thread:   quantity.Range{Low: r.Number("thread_low"), High: r.Number("thread_high")},
			Head:     quantity.Range{Low: r.Number("head_low"), High: r.Number("head_high")},
			Examples: r.Text("examples"),
			Source:   r.Text("source"),
		})
	}
	return all
})

var guides = sync.OnceValue(func() []GuideScatter {
	var all []GuideScatter
	for _, r := range table.Read(tables, "scatter.csv") {
		all = append(all, GuideScatter{
			Name:              r.Text("name"),
			Factor:            quantity.Range{Low: r.Number("low"), High: r.Number("high")},
			Source:            r.Text("source"),
			leastFrictionFrom: r.Number("least_friction_from"),
		})
	}
	return all
})
