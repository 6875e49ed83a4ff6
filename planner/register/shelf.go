package register

import (
	"errors"
	"fmt"
	"slices"
	"strings"

	"clampback/planner/fastener"
	"clampback/planner/table"
)

// library is what the user's own libraries hold. The zero library is empty: only
// the program's tables are known.
type library struct {
	threads   shelf[fastener.Thread]
	heads     shelf[fastener.Head]
	nuts      shelf[fastener.Nut]
	washers   shelf[fastener.Washer]
	classes   shelf[fastener.PropertyClass]
	materials shelf[fastener.Material]
}

// shelf is one kind of entries.
type shelf[T any] struct {
	names   []string // each once, in the order of the files
	items   map[label]item[T]
	threads map[string][]string // of a name, those that it is there for
	partial bool                // some entry could not be read: a name that is not here may be its name
}

// label is what an entry is found by.
type label struct {
	name   string
	thread string // designation; "" where entries fit every thread
}

// item is one entry.
type item[T any] struct {
	value T
	sound bool    // false: it has a problem, which must not show again where it is used
	place Problem // file, line, column and text only
}

// unreadLibrary is a library of which nothing is known.
func unreadLibrary() *library {
	l := &library{}
	l.lose()
	return l
}

// lose notes that entries of any kind could not be read.
func (l *library) lose() {
	l.threads.partial, l.heads.partial, l.nuts.partial = true, true, true
	l.washers.partial, l.classes.partial, l.materials.partial = true, true, true
}

func (s *shelf[T]) add(l label, i item[T]) {
	if s.items == nil {
		s.items, s.threads = map[label]item[T]{}, map[string][]string{}
	}
	if len(s.threads[l.name]) == 0 {
		s.names = append(s.names, l.name)
	}
	s.threads[l.name] = append(s.threads[l.name], l.thread)
	s.items[l] = i
}

// has reports whether there is an entry of that name.
func (s *shelf[T]) has(name string) bool { return len(s.threads[name]) > 0 }

// errUnread says that a library may hold what was sought, but could not be read: that
// already is a problem.
var errUnread = errors.New("a library could not be read")

// find returns the entry of that name, else what the program's table has. The error is
// errUnread, a *table.UnknownError that knows the entries too, or a plain one.
func (s *shelf[T]) find(l label, tables func(name string) (T, error)) (T, error) {
	var none T
	if i, found := s.items[l]; found {
		if !i.sound {
			return none, errUnread
		}
		return i.value, nil
	}
	v, err := tables(l.name)
	var unknown *table.UnknownError
	switch {
	case err == nil:
		return v, nil
	case s.partial:
		return none, errUnread
	case !errors.As(err, &unknown):
		return none, err
	case s.has(l.name):
		return none, fmt.Errorf("no %s %q for %s: your library has it for %s", unknown.Kind, l.name, l.thread,
			strings.Join(s.threads[l.name], ", "))
	}
	return none, &table.UnknownError{Kind: unknown.Kind, Name: unknown.Name, Known: slices.Concat(s.names, unknown.Known)}
}

func (l *library) findThread(name string) (fastener.Thread, error) {
	return l.threads.find(label{name, ""}, fastener.ParseThread)
}

func (l *library) findHead(kind string, t fastener.Thread) (fastener.Head, error) {
	return l.heads.find(label{kind, t.Designation}, func(kind string) (fastener.Head, error) { return fastener.FindHead(kind, t) })
}

func (l *library) findNut(kind string, t fastener.Thread) (fastener.Nut, error) {
	return l.nuts.find(label{kind, t.Designation}, func(kind string) (fastener.Nut, error) { return fastener.FindNut(kind, t) })
}

func (l *library) findWasher(name string, t fastener.Thread) (fastener.Washer, error) {
	return l.washers.find(label{name, t.Designation}, func(name string) (fastener.Washer, error) { return fastener.FindWasher(name, t) })
}

func (l *library) findClass(name string, t fastener.Thread) (fastener.PropertyClass, error) {
	return l.classes.find(label{name, ""}, func(name string) (fastener.PropertyClass, error) { return fastener.FindClass(name, t) })
}

func (l *library) findMaterial(name string) (fastener.Material, error) {
	return l.materials.find(label{name, ""}, fastener.FindMaterial)
}
