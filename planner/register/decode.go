package register

import (
	"errors"
	"fmt"
	"slices"
	"strconv"
	"strings"

	"clampback/planner/fastener"
	"clampback/planner/quantity"
)

// decoder reads values out of nodes and notes what is wrong with them. Every
// method returns a zero value after a problem, so that reading goes on and one
// run finds all problems.
type decoder struct{ *problems }

// object is a mapping whose keys are read one by one; nil when there is none.
type object struct {
	d    *decoder
	node *node
	name string // for messages: "bolt", "clamped part 2"
}

// object reads a mapping with known keys. A nil node is an absent mapping.
func (d *decoder) object(n *node, name string, known ...string) *object {
	if n == nil || n.kind == refused {
		return &object{d, &node{}, name}
	}
	if n.kind != mapping {
		d.at(n.pos, fmt.Sprintf("%s is %s, but a mapping belongs here", name, n.kind),
			fmt.Sprintf("write it as {%s: ...}", known[0]))
		return &object{d, &node{pos: n.pos}, name}
	}
	for _, e := range n.entries {
		if !slices.Contains(known, e.key) {
			d.at(e.pos, fmt.Sprintf("unknown key %q in %s", e.key, name), suggest(e.key, known, "the keys are"))
		}
	}
	return &object{d, n, name}
}

// stated reports whether a key is there.
func (o *object) stated(key string) bool { return o.node.get(key) != nil }

// require notes a missing key and reports whether it is there.
func (o *object) require(key, example string) bool {
	if o.stated(key) {
		return true
	}
	if o.node.kind == mapping { // else the mapping itself is already a problem
		o.d.at(o.node.pos, fmt.Sprintf("%s lacks %s", o.name, key), fmt.Sprintf("add %s: %s", key, example))
	}
	return false
}

// text returns the text of a scalar, "" when it is absent or no scalar.
func (o *object) text(key string) string {
	n := o.node.get(key)
	if n == nil {
		return ""
	}
	return o.d.text(n, key)
}

func (d *decoder) text(n *node, name string) string {
	switch {
	case n.kind == refused:
	case n.kind == empty:
		d.at(n.pos, name+" is empty", "state a value, or remove the key")
	case n.kind != scalar:
		d.at(n.pos, fmt.Sprintf("%s is %s, but a single value belongs here", name, n.kind), "write one value")
	default:
		return n.text
	}
	return ""
}

// name returns a text that must not be empty and holds no line break.
func (o *object) label(key string) string {
	s := o.text(key)
	if len(s) > maxLabel {
		o.d.at(o.node.get(key).pos, fmt.Sprintf("%s has %d characters", key, len(s)), fmt.Sprintf("use at most %d", maxLabel))
		return ""
	}
	return strings.Join(strings.Fields(s), " ")
}

// maxLabel is the longest text that names something, bytes.
const maxLabel = 200

// one returns a quantity, 0 when it is absent.
func (o *object) one(key string, dim quantity.Dimension) float64 {
	n := o.node.get(key)
	if n == nil {
		return 0
	}
	return o.d.one(n, key, dim)
}

func (d *decoder) one(n *node, name string, dim quantity.Dimension) float64 {
	text := d.text(n, name)
	if text == "" {
		return 0
	}
	v, err := quantity.Parse(text, dim)
	d.quantityProblem(n, name, err)
	return v
}

// span returns a range, zero when it is absent.
func (o *object) span(key string, dim quantity.Dimension) quantity.Range {
	n := o.node.get(key)
	if n == nil {
		return quantity.Range{}
	}
	text := o.d.text(n, key)
	if text == "" {
		return quantity.Range{}
	}
	r, err := quantity.ParseRange(text, dim)
	o.d.quantityProblem(n, key, err)
	return r
}

func (d *decoder) quantityProblem(n *node, name string, err error) {
	var e *quantity.Error
	if errors.As(err, &e) {
		d.at(n.pos, name+": "+e.Message, e.Mend)
	}
}

// whole returns a whole number, 0 when it is absent.
func (o *object) whole(key string) int {
	n := o.node.get(key)
	if n == nil {
		return 0
	}
	text := o.d.text(n, key)
	if text == "" {
		return 0
	}
	v, err := strconv.Atoi(text)
	if err != nil || strings.HasPrefix(text, "+") || (len(text) > 1 && text[0] == '0') {
		o.d.at(n.pos, fmt.Sprintf("%s: %q is not a whole number", key, text), "write it as 8")
		return 0
	}
	return v
}

// choice returns one of the words of a key, the first when it is absent.
func (o *object) choice(key string, words ...string) string {
	if !o.stated(key) {
		return ""
	}
	text := o.text(key)
	if text != "" && !slices.Contains(words, text) {
		o.d.at(o.node.get(key).pos, fmt.Sprintf("%s: unknown word %q", key, text), suggest(text, words, "it is one of"))
		return ""
	}
	return text
}

// find looks a designation up in a table and notes what is wrong with it.
func find[T any](o *object, key, example string, lookup func(string) (T, error)) T {
	var none T
	if !o.require(key, example) {
		return none
	}
	text := o.text(key)
	if text == "" {
		return none
	}
	v, err := lookup(text)
	if err != nil {
		o.d.lookupProblem(o.node.get(key), key, err)
	}
	return v
}

func (d *decoder) lookupProblem(n *node, key string, err error) {
	var unknown *fastener.UnknownError
	if errors.As(err, &unknown) {
		d.at(n.pos, unknown.Error(), suggest(unknown.Name, unknown.Known, "known are"))
		return
	}
	d.at(n.pos, err.Error(), "choose another "+strings.ReplaceAll(key, "_", " ")+" or size")
}

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

// nearest returns the known word with the fewest changes, "" when none is near.
func nearest(word string, known []string) string {
	best, least := "", max(2, len(word)/3)+1
	for _, k := range known {
		if d := distance(strings.ToLower(word), strings.ToLower(k)); d < least {
			best, least = k, d
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
