package quantity_test

import (
	"fmt"
	"math"
	"strconv"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"clampback/planner/quantity"
)

// Conversion factors of NIST SP 811 (2008), appendix B.8, to their printed
// digits; exact ones where SP 811 prints them bold.
func TestFactorsNISTSP811(t *testing.T) {
	cases := []struct {
		text      string
		dimension quantity.Dimension
		want      float64
		relative  float64
	}{
		{"1 in", quantity.Length, 25.4, 0},
		{"1 lbf", quantity.Force, 4.448222, 1e-7},
		{"1 kip", quantity.Force, 4448.222, 1e-7},
		{"1 lbf.ft", quantity.Torque, 1355.818, 3e-7},
		{"1 lbf.in", quantity.Torque, 112.9848, 5e-7},
		{"1 psi", quantity.Pressure, 6.894757e-3, 1e-7},
		{"1 ksi", quantity.Pressure, 6.894757, 1e-7},
		{"1 bar", quantity.Pressure, 0.1, 1e-15},
		{"1 in2", quantity.Area, 645.16, 1e-15},
		{"212 degF", quantity.Temperature, 100, 1e-14},
		{"273.15 K", quantity.Temperature, 0, 0},
		{"-40 degF", quantity.Temperature, -40, 1e-14},
	}
	for _, c := range cases {
		got, err := quantity.Parse(c.text, c.dimension)
		require.NoError(t, err, c.text)
		assert.InDelta(t, c.want, got, c.relative*math.Abs(c.want), c.text)
	}
}

func TestParseReadsWhatTheTradeWrites(t *testing.T) {
	cases := []struct {
		text      string
		dimension quantity.Dimension
		want      quantity.Range
	}{
		{"12.5 kN", quantity.Force, quantity.Single(12500)},
		{"12.5kN", quantity.Force, quantity.Single(12500)},
		{"0 to 9.5 kN", quantity.Force, quantity.Range{Low: 0, High: 9500}},
		{"-5 kN to 9500 N", quantity.Force, quantity.Range{Low: -5000, High: 9500}},
		{"10 um", quantity.Length, quantity.Single(0.01)},
		{"2e6", quantity.Number, quantity.Single(2e6)},
		{"0.10 to 0.14", quantity.Ratio, quantity.Range{Low: 0.10, High: 0.14}},
		{"10 to 14 %", quantity.Ratio, quantity.Range{Low: 0.10, High: 0.14}},
		{"-10 degC to 70 degC", quantity.Temperature, quantity.Range{Low: -10, High: 70}},
		{"11.5 um/m/K", quantity.Expansion, quantity.Single(11.5e-6)},
	}
	for _, c := range cases {
		got, err := quantity.ParseRange(c.text, c.dimension)
		require.NoError(t, err, c.text)
		assert.InDelta(t, c.want.Low, got.Low, 1e-12, c.text)
		assert.InDelta(t, c.want.High, got.High, 1e-12, c.text)
	}
}

func TestParseRefusesWithAMend(t *testing.T) {
	cases := []struct {
		text      string
		dimension quantity.Dimension
		message   string
		mend      string
	}{
		{"12", quantity.Force, `"12" has no unit`, "add the unit: N, kN, lbf or kip"},
		{"12 kN", quantity.Length, `"12 kN" is a force, but a length belongs here`, "write it as 12 mm"},
		{"12 Nm", quantity.Torque, `unknown unit "Nm"`, "write N.m"},
		{"12 furlong", quantity.Length, `unknown unit "furlong"`, "use mm, um, m or in"},
		{"1,5 kN", quantity.Force, `"1,5 kN" has a comma`, "use a point for decimals and no thousands separators"},
		{"1_000 N", quantity.Force, `"1_000 N" has an underscore`, "write the number without it"},
		{"0x10 mm", quantity.Length, `unknown unit "x10 mm"`, "use mm, um, m or in"},
		{"nan mm", quantity.Length, `"nan mm" is not a length`, "write it as 12 mm"},
		{"1e999 mm", quantity.Length, `"1e999" is not a number that can be used`, "write it as 12 mm"},
		{"9 to 3 kN", quantity.Force, `"9 to 3 kN" runs backwards`, `write the lower end first, for example "3 kN to ..."`},
		{"8 mm", quantity.Number, `"8 mm" has a unit, but a plain number belongs here`, "leave the unit out"},
		{"", quantity.Force, `"" is not a force`, "write it as 12 kN"},
		{"3 mm", quantity.Area, `"3 mm" is a length, but an area belongs here`, "write it as 2400 mm2"},
		{"x", quantity.Angle, `"x" is not an angle`, "write it as 30 deg"},
		{"10 % to 0.14", quantity.Ratio, `"10 % to 0.14" has its unit after the lower end only`,
			"write the unit after the last number, or after both"},
		{"5 kN to 9", quantity.Force, `"5 kN to 9" has its unit after the lower end only`,
			"write the unit after the last number, or after both"},
		{"0-9.5 kN", quantity.Force, `"0-9.5" is not a number that can be used`,
			"write it as 12 kN; a range has the word to between its ends"},
		{"0..9.5 kN", quantity.Force, `"0..9.5" is not a number that can be used`,
			"write it as 12 kN; a range has the word to between its ends"},
		{"inf N", quantity.Force, `"inf N" is not a force`, "write it as 12 kN"},
		{"1e-400 N", quantity.Force, `"1e-400" is not a number that can be used`, "write it as 12 kN"},
		{"1e-323 um", quantity.Length, `"1e-323 um" is outside the numbers that can be used`, "write it as 12 mm"},
		{"1e308 kN", quantity.Force, `"1e308 kN" is outside the numbers that can be used`, "write it as 12 kN"},
		{"12 N/mm^2", quantity.Pressure, `unknown unit "N/mm^2"`, "write MPa"},
		{"0x1p4 N", quantity.Force, `unknown unit "x1p4 N"`, "use N, kN, lbf or kip"},
	}
	for _, c := range cases {
		_, err := quantity.ParseRange(c.text, c.dimension)
		var e *quantity.Error
		require.ErrorAs(t, err, &e, c.text)
		assert.Equal(t, c.message, e.Message)
		assert.Equal(t, c.mend, e.Mend)
	}
}

