package sheet

import "github.com/xuri/excelize/v2"

// styles are the cell formats of the book. What is an input shows by a frame
// and a word, not by colour alone.
type styles struct {
	title    int
	heading  int
	text     int
	wrapped  int
	bold     int
	verdict  int // bold, clear of the number to its left
	warning  int
	inputs   map[string]int // by number format, unlocked
	computed map[string]int // by number format, locked
}

// formats are all number formats.
var formats = []string{"0", "0.000", "0.00", "0.00##", "0.0", "0.0000E+00", "0%", "0.####", noneFormat, noneAngle}

// Formats of what an infeasible joint does not have.
const (
	noneFormat = `0.00##;-0.00##;"none"`
	noneAngle  = `0.0;-0.0;"none"`
)

// formatOf returns the number format of a unit.
func formatOf(unit string) string {
	switch unit {
	case "N":
		return "0"
	case "mm":
		return "0.000"
	case "N.m":
		return "0.00##" // a setting may have a fine step
	case "mm2", "N/mm":
		return "0.00"
	case "MPa", "deg", "degC", "um":
		return "0.0"
	case "mm/N", "1/mm", "1/K", "deg/N":
		return "0.0000E+00"
	}
	return "0.####"
}

func newStyles(f *excelize.File) (styles, error) {
	s := styles{inputs: map[string]int{}, computed: map[string]int{}}
	frame := []excelize.Border{
		{Type: "left", Color: "000000", Style: 1}, {Type: "right", Color: "000000", Style: 1},
		{Type: "top", Color: "000000", Style: 1}, {Type: "bottom", Color: "000000", Style: 1},
	}
	hairline := []excelize.Border{{Type: "bottom", Color: "BFBFBF", Style: 4}}
	top := &excelize.Alignment{Vertical: "top", WrapText: true}
	const family = "Calibri"
	number := &excelize.Alignment{Vertical: "top", Horizontal: "right", Indent: 1}
	plain := map[*int]*excelize.Style{
		&s.title: {Font: &excelize.Font{Family: family, Bold: true, Size: 14}},
		&s.heading: {Font: &excelize.Font{Family: family, Bold: true, Size: 11},
			Fill: excelize.Fill{Type: "pattern", Pattern: 1, Color: []string{"D9D9D9"}}, Alignment: top},
		&s.text:    {Border: hairline, Alignment: &excelize.Alignment{Vertical: "top"}},
		&s.wrapped: {Border: hairline, Alignment: top},
		&s.bold: {Font: &excelize.Font{Family: family, Bold: true, Size: 11},
			Alignment: &excelize.Alignment{Vertical: "top"}},
		&s.verdict: {Font: &excelize.Font{Family: family, Bold: true, Size: 11},
			Alignment: &excelize.Alignment{Vertical: "top", Horizontal: "left", Indent: 1}},
		&s.warning: {Font: &excelize.Font{Family: family, Bold: true, Size: 14},
			Alignment: &excelize.Alignment{Vertical: "top"}},
	}
	// The order of creation numbers the styles: it must not follow the map.
	for _, id := range []*int{&s.title, &s.heading, &s.text, &s.wrapped, &s.bold, &s.verdict, &s.warning} {
		var err error
		if *id, err = f.NewStyle(plain[id]); err != nil {
			return s, err
		}
	}
	for _, format := range formats {
		custom := format
		computed, err := f.NewStyle(&excelize.Style{CustomNumFmt: &custom, Border: hairline, Alignment: number})
		if err != nil {
			return s, err
		}
		input, err := f.NewStyle(&excelize.Style{
			CustomNumFmt: &custom, Border: frame, Alignment: number,
			Fill:       excelize.Fill{Type: "pattern", Pattern: 1, Color: []string{"FFF8DC"}},
			Protection: &excelize.Protection{Locked: false},
		})
		if err != nil {
			return s, err
		}
		s.computed[format], s.inputs[format] = computed, input
	}
	return s, nil
}
