package register_test

import (
	"errors"
	"fmt"
	"io/fs"
	"math"
	"os"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner"
	"clampback/planner/register"
)

// ownParts is a register whose joint uses each kind of entry of a library.
const ownParts = `assembly: Tarn 40 slurry pump
library: plant-library.yaml
defaults:
  friction: {thread: 0.10 to 0.14, head: 0.09 to 0.13}
  tightening: {tool: {tolerance: 4 %}}
joints:
  - id: A-1
    name: flange
    count: 4
    bolt: {thread: WT-12, length: 65 mm, head: twelve-point, property_class: WS-1100, shank: 18 mm}
    nut: collar
    washers: {head: WW-12 hard, nut: WW-12 hard}
    clamped:
      - {part: flange, material: WM-40 spheroidal, thickness: 18 mm, hole: 13 mm, outer_diameter: 34 mm}
      - {part: rail, material: S355, thickness: 15 mm, hole: 13.5 mm, outer_diameter: 40 mm}
    clamp: {residual: 12 kN, transverse: 500 N, interface_friction: 0.15}
    loads: {axial: 0 to 9.5 kN, introduction_factor: 0.5}
`

func ownLibrary(t testing.TB) string {
	data, err := os.ReadFile("testdata/plant-library.yaml")
	require.NoError(t, err)
	return string(data)
}

// readBeside reads a register plant/pump.yaml with files beside it.
func readBeside(text string, files map[string]string) ([]planner.Joint, []register.Problem) {
	joints, err := register.Read(register.Source{Name: "plant/pump.yaml", Data: []byte(text), Open: func(name string) ([]byte, error) {
		data, found := files[name]
		if !found {
			return nil, fmt.Errorf("plant/%s: %w", name, fs.ErrNotExist)
		}
		return []byte(data), nil
	}})
	var e *register.ProblemsError
	if errors.As(err, &e) {
		return nil, e.Problems
	}
	return joints, nil
}

// Every entry reaches the joint with its numbers, and its source the plan.
func TestLibrary(t *testing.T) {
	joints, problems := readBeside(ownParts, map[string]string{"plant-library.yaml": ownLibrary(t)})
	require.Empty(t, problems, report(problems))
	j := joints[0]
	const source = "library plant-library.yaml: "
	assert.InDelta(t, 1.35, j.Bolt.Thread.Pitch, 0)
	assert.Equal(t, source+"drawing 87", j.Bolt.Thread.Source)
	assert.Equal(t, source+"drawing 88", j.Bolt.Head.Source)
	assert.Equal(t, "drawing 88", j.Bolt.Head.Standard)
	assert.InDelta(t, 12, j.Nut.Height, 0)
	assert.Equal(t, source+"drawing 89", j.Nut.Source)
	assert.InDelta(t, 1100, j.HeadWasher.LimitingPressure, 0)
	assert.InDelta(t, 350, j.NutWasher.HardnessHV, 0)
	assert.InDelta(t, 1000, j.Bolt.Class.YieldStrength, 0)
	assert.InDelta(t, 0.6, j.Bolt.Class.ShearRatio, 1e-15)
	m := j.Parts[0].Material
	assert.InDeltaSlice(t, []float64{168e3, 620, 12.5, 350, 420}, []float64{m.Modulus, m.LimitingPressure, m.Expansion * 1e6, m.ShearStrength,
		m.TensileStrength}, 1e-12)
	assert.Equal(t, source+"works standard 12", m.Source)

	p, err := planner.Work(j)
	require.NoError(t, err)
	printed := map[string]bool{}
	for _, l := range p.Trace {
		printed[l.Source] = true
	}
	for _, origin := range []string{"works standard 12", "works standard 14", "drawing 87", "drawing 88", "drawing 89", "drawing 90"} {
		assert.True(t, printed[source+origin], origin)
	}
}

