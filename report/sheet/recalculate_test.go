package sheet_test

import (
	"archive/zip"
	"bytes"
	"fmt"
	"io"
	"math"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"github.com/xuri/excelize/v2"

	"clampback/planner"
	"clampback/report/internal/demo"
	"clampback/report/sheet"
)

func write(t testing.TB, plans []planner.Plan) []byte {
	var b bytes.Buffer
	require.NoError(t, sheet.Write(&b, plans, sheet.Options{}))
	return b.Bytes()
}

// needSpreadsheet returns the spreadsheet program that recalculates, LibreOffice.
func needSpreadsheet(t testing.TB) string {
	path, err := exec.LookPath("soffice")
	if err != nil {
		if os.Getenv("CI") == "true" {
			t.Fatal("soffice is missing: install libreoffice-calc")
		}
		t.Skip("SKIPPED: soffice is missing, so the live formulas are not checked; install libreoffice-calc")
	}
	return path
}

var cachedValue = regexp.MustCompile(`(</f>)<v>[^<]*</v>`)

// poison removes the cached value of every formula cell, so that no comparison
// can succeed on a value that the program wrote itself.
func poison(t testing.TB, book []byte) []byte {
	in, err := zip.NewReader(bytes.NewReader(book), int64(len(book)))
	require.NoError(t, err)
	var out bytes.Buffer
	z := zip.NewWriter(&out)
	removed := 0
	for _, f := range in.File {
		r, err := f.Open()
		require.NoError(t, err)
		data, err := io.ReadAll(r)
		require.NoError(t, err)
		if strings.HasPrefix(f.Name, "xl/worksheets/") {
			removed += len(cachedValue.FindAll(data, -1))
			data = cachedValue.ReplaceAll(data, []byte("$1"))
		}
		w, err := z.Create(f.Name)
		require.NoError(t, err)
		_, err = w.Write(data)
		require.NoError(t, err)
	}
	require.NoError(t, z.Close())
	require.Positive(t, removed)
	return out.Bytes()
}

// recalculate has LibreOffice compute every formula of the books anew.
func recalculate(t testing.TB, books ...[]byte) []*excelize.File {
	soffice := needSpreadsheet(t)
	dir := t.TempDir()
	args := []string{"-env:UserInstallation=file://" + filepath.Join(dir, "profile"), "--headless", "--convert-to",
		"xlsx:Calc MS Excel 2007 XML", "--outdir", filepath.Join(dir, "out")}
	for i, book := range books {
		name := filepath.Join(dir, fmt.Sprintf("book%d.xlsx", i))
		require.NoError(t, os.WriteFile(name, poison(t, book), 0o600))
		args = append(args, name)
	}
	output, err := exec.Command(soffice, args...).CombinedOutput()
	require.NoError(t, err, "%s", output)
	files := make([]*excelize.File, len(books))
	for i := range books {
		files[i], err = excelize.OpenFile(filepath.Join(dir, "out", fmt.Sprintf("book%d.xlsx", i)))
		require.NoError(t, err, "%s", output)
		t.Cleanup(func() { files[i].Close() })
	}
	return files
}

// values reads a sheet's raw cells by the symbol in column A: column C.
func values(t testing.TB, f *excelize.File, name string) (symbols map[string]float64, checks map[string][4]string) {
	rows, err := f.GetRows(name, excelize.Options{RawCellValue: true})
	require.NoError(t, err)
	symbols, checks = map[string]float64{}, map[string][4]string{}
	inChecks := false
	for _, row := range rows {
		switch {
		case len(row) > 0 && row[0] == "Checks":
			inChecks = true
		case inChecks && len(row) >= 8 && row[0] == "" && row[1] != "check":
			checks[row[1]] = [4]string{row[2], row[4], row[5], row[7]}
		case !inChecks && len(row) >= 6 && (row[5] == "computed" || row[5] == "input"):
			v, err := strconv.ParseFloat(row[2], 64)
			require.NoError(t, err, "%s %s = %q", name, row[0], row[2])
			symbols[row[0]] = v
		}
	}
	return symbols, checks
}

// same compares to 1e-10 relative; LibreOffice writes 15 digits and more.
func same(t testing.TB, want, got float64, what string) {
	if math.Abs(want-got) > 1e-10*math.Max(math.Abs(want), math.Abs(got)) && math.Abs(want-got) > 1e-15 {
		t.Errorf("%s: plan %.15g, recalculated %.15g", what, want, got)
	}
}

