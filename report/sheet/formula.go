package sheet

import (
	"fmt"
	"io/fs"
	"strconv"
	"strings"

	"clampback/planner"
	"clampback/templates"
)

// formulas are the lines of templates/calculation.csv and checks.csv by rule.
type formulas struct {
	lines  map[string]string
	checks map[string]checkFormula
}

// checkFormula is a check's value and limit.
type checkFormula struct{ value, limit string }

// readFormulas reads the formulas of a folder laid out as templates is.
func readFormulas(folder fs.FS) (formulas, error) {
	f := formulas{map[string]string{}, map[string]checkFormula{}}
	calculation, err := templates.Rows(folder, "calculation.csv", 2)
	if err != nil {
		return f, err
	}
	for _, r := range calculation {
		f.lines[r[0]] = r[1]
	}
	checks, err := templates.Rows(folder, "checks.csv", 3)
	if err != nil {
		return f, err
	}
	for _, r := range checks {
		f.checks[r[0]] = checkFormula{r[1], r[2]}
	}
	return f, nil
}

// numbers says how many lines each repeated symbol of a plan has; 0 for a symbol
// that is not repeated.
type numbers map[string]int

func countRepeated(trace []planner.Line) numbers {
	n := numbers{}
	for _, l := range trace {
		if l.Index == 0 {
			n[l.Symbol] += 0 // delta_S stands beside delta_S_1
		} else {
			n[strings.TrimSuffix(l.Symbol, "_"+strconv.Itoa(l.Index))] = l.Index
		}
	}
	return n
}

// expand fills the placeholders of a formula for the line with an index.
//
//	{i}              the index
//	{before x}       symbol x one line earlier, 0 for the first
//	{sum x}          x_1+x_2+...
//	{list x}         x_1,x_2,...
//	{products x y}   x_1*y_1+x_2*y_2+...
//	{each x f}       f for each number of x, # in it replaced, added up
//	{opt x y}        x when the plan has the symbol, y when not
//
// # in a symbol stands for the index.
func (n numbers) expand(formula string, index int) (string, error) {
	var out strings.Builder
	for {
		before, rest, found := strings.Cut(formula, "{")
		out.WriteString(before)
		if !found {
			return out.String(), nil
		}
		placeholder, after, closed := strings.Cut(rest, "}")
		if !closed {
			return "", fmt.Errorf("the placeholder {%s is not closed", rest)
		}
		text, err := n.placeholder(placeholder, index)
		if err != nil {
			return "", err
		}
		out.WriteString(text)
		formula = after
	}
}

func (n numbers) placeholder(p string, index int) (string, error) {
	words := strings.Fields(p)
	if len(words) == 3 && words[0] == "each" && n[words[1]] > 0 {
		return n.each(words[1], words[2]), nil
	}
	words = strings.Fields(strings.ReplaceAll(p, "#", strconv.Itoa(index)))
	if index > 0 {
		switch {
		case p == "i":
			return strconv.Itoa(index), nil
		case len(words) == 2 && words[0] == "before":
			return before(words[1], index), nil
		}
	}
	return n.ofSymbols(p, words)
}

// ofSymbols fills a placeholder that does not rest on the line's own number.
func (n numbers) ofSymbols(p string, words []string) (string, error) {
	if len(words) == 3 && words[0] == "opt" {
		return n.either(words[1], words[2]), nil
	}
	if len(words) > 1 && n[words[1]] > 0 {
		switch {
		case len(words) == 2 && words[0] == "sum":
			return n.join("+", words[1]), nil
		case len(words) == 2 && words[0] == "list":
			return n.join(",", words[1]), nil
		case len(words) == 3 && words[0] == "products" && n[words[1]] == n[words[2]]:
			return n.join("+", words[1], words[2]), nil
		}
	}
	return "", fmt.Errorf("the placeholder {%s} cannot be filled", p)
}

func before(symbol string, index int) string {
	if index == 1 {
		return "0"
	}
	return symbol + "_" + strconv.Itoa(index-1)
}

// each adds up a term for each number of a symbol.
func (n numbers) each(symbol, term string) string {
	terms := make([]string, n[symbol])
	for i := range terms {
		terms[i] = strings.ReplaceAll(term, "#", strconv.Itoa(i+1))
	}
	return strings.Join(terms, "+")
}

// either returns a symbol where the plan has it, and what stands for it where not.
func (n numbers) either(symbol, other string) string {
	if _, has := n[symbol]; has {
		return symbol
	}
	return other
}

// join writes one term for each number of the first symbol: the product of all
// symbols at that number.
func (n numbers) join(separator string, symbols ...string) string {
	terms := make([]string, n[symbols[0]])
	for i := range terms {
		factors := make([]string, len(symbols))
		for k, s := range symbols {
			factors[k] = s + "_" + strconv.Itoa(i+1)
		}
		terms[i] = strings.Join(factors, "*")
	}
	return strings.Join(terms, separator)
}