// A library that repeats the numbers of the program's tables gives the same plan.
func TestLibraryOfStandardNumbers(t *testing.T) {
	library := `
threads:
  - {name: T, diameter: 12 mm, pitch: 1.75 mm, source: ISO 261}
heads:
  - {name: H, thread: M12, bearing_diameter: 16.63 mm, height: 7.5 mm, width_across_flats: 18 mm, source: ISO 4014}
  - {name: H, thread: T, bearing_diameter: 16.63 mm, height: 7.5 mm, width_across_flats: 18 mm, source: ISO 4014}
nuts:
  - {name: N, thread: T, bearing_diameter: 16.6 mm, height: 10.37 mm, width_across_flats: 18 mm, source: ISO 4032}
property_classes:
  - {name: C, yield: 940 MPa, tensile: 1040 MPa, modulus: 205 GPa, expansion: 11.5 um/m/K, source: ISO 898-1}
`
	shanked := spoil(t, "property_class: 10.9", "property_class: 10.9, shank: 10 mm")
	want, problems := readBeside(shanked, nil)
	require.Empty(t, problems)
	for from, to := range map[string]string{"thread: M12": "thread: T", "head: hexagon": "head: H", "nut: hexagon": "nut: N", "10.9": "C"} {
		shanked = strings.Replace(shanked, from, to, 1)
	}
	got, problems := readBeside("library: [own.yaml]\n"+shanked, map[string]string{"own.yaml": library})
	require.Empty(t, problems, report(problems))
	plan := func(j planner.Joint) planner.Plan {
		p, err := planner.Work(j)
		require.NoError(t, err)
		return p
	}
	a, b := plan(want[0]), plan(got[0])
	assert.InEpsilon(t, a.Torque.WindowHigh, b.Torque.WindowHigh, 1e-12)
	require.Len(t, b.Trace, len(a.Trace))
	for i := range a.Trace {
		assert.InDelta(t, a.Trace[i].Value, b.Trace[i].Value, 1e-12*math.Abs(a.Trace[i].Value), a.Trace[i].Symbol)
	}
}

// Any single mistake in a library is one problem at its own line, in its own file,
// although a joint uses every entry.
func TestAnyMistakeOfALibraryAloneIsOneProblem(t *testing.T) {
	lines := strings.SplitAfter(ownLibrary(t), "\n")
	for i, line := range lines {
		m := keyLine.FindStringSubmatch(line)
		if m == nil {
			continue
		}
		before, key, value := m[1], m[2], m[3]
		n := below(lines, i)
		spoilt := map[string][]string{
			"misspelt": replaced(lines, i, 1, before+key+"x: "+value+"\n"),
			"no value": replaced(lines, i, n+1, before+key+":\n"),
			"alias":    replaced(lines, i, n+1, before+key+": *a\n"),
			"a text":   replaced(lines, i, n+1, before+key+": text\n"),
		}
		if !strings.Contains(before, "-") {
			spoilt["twice"] = replaced(lines, i, 0, lines[i:i+n+1]...)
		}
		switch {
		case key == "name": // whoever uses the entry then knows no such name
			delete(spoilt, "a text")
		case key == "source":
			delete(spoilt, "a text")
			fallthrough
		case value != "":
			spoilt["missing"] = replaced(lines, i, 1)
			spoilt["empty text"] = replaced(lines, i, 1, before+key+`: ""`+"\n")
			spoilt["a list"] = replaced(lines, i, 1, before+key+": [1]\n")
			spoilt["a mapping"] = replaced(lines, i, 1, before+key+": {a: b}\n")
		}
		if value != "" && value[0] >= '1' && value[0] <= '9' {
			spoilt["no unit"] = replaced(lines, i, 1, before+key+": 13\n")
			spoilt["wrong unit"] = replaced(lines, i, 1, before+key+": 13 kN\n")
			spoilt["negative"] = replaced(lines, i, 1, before+key+": -"+value+"\n")
			spoilt["huge"] = replaced(lines, i, 1, before+key+": 1e30 "+strings.Fields(value)[1]+"\n")
			spoilt["zero"] = replaced(lines, i, 1, before+key+": 0 "+strings.Fields(value)[1]+"\n")
			if key == "expansion" { // 0 is a possible expansion, and so is a negative one
				delete(spoilt, "zero")
				delete(spoilt, "negative")
			}
		}
		for name, text := range spoilt {
			joints, problems := readBeside(ownParts, map[string]string{"plant-library.yaml": strings.Join(text, "")})
			optional := key == "angle" || key == "hardness" || key == "bearing_pressure" || key == "shear_strength" || key == "shear_ratio" || key == "tensile_strength"
			if name == "missing" && optional && joints != nil {
				continue
			}
			if !assert.Len(t, problems, 1, "line %d, %s: %s\n%s", i+1, key, name, report(problems)) {
				continue
			}
			p := problems[0]
			if name == "missing" && p.File == "plant/pump.yaml" { // a property that only this joint needs
				assert.True(t, optional, "%s: %s", key, p.Message)
				continue
			}
			assert.Equal(t, "plant/plant-library.yaml", p.File)
			assert.NotEmpty(t, p.Mend)
			if name != "missing" && name != "twice" {
				assert.Equal(t, i+1, p.Line, "%s: %s\n%s", key, name, report(problems))
			}
		}
	}
}

