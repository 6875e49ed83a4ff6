package sheet_test

import (
	"archive/zip"
	"bytes"
	"fmt"
	"io"
	"regexp"
	"runtime"
	"strings"
	"testing"
	"testing/fstest"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"github.com/xuri/excelize/v2"

	"clampback/planner"
	"clampback/report/internal/demo"
	"clampback/report/sheet"
)

func open(t testing.TB, book []byte) *excelize.File {
	f, err := excelize.OpenReader(bytes.NewReader(book))
	require.NoError(t, err)
	t.Cleanup(func() { f.Close() })
	return f
}

// many returns n plans of the demo joints under ids of their own.
func many(t testing.TB, n int) []planner.Plan {
	plant := demo.Plans(t)
	plans := make([]planner.Plan, n)
	for i := range plans {
		plans[i] = plant[i%len(plant)]
		plans[i].ID = fmt.Sprintf("J-%04d", i)
	}
	return plans
}

func TestSameBytesForSamePlans(t *testing.T) {
	first := write(t, demo.Plans(t))
	for range 3 {
		assert.True(t, bytes.Equal(first, write(t, demo.Plans(t))))
	}
}

func TestBookHasRegisterJointsAndAbout(t *testing.T) {
	plans := demo.Plans(t)
	f := open(t, write(t, plans))
	want := []string{"Register"}
	for _, p := range plans {
		want = append(want, p.ID)
	}
	assert.Equal(t, append(want, "About"), f.GetSheetList())
	rows, err := f.GetRows("Register")
	require.NoError(t, err)
	assert.Len(t, rows, 5+len(plans), "one row a joint below the heading")
	for _, name := range f.GetSheetList() {
		protection, err := f.GetSheetProtection(name)
		require.NoError(t, err)
		assert.Empty(t, protection.Password, name)
	}
}

// An infeasible joint says so in words at the top of its sheet and in the
// register.
func TestInfeasibleJointSaysSo(t *testing.T) {
	f := open(t, write(t, demo.Plans(t)))
	verdict, err := f.GetCellValue("TRN-100", "C4")
	require.NoError(t, err)
	assert.Equal(t, "INFEASIBLE: do not tighten", verdict)
}

// A snug torque that reaches the target leaves nothing to tighten: the sheet must
// not call feasible what the plan does not, and the register offers no setting.
func TestSnugAboveTargetIsInfeasible(t *testing.T) {
	joints := demo.Joints(t)[:1]
	joints[0].Tightening.Snug, joints[0].Tightening.SnugTorque = 0, 150e3 // N.mm; the target is 98 N.m
	plans := demo.PlanAll(t, joints)
	require.False(t, plans[0].Feasible)
	f := open(t, write(t, plans))
	for _, at := range []string{"J6", "L6", "M6"} {
		value, err := f.GetCellValue("Register", at, excelize.Options{RawCellValue: true})
		require.NoError(t, err)
		assert.Equal(t, "0", value, "%s: 0 is shown as the word none", at)
	}
}

// Symbols become names of cells, which a spreadsheet compares without case and
// does not tell from references (ECMA-376 Part 1, 18.2.5).
func TestSymbolsAreNamesOfCells(t *testing.T) {
	name := regexp.MustCompile(`^[A-Za-z_][A-Za-z0-9_.]*$`)
	reference := regexp.MustCompile(`(?i)^([a-z]{1,3}[0-9]+|r[0-9]*c?[0-9]*|c[0-9]*)$`)
	for _, p := range demo.Plans(t) {
		seen := map[string]string{}
		for _, l := range p.Trace {
			assert.Regexp(t, name, l.Symbol)
			assert.NotRegexp(t, reference, l.Symbol)
			folded := strings.ToLower(l.Symbol)
			assert.Empty(t, seen[folded], "%s: %s", p.ID, l.Symbol)
			seen[folded] = l.Symbol
		}
	}
}

