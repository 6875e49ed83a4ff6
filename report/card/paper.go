package card

import (
	"fmt"
	"strings"
)

// Paper is a size of paper, portrait.
type Paper struct {
	name   string
	width  float64 // mm
	height float64 // mm
	scale  float64 // of type and spacing, 1 on A5
}

// The papers. The zero Paper prints as A5.
var (
	A5     = Paper{"A5", 148, 210, 1}
	A4     = Paper{"A4", 210, 297, 1.35}
	Letter = Paper{"letter", 215.9, 279.4, 1.3}
)

// ParsePaper returns the paper of a name, whatever its case.
func ParsePaper(name string) (Paper, error) {
	for _, p := range []Paper{A5, A4, Letter} {
		if strings.EqualFold(p.name, name) {
			return p, nil
		}
	}
	return Paper{}, fmt.Errorf("unknown paper %q", name)
}
