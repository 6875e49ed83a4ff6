package group

import (
	"fmt"
	"slices"
	"strings"
)

// complete requires rows, and of each case every bolt that another has. It says
// nothing while rows could not be read.
func (r *reader) complete() {
	if len(r.problems) > 0 {
		return
	}
	if len(r.shares) == 0 {
		r.at(0, "the table has no rows", "add a row for each bolt in each load case")
		return
	}
	seen := make([]bool, MaxBolts+1)
	for _, s := range r.shares {
		seen[s.Bolt] = true
	}
	for bolt, found := range seen {
		if found {
			r.bolts = append(r.bolts, bolt)
		}
	}
	for i, c := range r.cases {
		if c.bolts == len(r.bolts) || r.full() {
			continue
		}
		var missing []int
		for _, bolt := range r.bolts {
			if _, found := r.rows[place{int32(i), int32(bolt)}]; !found {
				missing = append(missing, bolt)
			}
		}
		r.number, r.line = c.number, c.line
		r.at(c.offset, fmt.Sprintf("load case %q lacks %s, which other cases have", c.name, listBolts(missing)),
			"add the rows, with 0 where a bolt gets nothing")
	}
}

// listBolts names bolts: "bolt 3", "bolts 3, 4 and 5", "bolts 3, 4, 5, 6, 7 and 20 more".
func listBolts(bolts []int) string {
	const listed = 5
	if len(bolts) == 1 {
		return fmt.Sprintf("bolt %d", bolts[0])
	}
	texts := make([]string, 0, listed+1)
	for i, bolt := range bolts {
		if i == listed && len(bolts) > listed+1 {
			texts = append(texts, fmt.Sprintf("%d more", len(bolts)-listed))
			break
		}
		texts = append(texts, fmt.Sprint(bolt))
	}
	last := len(texts) - 1
	return "bolts " + strings.Join(texts[:last], ", ") + " and " + texts[last]
}

// ordered returns the shares by case and bolt: a complete table has as many rows
// a case as bolts.
func (r *reader) ordered() []Share {
	n := len(r.bolts)
	inOrder := true
	for i := 0; i < len(r.shares) && inOrder; i++ {
		s := r.shares[i]
		inOrder = s.Bolt == r.bolts[i%n] && s.Case == r.cases[i/n].name
	}
	if inOrder {
		return r.shares
	}
	shares := make([]Share, len(r.shares))
	for _, s := range r.shares {
		rank, _ := slices.BinarySearch(r.bolts, s.Bolt)
		shares[r.index[s.Case]*n+rank] = s
	}
	return shares
}
