package card_test

import (
	"bytes"
	"fmt"
	"image"
	_ "image/png"
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
	"clampback/planner/register"
	"clampback/report/card"
)

func demoPlans(t testing.TB) []planner.Plan {
	data, err := os.ReadFile("../../testdata/demo/tarn40.yaml")
	require.NoError(t, err)
	joints, err := register.Read(register.Source{Name: "tarn40.yaml", Data: data})
	require.NoError(t, err)
	plans := make([]planner.Plan, len(joints))
	for i, j := range joints {
		plans[i], err = planner.Work(j)
		require.NoError(t, err)
	}
	return plans
}

func byID(t testing.TB, id string) planner.Plan {
	for _, p := range demoPlans(t) {
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

// need returns an independent program; in CI its absence fails the test.
func need(t testing.TB, program, pack string) string {
	path, err := exec.LookPath(program)
	if err != nil {
		if os.Getenv("CI") == "true" {
			t.Fatalf("%s is missing: install %s", program, pack)
		}
		t.Skipf("SKIPPED: %s is missing, so the PDF is not checked; install %s", program, pack)
	}
	return path
}

// pages returns the text of each page as poppler reads it.
func pages(t testing.TB, pdf []byte) []string {
	command := exec.Command(need(t, "pdftotext", "poppler-utils"), "-layout", "-", "-")
	command.Stdin = bytes.NewReader(pdf)
	text, err := command.Output()
	require.NoError(t, err)
	all := strings.Split(string(text), "\f")
	return all[:len(all)-1]
}

// squeeze makes runs of blanks and line ends one blank.
func squeeze(s string) string { return strings.Join(strings.Fields(s), " ") }

// Every demo card holds its plan's setting, bolts and limits, as an independent
// reader of PDF finds them.
func TestCardTextIsThePlans(t *testing.T) {
	for _, p := range demoPlans(t) {
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
				assert.Contains(t, front, quantity.Trim(p.Angle.FromSnug)+" deg")
				assert.Contains(t, front, quantity.Trim(p.Angle.SnugTorque)+" N.m")
			} else {
				assert.Contains(t, front, "Set "+quantity.Trim(p.Torque.Target)+" N.m.")
			}
			for _, text := range []string{"Warnings", "OK or not OK", "Do not add torque.", "Calculated, not tested", "revision C", "Local codes", "Tightened by"} {
				assert.Contains(t, whole, text)
			}
			for i := range all {
				assert.Contains(t, squeeze(all[i]), fmt.Sprintf("Page %d of %d", i+1, len(all)))
			}
		})
	}
}

