package group_test

import (
	"bytes"
	"errors"
	"fmt"
	"math"
	"runtime"
	"strings"
	"testing"
	"unicode/utf8"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"clampback/planner/group"
)

const heads = "load_case,bolt,axial (kN),transverse_x (kN),transverse_y (kN)\n"

const table = heads + `start-up,1,12.5,0,-1.5
start-up,2,1.25e1,3,0
"stop, hot",1,-4,0,0
"stop, hot",2,0,0,0
`

var tableShares = []group.Share{
	{Case: "start-up", Bolt: 1, Axial: 12500, Y: -1500},
	{Case: "start-up", Bolt: 2, Axial: 12500, X: 3000},
	{Case: "stop, hot", Bolt: 1, Axial: -4000},
	{Case: "stop, hot", Bolt: 2},
}

// One table, written in the ways that are one.
func TestReadCSV(t *testing.T) {
	for name, text := range map[string]string{
		"as it is":             table,
		"byte order mark":      "\xef\xbb\xbf" + table,
		"CRLF":                 strings.ReplaceAll(table, "\n", "\r\n"),
		"no last line end":     strings.TrimSuffix(table, "\n"),
		"comments and blanks":  "# run 7, half model\n\n" + strings.ReplaceAll(table, "\n", "\n  # x;y\n\t\n"),
		"blanks around fields": strings.ReplaceAll(strings.ReplaceAll(table, ",", "  ,\t "), "stop  ,", "stop,"),
		"quotes around all":    heads + "\"start-up\",\"1\",\"12.5\",\"0\",\"-1.5\" \nstart-up,2,1.25e1,3,0\n" + `"stop, hot",1,-4,0,0` + "\n" + `" stop,  hot ",2,0,0,0`,
		"columns in any order": "transverse_y (kN),bolt,transverse_x(kN),load_case, axial ( kN )\n-1.5,1,0,start-up,12.5\n0,2,3,start-up,12.5\n0,1,0,\"stop, hot\",-4\n0,2,0,\"stop, hot\",0",
		"rows in any order":    heads + "start-up,2,12.5,3,0\n\"stop, hot\",2,0,0,0\n\"stop, hot\",1,-4,0,0\nstart-up,1,12.5,0,-1.5\n",
		"other units":          "load_case,bolt,axial (N),transverse_x (N),transverse_y (kN)\nstart-up,1,12500,0,-1.5\nstart-up,2,+12500,3E+03,-0\n\"stop, hot\",1,-4000.0,0,0\n\"stop, hot\",2,0,0,0",
	} {
		shares, err := group.ReadCSV("run.csv", []byte(text))
		require.NoError(t, err, name)
		assert.Equal(t, tableShares, shares, name)
	}
	shares, err := group.ReadCSV("run.csv", []byte("load_case,bolt,axial (lbf),transverse_x (kip),transverse_y (N)\na,7,1,2,3\n"))
	require.NoError(t, err)
	require.Len(t, shares, 1, "a bolt may have any number")
	assert.Equal(t, 7, shares[0].Bolt)
	assert.InEpsilon(t, 4.4482216152605, shares[0].Axial, 1e-14, "NIST SP 811 appendix B")
	assert.InEpsilon(t, 8896.443230521, shares[0].X, 1e-14)
	assert.InDelta(t, 3, shares[0].Y, 0)
}

