package register_test

import (
	"errors"
	"fmt"
	"io/fs"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner"
	"clampback/planner/register"
)

const plantLibrary = `threads:
  - {name: WT12, diameter: 12 mm, pitch: 0.9 mm, source: works standard 1}
materials:
  - {name: hard facing, modulus: 210 GPa, bearing_pressure: 900 MPa, expansion: 11 um/m/K, shear_strength: 400 MPa, source: works standard 7}
property_classes:
  - {name: WS-1000, yield: 850 MPa, tensile: 1000 MPa, shear_ratio: 0.6, modulus: 205 GPa, expansion: 11.5 um/m/K, source: works standard 12}
heads:
  - {name: twelve point, thread: WT12, bearing_diameter: 19 mm, height: 12 mm, width_across_flats: 13 mm, source: works standard 12}
nuts:
  - {name: twelve point nut, thread: WT12, bearing_diameter: 19 mm, height: 12 mm, width_across_flats: 13 mm, source: works standard 12}
washers:
  - {name: WS thick, thread: WT12, inner_diameter: 13 mm, outer_diameter: 26 mm, thickness: 6 mm, bearing_pressure: 900 MPa, modulus: 205 GPa, expansion: 11.5 um/m/K, source: works standard 13}
`

const ownParts = `assembly: Tarn 40 slurry pump
library: plant.yaml
defaults:
  friction: {thread: 0.10 to 0.14, head: 0.09 to 0.13}
  tightening: {tool: {tolerance: 4 %}}
joints:
  - id: A-1
    name: flange
    count: 4
    bolt: {thread: WT12, length: 65 mm, head: twelve point, property_class: WS-1000}
    nut: twelve point nut
    washers: {head: WS thick}
    clamped:
      - {part: flange, material: hard facing, thickness: 18 mm, hole: 13.5 mm, outer_diameter: 34 mm}
      - {part: rail, material: S355, thickness: 15 mm, hole: 13.5 mm, outer_diameter: 40 mm}
    clamp: {residual: 12 kN}
    loads: {axial: 0 kN}
`

