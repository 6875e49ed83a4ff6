package card_test

import (
	"bytes"
	"fmt"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
	"testing/fstest"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner"
	"clampback/planner/pattern"
	"clampback/planner/quantity"
	"clampback/report/card"
	"clampback/report/figure"
	"clampback/report/internal/demo"
	"clampback/templates"
)

func byID(t testing.TB, id string) planner.Plan {
	for _, p := range demo.Plans(t) {
		if p.ID == id {
			return p
		}
	}
	require.Fail(t, "no joint "+id)
	return planner.Plan{}
}

func write(t testing.TB, p planner.Plan, o card.Options) []byte {
	var b bytes.Buffer
	require.NoError(t, card.Write(&b, p, o))
	return b.Bytes()
}

// squeeze makes runs of blanks and line ends one blank.
func squeeze(s string) string { return strings.Join(strings.Fields(s), " ") }

// Every demo card holds its plan's setting, bolts and limits, as an independent
// reader of PDF finds them.
func TestCardTextIsThePlans(t *testing.T) {
	for _, p := range demo.Plans(t) {
		if !p.Feasible {
			continue
		}
		t.Run(p.ID, func(t *testing.T) {
			all := pages(t, write(t, p, card.Options{}))
			front, whole := squeeze(all[0]), squeeze(strings.Join(all, " "))
			assert.Contains(t, front, p.ID)
			assert.Contains(t, front, p.Name)
			assert.Contains(t, front, fmt.Sprintf("%d bolts", p.Count))
			assert.Contains(t, front, p.Joint.Bolt.Thread.Designation)
			assert.Contains(t, front, "class "+p.Joint.Bolt.Class.Name)
			assert.Contains(t, front, "Lubrication:")
			assert.Contains(t, front, p.Joint.Tightening.Tool.Name)
			if p.Joint.Tightening.Method == planner.TorqueAndAngleMethod {
				assert.Contains(t, front, "Then turn "+quantity.Trim(p.Angle.FromSnug)+" deg")
				assert.Contains(t, front, "Torque "+quantity.Trim(p.Angle.SnugTorque)+" N.m")
				assert.Contains(t, whole, "Set "+quantity.Trim(p.Angle.SnugTorque)+" N.m.")
				assert.Contains(t, whole, "Turn "+quantity.Trim(p.Angle.FromSnug)+" deg further.")
			} else {
				assert.Contains(t, front, "Set the tool to "+quantity.Trim(p.Torque.Target))
				assert.Contains(t, whole, "Set "+quantity.Trim(p.Torque.Target)+" N.m.")
			}
			for _, text := range []string{"Warnings", "OK or not OK", "Do not add torque.", "Calculated, not tested",
				"revision C", "Local codes", "Tightened by"} {
				assert.Contains(t, whole, text)
			}
			for i := range all {
				assert.Contains(t, squeeze(all[i]), fmt.Sprintf("Page %d of %d", i+1, len(all)))
			}
		})
	}
}

// What the card takes as a limit of a reading is rounded inwards: it never
// accepts what the plan does not.
func TestLimitsOfReadingsLieInsideThePlan(t *testing.T) {
	limits := func(text, before, unit string) (low, high float64) {
		found := regexp.MustCompile(before + ` ([\d.]+) to ([\d.]+) ` + unit).FindStringSubmatch(text)
		require.NotNil(t, found, text)
		_, err := fmt.Sscan(found[1]+" "+found[2], &low, &high)
		require.NoError(t, err)
		return low, high
	}
	for _, p := range demo.Plans(t) {
		if !p.Feasible {
			continue
		}
		text := squeeze(strings.Join(pages(t, write(t, p, card.Options{})), " "))
		low, high := limits(text, "OK is", "deg")
		assert.GreaterOrEqual(t, low, p.Angle.Low, p.ID)
		assert.LessOrEqual(t, high, p.Angle.High, p.ID)
		assert.Less(t, low, high, p.ID)
		assert.Greater(t, high-low, 0.6*(p.Angle.High-p.Angle.Low), "%s: rounding leaves most of the range", p.ID)
		if p.Joint.Tightening.Method == planner.TorqueAndAngleMethod {
			low, high = limits(text, "must show", "N.m")
			assert.GreaterOrEqual(t, low, p.Torque.WindowLow, p.ID)
			assert.LessOrEqual(t, high, p.Torque.WindowHigh, p.ID)
		}
	}
}

