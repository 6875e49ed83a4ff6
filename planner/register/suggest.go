package register

import (
	"fmt"
	"strings"
)

// listedKnown is how many known names an error lists.
const listedKnown = 12

// suggest makes the mend for an unknown word: the nearest known one, and the
// known ones where they are few.
func suggest(word string, known []string, lead string) string {
	var parts []string
	if near := nearest(word, known); near != "" {
		parts = append(parts, fmt.Sprintf("did you mean %q?", near))
	}
	if len(known) <= listedKnown {
		parts = append(parts, lead+" "+strings.Join(known, ", "))
	} else if len(parts) == 0 {
		parts = append(parts, lead+" "+strings.Join(known[:listedKnown], ", ")+" and more")
	}
	return strings.Join(parts, " ")
}

// nearest returns the known word with the fewest changes, else one that begins
// with the word, "" when none is near.
func nearest(word string, known []string) string {
	const beginning = 3 // letters that tell a word
	lower := strings.ToLower(word)
	best, least := "", max(2, len(word)/3)+1
	for _, k := range known {
		if d := distance(lower, strings.ToLower(k)); d < least && d < max(len(k), len(word)) {
			best, least = k, d
		}
	}
	for _, k := range known {
		if best == "" && len(word) >= beginning && strings.HasPrefix(strings.ToLower(k), lower) {
			best = k
		}
	}
	return best
}

// distance is the number of letters to insert, delete or replace (Levenshtein).
func distance(a, b string) int {
	if len(a) > maxLabel {
		return len(a)
	}
	row := make([]int, len(b)+1)
	for j := range row {
		row[j] = j
	}
	for i := range len(a) {
		diagonal := row[0]
		row[0] = i + 1
		for j := range len(b) {
			change := diagonal
			if a[i] != b[j] {
				change++
			}
			diagonal = row[j+1]
			row[j+1] = min(change, row[j]+1, row[j+1]+1)
		}
	}
	return row[len(b)]
}
