package planner

import "strconv"

// The sources that the trace cites most.
const (
	stated     = "stated in the register"
	guideline  = "VDI 2230-1:2015 "
	iso724     = "ISO 724"
	iso898     = "ISO 898-1"
	asme       = "ASME B1.1"
	arithmetic = "arithmetic"
)

// input puts down a number that is stated or looked up.
func (w *work) input(symbol, meaning string, value float64, unit, source string) {
	w.trace = append(w.trace, Line{Symbol: symbol, Meaning: meaning, Value: value, Unit: unit, Source: source, Input: true})
}

// line puts down a computed number and returns it. Its formula in
// templates/calculation.csv goes by the symbol.
func (w *work) line(symbol, meaning string, value float64, unit, source string) float64 {
	return w.lineBy(symbol, symbol, meaning, value, unit, source)
}

// lineBy is line for a symbol with more than one formula: rule says which.
func (w *work) lineBy(rule, symbol, meaning string, value float64, unit, source string) float64 {
	w.trace = append(w.trace, Line{Symbol: symbol, Meaning: meaning, Value: value, Unit: unit, Source: source, Rule: rule})
	return value
}

// inputAt is input for place i, from 1, of a repeated line.
func (w *work) inputAt(i int, symbol, meaning string, value float64, unit, source string) {
	w.trace = append(w.trace, Line{
		Symbol: indexed(symbol, i), Meaning: meaning, Value: value, Unit: unit, Source: source, Input: true, Index: i,
	})
}

// lineAt is line for place i, from 1, of a repeated line; the rule is the
// symbol followed by "_i".
func (w *work) lineAt(i int, symbol, meaning string, value float64, unit, source string) float64 {
	w.trace = append(w.trace, Line{
		Symbol: indexed(symbol, i), Meaning: meaning, Value: value, Unit: unit, Source: source, Rule: symbol + "_i", Index: i,
	})
	return value
}

// safety puts down a safety factor that the register states; one that it leaves to
// the method is 1 and stands among the assumptions.
func (w *work) safety(symbol, meaning string, factor float64) {
	if factor > 0 {
		w.input(symbol, meaning, factor, "-", stated)
	}
}

func itoa(i int) string { return strconv.Itoa(i) }

func indexed(symbol string, i int) string { return symbol + "_" + strconv.Itoa(i) }

// assumed puts down what the plan takes for granted because nothing was
// stated, or because the method does.
func (w *work) assumed(text string) { w.assumptions = append(w.assumptions, text) }

// lineByAt is lineAt for a repeated line with more than one formula.
func (w *work) lineByAt(rule string, i int, symbol, meaning string, value float64, unit, source string) float64 {
	w.trace = append(w.trace, Line{
		Symbol: indexed(symbol, i), Meaning: meaning, Value: value, Unit: unit, Source: source, Rule: rule, Index: i,
	})
	return value
}
