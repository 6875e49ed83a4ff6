package register_test

import (
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner"
	"clampback/planner/quantity"
	"clampback/planner/register"
)

// demo returns the demo register.
func demo(t testing.TB) string {
	data, err := os.ReadFile("../../testdata/demo/tarn40.yaml")
	require.NoError(t, err)
	return string(data)
}

func read(text string) ([]planner.Joint, error) {
	return register.Read(register.Source{Name: "pump.yaml", Data: []byte(text), Open: func(name string) ([]byte, error) {
		return os.ReadFile(filepath.Join("testdata", name))
	}})
}

// good is a small register that reads well; tests spoil it line by line.
const good = `assembly: Tarn 40 slurry pump
revision: C
defaults:
  friction: {thread: 0.10 to 0.14, head: 0.09 to 0.13}
  tightening: {tool: {tolerance: 4 %}}
joints:
  - id: A-1
    name: flange
    count: 4
    pattern: {circle: 100 mm}
    bolt: {thread: M12, length: 60 mm, head: hexagon, property_class: 10.9}
    nut: hexagon
    clamped:
      - {part: flange, material: S355, thickness: 18 mm, hole: 13.5 mm, outer_diameter: 34 mm}
      - {part: rail, material: S355, thickness: 15 mm, hole: 13.5 mm, outer_diameter: 40 mm}
    clamp: {residual: 12 kN}
    loads: {axial: 0 to 9.5 kN, introduction_factor: 0.5}
`

func TestReadDemo(t *testing.T) {
	joints, err := read(demo(t))
	require.NoError(t, err)
	require.GreaterOrEqual(t, len(joints), 10)
	j := joints[0]
	assert.Equal(t, "TRN-010", j.ID)
	assert.Equal(t, "Tarn 40 slurry pump", j.Assembly)
	assert.Equal(t, "C", j.Revision)
	assert.Equal(t, quantity.Range{Low: 0, High: 9500}, j.Loads.Axial)
	assert.InDelta(t, 0.016, j.Roughness, 1e-15, "from defaults")
	assert.Equal(t, quantity.Range{Low: 0.10, High: 0.14}, j.Friction.Thread, "from defaults")
	assert.InDelta(t, 0.04, j.Tightening.Tool.Tolerance, 1e-15)
	assert.Len(t, j.Pattern.Points, 8)
}

func TestDefaultsAreMergedKeyByKey(t *testing.T) {
	text := good + "    tightening: {step: 2 N.m}\n    friction: {condition: class B}\n"
	joints, err := read(text)
	require.NoError(t, err)
	assert.InDelta(t, 2000, joints[0].Tightening.Step, 0)
	assert.InDelta(t, 0.04, joints[0].Tightening.Tool.Tolerance, 1e-15, "kept from defaults")
	assert.Equal(t, "class B, VDI 2230-1 Table A5 class B", joints[0].Friction.Source, "the condition replaces the ranges")
}

// after returns what follows the first mark.
func after(s, mark string) string {
	_, rest, _ := strings.Cut(s, mark)
	return rest
}

// spoil replaces one text of the good register.
func spoil(t testing.TB, from, to string) string {
	require.Equal(t, 1, strings.Count(good, from), "%q must stand once", from)
	return strings.Replace(good, from, to, 1)
}