// Each mistake gives one error with file, place, message and mend.
func TestMistakesOfALibrary(t *testing.T) {
	const one = "materials:\n  - {name: X, modulus: 200 GPa, expansion: 16 um/m/K, source: s}\n"
	const m12 = "bearing_diameter: 17 mm, height: 8 mm, width_across_flats: 18 mm, source: s}\n"
	cases := []struct{ name, library, want, mend string }{
		{"unknown section", "alloys: []\n", `1:1: unknown key "alloys" in the library`, "the keys are materials, property_classes"},
		{"misspelt section", "material: []\n", `1:1: unknown key "material" in the library`, `did you mean "materials"?`},
		{"unknown key", strings.Replace(one, "source: s", "source: s, colour: red", 1), `2:66: unknown key "colour" in material 1`, "the keys are name, modulus"},
		{"no source", strings.Replace(one, ", source: s", "", 1), `2:6: material 1 lacks source`, "add source: where its values come from"},
		{"no unit", strings.Replace(one, "200 GPa", "200", 1), `2:24: modulus: "200" has no unit`, "add the unit: MPa, GPa"},
		{"impossible", strings.Replace(one, "200 GPa", "0 GPa", 1), `2:24: the modulus is 0 MPa; it must be above 0`, "state modulus"},
		{"of zero", strings.Replace(one, "source: s", "shear_strength: 0 MPa, source: s", 1), `2:71: shear_strength is 0`, "or remove the key"},
		{"twice", one + strings.TrimPrefix(one, "materials:\n"), `3:12: the material "X" stands here and in plant/own.yaml:2`, "keep one of them"},
		{"a name of the tables", strings.Replace(one, "name: X", "name: S355", 1), `2:12: "S355" is in the program's own table`, "give yours another name"},
		{"a class of the tables", "property_classes:\n  - {name: 8.8, yield: 640 MPa, tensile: 800 MPa, modulus: 205 GPa, expansion: 11.5 um/m/K, source: s}\n",
			`2:12: "8.8" is in the program's own table`, "give yours another name"},
		{"a head of the tables", "heads:\n  - {name: socket cap, thread: M12, " + m12, `2:12: "socket cap" is in the program's own table`, "give yours another name"},
		{"a head that is none", "heads:\n  - {name: stud, thread: M12, " + m12, `2:12: "stud" means something else in registers`, "give yours another name"},
		{"a nut of the tables", "nuts:\n  - {name: hexagon, thread: M12, " + m12, `2:12: "hexagon" is in the program's own table`, "give yours another name"},
		{"a washer of the tables", "washers:\n  - {name: ISO 7089, thread: M12, inner_diameter: 13 mm, outer_diameter: 24 mm, thickness: 2 mm, bearing_pressure: 700 MPa, modulus: 205 GPa, expansion: 12 um/m/K, source: s}\n",
			`2:12: "ISO 7089" is in the program's own table`, "give yours another name"},
		{"a thread of the tables", "threads:\n  - {name: M12 X 1.75, diameter: 12 mm, pitch: 1.75 mm, source: s}\n", `2:12: "M12 X 1.75" is in the program's own table`, "give yours another name"},
		{"another profile", "threads:\n  - {name: W, diameter: 12 mm, pitch: 1.75 mm, angle: 55 deg, source: s}\n", `2:55: threads of 55 deg are not planned`, "60 degree profile"},
		{"head for a thread that is not known", "heads:\n  - {name: H, thread: M11, " + m12, `2:23: unknown thread "M11"`, `did you mean "M10"?`},
		{"head twice for one thread", "heads:\n  - {name: H, thread: M12, " + m12 + "  - {name: H, thread: M16, " + strings.Replace(m12, "17 mm", "22 mm", 1) +
			"  - {name: H, thread: M12x1.75, " + m12, `4:12: the head "H" for M12 stands here and in plant/own.yaml:2`, "keep one of them"},
		{"head smaller than its thread", "heads:\n  - {name: H, thread: M20, " + m12, `2:46: the bearing diameter of 17 mm is not larger than the thread of 20 mm`, "state the least"},
		{"yield over tensile", "property_classes:\n  - {name: C, yield: 900 MPa, tensile: 800 MPa, modulus: 205 GPa, expansion: 11.5 um/m/K, source: s}\n",
			`2:22: the yield strength of 900 MPa is above the tensile strength of 800 MPa`, "state the least"},
		{"no list", "materials: {name: X}\n", `1:13: materials is a mapping, but a list belongs here`, "one item a line"},
		{"no mapping", "materials: [X]\n", `1:13: material 1 is a single value, but a mapping belongs here`, "write it as {name: ...}"},
		{"empty", "", `1:1: the library is empty`, "begin with materials"},
		{"not YAML", "materials: [\n", "this is not YAML", "check indentation"},
		{"a scalar", "hello", "the library is a single value", "write it as {materials: ...}"},
		{"anchor", "materials: &a []\n", "1:12: anchors are not used in libraries", "write the values out"},
		{"merge key", one + "<<: {a: b}\n", "merge keys are not used in libraries", "write the values out"},
		{"second document", one + "---\nheads: []\n", "3:1: a second document begins here", "put each library into a file of its own"},
		{"deep", "materials: " + strings.Repeat("[", 100) + "\n", "the brackets nest too deeply", "a library needs no more than five levels"},
		{"byte order mark", "\xef\xbb\xbf" + one, "the file begins with a byte order mark", "save it as UTF-8"},
		{"tab", "materials:\n\t- {}\n", "2:1: a tab indents the line", "indent with blanks"},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			_, problems := readBeside("library: own.yaml\n"+good, map[string]string{"own.yaml": c.library})
			require.Len(t, problems, 1, report(problems))
			p := problems[0]
			assert.Equal(t, "plant/own.yaml", p.File)
			assert.Contains(t, fmt.Sprintf("%d:%d: %s", p.Line, p.Column, p.Message), c.want)
			assert.Contains(t, p.Mend, c.mend)
			if c.name != "byte order mark" { // which would shift the mark
				assert.Equal(t, strings.Split(c.library, "\n")[p.Line-1], p.Text)
			}
		})
	}
}