// compare holds a recalculated sheet against a plan: every line and check.
func compare(t *testing.T, p planner.Plan, f *excelize.File) {
	symbols, checks := values(t, f, p.ID)
	require.Len(t, symbols, len(p.Trace), p.ID)
	for _, l := range p.Trace {
		got, ok := symbols[l.Symbol]
		require.True(t, ok, "%s: no row %s", p.ID, l.Symbol)
		same(t, l.Value, got, p.ID+" "+l.Symbol)
	}
	require.Len(t, checks, len(p.Checks), p.ID)
	for _, c := range p.Checks {
		got := checks[c.Name]
		for i, want := range []float64{c.Value, c.Limit, c.Utilisation} {
			v, err := strconv.ParseFloat(got[i], 64)
			require.NoError(t, err, "%s %s: %q", p.ID, c.Name, got[i])
			same(t, want, v, fmt.Sprintf("%s %s column %d", p.ID, c.Name, i))
		}
		verdict := "FAILS"
		if c.OK {
			verdict = "ok"
		}
		assert.Equal(t, verdict, got[3], "%s %s", p.ID, c.Name)
	}
	verdict, err := f.GetCellValue(p.ID, "C4")
	require.NoError(t, err)
	assert.Equal(t, p.Feasible, verdict == "FEASIBLE", "%s: %s", p.ID, verdict)
}

// The formulas, a second statement of the method, recalculated by LibreOffice,
// give the plan's numbers on every demo joint.
func TestFormulasRecalculated(t *testing.T) {
	plans := demo.Plans(t)
	f := recalculate(t, write(t, plans))[0]
	cells := 0
	for _, p := range plans {
		compare(t, p, f)
		cells += len(p.Trace) + 4*len(p.Checks)
	}
	t.Logf("%d cells of %d joints agree to 1e-10", cells, len(plans))

	for i, p := range plans {
		compareRegister(t, p, f, i)
	}
}

// compareRegister holds a row of the recalculated register against a plan: an
// infeasible joint has no target, no snug torque and no angle there.
func compareRegister(t *testing.T, p planner.Plan, f *excelize.File, i int) {
	rows, err := f.GetRows("Register", excelize.Options{RawCellValue: true})
	require.NoError(t, err)
	row := rows[5+i]
	require.Len(t, row, 16, p.ID)
	assert.Equal(t, p.ID, row[0])
	target, snug, angle := p.Torque.Target, p.Angle.SnugTorque, p.Angle.FromSnug
	verdict := "FEASIBLE"
	if !p.Feasible {
		target, snug, angle = 0, 0, 0
		verdict = "INFEASIBLE: do not tighten"
	}
	// Limits are rounded inwards: to 1 N, to 0.01 N.m.
	for column, want := range map[int]float64{
		5: math.Ceil(p.WorkBack.RequiredResidualClamp * (1 - 1e-12)), 6: math.Ceil(p.WorkBack.RequiredPreload),
		7: math.Floor(p.Preload.Limit), 8: math.Ceil(p.Torque.WindowLow*100) / 100, 9: target,
		10: math.Floor(p.Torque.WindowHigh*100) / 100, 11: snug, 12: angle,
	} {
		got, err := strconv.ParseFloat(row[column], 64)
		require.NoError(t, err, "%s, register column %d: %q", p.ID, column, row[column])
		same(t, want, got, fmt.Sprintf("%s, register column %d", p.ID, column))
	}
	assert.Equal(t, verdict, row[14], p.ID)
	assert.Equal(t, p.Joint.Revision, row[15], p.ID)
}

// change is an input that an auditor changes in the sheet, and the same change
// of the joint.
type change struct {
	joint  int
	symbol string
	value  float64
	apply  func(*planner.Joint)
}

