package sheet

import (
	"fmt"
	"strings"
	"unicode/utf8"

	"clampback/planner"
)

// The sheets that are not joints.
const (
	registerSheet = "Register"
	aboutSheet    = "About"
)

// maxSheetName is the longest name of a sheet, characters.
const maxSheetName = 31

// sheetNames returns a sheet name for each plan: its id, shortened and numbered
// where it is too long, taken or reserved. Names are unique without case.
func sheetNames(plans []planner.Plan) []string {
	taken := map[string]bool{
		strings.ToLower(registerSheet): true,
		strings.ToLower(aboutSheet):    true,
		"sheet1":                       true, // the library's first sheet, renamed later
		"history":                      true, // reserved by spreadsheet programs
	}
	names := make([]string, len(plans))
	for i, p := range plans {
		name := p.ID
		for n := 2; len(name) > maxSheetName || taken[strings.ToLower(name)]; n++ {
			suffix := fmt.Sprintf("~%d", n)
			name = p.ID[:min(len(p.ID), maxSheetName-len(suffix))] + suffix
		}
		taken[strings.ToLower(name)] = true
		names[i] = name
	}
	return names
}

// quoted returns a sheet name as formulas write it.
func quoted(sheet string) string { return "'" + strings.ReplaceAll(sheet, "'", "''") + "'" }

// clean removes what XML cannot hold. Text that begins with = + - @ needs no
// change: it is written as text cells, never as formulas.
func clean(s string) string {
	return strings.Map(func(r rune) rune {
		switch {
		case r == '\t' || r == '\n' || r == '\r':
			return ' '
		case r < ' ' || r == utf8.RuneError || r == 0xfffe || r == 0xffff:
			return -1
		}
		return r
	}, s)
}
