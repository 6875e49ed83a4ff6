package register

import (
	"errors"
	"fmt"
	"slices"
	"strconv"
	"strings"
	"unicode/utf8"

	"clampback/planner"
	"clampback/planner/quantity"
	"clampback/planner/table"
)

// decoder reads values out of nodes and notes what is wrong with them. Every
// method returns a zero value after a problem, so that reading goes on and one
// run finds all problems.
type decoder struct {
	*problems
	library *library // of the register; nil outside joints
	unread  []string // paths of values that are missing or could not be read
}

// judges reports whether everything that a rule looked at was read: a fault that
// rests on a value put in for an unread one would mislead.
func (d *decoder) judges(f planner.Fault) bool {
	return d.knows(f.Path) && !slices.ContainsFunc(f.Rests, func(path string) bool { return !d.knows(path) })
}

// knows reports whether all of a value was read.
func (d *decoder) knows(path string) bool {
	return !slices.ContainsFunc(d.unread, func(unread string) bool { return overlap(unread, path) })
}

// overlap reports whether one path is the other or holds it.
func overlap(a, b string) bool {
	if len(a) > len(b) {
		a, b = b, a
	}
	return strings.HasPrefix(b, a) && (len(a) == len(b) || a == "" || b[len(a)] == '.' || b[len(a)] == '[')
}

// field is one value with the name that messages call it by and its path in the
// joint, as planner.Fault spells it.
type field struct {
	d    *decoder
	node *node
	name string
	path string
}

// wrong notes what is wrong with the value.
func (f field) wrong(message, mend string) {
	f.d.at(f.node.pos, message, mend)
	f.lose()
}

// lose marks the value as one that could not be read.
func (f field) lose() { f.d.unread = append(f.d.unread, f.path) }

// is reports whether the value is of a kind, and notes it when it is not.
func (f field) is(want kind, mend string) bool {
	if f.node.kind == want {
		return true
	}
	switch f.node.kind {
	case refused: // already a problem
		f.lose()
	case empty:
		f.wrong(f.name+" is empty", "state it, or remove the key")
	default:
		f.wrong(fmt.Sprintf("%s is %s, but %s belongs here", f.name, f.node.kind, want), mend)
	}
	return false
}

// text returns the text of a scalar, "" after a problem.
func (f field) text() string {
	if !f.is(scalar, "write one value") {
		return ""
	}
	if f.node.text == "" {
		f.wrong(f.name+" is empty", "state it, or remove the key")
	}
	return f.node.text
}

// maxLabel is the longest text that names something, characters.
const maxLabel = 200

// label returns a text that names something, on one line.
func (f field) label() string {
	s := strings.Join(strings.Fields(f.text()), " ")
	if n := utf8.RuneCountInString(s); n > maxLabel {
		f.wrong(fmt.Sprintf("%s has %d characters", f.name, n), fmt.Sprintf("use at most %d", maxLabel))
		return ""
	}
	if s == "" && f.node.text != "" {
		f.wrong(f.name+" is empty", "state it, or remove the key")
	}
	return s
}

// quantity returns a number in the internal unit of its dimension.
func (f field) quantity(dim quantity.Dimension) float64 {
	text := f.text()
	if text == "" {
		return 0
	}
	v, err := quantity.Parse(text, dim)
	f.noteQuantity(err)
	return v
}

// some returns a quantity that is not 0: 0 would pass for one that is not stated,
// and the usual value be taken against the statement.
func (f field) some(dim quantity.Dimension) float64 {
	unread := len(f.d.unread)
	v := f.quantity(dim)
	if v == 0 && len(f.d.unread) == unread {
		f.wrong(fmt.Sprintf("%s is 0", f.name), "state a value above 0, or remove the key")
	}
	return v
}

// span returns a range.
func (f field) span(dim quantity.Dimension) quantity.Range {
	text := f.text()
	if text == "" {
		return quantity.Range{}
	}
	r, err := quantity.ParseRange(text, dim)
	f.noteQuantity(err)
	return r
}

func (f field) noteQuantity(err error) {
	var e *quantity.Error
	if errors.As(err, &e) {
		f.wrong(f.name+": "+e.Message, e.Mend)
	}
}

