package sheet

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

func TestPlaceholders(t *testing.T) {
	n := numbers{"x": 3, "y": 3, "z": 1}
	cases := []struct {
		formula string
		index   int
		want    string
	}{
		{"a+b", 0, "a+b"},
		{"x_{i}*2", 2, "x_2*2"},
		{"{before x}+1", 1, "0+1"},
		{"{before x}+1", 3, "x_2+1"},
		{"{sum x}", 0, "x_1+x_2+x_3"},
		{"MIN(a,{list z})", 0, "MIN(a,z_1)"},
		{"{products x y}", 0, "x_1*y_1+x_2*y_2+x_3*y_3"},
	}
	for _, c := range cases {
		got, err := n.expand(c.formula, c.index)
		require.NoError(t, err)
		assert.Equal(t, c.want, got)
	}
	for _, bad := range []string{"{i}", "{sum q}", "{products x z}", "{open", "{}", "{before x}"} {
		_, err := n.expand(bad, 0)
		assert.Error(t, err, bad)
	}
}
