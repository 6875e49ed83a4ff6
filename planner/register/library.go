package register

import (
	"fmt"
	"slices"

	"clampback/planner"
	"clampback/planner/fastener"
)

// maxLibraries is how many libraries a register may name; each may have maxPart bytes.
const maxLibraries = 100

// libraryFile is one library beside the register.
type libraryFile struct {
	name string // as the register writes it
	top  *object
}

// readLibraries reads the libraries that a register names: one, or a list.
func readLibraries(f field) *library {
	l := &library{}
	names := []field{f}
	if f.node.kind == list {
		names = f.items("library")
	}
	switch {
	case len(names) == 0:
		f.wrong("library is empty", "name a file, or remove the key")
	case len(names) > maxLibraries:
		f.wrong(fmt.Sprintf("the register names %d libraries", len(names)), fmt.Sprintf("name at most %d", maxLibraries))
		names = nil
		l.lose()
	}
	var files []libraryFile
	for i, name := range names {
		text := name.text()
		if slices.ContainsFunc(names[:i], func(n field) bool { return text != "" && n.node.text == text }) {
			name.wrong(fmt.Sprintf("%s is named twice", text), "keep one of them")
			continue
		}
		file, whole := openLibrary(name, text)
		if !whole {
			l.lose()
		}
		if file.top != nil {
			files = append(files, file)
		}
	}
	for _, file := range files { // entries of any file may go by a thread of any other
		l.readThreads(file)
	}
	for _, file := range files {
		l.readParts(file)
		f.d.all = append(f.d.all, file.top.d.all...)
	}
	return l
}

// openLibrary reads a file down to its sections; whole reports whether nothing of it
// was lost on the way. Without an object there is nothing to read.
func openLibrary(f field, name string) (file libraryFile, whole bool) {
	if name == "" {
		return libraryFile{}, false
	}
	data, ok := f.open(name)
	if !ok {
		return libraryFile{}, false
	}
	if len(data) > maxPart {
		f.wrong(fmt.Sprintf("%s is larger than %d kB", name, maxPart>>10), "split it into several files: library: [one.yaml, two.yaml]")
		return libraryFile{}, false
	}
	s, bad := guard(Source{Name: f.beside(name), Data: data}, aLibrary)
	if len(bad) > 0 {
		f.d.all = append(f.d.all, bad...)
		return libraryFile{}, false
	}
	d := &decoder{problems: &problems{source: s}}
	top := parse(d.problems, chunk{1, s.lines})
	if top == nil {
		if len(d.all) == 0 {
			d.at(position{1, 1}, "the library is empty", "begin with materials, property_classes, heads, nuts, washers or threads")
		}
		f.d.all = append(f.d.all, d.all...)
		return libraryFile{}, false
	}
	o := field{d, top, "the library", ""}.object("materials", "property_classes", "heads", "nuts", "washers", "threads")
	return libraryFile{name, o}, len(d.all) == 0
}

// section is how the entries of one kind are read.
type section[T any] struct {
	key      string                 // "heads"
	one      string                 // "head"
	keys     []string               // besides name and source
	reserved string                 // a word that registers use in place of a name
	sized    bool                   // entries are for one thread
	taken    func(name string) bool // whether the program's own table has the name
	read     func(e entryOf) (T, []planner.Fault)
}

// entryOf is one entry while it is read.
type entryOf struct {
	*object
	name   string
	thread fastener.Thread // of a sized section
	origin string          // its source, as it states it
	source string          // the same with the library's name, as plans print it
}

// readSection puts the entries of a section on their shelf.
func readSection[T any](l *library, file libraryFile, shelf *shelf[T], sec section[T]) {
	if !file.top.stated(sec.key) {
		return
	}
	d := file.top.d
	before := len(d.all)
	fields := file.top.at(sec.key).items(sec.one)
	if len(d.all) > before {
		shelf.partial = true
	}
	keys := slices.Concat([]string{"name"}, sec.keys, []string{"source"})
	if sec.sized {
		keys = slices.Insert(keys, 1, "thread")
	}
	for _, f := range fields {
		e := entryOf{object: f.object(keys...)}
		if e.require("name", "as joints write it") {
			e.name = e.at("name").label()
		}
		if sec.sized && e.require("thread", "M12") {
			e.thread = lookUp(e.at("thread"), l.findThread)
		}
		if e.require("source", "where its values come from") {
			e.origin = e.at("source").label()
			e.source = fmt.Sprintf("library %s: %s", file.name, e.origin)
		}
		value, faults := sec.read(e)
		e.note(faults)
		if e.name == "" || sec.sized && e.thread.Designation == "" {
			shelf.partial = true // it cannot be found
			continue
		}
		placeEntry(shelf, sec, e, value)
	}
}

// note gives what is impossible about an entry its place.
func (e entryOf) note(faults []planner.Fault) {
	for _, f := range faults {
		pos := locate(e.node, f.Path)
		f.Path = e.pathOf(f.Path)
		f.Rests = slices.Clone(f.Rests)
		for i, key := range f.Rests {
			f.Rests[i] = e.pathOf(key)
		}
		if e.d.judges(f) {
			e.d.at(pos, f.Message, f.Mend)
			e.d.unread = append(e.d.unread, f.Path)
		}
	}
}

// placeEntry puts an entry on its shelf unless its name is taken.
func placeEntry[T any](shelf *shelf[T], sec section[T], e entryOf, value T) {
	at := label{e.name, e.thread.Designation}
	name := e.at("name")
	first, twice := shelf.items[at]
	switch {
	case e.name == sec.reserved:
		name.wrong(fmt.Sprintf("%q means something else in registers", e.name), "give yours another name")
	case sec.taken(e.name):
		name.wrong(fmt.Sprintf("%q is in the program's own table", e.name), "give yours another name")
	case twice:
		text := fmt.Sprintf("%s %q", sec.one, e.name)
		if sec.sized {
			text += " for " + at.thread
		}
		name.wrong(fmt.Sprintf("the %s stands here and in %s:%d", text, first.place.File, first.place.Line), "keep one of them")
	default:
		pos := name.node.pos
		shelf.add(at, item[T]{value, e.d.knows(e.path), Problem{File: e.d.source.name, Line: pos.line}})
	}
}
