package published

import (
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// Every table says in its header what it holds, every row where it comes from
// and whether it was seen in print; none leads to a web address.
func TestTablesStateTheirSource(t *testing.T) {
	files, err := filepath.Glob("../../../testdata/published/*.csv")
	require.NoError(t, err)
	require.NotEmpty(t, files)
	for _, file := range files {
		name := filepath.Base(file)
		text, err := os.ReadFile(file)
		require.NoError(t, err)
		assert.True(t, strings.HasPrefix(string(text), "# "), "%s has a header", name)
		assert.NotRegexp(t, `https?:|www\.|\.(com|org|net|de|ru|id)\b`, string(text), name)
		for _, row := range Rows(t, name) {
			assert.NotEmpty(t, row["source"], "%s: %v", name, row)
			assert.Contains(t, []string{"seen", "memory"}, row["seen"], "%s: %v", name, row)
			require.Contains(t, row, "id", name)
		}
	}
}

func TestNumberKnowsItsLastDigit(t *testing.T) {
	for text, want := range map[string]float64{"84": 0.5, "84.3": 0.05, "20.70": 0.005} {
		_, half := Number(t, map[string]string{"x": text}, "x")
		assert.InDelta(t, want, half, 1e-12, text)
	}
}