// Every bad input gives one error with place, message and mend.
func TestOneErrorForEachMistake(t *testing.T) {
	cases := []struct {
		name, from, to string
		want           string // line:column: message
		mend           string
	}{
		{"unknown key", "nut: hexagon", "nutt: hexagon", `12:5: unknown key "nutt" in the joint`, `did you mean "nut"?`},
		{"missing unit", "length: 60 mm", "length: 60", `11:33: length: "60" has no unit`, "add the unit: mm, um, m or in"},
		{"wrong dimension", "residual: 12 kN", "residual: 12 mm", `16:23: residual: "12 mm" is a length, but a force belongs here`, "write it as 12 kN"},
		{"wrong unit", "residual: 12 kN", "residual: 12 KN", `16:23: residual: unknown unit "KN"`, "write kN"},
		{"hole smaller than thread", "thickness: 18 mm, hole: 13.5 mm", "thickness: 18 mm, hole: 11 mm", `14:64: the hole of 11 mm is smaller than the thread of 12 mm`, "state the clearance hole: at least the thread's diameter"},
		{"grip longer than bolt", "length: 60 mm", "length: 30 mm", `11:33: the grip of 33 mm is longer than the bolt of 30 mm`, "state a longer bolt, or thinner parts"},
		{"thickness 0", "thickness: 18 mm", "thickness: 0 mm", `14:51: the thickness is 0 mm; it must be above 0`, "state the part's thickness, or leave the part out"},
		{"mu of 5", "thread: 0.10 to 0.14", "thread: 5", `4:22: the friction in the thread is 5; a coefficient of friction lies between 0.001 and 1`, "write it as 0.10 to 0.14"},
		{"unknown material", "part: flange, material: S355", "part: flange, material: S335", `14:34: unknown material "S335"`, `did you mean "S235"?`},
		{"unknown thread", "thread: M12", "thread: M11", `11:20: unknown thread "M11"`, `did you mean "M10"?`},
		{"inch thread", "thread: M12", "thread: 1/2-14 UNC", `11:20: unknown thread "1/2-14 UNC"`, "did you mean \"1/2-13 UNC\"?"},
		{"metric class on an inch thread", "thread: M12", "thread: 1/2-13 UNC", `11:78: unknown property class "10.9"`, "A193 B7"},
		{"stud without nut", "head: hexagon, property_class: 10.9}\n    nut: hexagon\n", "head: stud, property_class: 10.9}\n    tapped: {material: S355, depth: 40 mm}\n",
			`11:46: a stud needs a nut in place of a head`, "add nut: hexagon"},
		{"missing key", "    count: 4\n", "", `7:5: the joint lacks count`, "add count: 8"},
		{"no axial factor", ", introduction_factor: 0.5", "", `17:13: the axial load has no load introduction factor`, "state introduction_factor"},
		{"list for mapping", "clamp: {residual: 12 kN}", "clamp: [12 kN]", `16:12: clamp is a list, but a mapping belongs here`, "write it as {residual: ...}"},
		{"mapping for value", "id: A-1", "id: {a: b}", `7:10: id is a mapping, but a single value belongs here`, "write one value"},
		{"count and pattern", "pattern: {circle: 100 mm}", "pattern: {rows: 2, columns: 3, pitch: [60 mm, 80 mm]}", `10:15: the pattern has 6 positions, the joint 4 bolts`, "make count and pattern agree"},
		{"range backwards", "0 to 9.5 kN", "9.5 to 0 kN", `17:20: axial: "9.5 to 0 kN" runs backwards`, `write the lower end first`},
		{"duplicate key", "count: 4", "count: 4\n    count: 5", `10:5: the key count stands here and in line 9`, "keep one of them"},
		{"alias", "nut: hexagon", "nut: *n", `12:10: aliases are not used in registers`, "write the values out"},
		{"anchor", "nut: hexagon", "nut: &n hexagon", `12:10: anchors are not used in registers`, "write the values out"},
		{"tag", "nut: hexagon", "nut: !!str hexagon", `12:10: tags are not used in registers`, "remove the tag"},
		{"not YAML", "clamp: {residual: 12 kN}", "clamp: {residual: 12 kN", `this is not YAML`, "check indentation"},
		{"tab", "    nut: hexagon", "\tnut: hexagon", `12:1: a tab indents the line`, "indent with blanks"},
		{"id with a slash", "id: A-1", "id: ../A", `7:9: id "../A" cannot name a file`, "use 1 to 40 letters"},
		{"id of dots", "id: A-1", "id: ..", `7:9: id ".." cannot name a file`, "use 1 to 40 letters"},
		{"id too long", "id: A-1", "id: " + strings.Repeat("x", 41), `7:9: id "xxx`, "use 1 to 40 letters"},
		{"evidence", "friction: {thread: 0.10 to 0.14, head: 0.09 to 0.13}", "friction: {evidence: tests.csv}", `4:24: friction from test evidence is not read by this version`, "state the ranges"},
		{"method", "tightening: {tool: {tolerance: 4 %}}", "tightening: {method: yield, tool: {tolerance: 4 %}}", `5:24: method: "yield" is not planned by this version`, "state torque or torque and angle"},
		{"octal", "count: 4", "count: 04", `9:12: count: "04" is not a whole number`, "write it as 8"},
		{"fraction for count", "count: 4", "count: 4.5", `9:12: count: "4.5" is not a whole number`, "write it as 8"},
		{"no demand", "clamp: {residual: 12 kN}", "clamp: {residual: 0 kN}", `16:13: nothing says what the joint must hold`, "state residual, transverse, torque or seal"},
		{"no tool", "tightening: {tool: {tolerance: 4 %}}", "tightening: {}", `no tool is stated`, "add tightening: {tool: {tolerance: 4 %}}"},
		{"second document", "    loads: {axial: 0 to 9.5 kN, introduction_factor: 0.5}\n", "    loads: {axial: 0 kN}\n---\nassembly: other\n", `18:1: a second document begins here`, "put each register into a file of its own"},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			_, err := read(spoil(t, c.from, c.to))
			var e *register.ProblemsError
			require.ErrorAs(t, err, &e)
			require.Len(t, e.Problems, 1, "%s", e.Report())
			p := e.Problems[0]
			assert.Contains(t, fmt.Sprintf("%d:%d: %s", p.Line, p.Column, p.Message), c.want)
			assert.Contains(t, p.Mend, c.mend)
			assert.Equal(t, "pump.yaml", p.File)
			assert.NotEmpty(t, p.Text)
		})
	}
}

