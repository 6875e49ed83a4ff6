package friction_test

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/friction"
	"clampback/planner/quantity"
	"clampback/planner/table"
)

// VDI 2230-1 Table A5, friction classes (ids CV1209 to CV1212, seen in reprints).
func TestFrictionClasses(t *testing.T) {
	printed := map[string]quantity.Range{
		"class A": {Low: 0.04, High: 0.10},
		"class B": {Low: 0.08, High: 0.16},
		"class C": {Low: 0.14, High: 0.24},
		"class D": {Low: 0.20, High: 0.35},
	}
	for name, want := range printed {
		c, err := friction.FindCondition(name)
		require.NoError(t, err)
		assert.Equal(t, want, c.Thread)
		assert.Equal(t, want, c.Head)
		assert.NotEmpty(t, c.Source)
	}
}

func TestUnknownConditionNamesTheKnown(t *testing.T) {
	_, err := friction.FindCondition("class F")
	var unknown *table.UnknownError
	require.ErrorAs(t, err, &unknown)
	assert.Contains(t, unknown.Known, "class B")
}

// VDI 2230-1:2003 Table A8, torque wrench with estimated friction (ids CV1199
// and CV1200, from memory), and its agreement with the scatter column:
// alpha_A = (1 + s)/(1 - s).
func TestGuideScatter(t *testing.T) {
	assert.Equal(t, quantity.Range{Low: 1.7, High: 2.5}, friction.GuideFor(0.04).Factor)
	assert.Equal(t, quantity.Range{Low: 1.6, High: 2.0}, friction.GuideFor(0.08).Factor)
	assert.Equal(t, quantity.Range{Low: 1.6, High: 2.0}, friction.GuideFor(0.14).Factor)
	factor := func(s float64) float64 { return (1 + s) / (1 - s) }
	assert.InDelta(t, 1.6, factor(0.23), 0.005)
	assert.InDelta(t, 2.0, factor(0.33), 0.02, "printed 33 %")
	assert.InDelta(t, 2.5, factor(0.43), 0.01)
}
