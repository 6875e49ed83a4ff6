package stiffness_test

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"clampback/planner/quantity"
	"clampback/planner/stiffness"
)

// spring is a joint with delta_S = 3e-6 and delta_P = 1e-6 mm/N, by hand.
func spring(loadFactor float64) stiffness.Diagram {
	return stiffness.Diagram{BoltCompliance: 3e-6, ClampedCompliance: 1e-6, LoadFactor: loadFactor}
}

// Worked by hand from two linear springs: at n = 1, Phi = delta_P/(delta_S + delta_P)
// = 0.25; at n = 0.4, Phi = 0.1.
func TestStatesByHand(t *testing.T) {
	for _, c := range []struct {
		name                string
		factor              float64
		preload, load       float64
		length, bolt, clamp float64
		open, slack         bool
	}{
		{"no load", 0.25, 40000, 0, 0.12, 40000, 40000, false, false},
		{"tension at the head", 0.25, 40000, 8000, 0.126, 42000, 34000, false, false},
		{"tension within the parts", 0.1, 40000, 8000, 0.12288, 40800, 32800, false, false},
		{"compression", 0.25, 40000, -8000, 0.114, 38000, 46000, false, false},
		{"just before opening", 0.25, 30000, 40000, 0.12, 40000, 0, false, false},
		{"open: the bolt alone, at its own slope", 0.25, 30000, 60000, 0.18, 60000, 0, true, false},
		{"slack: the parts alone", 0.25, 10000, -60000, -0.02, 0, 60000, false, true},
		{"nothing clamped", 0.25, -2000, 5000, 0.015, 5000, 0, true, false},
		{"nothing clamped, pressed", 0.25, 0, -5000, -0.005, 0, 5000, false, true},
	} {
		s := spring(c.factor).Under(c.preload, c.load)
		assert.InDelta(t, c.length, s.Length, 1e-12, c.name)
		assert.InDelta(t, c.bolt, s.Bolt, 1e-8, c.name)
		assert.InDelta(t, c.clamp, s.Clamp, 1e-8, c.name)
		assert.Equal(t, c.open, s.Open, c.name)
		assert.Equal(t, c.slack, s.Slack, c.name)
	}
}

// Bolt force less clamp force is the load, in every state; neither is negative.
func TestForcesBalance(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		d := stiffness.Diagram{
			BoltCompliance:    rapid.Float64Range(1e-7, 1e-4).Draw(t, "delta_S"),
			ClampedCompliance: rapid.Float64Range(1e-7, 1e-4).Draw(t, "delta_P"),
		}
		d.LoadFactor = rapid.Float64Range(0, 1).Draw(t, "n") * d.ClampedCompliance / (d.BoltCompliance + d.ClampedCompliance)
		preload := rapid.Float64Range(-1e4, 1e5).Draw(t, "preload")
		load := rapid.Float64Range(-1e6, 1e6).Draw(t, "load")
		s := d.Under(preload, load)
		require.InDelta(t, load, s.Bolt-s.Clamp, 1e-6)
		require.GreaterOrEqual(t, s.Bolt, 0.0)
		require.GreaterOrEqual(t, s.Clamp, -1e-9)
		// More load never shortens the bolt nor relieves it.
		more := d.Under(preload, load+rapid.Float64Range(0, 1e5).Draw(t, "more"))
		require.GreaterOrEqual(t, more.Bolt, s.Bolt-1e-6)
		require.GreaterOrEqual(t, more.Length, s.Length-1e-9)
	})
}

func TestSwing(t *testing.T) {
	d := spring(0.25)
	d.Preload, d.Loss = quantity.Range{Low: 43000, High: 60000}, 3000
	_, _, ok := d.Swing()
	assert.False(t, ok, "static")
	d.Swinging = quantity.Range{Low: -4000, High: 8000}
	low, high, ok := d.Swing()
	assert.True(t, ok)
	assert.InDelta(t, 39000, low.Bolt, 1e-9)
	assert.InDelta(t, 42000, high.Bolt, 1e-9)
	d.Moment = quantity.Range{Low: -200, High: 300}
	low, high, _ = d.Swing()
	assert.InDelta(t, 38800, low.Bolt, 1e-9, "with a working moment")
	assert.InDelta(t, 42300, high.Bolt, 1e-9)
	d.Axial.High, d.Gain = 8000, 1000
	assert.InDelta(t, 63300, d.Largest().Bolt, 1e-9)
	d.Swinging = quantity.Single(8000)
	_, _, ok = d.Swing()
	assert.False(t, ok, "a constant load does not swing")
}

func TestLaterLossIsWhatEmbeddingLeaves(t *testing.T) {
	d := stiffness.Diagram{Preload: quantity.Range{Low: 40000, High: 50000}, Embedding: 3000, Closing: 500, Loss: 5000, Gain: 700}
	assert.InDelta(t, 1500, d.LaterLoss(), 1e-9)
	assert.InDelta(t, 35000, d.Least(), 1e-9)
	assert.InDelta(t, 50700, d.Most(), 1e-9)
	bolt, end := spring(0).Unloaded(40000)
	assert.InDelta(t, 0.12, bolt, 1e-12)
	assert.InDelta(t, 0.16, end, 1e-12)
}