// withLibrary reads a register beside a library and returns its problems as
// file:line:column: message.
func withLibrary(text, library string) ([]planner.Joint, []string) {
	joints, err := register.Read(register.Source{Name: "plant/pump.yaml", Data: []byte(text), Open: func(name string) ([]byte, error) {
		if name != "plant.yaml" {
			return nil, fmt.Errorf("plant/%s: %w", name, fs.ErrNotExist)
		}
		return []byte(library), nil
	}})
	var e *register.ProblemsError
	if !errors.As(err, &e) {
		return joints, nil
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

// A plant's own thread, head, class, nut, washer and material plan a joint, and each
// number says where it comes from.
func TestJointOfThePlantsOwnParts(t *testing.T) {
	joints, problems := withLibrary(ownParts, plantLibrary)
	require.Empty(t, problems)
	j := joints[0]
	assert.InDelta(t, 0.9, j.Bolt.Thread.Pitch, 0)
	assert.InDelta(t, 850, j.Bolt.Class.YieldStrength, 0)
	assert.Equal(t, "library plant.yaml: works standard 7", j.Parts[0].Material.Source)
	p, err := planner.Work(j)
	require.NoError(t, err)
	assert.True(t, p.Feasible, "%v", p.Binds)
}

func TestMistakesOfALibrary(t *testing.T) {
	const yaml, lib = "plant/pump.yaml:", "plant/plant.yaml:"
	cases := []struct {
		name, from, to string
		want           []string
	}{
		{"unknown key", "pitch: 0.9 mm", "pitch: 0.9 mm, colour: red", []string{lib + `2:50: unknown key "colour" in thread 1`}},
		{"no unit", "yield: 850 MPa", "yield: 850", []string{lib + `6:28: yield: "850" has no unit`}},
		{"no source", ", source: works standard 7", "", []string{lib + "4:6: material 1 lacks source"}},
		{"negative", "height: 12 mm, width_across_flats: 13 mm, source: works standard 12}\nnuts", "height: -12 mm, width_across_flats: 13 mm, source: works standard 12}\nnuts",
			[]string{lib + "8:73: height is negative"}},
		{"zero", "thickness: 6 mm", "thickness: 0 mm", []string{lib + "12:93: thickness is 0"}},
		{"hides a material", "name: hard facing", "name: S355", []string{lib + "4:12: the material S355 is in the program's own table"}},
		{"hides a class", "name: WS-1000", `name: "10.9"`, []string{lib + "6:12: the property class 10.9 is in the program's own table"}},
		{"hides a thread", "name: WT12", "name: M12", []string{lib + "2:12: the thread M12 is in the program's own table"}},
		{"yield above tensile", "tensile: 1000 MPa", "tensile: 800 MPa", []string{lib + "6:28: the yield strength is above the tensile strength"}},
		{"coarse beyond reason", "pitch: 0.9 mm", "pitch: 9 mm", []string{lib + "2:42: the pitch leaves no core of the thread"}},
		{"narrow washer", "outer_diameter: 26 mm", "outer_diameter: 12 mm", []string{lib + "12:75: the washer is no wider than its hole"}},
		{"empty", plantLibrary, "", []string{lib + "1:1: the library is empty"}},
		{"no yaml", plantLibrary, "materials: [", nil},
		{"misspelt section", "washers:\n", "washer:\n", []string{lib + `11:1: unknown key "washer" in the library`}},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			library := strings.Replace(plantLibrary, c.from, c.to, 1)
			require.NotEqual(t, plantLibrary, library)
			_, problems := withLibrary(ownParts, library)
			if c.want == nil {
				assert.Len(t, problems, 1)
				return
			}
			assert.Equal(t, c.want, problems)
		})
	}
	twice := strings.Replace(plantLibrary, "property_classes:", "  - {name: hard facing, modulus: 1 GPa, bearing_pressure: 1 MPa, expansion: 1 um/m/K, source: x}\nproperty_classes:", 1)
	_, problems := withLibrary(ownParts, twice)
	assert.Equal(t, []string{lib + "5:12: the material hard facing stands twice in the library"}, problems)
	_, problems = withLibrary(strings.Replace(ownParts, "plant.yaml", "missing.yaml", 1), plantLibrary)
	assert.Equal(t, []string{yaml + "2:10: library: plant/missing.yaml: file does not exist"}, problems)
	_, problems = withLibrary(strings.Replace(ownParts, "hard facing", "hard fadcing", 1), plantLibrary)
	assert.Equal(t, []string{yaml + `14:34: unknown material "hard fadcing"`}, problems)
	_, problems = withLibrary(strings.Replace(ownParts, "thread: WT12", "thread: M12", 1), plantLibrary)
	assert.Contains(t, problems, yaml+"10:46: the library has the head twelve point for other threads only")
	_, err := register.Read(register.Source{Name: "standard input", Data: []byte(ownParts)})
	assert.ErrorContains(t, err, "this register has no folder from which to read plant.yaml")
}

// Whatever the library holds, reading ends with joints or with problems that have a
// place and a mend.
func FuzzLibrary(f *testing.F) {
	f.Add(plantLibrary)
	f.Add("materials: [{name: a}]")
	f.Add("threads:\n  - {name: x, diameter: 1 mm, pitch: 1 um, source: y}\n")
	f.Add("heads: *a")
	f.Fuzz(func(t *testing.T, library string) {
		joints, problems := withLibrary(ownParts, library)
		if problems == nil && len(joints) != 1 {
			t.Fatal("neither a joint nor a problem")
		}
		for _, p := range problems {
			if strings.Contains(p, ":0:") || p == "no mend:" {
				t.Fatalf("%v", problems)
			}
		}
	})
}