func TestWhatIsWrongWithATable(t *testing.T) {
	long := strings.Repeat("x", 201)
	cases := []struct {
		name, text string
		want       []string // line:column: message
		mend       string
	}{
		{"empty", "", []string{"1:1: the table is empty"}, "begin with the line load_case,bolt,axial (kN)"},
		{"comments only", "# a\n\n", []string{"2:1: the table is empty"}, "begin with the line"},
		{"heads only", heads, []string{"1:1: the table has no rows"}, "add a row for each bolt"},
		{"semicolons", strings.ReplaceAll(heads, ",", ";") + "a;1;1,5;0;0\n", []string{"1:10: the columns are separated by semicolons"}, "commas, and decimals with a point"},
		{"tabs", strings.ReplaceAll(heads, ",", "\t"), []string{"1:10: the columns are separated by tabs"}, "commas, and decimals with a point"},
		{"wrong dimension", "load_case,bolt,axial (mm),transverse_x (kN),transverse_y (kN)\na,1,1,0,0\n",
			[]string{`1:16: axial: "mm" is a length, but a force belongs here`}, "write the head as axial (kN): N, kN, lbf or kip"},
		{"unknown unit", "load_case,bolt,axial (kN),transverse_x (KN),transverse_y (kN)\na,1,1,0,0\n",
			[]string{`1:27: transverse_x: unknown unit "KN"`}, "write the head as transverse_x (kN)"},
		{"no unit", "load_case,bolt,axial,transverse_x [kN],transverse_y (kN\na,1,1,0,0\n", []string{
			`1:16: the head "axial" states no unit`, `1:22: unknown column "transverse_x [kN]"`, `1:40: the head "transverse_y (kN" states no unit`}, "write the head as axial (kN)"},
		{"missing columns", "load_case,axial (kN)\na,1\n", []string{"1:1: the table has no column bolt",
			"1:1: the table has no column transverse_x (kN)", "1:1: the table has no column transverse_y (kN)"}, "add the column"},
		{"columns twice, unknown, unnamed", "bolt,load_case,bolt,axial (kN),shear (kN),,transverse_x (kN),transverse_y (kN),bolt (N)\n", []string{
			"1:16: the column bolt stands here twice", `1:32: unknown column "shear (kN)"`, "1:43: column 6 has no head",
			"1:80: the column bolt stands here twice"}, "keep one of them"},
		{"bolt with a unit", "load_case,bolt (mm),axial (kN),transverse_x (kN),transverse_y (kN)\n", []string{"1:11: the column bolt has a unit"}, "write the head as bolt"},
		{"all fields wrong", heads + " ,0,1 kN,,\"1,5\"\n" + long + ",1.0,nan,0x10,1e400\na,,12;5,1_0,1e-999\na,10001,2e6,99999999999999999999,1..2\n", []string{
			"2:2: load_case is empty", "2:3: bolt is 0", `2:5: axial: "1 kN" has a unit, but a plain number belongs here`,
			"2:10: transverse_x is empty", `2:11: transverse_y: "1,5" has a comma`,
			"3:1: load_case has 201 characters", `3:203: bolt: "1.0" is not a whole number`, `3:207: axial: "nan" is not a plain number`,
			`3:211: transverse_x: "0x10" has a unit, but a plain number belongs here`, `3:216: transverse_y: "1e400" is not a number that can be used`,
			"4:3: bolt is empty", `4:4: axial: "12;5" has a unit, but a plain number belongs here`, `4:9: transverse_x: "1_0" has an underscore`,
			`4:13: transverse_y: "1e-999" is not a number that can be used`, "5:3: bolt is 10001",
			"5:9: axial is 2000000 kN; it must be at most 1000000 kN", "5:13: transverse_x is 1e+20 kN; it must be at most 1000000 kN",
			`5:34: transverse_y: "1..2" is not a number that can be used`}, "name the load case in each row"},
		{"fields", heads + "a,1,0,0\na,2,0,0,0,0\na,3,1,234,0,0\na;4;0;0;0\n", []string{"2:8: the row has 4 fields, the head 5",
			"3:11: the row has 6 fields, the head 5", "4:13: the row has 6 fields, the head 5", "5:10: the row has 1 fields, the head 5"}, "decimals after a point"},
		{"quotes", heads + "\"a,1,0,0,0\na \"b\",1,0,0,0\n\"a\" b,1,0,0,0\na,2,0,0,0\n", []string{"2:1: the quote is not closed on its line",
			"3:3: a quote stands inside a field", "4:5: text follows a field in quotes"}, "close it"},
		{"not text", heads + "ä\xff,1,0,0,0\na\x00,1,0,0,0\nb\u0085,1,0,0,0\na,1,0,0,0\r\r\n", []string{"2:2: the text is not valid UTF-8",
			"3:2: the control character U+0000 is not text", "4:2: the control character U+0085 is not text", "5:10: the control character U+000D is not text"}, "save the file as CSV in UTF-8"},
		{"UTF-16", "\xff\xfel\x00o\x00", []string{"1:1: the text is not valid UTF-8"}, "save the file as CSV in UTF-8"},
		{"long line", heads + strings.Repeat("y", 5000) + "\na,1,0,0,0\n", []string{"2:1: the line has 5000 bytes"}, "a row needs no more than 4096"},
		{"twice", heads + "a,1,0,0,0\nb,1,0,0,0\n  a ,1,5,0,0\n", []string{`4:6: load case "a" has bolt 1 here and in line 2`}, "keep one of the rows"},
		{"bolts missing", heads + "ä,1,0,0,0\n  b,9,0,0,0\nc,1,0,0,0\nc,9,0,0,0\nc,4,0,0,0\n", []string{`2:1: load case "ä" lacks bolts 4 and 9, which other cases have`,
			`3:3: load case "b" lacks bolts 1 and 4, which other cases have`}, "add the rows, with 0 where a bolt gets nothing"},
		{"many missing", heads + "a,1,0,0,0\n" + rowsOf("b", 9) + rowsOf("c", 8), []string{`2:1: load case "a" lacks bolts 2, 3, 4, 5, 6 and 3 more, which other cases have`,
			`12:1: load case "c" lacks bolt 9, which other cases have`}, "add the rows"},
	}
	for _, c := range cases {
		t.Run(c.name, func(t *testing.T) {
			shares, err := group.ReadCSV("run.csv", []byte(c.text))
			assert.Nil(t, shares)
			var e *group.ProblemsError
			require.ErrorAs(t, err, &e)
			assert.Equal(t, "run.csv", e.File)
			var got []string
			for _, p := range e.Problems {
				got = append(got, fmt.Sprintf("%d:%d: %s", p.Line, p.Column, p.Message))
				assert.NotEmpty(t, p.Mend)
			}
			assert.Equal(t, c.want, got)
			assert.Contains(t, e.Problems[0].Mend, c.mend)
		})
	}
}

