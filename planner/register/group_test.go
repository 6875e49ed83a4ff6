package register_test

import (
	"errors"
	"fmt"
	"io/fs"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner/group"
	"clampback/planner/register"
)

const axialLoads = "loads: {axial: 0 to 9.5 kN, introduction_factor: 0.5}"

const sharedLoads = `loads: {introduction_factor: 0.5, cycles: 1e6}
    group:
      loads:
        - {case: start-up, force: [0 kN, 2 kN, 8 kN], moment: [0 N.m, 600 N.m, 0 N.m], at: [0 mm, 0 mm, 150 mm]}
        - {case: standstill, force: [0 kN, 0 kN, -4 kN]}
`

// withFriction states the interface friction that transverse loads of a group need.
func withFriction(text string) string {
	return strings.Replace(text, "clamp: {", "clamp: {interface_friction: 0.2, ", 1)
}

// readWith reads a register that may open the given files.
func readWith(text string, files map[string]string) ([]group.Share, []string) {
	text = withFriction(text)
	joints, err := register.Read(register.Source{Name: "plant/pump.yaml", Data: []byte(text), Open: func(name string) ([]byte, error) {
		data, found := files[name]
		if !found {
			return nil, fmt.Errorf("plant/%s: %w", name, fs.ErrNotExist)
		}
		return []byte(data), nil
	}})
	var e *register.ProblemsError
	if !errors.As(err, &e) {
		return joints[0].Group, nil
	}
	var problems []string
	for _, p := range e.Problems {
		if p.Mend == "" {
			problems = append(problems, "no mend:")
		}
		problems = append(problems, fmt.Sprintf("%s:%d:%d: %s", p.File, p.Line, p.Column, p.Message))
	}
	return nil, problems
}

// The loads of the whole joint are shared out over the circle of 100 mm of the
// good register: bolt 1 at the top, then clockwise.
func TestGroupOfLoads(t *testing.T) {
	shares, problems := readWith(spoil(t, axialLoads+"\n", sharedLoads), nil)
	require.Empty(t, problems)
	require.Len(t, shares, 8)
	// M_x = -150 mm 2 kN = -300 N.m, on the bolts 50 mm above and below: 3 kN; M_y = 600 N.m, right and left: 6 kN.
	for i, want := range []float64{2000 - 3000, 2000 - 6000, 2000 + 3000, 2000 + 6000} {
		assert.Equal(t, "start-up", shares[i].Case)
		assert.Equal(t, i+1, shares[i].Bolt)
		assert.InDelta(t, want, shares[i].Axial, 1e-9)
		assert.InDelta(t, 500, shares[i].Y, 1e-9)
	}
	assert.Equal(t, "standstill", shares[7].Case)
	assert.InDelta(t, -1000, shares[7].Axial, 1e-12)
}

const tableOfFour = `load_case,bolt,axial (kN),transverse_x (kN),transverse_y (kN)
start,1,4,0,0
start,2,1,0,0
start,3,-1,0,0.5
start,4,1,0,0
`

func TestGroupOfForces(t *testing.T) {
	text := spoil(t, axialLoads, "loads: {introduction_factor: 0.5}\n    group: {forces: fe/run 7.csv}")
	shares, problems := readWith(text, map[string]string{"fe/run 7.csv": tableOfFour})
	require.Empty(t, problems)
	require.Len(t, shares, 4)
	assert.Equal(t, group.Share{Case: "start", Bolt: 3, Axial: -1000, Y: 500}, shares[2])
	text = strings.Replace(text, "    pattern: {circle: 100 mm}\n", "", 1)
	_, problems = readWith(text, map[string]string{"fe/run 7.csv": tableOfFour})
	assert.Empty(t, problems, "forces need no pattern")
}

// The defaults' group gives way to a joint's axial load and the other way round,
// the other loads stay.
func TestGroupAndDefaults(t *testing.T) {
	grouped := strings.Replace(spoil(t, axialLoads, "group: {forces: run.csv}"), "defaults:\n",
		"defaults:\n  loads: {axial: 3 kN, introduction_factor: 0.7}\n", 1)
	joints, err := register.Read(register.Source{Name: "pump.yaml", Data: []byte(withFriction(grouped)), Open: func(string) ([]byte, error) {
		return []byte(tableOfFour), nil
	}})
	require.NoError(t, err)
	assert.Len(t, joints[0].Group, 4)
	assert.InDelta(t, 0.7, *joints[0].Loads.IntroductionFactor, 0)
	assert.Zero(t, joints[0].Loads.Axial)

	shares, problems := readWith(strings.Replace(good, "defaults:\n", "defaults:\n  group: {forces: missing.csv}\n", 1), nil)
	assert.Empty(t, problems)
	assert.Empty(t, shares)

	loads := strings.Replace(spoil(t, axialLoads+"\n", sharedLoads), "defaults:\n", "defaults:\n  group: {forces: missing.csv}\n", 1)
	shares, problems = readWith(loads, nil)
	assert.Empty(t, problems)
	assert.Len(t, shares, 8)
}

