package card_test

import (
	"bytes"
	"fmt"
	"image"
	_ "image/png" // pdftoppm's pages
	"os"
	"os/exec"
	"regexp"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"
)

// need returns an independent program; in CI its absence fails the test.
func need(t testing.TB, program, pack string) string {
	path, err := exec.LookPath(program)
	if err != nil {
		if os.Getenv("CI") == "true" {
			t.Fatalf("%s is missing: install %s", program, pack)
		}
		t.Skipf("SKIPPED: %s is missing, so the PDF is not checked; install %s", program, pack)
	}
	return path
}

// pages returns the text of each page as poppler reads it.
func pages(t testing.TB, pdf []byte) []string {
	command := exec.Command(need(t, "pdftotext", "poppler-utils"), "-layout", "-", "-")
	command.Stdin = bytes.NewReader(pdf)
	text, err := command.Output()
	require.NoError(t, err)
	all := strings.Split(string(text), "\f")
	return all[:len(all)-1]
}

// inkHeights renders the first page and returns the heights of what is taller
// than 8 mm in a strip of 14 mm, mm: no text is but the settings.
func inkHeights(t *testing.T, pdf []byte, left int) []float64 {
	const scale = 5 // pixels a mm
	command := exec.Command(need(t, "pdftoppm", "poppler-utils"), "-png", "-gray", "-r", fmt.Sprint(25.4*scale), "-f",
		"1", "-l", "1", "-")
	command.Stdin = bytes.NewReader(pdf)
	png, err := command.Output()
	require.NoError(t, err)
	page, _, err := image.Decode(bytes.NewReader(png))
	require.NoError(t, err)
	var heights []float64
	run := 0
	for y := range page.Bounds().Max.Y {
		if dark(page, y, left*scale, (left+14)*scale) {
			run++
			continue
		}
		if run > 8*scale {
			heights = append(heights, float64(run)/scale)
		}
		run = 0
	}
	return heights
}

// dark reports whether a row of pixels has a dark one from..to.
func dark(page image.Image, y, from, to int) bool {
	for x := from; x < to; x++ {
		if r, _, _, _ := page.At(x, y).RGBA(); r < 0x8000 {
			return true
		}
	}
	return false
}

// word is a word on a page where poppler finds it, points; top and bottom are
// those of a digit in DejaVu Sans, whose ascent is 0.928, descent 0.236 and digit
// height 0.729 of the type size.
type word struct{ left, top, right, bottom float64 }

var wordBox = regexp.MustCompile(`<word xMin="([\d.-]+)" yMin="([\d.-]+)" xMax="([\d.-]+)" yMax="([\d.-]+)">`)

// words returns the words of each page.
func words(t *testing.T, pdf []byte) [][]word {
	command := exec.Command(need(t, "pdftotext", "poppler-utils"), "-bbox", "-", "-")
	command.Stdin = bytes.NewReader(pdf)
	text, err := command.Output()
	require.NoError(t, err)
	var all [][]word
	for _, page := range strings.Split(string(text), "<page ")[1:] {
		var found []word
		for _, m := range wordBox.FindAllStringSubmatch(page, -1) {
			var w word
			_, err := fmt.Sscan(strings.Join(m[1:], " "), &w.left, &w.top, &w.right, &w.bottom)
			require.NoError(t, err)
			height := w.bottom - w.top
			w.top += height * (0.928 - 0.729) / 1.164
			w.bottom -= height * 0.236 / 1.164
			found = append(found, w)
		}
		all = append(all, found)
	}
	return all
}

// assertClean fails where a word leaves the printable area or runs into another.
func assertClean(t *testing.T, name string, pdf []byte, width, height float64) {
	const edge = 7 / 0.3528 // 7 mm in points
	for n, page := range words(t, pdf) {
		for i, a := range page {
			require.True(t, a.left >= edge && a.top >= edge && a.right <= width-edge && a.bottom <= height-edge,
				"%s, page %d: %v is cut", name, n+1, a)
			for _, b := range page[:i] {
				const touch = 0.3 // points: rounding of the boxes
				require.False(t, a.left+touch < b.right && b.left+touch < a.right && a.top+touch < b.bottom && b.top+touch < a.bottom,
					"%s, page %d: %v runs into %v", name, n+1, a, b)
			}
		}
	}
}