// The limits of the angle are rounded inwards: what the card accepts, the plan
// accepts.
func TestAcceptedAngleLiesInsideThePlan(t *testing.T) {
	accepts := regexp.MustCompile(`OK is (\d+) to (\d+) deg`)
	for _, p := range demoPlans(t) {
		if !p.Feasible || p.Joint.Tightening.Method == planner.TorqueAndAngleMethod {
			continue
		}
		found := accepts.FindStringSubmatch(squeeze(strings.Join(pages(t, write(t, p, card.Options{})), " ")))
		require.NotNil(t, found, p.ID)
		var low, high float64
		_, err := fmt.Sscan(found[1]+" "+found[2], &low, &high)
		require.NoError(t, err)
		assert.GreaterOrEqual(t, low, p.Angle.Low, p.ID)
		assert.LessOrEqual(t, high, p.Angle.High, p.ID)
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

func TestPDFIsValid(t *testing.T) {
	qpdf := need(t, "qpdf", "qpdf")
	var b bytes.Buffer
	require.NoError(t, card.WriteTogether(&b, demoPlans(t), card.Options{WithDiagram: true, ShowInfeasible: true}))
	name := filepath.Join(t.TempDir(), "cards.pdf")
	require.NoError(t, os.WriteFile(name, b.Bytes(), 0o600))
	output, err := exec.Command(qpdf, "--check", name).CombinedOutput()
	assert.NoError(t, err, "%s", output)
}

func TestSameBytesForSamePlan(t *testing.T) {
	for range 3 {
		var a, b bytes.Buffer
		require.NoError(t, card.WriteTogether(&a, demoPlans(t), card.Options{WithDiagram: true, ShowInfeasible: true}))
		require.NoError(t, card.WriteTogether(&b, demoPlans(t), card.Options{WithDiagram: true, ShowInfeasible: true}))
		assert.True(t, bytes.Equal(a.Bytes(), b.Bytes()))
	}
}

// The digits of the setting are at least 14 mm high on A5, measured on the
// rendered page: the tallest run of rows that are black in the frame.
func TestSettingIsLarge(t *testing.T) {
	const dpi = 127 // 5 pixels a mm
	command := exec.Command(need(t, "pdftoppm", "poppler-utils"), "-png", "-gray", "-r", fmt.Sprint(dpi), "-f", "1", "-l", "1", "-")
	command.Stdin = bytes.NewReader(write(t, byID(t, "TRN-010"), card.Options{}))
	png, err := command.Output()
	require.NoError(t, err)
	page, _, err := image.Decode(bytes.NewReader(png))
	require.NoError(t, err)
	height := float64(tallestInk(page, image.Rect(5*12, 5*40, 5*26, 5*75))) / 5
	assert.GreaterOrEqual(t, height, 14.0, "mm")
	assert.Less(t, height, 20.0, "mm: only the digits were measured")
}

// tallestInk returns the largest number of rows in a row that have a dark pixel
// in the area.
func tallestInk(page image.Image, area image.Rectangle) int {
	tallest, run := 0, 0
	for y := area.Min.Y; y < area.Max.Y; y++ {
		dark := false
		for x := area.Min.X; x < area.Max.X; x++ {
			r, _, _, _ := page.At(x, y).RGBA()
			dark = dark || r < 0x8000
		}
		if run++; !dark {
			run = 0
		}
		tallest = max(tallest, run)
	}
	return tallest
}

// Long names, long ids, many bolts and no pattern all print whole.
func TestExtremesPrintWhole(t *testing.T) {
	p := byID(t, "TRN-010")
	p.ID = strings.Repeat("W", 40)
	p.Name = strings.Repeat("A very long name of a joint that goes on ", 4)
	p.Joint.Assembly = strings.Repeat("assembly ", 20)
	p.Joint.Tightening.Tool.Name = strings.Repeat("spindle ", 30)
	p.Joint.Friction.State = strings.Repeat("lubricant ", 20)
	for _, n := range []int{1, 2, 3, 60, 120, 1000} {
		p.Count, p.Joint.Count = n, n
		p.Joint.Pattern = pattern.NewCircle(n, 400)
		whole := squeeze(strings.Join(pages(t, write(t, p, card.Options{WithDiagram: true})), " "))
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
		"set_tool,Set the tool to\n":          `the phrase "set_tool" is missing`,
		"Set {target} N.m. Tighten all bolts": `the phrase "step_final" lacks {target}`,
	} {
		require.Contains(t, string(words), from)
		spoiled := strings.Replace(string(words), from, "", 1)
		if strings.Contains(from, "{target}") {
			spoiled = strings.Replace(string(words), from, "Tighten all bolts", 1)
		}
		err := card.Write(io.Discard, byID(t, "TRN-010"), card.Options{Templates: fstest.MapFS{"cards/en.csv": {Data: []byte(spoiled)}}})
		assert.ErrorContains(t, err, want)
	}
}

// Target: 1,000 A5 cards in documents of 100 to 500 in under 2 s.
func BenchmarkCards1000(b *testing.B) {
	demo := demoPlans(b)
	var plans []planner.Plan
	for i := range 250 {
		p := demo[i%len(demo)]
		if !p.Feasible {
			p = demo[0]
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
