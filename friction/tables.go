package friction

import (
	"bytes"
	_ "embed"
	"encoding/csv"
	"fmt"
	"strconv"
	"sync"

	"clampback/planner/fastener"
	"clampback/planner/quantity"
)

//go:embed conditions.csv
var conditionsCSV []byte

//go:embed scatter.csv
var scatterCSV []byte

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
// *fastener.UnknownError with the names there are.
func FindCondition(name string) (Condition, error) {
	var known []string
	for _, c := range conditions() {
		if c.Name == name {
			return c, nil
		}
		known = append(known, c.Name)
	}
	return Condition{}, &fastener.UnknownError{Kind: "friction condition", Name: name, Known: known}
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
	for _, r := range readTable(conditionsCSV) {
		all = append(all, Condition{
			Name:     r.text("name"),
			Thread:   quantity.Range{Low: r.number("thread_low"), High: r.number("thread_high")},
			Head:     quantity.Range{Low: r.number("head_low"), High: r.number("head_high")},
			Examples: r.text("examples"),
			Source:   r.text("source"),
		})
	}
	return all
})

var guides = sync.OnceValue(func() []GuideScatter {
	var all []GuideScatter
	for _, r := range readTable(scatterCSV) {
		all = append(all, GuideScatter{
			Name:              r.text("name"),
			Factor:            quantity.Range{Low: r.number("low"), High: r.number("high")},
			Source:            r.text("source"),
			leastFrictionFrom: r.number("least_friction_from"),
		})
	}
	return all
})

// row is one line of an embedded table by column name.
type row map[string]string

// readTable panics on a damaged table: the tables are part of the program and
// the tests read every one.
func readTable(data []byte) []row {
	r := csv.NewReader(bytes.NewReader(data))
	r.Comment = '#'
	records, err := r.ReadAll()
	if err != nil {
		panic(fmt.Sprintf("embedded friction table: %v", err))
	}
	var rows []row
	for _, record := range records[1:] {
		named := row{}
		for i, column := range records[0] {
			named[column] = record[i]
		}
		rows = append(rows, named)
	}
	return rows
}

func (r row) text(column string) string { return r[column] }

func (r row) number(column string) float64 {
	v, err := strconv.ParseFloat(r[column], 64)
	if err != nil {
		panic(fmt.Sprintf("embedded friction table, column %s: %v", column, err))
	}
	return v
}
