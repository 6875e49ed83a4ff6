package register

import (
	"fmt"
	"slices"
	"strings"

	"clampback/planner"
	"clampback/planner/quantity"
)

func readTightening(f field) planner.Tightening {
	o := f.object("method", "scatter", "scatter_factor", "tool", "utilisation", "aim", "step", "snug", "snug_torque",
		"angle_step", "angle_tolerance", "elastic_spread")
	t := planner.Tightening{
		Method:        planner.Method(readWord(o, "method", []string{"torque", "torque and angle"}, "yield", "tension", "stretch")),
		Scatter:       planner.Scatter(readWord(o, "scatter", []string{"range", "guide"}, "chance")),
		Aim:           planner.Aim(readWord(o, "aim", []string{"high", "middle"})),
		ScatterFactor: o.some("scatter_factor", quantity.Number),
		Utilisation:   o.some("utilisation", quantity.Ratio),
		Step:          o.some("step", quantity.Torque),
		Snug:          o.some("snug", quantity.Ratio),
		SnugTorque:    o.some("snug_torque", quantity.Torque),
		AngleStep:     o.some("angle_step", quantity.Angle),
		AngleTol:      o.some("angle_tolerance", quantity.Angle),
		ElasticSpread: o.some("elastic_spread", quantity.Ratio),
	}
	if o.stated("tool") {
		tool := o.at("tool").object("name", "tolerance")
		tool.require("tolerance", "4 %")
		t.Tool = &planner.Tool{Name: tool.label("name"), Tolerance: tool.one("tolerance", quantity.Ratio)}
	}
	return t
}

// readWord reads one of the words that this version plans, "" when the key is
// absent. Words that registers have for what it does not plan are refused by name.
func readWord(o *object, key string, planned []string, unplanned ...string) string {
	if !o.stated(key) {
		return ""
	}
	f := o.at(key)
	if word := o.word(key); slices.Contains(unplanned, word) {
		f.wrong(fmt.Sprintf("%s: %q is not planned by this version", key, word), "state "+strings.Join(planned, " or "))
		return ""
	}
	return f.choice(planned...)
}