// An infeasible joint has no card; asked for, it gets a page that forbids and
// holds no torque.
func TestInfeasibleJointGetsNoInstruction(t *testing.T) {
	p := byID(t, "TRN-100")
	require.False(t, p.Feasible)
	assert.ErrorContains(t, card.Write(io.Discard, p, card.Options{}), "infeasible and gets no card")

	all := pages(t, write(t, p, card.Options{ShowInfeasible: true}))
	require.Len(t, all, 1)
	page := squeeze(all[0])
	assert.Contains(t, page, "DO NOT TIGHTEN")
	assert.Contains(t, page, "not an instruction")
	for _, text := range []string{"N.m", "Steps", "Set ", "Order", "deg"} {
		assert.NotContains(t, page, text)
	}
	for _, text := range pages(t, write(t, p, card.Options{ShowInfeasible: true, WithDiagram: true}))[1:] {
		assert.Contains(t, squeeze(text), "TRN-100")
	}
}

// The calculation page of a cyclic joint shows both fatigue diagrams with their source
// and the cycles below its joint diagram, on one page of any paper; that of a static
// joint none.
func TestCalculationPageShowsFatigue(t *testing.T) {
	for _, paper := range []card.Paper{card.A5, card.A4, card.Letter} {
		for _, p := range demo.Plans(t) {
			o := card.Options{Paper: paper, ShowInfeasible: true}
			without := len(pages(t, write(t, p, o)))
			o.WithDiagram = true
			all := pages(t, write(t, p, o))[without:]
			assert.LessOrEqual(t, len(all), 3, "%s, %v", p.ID, paper)
			figures := 0
			for _, page := range all {
				text := squeeze(page)
				if !strings.Contains(text, "Haigh diagram") {
					continue
				}
				figures++
				assert.Contains(t, text, "Smith diagram", p.ID)
				assert.Contains(t, text, "change of length", "%s: the joint diagram stands above", p.ID)
				require.NotNil(t, p.Fatigue, p.ID)
				assert.Contains(t, text, "Thread rolled "+p.Fatigue.Rolled, p.ID)
				if p.Fatigue.Cycles > 0 {
					assert.Contains(t, text, figure.Cycles(p.Fatigue.Cycles)+" cycles, at the highest preload", p.ID)
				} else {
					assert.Contains(t, text, "largest amplitude of the load spectrum and limit at 2e6 cycles", p.ID)
				}
				assert.Contains(t, text, "VDI 2230-1:2015 R9, from memory", p.ID)
			}
			want := 0
			if p.Fatigue != nil {
				want = 1
			}
			assert.Equal(t, want, figures, "%s, %v", p.ID, paper)
		}
	}
}

// Where the interface opens, the fatigue diagrams say that they show too little.
func TestFatigueOfAnOpenJointIsNoPromise(t *testing.T) {
	p := byID(t, "TRN-010")
	require.NotContains(t, squeeze(strings.Join(pages(t, write(t, p, card.Options{WithDiagram: true})), " ")), "The interface opens")
	p.ResidualClamp.Lowest = -1
	require.Contains(t, squeeze(strings.Join(pages(t, write(t, p, card.Options{WithDiagram: true})), " ")), "The interface opens")
}

// The work-back on the page adds up: every loss has its line.
func TestEveryLossHasItsLine(t *testing.T) {
	p := byID(t, "TRN-010")
	p.WorkBack.ClosingLoss, p.WorkBack.SofteningLoss, p.WorkBack.RelaxationLoss = 1230, 2340, 3450
	text := squeeze(strings.Join(pages(t, write(t, p, card.Options{WithDiagram: true})), " "))
	for _, want := range []string{"closing layers 1.23", "softer moduli 2.34", "relaxation 3.45"} {
		assert.Contains(t, text, want)
	}
}