// A template with a mistake is refused with its place, never written as it is.
func TestTemplateMistakesAreRefused(t *testing.T) {
	for text, want := range map[string]string{
		"rule,formula\nd_2,1\n":             "no rule",
		"rule,formula\nd_2,1\nd_2,2\n":      "calculation.csv:3",
		"rule,formula\nd_2,1,2\n":           "line 2",
		"rule,formula\nd_2,{sum nothing}\n": "cannot be filled",
		"rule,formula\n":                    "no lines",
	} {
		folder := fstest.MapFS{"calculation.csv": {Data: []byte(text)}}
		err := sheet.Write(io.Discard, demo.Plans(t), sheet.Options{Templates: folder})
		assert.ErrorContains(t, err, want, text)
	}
}

// An ampersand is a code in a header: doubled, also where a long title is cut.
func TestHeaderKeepsAmpersand(t *testing.T) {
	joints := demo.Joints(t)[:1]
	joints[0].Assembly = strings.Repeat("&", 120)
	f := open(t, write(t, demo.PlanAll(t, joints)))
	header, err := f.GetHeaderFooter("Register")
	require.NoError(t, err)
	assert.Equal(t, "&L"+strings.Repeat("&", 200)+"&R&A", header.OddHeader)
}

// What a user writes never becomes a formula, whatever it begins with.
func TestUserTextStaysText(t *testing.T) {
	for _, text := range []string{`=1+1`, `+1`, `-1`, `@SUM(A1)`, `=HYPERLINK("http://x","y")`, "\t=1", "a\x01b", `{=1}`} {
		joints := demo.Joints(t)[:1]
		joints[0].Name, joints[0].Assembly, joints[0].Parts[0].Name = text, text, text
		joints[0].Tightening.Tool.Name = text
		f := open(t, write(t, demo.PlanAll(t, joints)))
		for _, name := range f.GetSheetList() {
			rows, err := f.GetRows(name)
			require.NoError(t, err)
			for r, row := range rows {
				for c, value := range row {
					if !strings.Contains(value, strings.TrimSpace(strings.ReplaceAll(text, "\x01", ""))) {
						continue
					}
					at, err := excelize.CoordinatesToCellName(c+1, r+1)
					require.NoError(t, err)
					formula, err := f.GetCellFormula(name, at)
					require.NoError(t, err)
					assert.Empty(t, formula, "%s!%s: %q", name, at, value)
				}
			}
		}
	}
}

// Ids of 40 letters, ids that differ late, and reserved words all get a sheet.
func TestSheetNamesAreValidAndUnique(t *testing.T) {
	plans := many(t, 6)
	long := strings.Repeat("A", 39)
	for i, id := range []string{long + "1", long + "2", "Register", "about", "History", "register~2"} {
		plans[i].ID = id
	}
	f := open(t, write(t, plans))
	seen := map[string]bool{}
	for _, name := range f.GetSheetList() {
		assert.LessOrEqual(t, len(name), 31)
		assert.False(t, seen[strings.ToLower(name)], name)
		seen[strings.ToLower(name)] = true
	}
	assert.Len(t, seen, 8)
}

// Every part of the archive is there once, in order, without a time.
func TestArchiveIsOrdered(t *testing.T) {
	book := write(t, many(t, 3))
	z, err := zip.NewReader(bytes.NewReader(book), int64(len(book)))
	require.NoError(t, err)
	for i, f := range z.File {
		if i > 0 {
			assert.Less(t, z.File[i-1].Name, f.Name)
		}
		r, err := f.Open()
		require.NoError(t, err)
		_, err = io.Copy(io.Discard, r)
		require.NoError(t, err)
	}
}

// Target: 200 joints with a calculation sheet each in under 3 s and 300 MB.
func BenchmarkWorkbook200(b *testing.B) {
	plans := many(b, 200)
	var before, after runtime.MemStats
	runtime.GC()
	runtime.ReadMemStats(&before)
	for b.Loop() {
		if err := sheet.Write(io.Discard, plans, sheet.Options{}); err != nil {
			b.Fatal(err)
		}
	}
	runtime.ReadMemStats(&after)
	b.ReportMetric(float64(after.Sys)/1e6, "MB-from-system")
}
