package figure

import (
	"fmt"
	"sync"

	"golang.org/x/image/font"
	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"
)

// textWidth returns how wide a line of text is, mm: the sum of its characters'
// advances, as neither backend kerns.
func textWidth(text string, t Type) float64 {
	table := advances()[0]
	if t.Bold {
		table = advances()[1]
	}
	var sum float32
	for _, r := range text {
		if int(r) >= len(table) || table[r] == 0 {
			r = printableRune(r)
		}
		if r >= 0 {
			sum += table[r]
		}
	}
	return float64(sum) * t.Size
}

// lastRune is the last character of the faces.
const lastRune = 0x2713

// advances are the widths of the characters of both faces over the type size, by
// character; read once from the fonts.
var advances = sync.OnceValue(func() (all [2][]float32) {
	for i, data := range [][]byte{RegularFont, BoldFont} {
		face, err := sfnt.Parse(data)
		if err != nil {
			panic(fmt.Sprintf("embedded font: %v", err))
		}
		all[i] = make([]float32, lastRune+1)
		var buffer sfnt.Buffer
		for r := range rune(lastRune + 1) {
			glyph, err := face.GlyphIndex(&buffer, r)
			if err != nil || glyph == 0 {
				continue
			}
			const em = 1000
			advance, err := face.GlyphAdvance(&buffer, glyph, fixed.I(em), font.HintingNone)
			if err != nil {
				panic(fmt.Sprintf("embedded font: %v", err))
			}
			all[i][r] = float32(advance) / 64 / em
		}
	}
	return all
})