// What is wrong with the way a register names or uses libraries is a problem of the
// register.
func TestMistakesAboutLibraries(t *testing.T) {
	const own = "own.yaml"
	library := ownLibrary(t)
	cases := []struct{ name, register, want, mend string }{
		{"missing", "library: none.yaml\n" + good, "1:10: library: plant/none.yaml: file does not exist", "check the name"},
		{"twice", "library: [own.yaml, own.yaml]\n" + good, "1:21: own.yaml is named twice", "keep one of them"},
		{"empty", "library:\n" + good, "1:9: library is empty", "state it, or remove the key"},
		{"empty list", "library: []\n" + good, "1:10: library is empty", "name a file"},
		{"mapping", "library: {a: b}\n" + good, "1:11: library is a mapping", "write one value"},
		{"misspelt", "librarx: own.yaml\n" + strings.Replace(good, "material: S355", "material: WM-40 spheroidal", 1), `1:1: unknown key "librarx" in the register`, `did you mean "library"?`},
		{"too large", "library: huge.yaml\n" + good, "1:10: huge.yaml is larger than 1024 kB", "split it into several files"},
		{"too many", "library: [" + strings.Repeat("own.yaml, ", 101) + "]\n" + good, "1:10: the register names 101 libraries", "name at most 100"},
		{"thread of an unread library, in the heat", "library: none.yaml\n" + strings.Replace(good, "thread: M12", "thread: WT-12", 1) +
			"    temperature: {assembly: 20 degC, service: 250 degC}\n", "1:10: library: plant/none.yaml: file does not exist", "check the name"},
		{"near an own name", "library: own.yaml\n" + strings.Replace(good, "material: S355", "material: WM-40 spheroid", 1),
			`15:34: unknown material "WM-40 spheroid"`, `did you mean "WM-40 spheroidal"?`},
		{"known are own names first", "library: own.yaml\n" + strings.Replace(good, "head: hexagon", "head: pentagram star", 1), `12:46: unknown head "pentagram star"`, "known are twelve-point, hexagon"},
		{"for another thread", "library: own.yaml\n" + strings.Replace(good, "head: hexagon", "head: twelve-point", 1),
			`12:46: no head "twelve-point" for M12: your library has it for WT-12`, "choose another head or size"},
		{"a class too weak for what is asked", "library: weak.yaml\n" + strings.Replace(good, "10.9}\n    nut: hexagon", "C}\n    tapped: {material: S355, depth: 40 mm}", 1),
			`12:71: the shear strength of class C is not known`, "add shear_ratio to its entry in your library"},
	}
	files := map[string]string{
		own: library, "huge.yaml": strings.Repeat("#", 1<<20+1),
		"weak.yaml": "property_classes: [{name: C, yield: 640 MPa, tensile: 800 MPa, modulus: 205 GPa, expansion: 11.5 um/m/K, source: s}]\n",
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			_, problems := readBeside(c.register, files)
			require.Len(t, problems, 1, report(problems))
			p := problems[0]
			assert.Equal(t, "plant/pump.yaml", p.File)
			assert.Contains(t, fmt.Sprintf("%d:%d: %s", p.Line, p.Column, p.Message), c.want)
			assert.Contains(t, p.Mend, c.mend)
		})
	}
	_, err := register.Read(register.Source{Name: "standard input", Data: []byte("library: own.yaml\n" + good)})
	assert.ErrorContains(t, err, "standard input:1:10: library: this register has no folder from which to read own.yaml")
}

