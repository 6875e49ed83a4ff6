package figure_test

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"clampback/planner"
	"clampback/planner/quantity"
	"clampback/planner/stiffness"
	"clampback/report/figure"
	"clampback/report/internal/demo"
)

// draw draws a joint diagram as on A5 and reads it back.
func draw(t require.TestingT, p planner.Plan, say figure.Words) (drawing, string) {
	c := figure.NewSVG(132, 72)
	figure.JointDiagram(c, p, figure.Box{Width: 132, Height: 72}, say)
	return readBack(t, c.String()), c.String()
}

// scale reads the scale of the axes from the numbers printed at them: what turns a
// point of the page into um and kN.
func scale(t require.TestingT, d drawing) func(figure.Point) (length, force float64) {
	var xs, ys [][2]float64 // mm on the page, number
	var foot float64
	for _, l := range d.labels {
		foot = math.Max(foot, zeroOr(l))
	}
	for _, l := range d.labels {
		v, ok := numberOf(l.text)
		switch {
		case !ok:
		case math.Abs(l.base-foot) < 1e-9:
			xs = append(xs, [2]float64{(l.left + l.right) / 2, v})
		default:
			ys = append(ys, [2]float64{l.base - 0.36*l.size, v})
		}
	}
	along := func(pairs [][2]float64) func(float64) float64 {
		require.Greater(t, len(pairs), 1)
		a, b := pairs[0], pairs[len(pairs)-1]
		return func(at float64) float64 { return a[1] + (at-a[0])*(b[1]-a[1])/(b[0]-a[0]) }
	}
	x, y := along(xs), along(ys)
	return func(p figure.Point) (float64, float64) { return x(p.X), y(p.Y) }
}

// zeroOr is the base line of a number: the lowest are those of the length axis.
func zeroOr(l label) float64 {
	if _, ok := numberOf(l.text); ok {
		return l.base
	}
	return 0
}

func numberOf(text string) (float64, bool) {
	var v float64
	var rest string
	n, _ := fmt.Sscanf(strings.Replace(text, "−", "-", 1)+" end", "%g %s", &v, &rest)
	return v, n == 2 && rest == "end"
}

// find returns the lines of a width and a dash.
func (d drawing) find(width float64, dash string) []stroke {
	var found []stroke
	for _, l := range d.lines {
		if l.width == width && l.dash == dash {
			found = append(found, l)
		}
	}
	return found
}

// words are all labels in one line, subscripts joined to their letters.
func (d drawing) words() string {
	var b strings.Builder
	for _, l := range d.labels {
		b.WriteString(l.text)
	}
	return b.String()
}

// Every point of the diagram lies where the numbers at its axes say: the bolt's line
// at 1/delta_S, the parts' lines at 1/delta_P, band, limit and requirement at their
// forces, the operating force and its shares as long as they are. 0.3 % of the axis:
// the rounding of the page to micrometres over the distance of two numbers.
func TestJointDiagramIsToScale(t *testing.T) {
	say := english(t)
	for _, p := range demo.Plans(t) {
		drawn, _ := draw(t, p, say)
		read := scale(t, drawn)
		d := p.Diagram
		_, end := d.Unloaded(d.Most())
		at := func(name string, point figure.Point, length, force float64) {
			x, y := read(point)
			assert.InDelta(t, length*1000, x, 0.003*end*1000, "%s %s, length, um", p.ID, name)
			assert.InDelta(t, force/1000, y, 0.003*d.Limit/1000, "%s %s, force, kN", p.ID, name)
		}
		springs := drawn.find(0.7, "")
		require.Len(t, springs, 2, p.ID)
		least := d.Preload.Low - d.Loss
		at("bolt line", springs[0].from, 0, 0)
		at("bolt line", springs[0].to, d.Preload.High*d.BoltCompliance, d.Preload.High)
		at("parts line", springs[1].from, least*d.BoltCompliance, least)
		at("parts line", springs[1].to, least*(d.BoltCompliance+d.ClampedCompliance), 0)

		var band []figure.Point
		for _, f := range drawn.fills {
			if f.shade == "#e0e0e0" {
				band = f.points
			}
		}
		require.Len(t, band, 4, p.ID)
		_, low := read(band[0])
		_, high := read(band[2])
		assert.InDelta(t, d.Preload.Low/1000, low, 0.003*d.Limit/1000, p.ID)
		assert.InDelta(t, d.Preload.High/1000, high, 0.003*d.Limit/1000, p.ID)

		limits, required := drawn.find(0.5, "3 1"), drawn.find(0.5, "1 1")
		require.Len(t, limits, 1, p.ID)
		require.Len(t, required, 1, p.ID)
		_, limit := read(limits[0].from)
		_, need := read(required[0].from)
		assert.InDelta(t, d.Limit/1000, limit, 0.003*d.Limit/1000, p.ID)
		assert.InDelta(t, d.RequiredResidual/1000, need, 0.003*d.Limit/1000, p.ID)

		var loads []float64
		for _, l := range drawn.find(0.2, "0.6 0.6") {
			if l.from.X == l.to.X {
				_, from := read(l.from)
				_, to := read(l.to)
				loads = append(loads, to-from)
			}
		}
		var want []float64
		for _, load := range []float64{math.Max(0, d.ClampAxial), math.Min(0, d.Axial.Low)} {
			if load != 0 {
				want = append(want, load/1000)
			}
		}
		require.Len(t, loads, len(want), p.ID)
		for i := range want {
			assert.InDelta(t, want[i], loads[i], 0.003*d.Limit/1000, p.ID)
		}
	}
}