// An auditor changes an input in the workbook and sees the torque move: to where
// a fresh plan of the changed joint has it.
func TestChangedInputsMoveTheTorque(t *testing.T) {
	joints := demo.Joints(t)
	changes := []change{
		{0, "F_K_res", 20000, func(j *planner.Joint) { j.Clamp.Residual = 20000 }},
		{0, "h_2", 21, func(j *planner.Joint) { j.Parts[0].Thickness = 21 }},
		{0, "mu_G_max", 0.17, func(j *planner.Joint) { j.Friction.Thread.High = 0.17 }},
		{0, "D_A", 22, func(j *planner.Joint) { j.Parts[0].OuterDiameter = 22 }},
		{0, "temp_lo", -40, func(j *planner.Joint) { j.Temperature.Service.Low = -40 }},
		{1, "h_2", 44, func(j *planner.Joint) { j.Parts[0].Thickness = 44 }}, // too little thread engaged
		{1, "mu_K_min", 0.06, func(j *planner.Joint) { j.Friction.Head.Low = 0.06 }},
		{1, "tau_BM", 90, func(j *planner.Joint) { j.Tapped.Material.ShearStrength = 90 }},
		{2, "F_Q", 3100, func(j *planner.Joint) { j.Clamp.Transverse = 3100 }},
		{2, "nu", 0.7, func(j *planner.Joint) { j.Tightening.Utilisation = 0.7 }},
		{3, "F_A_max", 6000, func(j *planner.Joint) { j.Loads.Axial.High = 6000 }},
		{4, "tol_T", 0.15, func(j *planner.Joint) { j.Tightening.Tool.Tolerance = 0.15 }},
		{5, "eps", 0.2, func(j *planner.Joint) { j.Tightening.ElasticSpread = 0.2 }},
		{5, "tol_ang", 4, func(j *planner.Joint) { j.Tightening.AngleTol = 4 }},
		{6, "alpha_A", 2.2, func(j *planner.Joint) { j.Tightening.ScatterFactor = 2.2 }},
		{7, "n", 0.9, func(j *planner.Joint) { *j.Loads.IntroductionFactor = 0.9 }},
		{10, "s_S", 0.99, func(j *planner.Joint) { j.Tightening.Snug = 0.99 }},       // rounds to the target: infeasible
		{0, "F_A_max", 60000, func(j *planner.Joint) { j.Loads.Axial.High = 60000 }}, // no window: infeasible
		{9, "mu_G_max", 0.10, func(j *planner.Joint) { j.Friction.Thread.High = 0.10 }},
		{12, "a_A", 16, func(j *planner.Joint) { *j.Eccentric.LoadArm = 16 }},
		{12, "M_B_hi", 20, func(j *planner.Joint) { j.Eccentric.MomentHigh = 20000 }},
		{12, "s_sym", -1, func(j *planner.Joint) { j.Eccentric.BoltOffset = -1 }},
		{12, "l_A", 4, func(j *planner.Joint) { j.Loads.Introduction.Lead = 4 }},
		{13, "mu_T", 0.1, func(j *planner.Joint) { j.Clamp.InterfaceFriction = 0.1 }},
		{14, "temp_N", 45, func(j *planner.Joint) { j.Temperature.Assembly.High = 45 }},
		{14, "rho_rel", 0.06, func(j *planner.Joint) { j.Losses.Relaxation = 0.06 }},
		{14, "F_B_hi_2", 60000, func(j *planner.Joint) { j.Loads.Spectrum[1].High, j.Loads.Axial.High = 60000, 60000 }},
		{14, "fz_L_1", 12, func(j *planner.Joint) { j.Losses.Layers[0].Amount = 0.012 }},
		{15, "w_M", 20, func(j *planner.Joint) { j.Tapped.OuterDiameter = 20 }},
		{16, "S_G", 1.9, func(j *planner.Joint) { j.Safety.Slip = 1.9 }},
		{17, "F_strip", 12500, func(j *planner.Joint) { j.Tapped.Insert.PullOut = 12500 }},
		{18, "G_A_1", 12000, func(j *planner.Joint) { j.Group[5].Axial = 12000 }},
		{20, "R_p02", 500, func(j *planner.Joint) { j.Bolt.Class.YieldStrength = 500 }},
	}
	var books [][]byte
	var want []planner.Plan
	for _, c := range changes {
		before := demo.PlanAll(t, joints[c.joint:c.joint+1])
		books = append(books, setInput(t, write(t, before), before[0], c.symbol, c.value))
		changed := demo.Joints(t)[c.joint]
		c.apply(&changed)
		after, err := planner.Work(changed)
		require.NoError(t, err)
		assert.False(t, before[0].Feasible == after.Feasible && assert.ObjectsAreEqual(before[0].Checks, after.Checks),
			"the change %s must matter", c.symbol)
		want = append(want, after)
	}
	for i, f := range recalculate(t, books...) {
		t.Run(changes[i].symbol, func(t *testing.T) {
			compare(t, want[i], f)
			compareRegister(t, want[i], f, 0)
		})
	}
}

// setInput changes an unlocked cell as a person would.
func setInput(t testing.TB, book []byte, p planner.Plan, symbol string, value float64) []byte {
	f, err := excelize.OpenReader(bytes.NewReader(book))
	require.NoError(t, err)
	defer f.Close()
	for i, l := range p.Trace {
		if l.Symbol != symbol {
			continue
		}
		require.True(t, l.Input)
		at := fmt.Sprintf("C%d", 7+i)
		style, err := f.GetCellStyle(p.ID, at)
		require.NoError(t, err)
		s, err := f.GetStyle(style)
		require.NoError(t, err)
		require.NotNil(t, s.Protection)
		require.False(t, s.Protection.Locked, "input cells are unlocked")
		require.NoError(t, f.SetCellFloat(p.ID, at, value, -1, 64))
		var b bytes.Buffer
		require.NoError(t, f.Write(&b))
		return b.Bytes()
	}
	t.Fatalf("%s has no input %s", p.ID, symbol)
	return nil
}