// All problems of register and libraries come in one run; those of a library that two
// registers name, once. A joint that cannot be read hides nothing of the library.
func TestLibraryProblemsInOneRun(t *testing.T) {
	files := map[string]string{
		"own.yaml": strings.NewReplacer("modulus: 168 GPa", "modulus: 168", "pitch: 1.35 mm", "pitch: 0 mm").Replace(ownLibrary(t)),
		"two.yaml": "materials:\n  - {name: Y}\nheadz: []\n",
	}
	text := strings.Replace(ownParts, "plant-library.yaml", "[own.yaml, two.yaml]", 1)
	text = strings.Replace(text, "length: 65 mm", "length: 65", 1)
	open := func(name string) ([]byte, error) { return []byte(files[name]), nil }
	_, err := register.Read(register.Source{Name: "a.yaml", Data: []byte(text), Open: open},
		register.Source{Name: "b.yaml", Data: []byte("library: [own.yaml]\njoints: [[\n"), Open: open})
	var e *register.ProblemsError
	require.ErrorAs(t, err, &e)
	var got []string
	for _, p := range e.Problems {
		got = append(got, fmt.Sprintf("%s:%d: %s", p.File, p.Line, p.Message))
	}
	assert.Equal(t, []string{
		`a.yaml:10: length: "65" has no unit`,
		`own.yaml:4: modulus: "168" has no unit`,
		`own.yaml:46: the pitch is 0 mm; it must be above 0`,
		`two.yaml:2: material 1 lacks expansion`,
		`two.yaml:2: material 1 lacks modulus`,
		`two.yaml:2: material 1 lacks source`,
		`two.yaml:3: unknown key "headz" in the library`,
		`b.yaml:2: this is not YAML: sequence end token ']' not found`,
	}, got)
}

// Threads are found wherever they stand, and files in folders.
func TestEntriesOfSeveralLibraries(t *testing.T) {
	head, threads, _ := strings.Cut(ownLibrary(t), "threads:\n")
	joints, problems := readBeside(strings.Replace(ownParts, "plant-library.yaml", "[own/parts.yaml, ../threads.yaml]", 1),
		map[string]string{"own/parts.yaml": head, "../threads.yaml": "threads:\n" + threads})
	require.Empty(t, problems, report(problems))
	assert.Equal(t, "library ../threads.yaml: drawing 87", joints[0].Bolt.Thread.Source)
	assert.Equal(t, "library own/parts.yaml: drawing 88", joints[0].Bolt.Head.Source)
}

// Whatever the bytes of a library, reading ends with joints that can be planned, or
// with problems that have a message, a mend and a place.
func FuzzLibrary(f *testing.F) {
	f.Add([]byte(ownLibrary(f)))
	for _, s := range []string{"", "materials: [", "heads:\n- ", "threads: [{name: M12}]", "nuts: [{name: a, thread: a}]\nthreads: [{name: a}]",
		"washers: {}\n", "<<: {a: b}\n", "materials: [{name: [a], modulus: *b}]\n---\n"} {
		f.Add([]byte(s))
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		joints, problems := readBeside(ownParts, map[string]string{"plant-library.yaml": string(data)})
		for _, j := range joints {
			if _, err := planner.Work(j); err != nil {
				t.Errorf("a joint that reads cannot be planned: %v", err)
			}
		}
		for _, p := range problems {
			if p.Message == "" || p.Mend == "" || p.Line < 1 || p.Column < 1 {
				t.Errorf("incomplete problem: %+v", p)
			}
		}
	})
}