// The diagram of every demo joint is tidy on any paper, says every number with its
// symbol and unit, and is the same every time.
func TestJointDiagramOfDemo(t *testing.T) {
	say := english(t)
	for _, p := range demo.Plans(t) {
		drawn, text := draw(t, p, say)
		assertTidy(t, drawn, 132, 72)
		_, again := draw(t, p, say)
		assert.Equal(t, text, again, p.ID)
		words := drawn.words()
		for _, label := range []string{
			fmt.Sprintf("Flim = %.2f kN", math.Floor(p.Preload.Limit/10+1e-6)/100),
			fmt.Sprintf("FMmax = %.2f kN", math.Ceil(p.Preload.Highest/10-1e-6)/100),
			fmt.Sprintf("FMmin = %.2f kN", math.Floor(p.Preload.Lowest/10+1e-6)/100),
			fmt.Sprintf("FKerf = %.2f kN", math.Ceil(p.WorkBack.RequiredResidualClamp/10-1e-6)/100),
			fmt.Sprintf("FZ = %.2f kN", math.Ceil(p.WorkBack.EmbeddingLoss/10-1e-6)/100),
			fmt.Sprintf("FKR = %.2f kN", math.Floor(p.ResidualClamp.Lowest/10+1e-6)/100),
			"δS = ", map[bool]string{false: "δP = ", true: "δP* = "}[p.Joint.Eccentric != nil], "µm/kN", "FV = ", "FSmax = ", "force, kN", "change of length, µm",
		} {
			assert.Contains(t, words, label, p.ID)
		}
		assert.Equal(t, p.Fatigue != nil, strings.Contains(words, "cyclic"), p.ID)
	}
}

// A plan whose diagram is drawn, of any joint: possible or not.
func drawPlan(t *rapid.T) planner.Plan {
	d := stiffness.Diagram{
		BoltCompliance:    rapid.Float64Range(2e-7, 3e-5).Draw(t, "delta_S"),
		ClampedCompliance: rapid.Float64Range(1e-7, 3e-5).Draw(t, "delta_P"),
		Eccentric:         rapid.Bool().Draw(t, "eccentric"),
	}
	d.LoadFactor = rapid.Float64Range(0, 1).Draw(t, "n") * d.ClampedCompliance / (d.BoltCompliance + d.ClampedCompliance)
	size := math.Pow(10, rapid.Float64Range(1, 6.5).Draw(t, "size"))
	some := func(name string, low, high float64) float64 {
		return size * rapid.Float64Range(low, high).Draw(t, name)
	}
	d.Preload.Low = some("lowest", 0, 1)
	d.Preload.High = d.Preload.Low + some("scatter", 0, 1)
	d.Embedding = some("embedding", 0, 0.4)
	d.Closing = some("closing", -0.2, 0.2)
	d.Closing = math.Max(0, d.Closing)
	d.Loss = d.Embedding + d.Closing + math.Max(0, some("later", -0.3, 0.5))
	d.Gain = math.Max(0, some("gain", -0.3, 0.3))
	d.Axial.Low = some("axial low", -2, 1)
	d.Axial.High = d.Axial.Low + some("axial width", 0, 2)
	d.ClampAxial = d.Axial.High - math.Max(0, some("another bolt", -1, 1))
	if rapid.Bool().Draw(t, "cyclic") {
		d.Swinging = d.Axial
	}
	if d.Eccentric {
		d.Moment.Low = some("moment low", -0.1, 0.1)
		d.Moment.High = d.Moment.Low + some("moment", 0, 0.1)
	}
	d.BoltShare = d.LoadFactor*math.Max(0, d.Axial.High) + math.Max(0, d.Moment.High)
	d.ClampShare = (1 - d.LoadFactor) * math.Max(0, d.ClampAxial)
	d.ResidualClamp.Low = d.Preload.Low - d.Loss - d.ClampShare
	d.RequiredResidual = some("required", 0, 2)
	d.Limit = some("limit", 0, 3)
	return planner.Plan{Diagram: d}
}