// rowsOf returns rows of one case for bolts 1 to n.
func rowsOf(name string, n int) string {
	var b strings.Builder
	for bolt := range n {
		fmt.Fprintf(&b, "%s,%d,0,0,0\n", name, bolt+1)
	}
	return b.String()
}

// A table that is wrong throughout ends with its first hundred problems.
func TestProblemsAreCapped(t *testing.T) {
	_, err := group.ReadCSV("run.csv", []byte(heads+strings.Repeat("a,1,no,0,0\n", 1000)))
	var e *group.ProblemsError
	require.ErrorAs(t, err, &e)
	assert.Len(t, e.Problems, 100)
	assert.EqualError(t, err, `run.csv:2:5: axial: "no" is not a plain number (100 problems or more)`)
}

// What Distribute shares out and a table states is read back as it was, in
// whatever order the rows stand.
func TestReadBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(1, 6).Draw(t, "bolts")
		names := rapid.SliceOfNDistinct(rapid.StringMatching(`[a-z"ä,#;]([a-z "ä,#;]{0,6}[a-z"ä,#;])?`), 1, 5, func(s string) string {
			return strings.Join(strings.Fields(s), " ")
		}).Draw(t, "names")
		force := rapid.Float64Range(-1e9, 1e9)
		var want []group.Share
		var rows []string
		for _, name := range names {
			for bolt := range n {
				s := group.Share{Case: strings.Join(strings.Fields(name), " "), Bolt: bolt + 1, Axial: force.Draw(t, "axial"),
					X: force.Draw(t, "x"), Y: force.Draw(t, "y")}
				want = append(want, s)
				rows = append(rows, fmt.Sprintf("\"%s\",%d,%v,%v,%v\n", strings.ReplaceAll(name, `"`, `""`), s.Bolt, s.Axial, s.X, s.Y))
			}
		}
		text := strings.ReplaceAll(heads, "kN", "N")
		last := rows[n:]
		if len(last) > 0 { // the first case stays first, its rows and the others' in any order
			last = rapid.Permutation(rows[:n]).Draw(t, "first")
			last = append(append([]string{}, last...), rows[n:]...)
			rows = last
		}
		got, err := group.ReadCSV("run.csv", []byte(text+strings.Join(rows, "")))
		require.NoError(t, err)
		require.Equal(t, want, got)
	})
}