// Limits never move outwards, and by less than one step inwards.
func TestRoundingMovesInwards(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		v := rapid.Float64Range(-1e6, 1e6).Draw(t, "v")
		step := rapid.SampledFrom([]float64{0.01, 0.1, 0.5, 1, 5, 10, 25}).Draw(t, "step")
		down, up := quantity.RoundDown(v, step), quantity.RoundUp(v, step)
		slack := 1e-11 * (1 + math.Abs(v))
		require.LessOrEqual(t, down, v+slack)
		require.GreaterOrEqual(t, up, v-slack)
		require.Less(t, v-down, step+slack)
		require.Less(t, up-v, step+slack)
	})
}

// A value that is itself written with the step's digits is not moved at all, and
// prints with no more digits than the step.
func TestRoundingKeepsDecimalMultiples(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		n := rapid.IntRange(-100_000, 100_000).Draw(t, "n")
		digits := rapid.IntRange(0, 3).Draw(t, "digits")
		step := math.Pow10(-digits)
		v, err := strconv.ParseFloat(fmt.Sprintf("%de-%d", n, digits), 64)
		require.NoError(t, err)
		require.Equal(t, v, quantity.RoundDown(v, step))
		require.Equal(t, v, quantity.RoundUp(v, step))
		if n != 0 { // noise is relative
			require.Equal(t, v, quantity.RoundDown(math.Nextafter(v, math.Inf(-1)), step), "one ulp is noise")
		}
	})
}

// Where a step is below the rounding of the number, rounding still moves it by
// less than a step.
func TestRoundingOfHugeNumbers(t *testing.T) {
	assert.Equal(t, 1e15, quantity.RoundDown(1e15, 1))
	assert.Equal(t, 1e15, quantity.RoundUp(1e15, 1))
}

func TestRoundingForgivesNoise(t *testing.T) {
	assert.Equal(t, 0.3, quantity.RoundDown(0.1+0.2, 0.1))
	assert.Equal(t, 0.3, quantity.RoundUp(0.1+0.2, 0.1))
	assert.Equal(t, 83.0, quantity.RoundDown(83.99, 1))
	assert.Equal(t, 0.9, quantity.RoundDown(0.9, 0.3))
	assert.Equal(t, 3.3, quantity.RoundUp(3.3, 1.1))
	assert.Equal(t, 7.5, quantity.RoundDown(7.5, 2.5))
	assert.Equal(t, "83", quantity.Trim(83))
	assert.Equal(t, "9.5", quantity.Trim(9.5))
	assert.Equal(t, "1200", quantity.Trim(1200))
}

// What is printed reads back as the same number.
func TestTrimReadsBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		v := rapid.Float64Range(1e-3, 1e6).Draw(t, "v")
		got, err := quantity.Parse(quantity.Trim(v)+" mm", quantity.Length)
		require.NoError(t, err)
		require.InEpsilon(t, v, got, 1e-5)
	})
}

func TestFormatPrintsAsItIsWritten(t *testing.T) {
	cases := []struct {
		value     float64
		dimension quantity.Dimension
		want      string
	}{
		{13.5, quantity.Length, "13.5 mm"},
		{-12000, quantity.Force, "-12 kN"},
		{999, quantity.Force, "999 N"},
		{83000, quantity.Torque, "83 N.m"},
		{205000, quantity.Pressure, "205000 MPa"},
		{11.5e-6, quantity.Expansion, "11.5 um/m/K"},
		{300, quantity.Hardness, "300 HV"},
		{-273.15, quantity.Temperature, "-273.15 degC"},
		{0.14, quantity.Ratio, "0.14"},
		{2e6, quantity.Number, "2000000"},
		{1e300, quantity.Length, "1e+300 mm"},
	}
	for _, c := range cases {
		assert.Equal(t, c.want, quantity.Format(c.value, c.dimension))
	}
}

// What Format prints, Parse reads as the same value, to the 6 digits printed.
func TestFormatReadsBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		d := quantity.Dimension(rapid.IntRange(int(quantity.Number), int(quantity.Hardness)).Draw(t, "dimension"))
		v := rapid.Float64().Filter(func(v float64) bool {
			return math.Abs(v) < 1e300 && math.Abs(v) > 1e-300
		}).Draw(t, "v")
		got, err := quantity.Parse(quantity.Format(v, d), d)
		require.NoError(t, err)
		require.InEpsilon(t, v, got, 5.1e-6)
	})
}

func FuzzParseRange(f *testing.F) {
	for _, s := range []string{"12.5 kN", "0 to 9.5 kN", "-5 kN to 3 N", "1e3 mm", "to", " to ", "e e", "+-1 N",
		"12 µm", "1 to 2 to 3 N"} {
		f.Add(s, int(quantity.Force))
	}
	f.Fuzz(func(t *testing.T, s string, d int) {
		dimension := quantity.Dimension(((d % 11) + 11) % 11)
		r, err := quantity.ParseRange(s, dimension)
		if err == nil && (math.IsInf(r.Low, 0) || math.IsInf(r.High, 0) || math.IsNaN(r.Low+r.High) || r.Low > r.High) {
			t.Errorf("%q became %s", s, fmt.Sprint(r))
		}
	})
}
