package planner_test

import (
	"go/parser"
	"math"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner"
	"clampback/planner/internal/published"
)

// Worked examples of textbooks and handbooks as whole chains: each example is
// stated as a Joint, planned by Work, and every figure that its source prints is
// compared with the lines of the trace. A row of worked_examples.csv says how:
//
//	digit    ours agrees to half a unit of the last printed digit
//	rounded  the source went on with rounded numbers: the deviation lies in a band of a percent
//	model    the source uses another model: the deviation lies in a band that leaves its size in no doubt
func TestWorkedExamples(t *testing.T) {
	joints := exampleJoints(t)
	plans := map[string]planner.Plan{}
	for name, j := range joints {
		plans[name] = work(t, j)
	}
	kinds := map[string]int{}
	compared := map[string]int{}
	for _, row := range published.Rows(t, "worked_examples.csv") {
		name := row["example"]
		plan, found := plans[name]
		require.True(t, found, "no joint for %q", name)
		compared[name]++
		kinds[row["tolerance_kind"]]++
		t.Run(name+" "+row["quantity"], func(t *testing.T) { compareFigure(t, row, plan) })
	}
	for name := range joints {
		assert.NotZero(t, compared[name], "nothing printed is compared for %s", name)
	}
	assert.Equal(t, map[string]int{"digit": 92, "rounded": 29, "model": 26}, kinds, "no row goes missing")
}

// compareFigure compares one printed figure with the plan.
func compareFigure(t *testing.T, row map[string]string, plan planner.Plan) {
	factor, found := unitFactors[row["unit"]]
	require.True(t, found, "unit %q", row["unit"])
	printed, half := published.Number(t, row, "printed")
	ours := evaluate(t, row["our_symbol"], plan) / factor
	deviation := 100 * (ours/printed - 1)
	t.Logf("%s: printed %s %s, ours %.6g, %+.2f %%: %s", row["symbol"], row["printed"], row["unit"], ours, deviation, row["cause"])
	switch kind := row["tolerance_kind"]; kind {
	case "digit":
		assert.Empty(t, row["deviation_pct"], "the last digit is the tolerance")
		assert.LessOrEqual(t, math.Abs(ours-printed), half*1.0001, "%s: printed %g, ours %g", row["symbol"], printed, ours)
	case "rounded", "model":
		low, high := band(t, row["deviation_pct"])
		widest := map[string]float64{"rounded": 0.5, "model": 2}[kind]
		assert.LessOrEqual(t, high-low, widest, "the band is no check")
		assert.NotEmpty(t, row["cause"])
		assert.GreaterOrEqual(t, deviation, low, "%s: printed %g, ours %g", row["symbol"], printed, ours)
		assert.LessOrEqual(t, deviation, high, "%s: printed %g, ours %g", row["symbol"], printed, ours)
	default:
		require.Fail(t, "tolerance kind "+strconv.Quote(kind))
	}
}

// band reads "-1.5 to 2".
func band(t *testing.T, text string) (low, high float64) {
	from, to, found := strings.Cut(text, " to ")
	require.True(t, found, "band %q", text)
	low, err := strconv.ParseFloat(from, 64)
	require.NoError(t, err)
	high, err = strconv.ParseFloat(to, 64)
	require.NoError(t, err)
	require.Less(t, low, high)
	return low, high
}

// Units of the sources in N, mm, MPa, N.m.
const (
	inch = 25.4        // mm
	lbf  = 4.448221615 // N
	ksi  = 1000 * lbf / (inch * inch)
)

var unitFactors = map[string]float64{
	"-": 1, "N": 1, "kN": 1000, "MPa": 1, "N.m": 1,
	"lbf": lbf, "kip": 1000 * lbf, "psi": ksi / 1000, "kpsi": ksi, "in2": inch * inch,
	"lbf.in": lbf * inch / 1000, "Mlbf/in": 1e6 * lbf / inch,
}

// The expressions of the table are arithmetic on trace symbols and nothing else.
func TestExpressionsOfTheTable(t *testing.T) {
	plan := planner.Plan{Trace: []planner.Line{{Symbol: "F_A", Value: 6}, {Symbol: "k_1", Value: 2}}}
	for text, want := range map[string]float64{
		"F_A": 6, "F_A/k_1": 3, "1/(F_A+k_1)": 0.125, "F_A-k_1*2": 2, "1.5*(F_A-2)": 6,
	} {
		assert.InDelta(t, want, evaluate(t, text, plan), 1e-12, text)
	}
	for _, text := range []string{"sqrt(F_A)", "F_B", "F_A%k_1", "-F_A"} {
		tree, err := parser.ParseExpr(text)
		require.NoError(t, err)
		_, err = evaluateTree(tree, plan)
		assert.Error(t, err, text)
	}
}
