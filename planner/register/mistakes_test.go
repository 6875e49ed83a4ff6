package register_test

import (
	"errors"
	"fmt"
	"os"
	"regexp"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"clampback/planner/register"
)

// everyKey is a register that uses each key that registers have.
func everyKey(t testing.TB) []string {
	data, err := os.ReadFile("testdata/every_key.yaml")
	require.NoError(t, err)
	_, err = read(string(data))
	require.NoError(t, err)
	return strings.SplitAfter(string(data), "\n")
}

// keyLine cuts a line into what stands before the key, the key and its value.
var keyLine = regexp.MustCompile(`^( *(?:- )?)([a-z_]+):(?: (.*))?\n$`)

// below counts the lines that belong to the key of a line.
func below(lines []string, at int) int {
	depth := len(keyLine.FindStringSubmatch(lines[at])[1])
	n := 0
	for _, line := range lines[at+1:] {
		if indent := len(line) - len(strings.TrimLeft(line, " -")); indent <= depth {
			break
		}
		n++
	}
	return n
}

// problemsOf reads lines and returns what is wrong with them.
func problemsOf(t *testing.T, lines []string) []register.Problem {
	_, err := read(strings.Join(lines, ""))
	if err == nil {
		return nil
	}
	var e *register.ProblemsError
	require.True(t, errors.As(err, &e), "%v", err)
	return e.Problems
}

// replaced returns the lines with n of them, from at, replaced.
func replaced(lines []string, at, n int, with ...string) []string {
	result := append([]string{}, lines[:at]...)
	return append(append(result, with...), lines[at+n:]...)
}

// Any single mistake, at whatever key, is one problem at its own line, and hides
// or causes no other.
func TestAnyMistakeAloneIsOneProblem(t *testing.T) {
	lines := everyKey(t)
	words := map[string]bool{"assembly": true, "revision": true, "prepared_by": true, "name": true, "part": true,
		"lubrication": true, "id": true, "case": true, "state": true, "layer": true, "source": true,
		"settlement_source": true, "relaxation_source": true} // any text will do
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
		}
		if value != "" && !strings.HasPrefix(value, "[") {
			spoilt["empty text"] = replaced(lines, i, 1, before+key+`: ""`+"\n")
			spoilt["a list"] = replaced(lines, i, 1, before+key+": [1]\n")
			spoilt["a mapping"] = replaced(lines, i, 1, before+key+": {a: b}\n")
			if key == "material" || key == "nut" { // may be a mapping
				delete(spoilt, "a mapping")
			}
			if !words[key] {
				spoilt["nonsense"] = replaced(lines, i, 1, before+key+": what is this\n")
				spoilt["no unit"] = replaced(lines, i, 1, before+key+": 3 furlong\n")
				spoilt["negative"] = replaced(lines, i, 1, before+key+": -7777\n")
			}
			if key == "shank" || key == "condition" {
				delete(spoilt, "negative")
			}
		} else {
			spoilt["a text"] = replaced(lines, i, n+1, before+key+": text\n")
		}
		if !strings.Contains(before, "-") {
			all := replaced(lines, i, 0, lines[i:i+n+1]...)
			if problems := problemsOf(t, all); assert.Len(t, problems, 1, "%s twice", key) {
				assert.Contains(t, problems[0].Message, "the key "+key+" stands here and in line")
			}
		}
		for name, text := range spoilt {
			problems := problemsOf(t, text)
			if assert.Len(t, problems, 1, "line %d, %s: %s\n%s", i+1, key, name, report(problems)) {
				assert.Equal(t, i+1, problems[0].Line, "%s: %s\n%s", key, name, report(problems))
			}
		}
	}
}

// A missing key is one problem for each joint that needs it, none where the
// key may be left out.
func TestAnyMissingKeyIsOneProblemAtMost(t *testing.T) {
	lines := everyKey(t)
	for i, line := range lines {
		m := keyLine.FindStringSubmatch(line)
		if m == nil || strings.Contains(m[1], "-") { // which would take the item's dash with it
			continue
		}
		problems := problemsOf(t, replaced(lines, i, below(lines, i)+1))
		most := 1
		if strings.HasPrefix(line, "defaults:") || strings.HasPrefix(line, "  friction:") {
			most = 6 // so many joints rest on it
		}
		assert.LessOrEqual(t, len(problems), most, "%s missing:\n%s", m[2], report(problems))
	}
}

func report(problems []register.Problem) string {
	return (&register.ProblemsError{Problems: problems}).Report()
}

// Different mistakes in one joint are all found in one run: a key that is not
// known, a number without unit and values that are impossible.
func TestMistakesOfOneJointDoNotHideEachOther(t *testing.T) {
	text := good
	for from, to := range map[string]string{
		"count: 4":                          "count: 4\n    colour: red",
		"length: 60 mm":                     "length: 60",
		"hole: 13.5 mm, outer_diameter: 34": "hole: 11 mm, outer_diameter: 34",
		"thickness: 15 mm":                  "thickness: 0 mm",
		"thread: 0.10 to 0.14":              "thread: 5",
		"residual: 12 kN":                   "residual: 12 mm",
		"introduction_factor: 0.5":          "introduction_factor: 1.5",
		"nut: hexagon":                      "nut: *n",
	} {
		text = strings.Replace(text, from, to, 1)
	}
	var got []string
	for _, p := range problemsOf(t, []string{text}) {
		got = append(got, fmt.Sprintf("%d: %s", p.Line, p.Message))
	}
	assert.Equal(t, []string{
		"4: the friction in the thread is 5; a coefficient of friction lies between 0.001 and 1",
		`10: unknown key "colour" in the joint`,
		`12: length: "60" has no unit`,
		"13: aliases are not used in registers",
		"15: the hole of 11 mm is smaller than the thread of 12 mm",
		"16: the thickness is 0 mm; it must be above 0",
		`17: residual: "12 mm" is a length, but a force belongs here`,
		"18: the load introduction factor is 1.5",
	}, got)
}