func TestPDFIsValid(t *testing.T) {
	qpdf := need(t, "qpdf", "qpdf")
	var b bytes.Buffer
	require.NoError(t, card.WriteTogether(&b, demo.Plans(t), card.Options{WithDiagram: true, ShowInfeasible: true}))
	name := filepath.Join(t.TempDir(), "cards.pdf")
	require.NoError(t, os.WriteFile(name, b.Bytes(), 0o600))
	output, err := exec.Command(qpdf, "--check", name).CombinedOutput()
	assert.NoError(t, err, "%s", output)
}

func TestSameBytesForSamePlan(t *testing.T) {
	for range 3 {
		var a, b bytes.Buffer
		require.NoError(t, card.WriteTogether(&a, demo.Plans(t), card.Options{WithDiagram: true, ShowInfeasible: true}))
		require.NoError(t, card.WriteTogether(&b, demo.Plans(t), card.Options{WithDiagram: true, ShowInfeasible: true}))
		assert.True(t, bytes.Equal(a.Bytes(), b.Bytes()))
	}
}

// The digits of every setting are at least 14 mm high on A5, measured on the
// rendered page, whatever the number.
func TestSettingIsLarge(t *testing.T) {
	torque := func(target float64) planner.Plan {
		p := byID(t, "TRN-010")
		p.Torque.Target = target
		return p
	}
	angle := func(snug, turn float64) planner.Plan {
		p := byID(t, "TRN-060")
		p.Angle.SnugTorque, p.Angle.FromSnug = snug, turn
		return p
	}
	for name, c := range map[string]struct {
		plan    planner.Plan
		numbers int
		left    int // mm, where the numbers begin
	}{
		"torque":          {torque(98), 1, 12},
		"long torque":     {torque(9999.5), 1, 12},
		"angle":           {angle(60, 40), 2, 46},
		"long angle":      {angle(1120, 122.5), 2, 46},
		"very long angle": {angle(12345, 240), 2, 46},
	} {
		heights := inkHeights(t, write(t, c.plan, card.Options{}), c.left)
		require.Len(t, heights, c.numbers, "%s: %v", name, heights)
		for _, h := range heights {
			assert.GreaterOrEqual(t, h, 14.0, "%s, mm", name)
		}
	}
}

// Nothing is cut or printed over other text: all demo joints on all papers.
func TestNothingIsCutOrOverprinted(t *testing.T) {
	for paper, size := range map[card.Paper][2]float64{card.A5: {419.5, 595.3}, card.A4: {595.3, 841.9},
		card.Letter: {612, 792}} {
		var b bytes.Buffer
		require.NoError(t, card.WriteTogether(&b, demo.Plans(t),
			card.Options{Paper: paper, WithDiagram: true, ShowInfeasible: true}))
		assertClean(t, fmt.Sprint(paper), b.Bytes(), size[0], size[1])
	}
}

// Long names, long ids, many bolts and no pattern all print whole.
func TestExtremesPrintWhole(t *testing.T) {
	p := byID(t, "TRN-010")
	p.ID = strings.Repeat("W", 40)
	p.Name = strings.Repeat("A very long name of a joint that goes on ", 4)
	p.Joint.Assembly = strings.Repeat("assembly ", 20)
	p.Joint.Revision = strings.Repeat("revised ", 20)
	p.Joint.PreparedBy = strings.Repeat("engineer ", 20)
	p.Joint.Tightening.Tool.Name = strings.Repeat("spindle ", 30)
	p.Joint.Friction.State = strings.Repeat("lubricant ", 20)
	for _, n := range []int{1, 2, 3, 60, 120, 1000} {
		p.Count, p.Joint.Count = n, n
		p.Joint.Pattern = pattern.NewCircle(n, 400)
		pdf := write(t, p, card.Options{WithDiagram: true})
		assertClean(t, fmt.Sprintf("%d bolts", n), pdf, 419.5, 595.3)
		whole := squeeze(strings.Join(pages(t, pdf), " "))
		assert.Contains(t, whole, p.ID, "%d bolts", n)
		assert.Equal(t, 30, strings.Count(whole, "spindle"), "%d bolts", n)
	}
	p.Joint.Pattern = pattern.Pattern{}
	assert.Contains(t, squeeze(strings.Join(pages(t, write(t, p, card.Options{})), " ")), "Go crosswise")
}