// whole returns a whole number.
func (f field) whole() int {
	text := f.text()
	if text == "" {
		return 0
	}
	v, err := strconv.Atoi(text)
	if err != nil || strconv.Itoa(v) != text { // not 04, +4, 4.0 or 4e0
		f.wrong(fmt.Sprintf("%s: %q is not a whole number", f.name, text), "write it as 8")
		return 0
	}
	return v
}

// choice returns one of the words of a key.
func (f field) choice(words ...string) string {
	text := f.text()
	if text != "" && !slices.Contains(words, text) {
		f.wrong(fmt.Sprintf("%s: unknown word %q", f.name, text), suggest(text, words, "it is one of"))
		return ""
	}
	return text
}

// items returns the items of a list by a name for one of them.
func (f field) items(item string) []field {
	if !f.is(list, "write it as [..., ...], or one item a line that begins with \"- \"") {
		return nil
	}
	fields := make([]field, len(f.node.items))
	for i, n := range f.node.items {
		fields[i] = field{f.d, n, fmt.Sprintf("%s %d", item, i+1), fmt.Sprintf("%s[%d]", f.path, i)}
	}
	return fields
}

// lookUp finds a designation in a table.
func lookUp[T any](f field, find func(string) (T, error)) T {
	var none T
	text := f.text()
	if text == "" {
		return none
	}
	v, err := find(text)
	var unknown *table.UnknownError
	switch {
	case errors.Is(err, errUnread): // already a problem
		f.lose()
	case errors.As(err, &unknown):
		f.wrong(unknown.Error(), suggest(unknown.Name, unknown.Known, "known are"))
	case err != nil:
		f.wrong(err.Error(), "choose another "+strings.ReplaceAll(f.name, "_", " ")+" or size")
	}
	return v
}

// object is a mapping whose keys are read one by one; of an absent one, or one
// that is no mapping, no key is stated.
type object struct {
	field
	known []string
}

// object reads a mapping with known keys.
func (f field) object(known ...string) *object {
	if !f.is(mapping, fmt.Sprintf("write it as {%s: ...}", known[0])) {
		f.node = &node{kind: refused}
		return &object{f, known}
	}
	o := &object{f, known}
	if f.node.partial {
		for _, key := range known {
			if !o.stated(key) {
				o.miss(key)
			}
		}
	}
	for _, e := range f.node.entries {
		if slices.Contains(known, e.key) {
			continue
		}
		f.d.at(e.pos, fmt.Sprintf("unknown key %q in %s", e.key, f.name), suggest(e.key, known, "the keys are"))
		if near := nearest(e.key, known); near != "" && !o.stated(near) {
			o.miss(near) // most likely misspelt, so not missing
		}
	}
	return o
}

func (o *object) pathOf(key string) string {
	if o.path == "" {
		return key
	}
	return o.path + "." + key
}

// miss marks a key as one that could not be read.
func (o *object) miss(key string) { o.d.unread = append(o.d.unread, o.pathOf(key)) }

// at returns the value of a key, of no kind when it is absent.
func (o *object) at(key string) field {
	n := o.node.get(key)
	if n == nil {
		n = &node{kind: refused}
	}
	return field{o.d, n, key, o.pathOf(key)}
}

// stated reports whether a key is there.
func (o *object) stated(key string) bool { return o.node.get(key) != nil }

// require notes a missing key and reports whether it is there.
func (o *object) require(key, example string) bool {
	if o.stated(key) {
		return true
	}
	if o.node.kind == mapping && !slices.Contains(o.d.unread, o.pathOf(key)) {
		o.d.at(o.node.pos, fmt.Sprintf("%s lacks %s", o.name, key), fmt.Sprintf("add %s: %s", key, example))
	}
	o.miss(key)
	return false
}

// one returns the quantity of a key, 0 when it is absent.
func (o *object) one(key string, dim quantity.Dimension) float64 {
	if !o.stated(key) {
		return 0
	}
	return o.at(key).quantity(dim)
}

// some returns the quantity of a key that may be absent but, stated, not be 0.
func (o *object) some(key string, dim quantity.Dimension) float64 {
	if !o.stated(key) {
		return 0
	}
	return o.at(key).some(dim)
}

// label returns the text of a key, "" when it is absent.
func (o *object) label(key string) string {
	if !o.stated(key) {
		return ""
	}
	return o.at(key).label()
}

// word returns the text of a key where it is a single value, without judging it.
func (o *object) word(key string) string {
	if n := o.node.get(key); n != nil && n.kind == scalar {
		return n.text
	}
	return ""
}
