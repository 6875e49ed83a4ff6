package report_test

import (
	"bytes"
	"encoding/json"
	"errors"
	"flag"
	"iter"
	"os"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner"
	"clampback/report"
	"clampback/report/internal/demo"
)

var update = flag.Bool("update", false, "write the golden files anew")

// each gives the plans one by one, as the program does.
func each(plans []planner.Plan) iter.Seq2[planner.Plan, error] {
	return func(yield func(planner.Plan, error) bool) {
		for _, p := range plans {
			if !yield(p, nil) {
				return
			}
		}
	}
}

// The text of the demo plant as it was last read and approved.
func TestTextGolden(t *testing.T) {
	for name, o := range map[string]report.TextOptions{"plan.golden": {}, "trace.golden": {Trace: true}} {
		plans := demo.Plans(t)
		if o.Trace {
			plans = plans[:1]
		}
		var got bytes.Buffer
		require.NoError(t, report.WriteText(&got, each(plans), o))
		path := "testdata/" + name
		if *update {
			require.NoError(t, os.WriteFile(path, got.Bytes(), 0o600))
		}
		want, err := os.ReadFile(path)
		require.NoError(t, err)
		assert.Equal(t, string(want), got.String(), "%s; after reading the difference: go test ./report -update", name)
	}
}

// Colour repeats the words and adds nothing else.
func TestColourOnlyMarks(t *testing.T) {
	var plain, coloured bytes.Buffer
	require.NoError(t, report.WriteText(&plain, each(demo.Plans(t)), report.TextOptions{}))
	require.NoError(t, report.WriteText(&coloured, each(demo.Plans(t)), report.TextOptions{Colour: true}))
	text := coloured.Bytes()
	for _, code := range []string{"\x1b[32m", "\x1b[1;31m", "\x1b[0m"} {
		assert.Contains(t, string(text), code)
		text = bytes.ReplaceAll(text, []byte(code), nil)
	}
	assert.Equal(t, plain.String(), string(text))
}

// The record has exactly the keys of the design, and numbers where it has them.
func TestRecordKeys(t *testing.T) {
	var b bytes.Buffer
	require.NoError(t, report.WriteJSON(&b, "Tarn 40 slurry pump", "C", each(demo.Plans(t))))
	var record map[string]any
	require.NoError(t, json.Unmarshal(b.Bytes(), &record))
	assert.ElementsMatch(t, []string{"assembly", "revision", "joints"}, keys(record))
	joint := record["joints"].([]any)[0].(map[string]any)
	assert.ElementsMatch(t, []string{"id", "name", "count", "feasible", "binds", "stiffness", "work_back", "preload",
		"torque", "angle", "residual_clamp", "checks", "trace", "assumptions"}, keys(joint))
	for object, want := range map[string][]string{
		"stiffness": {"bolt_compliance_mm_per_N", "clamped_compliance_mm_per_N", "load_factor"},
		"work_back": {"required_residual_clamp_N", "load_relief_N", "embedding_loss_N", "closing_loss_N", "thermal_loss_N", "softening_loss_N", "relaxation_loss_N",
			"required_preload_N"},
		"preload":        {"limit_N", "lowest_N", "highest_N", "scatter_factor"},
		"torque":         {"window_low_Nm", "target_Nm", "window_high_Nm"},
		"angle":          {"snug_torque_Nm", "from_snug_deg", "low_deg", "high_deg"},
		"residual_clamp": {"lowest_N", "highest_N"},
	} {
		assert.ElementsMatch(t, want, keys(joint[object].(map[string]any)), object)
		for key, value := range joint[object].(map[string]any) {
			assert.IsType(t, 1.0, value, key)
		}
	}
	assert.ElementsMatch(t, []string{"name", "value", "limit", "unit", "utilisation", "ok", "source"},
		keys(joint["checks"].([]any)[0].(map[string]any)))
	assert.ElementsMatch(t, []string{"symbol", "meaning", "value", "unit", "source"},
		keys(joint["trace"].([]any)[0].(map[string]any)))
}

func keys(m map[string]any) []string {
	var all []string
	for k := range m {
		all = append(all, k)
	}
	return all
}

// A writer that fails is reported.
func TestFailedWriterIsReported(t *testing.T) {
	assert.Error(t, report.WriteText(broken{}, each(demo.Plans(t)), report.TextOptions{}))
	assert.Error(t, report.WriteJSON(broken{}, "", "", each(demo.Plans(t))))
}

type broken struct{}

func (broken) Write([]byte) (int, error) { return 0, errors.New("no space left on device") }