// Each mistake is one problem with its place.
func TestMistakesOfAGroup(t *testing.T) {
	shared := spoil(t, axialLoads+"\n", sharedLoads)
	loads := func(from, to string) string {
		require.Equal(t, 1, strings.Count(shared, from), from)
		return strings.Replace(shared, from, to, 1)
	}
	forces := spoil(t, axialLoads, "group: {forces: run.csv}")
	table := func(from, to string) map[string]string {
		require.Equal(t, 1, strings.Count(tableOfFour, from), from)
		return map[string]string{"run.csv": strings.Replace(tableOfFour, from, to, 1)}
	}
	const yaml, csv = "plant/pump.yaml:", "plant/run.csv:"
	cases := []struct {
		name, text string
		files      map[string]string
		want       []string
	}{
		{"axial too", loads("introduction_factor: 0.5", "axial: 5 kN, introduction_factor: 0.5"), nil,
			[]string{yaml + "17:20: both axial, the load of one bolt, and group, the loads of the whole joint, are stated"}},
		{"no axial and no group", spoil(t, "axial: 0 to 9.5 kN, ", ""), nil, []string{yaml + "17:13: loads lacks axial"}},
		{"loads and forces", loads("    group:\n", "    group:\n      forces: run.csv\n"), table("start,1", "start,1"),
			[]string{yaml + "19:15: the group states both loads and forces"}},
		{"neither", strings.Replace(forces, "forces: run.csv", "", 1), nil, []string{yaml + "17:12: the group states neither loads nor forces"}},
		{"misspelt", loads("      loads:", "      lods:"), nil, []string{yaml + `19:7: unknown key "lods" in group`}},
		{"misspelt group", loads("    group:", "    grup:"), nil, []string{yaml + `18:5: unknown key "grup" in the joint`}},
		{"no load case", strings.Replace(forces, "forces: run.csv", "loads: []", 1), nil, []string{yaml + "17:20: there is no load case"}},
		{"no pattern", strings.Replace(shared, "    pattern: {circle: 100 mm}\n", "", 1), nil,
			[]string{yaml + "19:9: the loads of the group need to know where the bolts sit"}},
		{"pattern not read", strings.Replace(shared, "circle: 100 mm", "circle: 100", 1), nil, []string{yaml + `10:23: circle: "100" has no unit`}},
		{"other count", strings.Replace(shared, "count: 4", "count: 5000", 1), nil,
			[]string{yaml + "10:15: a pattern has at most 1000 positions, the joint has 5000 bolts"}},
		{"no circle", strings.Replace(shared, "circle: 100 mm", "circle: 0 mm", 1), nil,
			[]string{yaml + "10:15: bolts 1 and 2 are 0 mm apart, less than the thread of 12 mm", yaml + "10:23: the bolt circle is 0 mm; it must be above 0"}},
		{"two bolts in one place", strings.Replace(shared, "{circle: 100 mm}", "{points: [[0 mm, 0 mm], [60 mm, 0 mm], [0 mm, 60 mm], [60 mm, 0 mm]]}", 1), nil,
			[]string{yaml + "10:68: bolts 2 and 4 sit in one place"}},
		{"all bolts in one place", strings.Replace(shared, "{circle: 100 mm}", "{rows: 2, columns: 2, pitch: [0 mm, 0 mm]}", 1), nil,
			[]string{yaml + "10:15: bolts 1 and 2 sit in one place"}},
		{"in one line", strings.Replace(shared, "{circle: 100 mm}", "{rows: 4, columns: 1, pitch: [0 mm, 50 mm]}", 1), nil,
			[]string{yaml + `20:12: the bolts stand in one line and cannot carry the moment of 600 N.m about the y axis in load case "start-up"`}},
		{"case without a name", loads("case: start-up, ", ""), nil, []string{yaml + "20:12: load case 1 lacks case"}},
		{"case with an empty name", loads("case: start-up, ", `case: " ", `), nil, []string{yaml + "20:18: case is empty"}},
		{"case twice", loads("case: standstill", "case: start-up"), nil, []string{yaml + `21:12: load cases 1 and 2 are both named "start-up"`}},
		{"no force", loads(", force: [0 kN, 0 kN, -4 kN]", ""), nil, []string{yaml + "21:12: load case 2 lacks force"}},
		{"a single force", loads("[0 kN, 0 kN, -4 kN]", "4 kN"), nil, []string{yaml + "21:37: force is a single value, but a list belongs here"}},
		{"two components", loads("[0 kN, 0 kN, -4 kN]", "[0 kN, 4 kN]"), nil, []string{yaml + "21:37: force has 2 values, but three belong here"}},
		{"wrong units", strings.NewReplacer("600 N.m", "600 N", "150 mm", "150").Replace(shared), nil,
			[]string{yaml + `20:71: moment y: "600 N" is a force, but a torque belongs here`, yaml + `20:103: at z: "150" has no unit`}},
		{"huge", loads("-4 kN", "-2e6 kN"), nil,
			[]string{yaml + `21:37: z of the force of load case "standstill" is -2000000 kN; it must be at most 1000000 kN`}},
		{"missing file", forces, nil, []string{yaml + "17:21: forces: plant/run.csv: file does not exist"}},
		{"wrong unit in the head", forces, table("axial (kN)", "axial (kg)"), []string{csv + `1:16: axial: unknown unit "kg"`}},
		{"a case that names no bolt", forces, table("start,3", "start,"), []string{csv + "4:7: bolt is empty"}},
		{"many in the table", strings.Replace(forces, "length: 60 mm", "length: 60", 1), table("start,3,-1", ",0,x"), []string{
			yaml + `11:33: length: "60" has no unit`, csv + "4:1: load_case is empty", csv + "4:2: bolt is 0", csv + `4:4: axial: "x" is not a plain number`}},
		{"no such bolt", forces, table("start,4", "start,9"), []string{yaml + "17:21: forces: plant/run.csv has forces of bolt 9, but the joint has 4 bolts"}},
		{"too many bolts", forces, table("start,4,1,0,0\n", "start,4,1,0,0\nstart,5,1,0,0\n"),
			[]string{yaml + "17:21: forces: plant/run.csv has forces of bolt 5, but the joint has 4 bolts"}},
		{"too few bolts", forces, table("start,2,1,0,0\n", ""),
			[]string{yaml + "17:21: forces: plant/run.csv has forces of 3 bolts, but the joint has 4: those of bolt 2 are missing"}},
		{"the last bolt missing", forces, table("start,4,1,0,0\n", ""),
			[]string{yaml + "17:21: forces: plant/run.csv has forces of 3 bolts, but the joint has 4: those of bolt 4 are missing"}},
		{"count not read", strings.Replace(forces, "count: 4", "count: x", 1), table("start,4", "start,9"), []string{yaml + `9:12: count: "x" is not a whole number`}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			_, problems := readWith(c.text, c.files)
			assert.Equal(t, c.want, problems)
		})
	}
}

// Two joints that read one bad table have its problems once.
func TestProblemsOfASharedTableShowOnce(t *testing.T) {
	text := spoil(t, axialLoads, "group: {forces: run.csv}")
	text += strings.Replace(after(text, "joints:\n"), "A-1", "A-2", 1)
	_, problems := readWith(text, map[string]string{"run.csv": "load_case,bolt\n"})
	assert.Equal(t, []string{"plant/run.csv:1:1: the table has no column axial (kN)",
		"plant/run.csv:1:1: the table has no column transverse_x (kN)",
		"plant/run.csv:1:1: the table has no column transverse_y (kN)"}, problems)
}

func TestRegisterWithoutAFolderOpensNothing(t *testing.T) {
	_, err := register.Read(register.Source{Name: "standard input", Data: []byte(spoil(t, axialLoads, "group: {forces: run.csv}"))})
	var e *register.ProblemsError
	require.ErrorAs(t, err, &e)
	require.Len(t, e.Problems, 1)
	assert.Equal(t, "forces: this register has no folder from which to read run.csv", e.Problems[0].Message)
	assert.Equal(t, "save the register as a file and name it on the command line", e.Problems[0].Mend)
	assert.Equal(t, 17, e.Problems[0].Line)
}