// Whatever the joint, no label overlaps another, is struck through or leaves the
// drawing, and nothing is drawn outside.
func TestJointDiagramIsTidy(t *testing.T) {
	say := english(t)
	rapid.Check(t, func(t *rapid.T) {
		p := drawPlan(t)
		drawn, text := draw(t, p, say)
		require.NotContains(t, text, "NaN")
		assertTidy(t, drawn, 132, 72)
		for _, l := range drawn.labels {
			require.GreaterOrEqual(t, l.size, 0.75*0.75*2.7, "legible: %+v", l)
		}
	})
}

// What has no clamp left is drawn as it is: the bolt alone under the whole load, the
// parts alone under a pressing one.
func TestJointDiagramOfHopelessJoints(t *testing.T) {
	say := english(t)
	joint := stiffness.Diagram{
		BoltCompliance: 3e-6, ClampedCompliance: 1e-6, LoadFactor: 0.25, Embedding: 2000, Loss: 2000,
		Preload: quantity.Range{Low: 32000, High: 40000}, RequiredResidual: 10000, Limit: 50000,
	}
	for _, c := range []struct {
		name  string
		spoil func(*stiffness.Diagram)
		want  []string
		never []string
	}{
		{"nothing", func(d *stiffness.Diagram) { *d = stiffness.Diagram{} }, []string{"FV = 0.00 kN: nothing left"}, []string{"NaN"}},
		{"no load", func(*stiffness.Diagram) {}, []string{"FKR = 0.00 kN", "FV = 30.00 kN"}, []string{"FA", "FS ="}},
		{"no preload", func(d *stiffness.Diagram) { d.Preload = quantity.Range{} },
			[]string{"FV = −2.00 kN: nothing left"}, []string{"δP"}},
		{"gap", func(d *stiffness.Diagram) {
			d.Axial.High, d.ClampAxial, d.ClampShare, d.ResidualClamp.Low = 60000, 60000, 45000, -15000
		}, []string{"FKR = −15.00 kN: gap", "FS = 60.00 kN", "30.00 kN of load"}, []string{"FSmax"}},
		{"negative residual without preload", func(d *stiffness.Diagram) {
			d.Loss, d.Axial.High, d.ClampAxial, d.ResidualClamp.Low = 40000, 20000, 20000, -23000
		}, []string{"FV = −8.00 kN: nothing left", "FKR = −23.00 kN: gap", "FS = 20.00 kN"}, nil},
		{"loose bolt", func(d *stiffness.Diagram) { d.Axial.Low = -200000 },
			[]string{"FS = 0.00 kN: bolt loose", "FK = 200.00 kN"}, nil},
	} {
		p := planner.Plan{Diagram: joint}
		c.spoil(&p.Diagram)
		drawn, text := draw(t, p, say)
		assertTidy(t, drawn, 132, 72)
		for _, want := range c.want {
			assert.Contains(t, drawn.words(), want, c.name)
		}
		for _, never := range append(c.never, "NaN", "Inf") {
			assert.NotContains(t, drawn.words()+text, never, c.name)
		}
	}
}

// Where the drawn triangle ends is the residual clamp of the plan, and the points of the
// bolt are the plan's largest force and what its shares say, eccentric and cyclic joints
// and groups too (the geometry of the joint diagram, VDI 2230-1; 1e-6 N for the rounding
// of sums).
func TestStatesAreThePlans(t *testing.T) {
	for _, p := range demo.Plans(t) {
		d := p.Diagram
		s := d.Under(d.Least(), math.Max(0, d.ClampAxial))
		if s.Open || p.ResidualClamp.Lowest < 0 {
			continue
		}
		assert.InDelta(t, p.ResidualClamp.Lowest, s.Clamp, 1e-6, p.ID)
		for _, l := range p.Trace {
			if l.Symbol == "F_Smax" {
				assert.InDelta(t, l.Value, d.Largest().Bolt, 1e-6, p.ID)
			}
		}
		if low, high, ok := d.Swing(); ok && p.Fatigue.Cycles > 0 && !d.Eccentric {
			area := p.Joint.Bolt.Thread.StressArea()
			assert.InDelta(t, p.Fatigue.Amplitude, (high.Bolt-low.Bolt)/2/area, 1e-6, p.ID)
		}
	}
}