func TestGuardsRefuseCleanly(t *testing.T) {
	cases := map[string]struct{ text, want string }{
		"byte order mark":  {"\xef\xbb\xbf" + good, "byte order mark"},
		"invalid UTF-8":    {strings.Replace(good, "flange\n", "fl\xffnge\n", 1), "8:13: the text is not valid UTF-8"},
		"control":          {strings.Replace(good, "flange\n", "fl\x00nge\n", 1), "control character"},
		"deep brackets":    {"assembly: " + strings.Repeat("[", 100000), "the brackets nest too deeply"},
		"deep dashes":      {"joints:\n  " + strings.Repeat("- ", 50000), "nests too deeply"},
		"deep indentation": {strings.Repeat(" ", 5000) + "a: b", "nests too deeply"},
		"alias bomb":       {"a: &a [x]\nb: &b [*a,*a]\nassembly: *b\n", "anchors are not used"},
		"empty":            {"", "the register is empty"},
		"one huge part":    {"assembly: x\n" + strings.Repeat("a: b\n", 500_000), "more than one joint can need"},
		"one huge joint": {"assembly: x\njoints:\n  - points: [" + strings.Repeat("1, ", 500_000) + "]\n",
			"more than one joint can need"},
		"countless joints": {"assembly: x\njoints:\n" + strings.Repeat("- a\n", 200_000), "more than 100000 joints"},
		"only a scalar":    {"hello", "the register is a single value"},
	}
	for name, c := range cases {
		t.Run(name, func(t *testing.T) {
			_, err := read(c.text)
			var e *register.ProblemsError
			require.ErrorAs(t, err, &e)
			assert.Contains(t, e.Report(), c.want)
		})
	}
	_, err := register.ReadSource(strings.NewReader(strings.Repeat("#", register.MaxSize+1)), "big.yaml")
	assert.ErrorContains(t, err, "larger than 64 MB")
}

// All problems come in one run, in order, each once even when every joint
// inherits it.
func TestAllProblemsInOneRun(t *testing.T) {
	second := strings.Replace("  - id"+after(good, "  - id"), "A-1", "A-2", 1)
	text := strings.Replace(good, "tolerance: 4 %", "tolerance: 4 mm", 1) + strings.Replace(second, "nut: hexagon",
		"nut: square", 1)
	text = strings.Replace(text, "residual: 12 kN", "residual: 12", 1)
	_, err := read(text)
	var e *register.ProblemsError
	require.ErrorAs(t, err, &e)
	var lines []int
	for _, p := range e.Problems {
		lines = append(lines, p.Line)
	}
	assert.Equal(t, []int{5, 16, 23}, lines, "%s", e.Report())
}

func TestDuplicateIDsAcrossFiles(t *testing.T) {
	_, err := register.Read(register.Source{Name: "a.yaml", Data: []byte(good)},
		register.Source{Name: "b.yaml", Data: []byte(good)})
	assert.ErrorContains(t, err, "b.yaml:7:9: the id A-1 stands here and in a.yaml:7")
}

