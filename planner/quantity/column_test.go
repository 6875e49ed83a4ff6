package quantity_test

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner/quantity"
)

// A number of a column times the factor is what Parse makes of number and unit.
func TestFactorIsThatOfParse(t *testing.T) {
	for name, d := range map[string]quantity.Dimension{"N": quantity.Force, "kN": quantity.Force, "lbf": quantity.Force,
		"kip": quantity.Force, "N.m": quantity.Torque, "in": quantity.Length} {
		factor, err := quantity.Factor(name, d)
		require.NoError(t, err)
		want, err := quantity.Parse("12.7 "+name, d)
		require.NoError(t, err)
		assert.InDelta(t, want, 12.7*factor, 0, name)
	}
	for name, want := range map[string]string{"mm": `"mm" is a length, but a force belongs here`, "KN": `unknown unit "KN"`,
		"": `"" has no unit`} {
		_, err := quantity.Factor(name, quantity.Force)
		assert.EqualError(t, err, want)
	}
}
