package figure_test

import (
	"io/fs"
	"strings"
	"testing"
	"unicode/utf8"

	"github.com/go-pdf/fpdf"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"golang.org/x/image/font/sfnt"
	"pgregory.net/rapid"

	"clampback/planner/pattern"
	"clampback/report/figure"
	"clampback/templates"
)

// Both faces hold every character that Printable lets through, and every
// character of the cards' words: an independent reader of the font files says so.
func TestFacesHoldEveryCharacter(t *testing.T) {
	words, err := fs.ReadFile(templates.Folder(nil), "cards/en.csv")
	require.NoError(t, err)
	cautions, err := fs.ReadFile(templates.Folder(nil), "cautions.csv")
	require.NoError(t, err)
	for name, data := range map[string][]byte{"regular": figure.RegularFont, "bold": figure.BoldFont} {
		face, err := sfnt.Parse(data)
		require.NoError(t, err)
		var buffer sfnt.Buffer
		has := func(r rune) bool {
			glyph, err := face.GlyphIndex(&buffer, r)
			return err == nil && glyph != 0
		}
		for r := rune(' '); r < 0x3000; r++ {
			if figure.Printable(string(r)) == string(r) {
				assert.True(t, has(r), "%s lacks %U", name, r)
			}
		}
		for _, r := range string(words) + string(cautions) {
			if r != '\n' {
				assert.True(t, has(r), "%s lacks %q of the cards' words", name, r)
			}
		}
	}
}

func TestPrintableShowsWhatItCannotPrint(t *testing.T) {
	assert.Equal(t, "Bügel µ ±4 Ωж", figure.Printable("Bügel µ ±4 Ωж"))
	assert.Equal(t, "a□b□ c", figure.Printable("a漢b\U0001F600\x07c"))
	assert.Equal(t, "a□", figure.Printable("a\xff"))
}

// Wrapping loses no character and keeps every line within the width.
func TestWrapLosesNothing(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := rapid.StringMatching(`[a-zA-Z ü漢]{0,80}`).Draw(t, "text")
		width := rapid.Float64Range(1, 30).Draw(t, "width")
		indent := rapid.Float64Range(0, width).Draw(t, "indent")
		measure := func(s string) float64 { return float64(utf8.RuneCountInString(s)) }
		lines := figure.Wrap(text, indent, width, measure)
		require.Equal(t, strings.Join(strings.Fields(text), ""), strings.ReplaceAll(strings.Join(lines, ""), " ", ""))
		for i, l := range lines {
			require.LessOrEqual(t, measure(l), width)
			if i == 0 {
				require.True(t, l == "" || indent+measure(l) <= width)
			}
		}
	})
}

// Text is as wide as the PDF library finds it, which reads the faces by itself.
func TestWidthsAgreeWithThePDFLibrary(t *testing.T) {
	doc := fpdf.New("P", "mm", "A5", "")
	pdf := figure.NewPDF(doc)
	for _, text := range []string{"98", "Tighten to 165 N.m", "±4 % µ Ω", "Ж", "a漢b"} {
		for style, bold := range map[string]bool{"": false, "B": true} {
			doc.SetFont("DejaVu", style, 10/(25.4/72))
			assert.InDelta(t, doc.GetStringWidth(figure.Printable(text)), pdf.Width(text, figure.Type{Size: 10, Bold: bold}),
				0.1, text)
		}
	}
}

// The order on the drawing is the pattern's: as many numbers as bolts, all
// inside the box.
func TestBoltPatternDrawsEveryBolt(t *testing.T) {
	for _, p := range []pattern.Pattern{pattern.NewCircle(24, 460), pattern.NewGrid(2, 4, 60, 80),
		pattern.NewFree([]pattern.Point{{X: 0, Y: 0}}), pattern.NewCircle(1, 50)} {
		c := figure.NewSVG(60, 60)
		digits := figure.BoltPattern(c, p, figure.Box{Width: 60, Height: 60})
		assert.Positive(t, digits)
		assert.Equal(t, len(p.Points), strings.Count(c.String(), "<text"))
		assert.NotContains(t, c.String(), "NaN")
	}
	assert.GreaterOrEqual(t, figure.DigitOf(pattern.NewCircle(24, 460), figure.Box{Width: 60, Height: 60}), 2.2,
		"24 bolts on A5, mm: 15 minutes of arc at 0.5 m, the least of NUREG-0700")
	assert.Less(t, figure.PatternHeight(pattern.NewGrid(1, 4, 60, 80), figure.Box{Width: 60, Height: 60}), 12.0,
		"a row needs little height, mm")
	for _, p := range []pattern.Pattern{pattern.NewGrid(1, 2, 48, 48), pattern.NewGrid(2, 4, 60, 80),
		pattern.NewGrid(3, 1, 9, 9), pattern.NewCircle(24, 460)} {
		box := figure.Box{Width: 60, Height: 60}
		whole := figure.DigitOf(p, box)
		box.Height = figure.PatternHeight(p, box)
		assert.InDelta(t, whole, figure.DigitOf(p, box), 1e-9, "the height it needs is enough: %v", p)
	}
}