func TestReportShowsLineMarkAndMend(t *testing.T) {
	_, err := read(spoil(t, "length: 60 mm", "length: 60"))
	var e *register.ProblemsError
	require.ErrorAs(t, err, &e)
	assert.Equal(t, `error: pump.yaml:11:33: length: "60" has no unit
        bolt: {thread: M12, length: 60, head: hexagon, property_class: 10.9}
                                    ^
mend: add the unit: mm, um, m or in
`, e.Report())
}

// The order of keys does not matter.
func TestKeyOrderDoesNotMatter(t *testing.T) {
	lines := strings.SplitAfter(good, "\n")
	joint := append([]string{}, lines[7:]...)
	moved := strings.Join(lines[:7], "") + strings.Join(append(joint[len(joint)-3:], joint[:len(joint)-3]...), "")
	want, err := read(good)
	require.NoError(t, err)
	got, err := read(moved)
	require.NoError(t, err, moved)
	assert.Equal(t, want, got)
}

// Joints in flow style, which are not cut apart, read the same.
func TestFlowStyleJoints(t *testing.T) {
	head, _, _ := strings.Cut(good, "joints:")
	flow := head + `joints: [{id: A-1, name: flange, count: 4, pattern: {circle: 100 mm}, bolt: {thread: M12, length: 60 mm, head: hexagon, property_class: 10.9}, nut: hexagon,
  clamped: [{part: flange, material: S355, thickness: 18 mm, hole: 13.5 mm, outer_diameter: 34 mm}, {part: rail, material: S355, thickness: 15 mm, hole: 13.5 mm, outer_diameter: 40 mm}],
  clamp: {residual: 12 kN}, loads: {axial: 0 to 9.5 kN, introduction_factor: 0.5}}]
`
	want, err := read(good)
	require.NoError(t, err)
	got, err := read(flow)
	require.NoError(t, err)
	assert.Equal(t, want, got)
}

// manyJoints returns a register of n joints.
func manyJoints(n int) []byte {
	head, joint, _ := strings.Cut(good, "  - id")
	var b strings.Builder
	b.WriteString(head)
	for i := range n {
		b.WriteString("  - id" + strings.Replace(joint, "A-1", fmt.Sprintf("A-%d", i), 1))
	}
	return []byte(b.String())
}

// Target: 10,000 joints in under 2 s.
func BenchmarkRead10000(b *testing.B) {
	source := register.Source{Name: "many.yaml", Data: manyJoints(10000)}
	b.SetBytes(int64(len(source.Data)))
	for b.Loop() {
		joints, err := register.Read(source)
		if err != nil || len(joints) != 10000 {
			b.Fatal(err)
		}
	}
}

// Whatever the bytes, reading ends with joints or with problems that have a
// message, a mend and a place.
func FuzzRead(f *testing.F) {
	f.Add([]byte(good))
	f.Add([]byte(demo(f)))
	f.Add([]byte(strings.Replace(good, "loads: {axial: 0 to 9.5 kN, introduction_factor: 0.5}",
		"group: {loads: [{case: a, force: [0 kN, 1 kN, 0 kN], moment: [0 N.m, 0 N.m, 1 N.m], at: [0 mm, 0 mm, 9 mm]}]}", 1)))
	for _, s := range []string{"", "a: [", "joints:\n- ", "joints:\n  - id: 1\n  - ? a",
		"assembly: x\njoints: [a, {b: c}]", "? [a]\n: b", "a: |\n  x\n", "--- >\n", "joints: {}\n", "<<: {a: b}\n"} {
		f.Add([]byte(s))
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		joints, err := register.Read(register.Source{Name: "fuzz.yaml", Data: data})
		if err == nil {
			for _, j := range joints {
				if _, err := planner.Work(j); err != nil {
					t.Errorf("a joint that reads cannot be planned: %v", err)
				}
			}
			return
		}
		var e *register.ProblemsError
		if !errors.As(err, &e) {
			t.Fatalf("%T is no list of problems", err)
		}
		for _, p := range e.Problems {
			if p.Message == "" || p.Mend == "" || p.Line < 1 || p.Column < 1 {
				t.Errorf("incomplete problem: %+v", p)
			}
		}
	})
}
