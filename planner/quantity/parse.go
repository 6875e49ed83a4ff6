package quantity

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

// Error says what is wrong with the text of a quantity and how to mend it. The
// reader of the text adds the position.
type Error struct {
	Message string
	Mend    string
}

// Error returns the message without the mend.
func (e *Error) Error() string { return e.Message }

// Parse reads one number with its unit and returns it in the internal unit of
// the dimension. The error is an *Error.
func Parse(text string, d Dimension) (float64, error) {
	number, unitName := split(text)
	value, err := parseNumber(number, text, d)
	if err != nil {
		return 0, err
	}
	u, err := resolve(unitName, text, d)
	if err != nil {
		return 0, err
	}
	inner := value*u.factor + u.offset
	if math.IsInf(inner, 0) || (inner == 0 && value != 0 && u.offset == 0) {
		return 0, &Error{fmt.Sprintf("%q is outside the numbers that can be used", text),
			fmt.Sprintf("write it as %s", d.Example())}
	}
	return inner, nil
}

// ParseRange reads "low to high" with the unit after the last number or after
// both, or a single value. The error is an *Error.
func ParseRange(text string, d Dimension) (Range, error) {
	lowText, highText, isRange := cutRange(text)
	if !isRange {
		v, err := Parse(text, d)
		return Single(v), err
	}
	_, unitBefore := split(lowText)
	_, unitAfter := split(highText)
	if unitBefore != "" && unitAfter == "" && d != Number {
		return Range{}, &Error{fmt.Sprintf("%q has its unit after the lower end only", text),
			"write the unit after the last number, or after both"}
	}
	high, err := Parse(highText, d)
	if err != nil {
		return Range{}, err
	}
	if unitBefore == "" {
		lowText += " " + unitAfter
	}
	low, err := Parse(lowText, d)
	if err != nil {
		return Range{}, err
	}
	if low > high {
		return Range{}, &Error{fmt.Sprintf("%q runs backwards", text),
			"write the lower end first, for example \"" + strings.TrimSpace(highText) + " to ...\""}
	}
	return Range{Low: low, High: high}, nil
}

// cutRange cuts at the word "to".
func cutRange(text string) (low, high string, ok bool) {
	low, high, ok = strings.Cut(text, " to ")
	return strings.TrimSpace(low), strings.TrimSpace(high), ok
}

// split cuts a quantity into number and unit: at the first blank, or where the
// number ends.
func split(text string) (number, unitName string) {
	text = strings.TrimSpace(text)
	end := 0
	for end < len(text) && (strings.IndexByte("0123456789+-.,_", text[end]) >= 0 || isExponent(text, end)) {
		end++
	}
	return text[:end], strings.TrimSpace(text[end:])
}

// isExponent reports whether the byte is the e of "2e6".
func isExponent(text string, i int) bool {
	if (text[i] != 'e' && text[i] != 'E') || i == 0 || i+1 == len(text) {
		return false
	}
	next := text[i+1]
	return text[i-1] >= '0' && text[i-1] <= '9' && (next >= '0' && next <= '9' || next == '-' || next == '+')
}

func parseNumber(number, text string, d Dimension) (float64, error) {
	example := fmt.Sprintf("write it as %s", d.Example())
	switch {
	case number == "":
		return 0, &Error{fmt.Sprintf("%q is not %s", text, d.oneOf()), example}
	case strings.Contains(number, ","):
		return 0, &Error{fmt.Sprintf("%q has a comma", text), "use a point for decimals and no thousands separators"}
	case strings.Contains(number, "_"):
		return 0, &Error{fmt.Sprintf("%q has an underscore", text), "write the number without it"}
	}
	mantissa, _, _ := strings.Cut(strings.ToLower(number), "e")
	value, err := strconv.ParseFloat(number, 64)
	vanished := value == 0 && strings.ContainsAny(mantissa, "123456789") // too small to hold
	if err == nil && !vanished {
		return value, nil
	}
	if strings.Contains(strings.TrimLeft(mantissa, "+-"), "-") || strings.Contains(mantissa, "..") {
		example += "; a range has the word to between its ends"
	}
	return 0, &Error{fmt.Sprintf("%q is not a number that can be used", number), example}
}

// resolve finds the unit and checks that it belongs to the dimension.
func resolve(name, text string, d Dimension) (unit, error) {
	none := unit{dimension: d, factor: 1}
	if name == "" {
		if d == Number || d == Ratio {
			return none, nil
		}
		return unit{}, &Error{fmt.Sprintf("%q has no unit", text), fmt.Sprintf("add the unit: %s", unitsOf(d))}
	}
	if d == Number {
		return unit{}, &Error{fmt.Sprintf("%q has a unit, but a plain number belongs here", text), "leave the unit out"}
	}
	u, ok := findUnit(name)
	if !ok {
		if right, known := spellings[name]; known {
			return unit{}, &Error{fmt.Sprintf("unknown unit %q", name), fmt.Sprintf("write %s", right)}
		}
		return unit{}, &Error{fmt.Sprintf("unknown unit %q", name), fmt.Sprintf("use %s", unitsOf(d))}
	}
	if u.dimension != d {
		return unit{}, &Error{fmt.Sprintf("%q is %s, but %s belongs here", text, u.dimension.oneOf(), d.oneOf()),
			fmt.Sprintf("write it as %s", d.Example())}
	}
	return u, nil
}