// A joint that tolerates nothing at all still gets its forbidding page and its
// calculation page, by either method.
func TestHopelessJointIsDrawn(t *testing.T) {
	for _, method := range []planner.Method{planner.TorqueMethod, planner.TorqueAndAngleMethod} {
		j := byID(t, "TRN-010").Joint
		n := 1.0
		j.Loads = planner.Loads{Axial: quantity.Range{High: 900000}, IntroductionFactor: &n}
		j.Tightening.Method = method
		p, err := planner.Work(j)
		require.NoError(t, err)
		require.False(t, p.Feasible)
		require.Zero(t, p.Preload.Limit)
		all := pages(t, write(t, p, card.Options{ShowInfeasible: true, WithDiagram: true}))
		assert.Contains(t, all[0], "DO NOT TIGHTEN")
	}
}

func TestPapers(t *testing.T) {
	sizes := map[string]string{"A5": "419.53 595.28", "A4": "595.28 841.89", "letter": "612.00 792.00"}
	for name, size := range sizes {
		paper, err := card.ParsePaper(strings.ToLower(name))
		require.NoError(t, err)
		assert.Contains(t, string(write(t, byID(t, "TRN-010"), card.Options{Paper: paper})), "/MediaBox [0 0 "+size+"]")
	}
	_, err := card.ParsePaper("A3")
	assert.EqualError(t, err, `unknown paper "A3"`)
}

// A phrase that is missing or lost its figure is an error, never a blank.
func TestMissingPhraseIsAnError(t *testing.T) {
	words, err := os.ReadFile("../../templates/cards/en.csv")
	require.NoError(t, err)
	for from, want := range map[string]string{
		"set_tool,Set the tool to\n": `the phrase "set_tool" is missing`,
		"Set {torque} N.m.":          `the phrase "step_set" lacks {torque}`,
	} {
		require.Contains(t, string(words), from)
		spoiled := strings.Replace(string(words), from, "", 1)
		if strings.Contains(from, "{torque}") {
			spoiled = strings.Replace(string(words), from, "Set the tool.", 1)
		}
		err := card.Write(io.Discard, byID(t, "TRN-010"),
			card.Options{Templates: fstest.MapFS{"cards/en.csv": {Data: []byte(spoiled)}}})
		assert.ErrorContains(t, err, want)
	}
}

// Every phrase of the catalogue is used: a translator translates nothing in vain.
func TestEveryPhraseIsUsed(t *testing.T) {
	var code strings.Builder
	for _, folder := range []string{".", "../figure"} {
		files, err := filepath.Glob(folder + "/*.go")
		require.NoError(t, err)
		for _, f := range files {
			if !strings.HasSuffix(f, "_test.go") {
				text, err := os.ReadFile(f)
				require.NoError(t, err)
				code.Write(text)
			}
		}
	}
	rows, err := templates.Rows(templates.Folder(nil), "cards/en.csv", 2)
	require.NoError(t, err)
	for _, r := range rows {
		assert.Contains(t, code.String(), `"`+r[0]+`"`)
	}
}

// An infeasible joint without a failing check still says why.
func TestForbiddingPageNamesAReason(t *testing.T) {
	j := byID(t, "TRN-010").Joint
	j.Tightening.Snug, j.Tightening.SnugTorque = 0, 150000
	p, err := planner.Work(j)
	require.NoError(t, err)
	require.False(t, p.Feasible)
	page := squeeze(pages(t, write(t, p, card.Options{ShowInfeasible: true}))[0])
	assert.Contains(t, page, "The first pass would already reach the final torque.")
	p.SnugTooHigh = false
	page = squeeze(pages(t, write(t, p, card.Options{ShowInfeasible: true}))[0])
	assert.Contains(t, page, "Joint engineering knows why.")
}

// Target: 1,000 A5 cards in documents of 100 to 500 in under 2 s.
func BenchmarkCards1000(b *testing.B) {
	plant := demo.Plans(b)
	var plans []planner.Plan
	for i := range 250 {
		p := plant[i%len(plant)]
		if !p.Feasible {
			p = plant[0]
		}
		plans = append(plans, p)
	}
	for b.Loop() {
		for range 4 {
			if err := card.WriteTogether(io.Discard, plans, card.Options{}); err != nil {
				b.Fatal(err)
			}
		}
	}
}