// millionRows is a table of a thousand cases of a thousand bolts.
func millionRows() []byte {
	var b bytes.Buffer
	b.WriteString(heads)
	for c := range 1000 {
		for bolt := range 1000 {
			fmt.Fprintf(&b, "load case %d,%d,%.6e,%.3f,%.3f\n", c, bolt+1, 12.5+float64(c), 0.001*float64(bolt), -1.5)
		}
	}
	return b.Bytes()
}

// A million rows need less than 300 MB besides the table, all garbage counted that
// the collector has not yet taken.
func TestMemoryOfAMillionRows(t *testing.T) {
	data := millionRows()
	runtime.GC()
	var before, now runtime.MemStats
	runtime.ReadMemStats(&before)
	shares, err := group.ReadCSV("run.csv", data)
	runtime.ReadMemStats(&now)
	require.NoError(t, err)
	assert.Len(t, shares, 1_000_000)
	assert.Less(t, now.Sys, before.Sys+300<<20, "taken from the system")
}

// Target: a million rows in under 2 s.
func BenchmarkReadCSVMillionRows(b *testing.B) {
	data := millionRows()
	b.SetBytes(int64(len(data)))
	b.ReportAllocs()
	for b.Loop() {
		shares, err := group.ReadCSV("run.csv", data)
		if err != nil || len(shares) != 1_000_000 {
			b.Fatal(err)
		}
	}
}

// Whatever the bytes, reading ends with a whole table of finite forces or with
// problems that have a place inside the line, a message and a mend.
func FuzzReadCSV(f *testing.F) {
	for _, s := range []string{"", table, heads, "\xef\xbb\xbf" + table, strings.ReplaceAll(table, ",", ";"), heads + "\"", heads + "a,1,\"\"\"\",0,0",
		heads + "a,1,1e308,0,0", heads + "#\n\r\n,,,,\n\xff", strings.Repeat("a,", 3000), heads + "a,1,0,0,0\nb,2,0,0,0\n"} {
		f.Add([]byte(s))
	}
	f.Fuzz(func(t *testing.T, data []byte) {
		shares, err := group.ReadCSV("fuzz.csv", data)
		if err == nil {
			bolts := map[string]int{}
			for _, s := range shares {
				bolts[s.Case]++
				if s.Case == "" || s.Bolt < 1 || math.Abs(s.Axial) > 1e9 || math.IsNaN(s.Axial+s.X+s.Y) {
					t.Errorf("%+v", s)
				}
			}
			for _, n := range bolts {
				if n*len(bolts) != len(shares) {
					t.Errorf("cases of different sizes: %v", bolts)
				}
			}
			return
		}
		var e *group.ProblemsError
		if !errors.As(err, &e) || len(e.Problems) == 0 {
			t.Fatalf("%T is no list of problems", err)
		}
		for _, p := range e.Problems {
			if p.Message == "" || p.Mend == "" || p.Line < 1 || p.Column < 1 || p.Column > utf8.RuneCountInString(p.Text)+1 {
				t.Errorf("incomplete problem: %+v", p)
			}
		}
	})
}
