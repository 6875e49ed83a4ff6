package register

import (
	"fmt"
	"runtime"
	"slices"
	"strconv"
	"strings"
	"sync"

	"clampback/planner"
)

// Read reads registers into joints, in order. The error is a *ProblemsError
// with every problem of all of them.
func Read(sources ...Source) ([]planner.Joint, error) {
	var joints []planner.Joint
	var all []Problem
	seen := map[string]Problem{} // id -> where it stands
	beside := map[Problem]bool{} // of files that several registers may name: told once
	for _, in := range sources {
		found, problems := readSource(in)
		for _, f := range found {
			place := f.id
			if first, twice := seen[f.joint.ID]; twice && f.joint.ID != "" {
				place.Message = fmt.Sprintf("the id %s stands here and in %s:%d", f.joint.ID, first.File, first.Line)
				place.Mend = "give each joint an id of its own"
				problems = append(problems, place)
				continue
			}
			seen[f.joint.ID] = place
			joints = append(joints, f.joint)
		}
		for _, p := range sorted(in.Name, problems) {
			if p.File == in.Name || !beside[p] {
				all = append(all, p)
				beside[p] = true
			}
		}
	}
	if len(all) > 0 {
		return nil, &ProblemsError{all}
	}
	return joints, nil
}

// located is a joint with the place of its id.
type located struct {
	joint planner.Joint
	id    Problem // file, line, column and text only
}

// header is what a register says about all its joints.
type header struct {
	assembly   string
	revision   string
	preparedBy string
	defaults   *node
	library    *library
}

func readSource(in Source) ([]located, []Problem) {
	s, bad := guard(in, aRegister)
	if len(bad) > 0 {
		return nil, bad
	}
	headChunk, chunks := split(s)
	p := &problems{source: s}
	if len(chunks) > maxJoints {
		p.at(position{chunks[maxJoints].first, 1}, fmt.Sprintf("the register has more than %d joints", maxJoints),
			"split it into several files")
		return nil, p.all
	}
	h, whole := readHeader(&decoder{problems: p}, parse(p, headChunk), len(chunks) > 0)

	// Each joint is parsed and judged by itself, on all cores; the results keep
	// their order.
	results := make([]jointResult, len(chunks)+len(whole))
	for i, f := range whole {
		results[i] = readJoint(s, h, f.node)
	}
	inParallel(len(chunks), func(i int) { results[len(whole)+i] = readChunk(s, h, chunks[i]) })
	var found []located
	for _, r := range results {
		found = append(found, r.joints...)
		p.all = append(p.all, r.problems...)
	}
	return found, p.all
}

// readHeader reads the keys at the top. Joints that split could not cut out are
// returned. What cannot be read of the defaults is not held against the joints.
func readHeader(d *decoder, top *node, cut bool) (header, []field) {
	unknown := &node{kind: mapping, partial: true}
	if top == nil {
		if len(d.all) == 0 {
			d.at(position{1, 1}, "the register is empty", "begin with assembly, revision and joints")
		}
		return header{defaults: unknown, library: unreadLibrary()}, nil
	}
	o := field{d, top, "the register", ""}.object("assembly", "revision", "prepared_by", "library", "defaults", "joints")
	h := header{revision: o.label("revision"), preparedBy: o.label("prepared_by"), library: &library{}}
	if o.require("assembly", "the machine the joints belong to") {
		h.assembly = o.at("assembly").label()
	}
	switch {
	case slices.Contains(d.unread, "library"): // most likely misspelt
		h.library = unreadLibrary()
	case o.stated("library"):
		h.library = readLibraries(o.at("library"))
	}
	switch {
	case slices.Contains(d.unread, "defaults"):
		h.defaults = unknown
	case o.stated("defaults"):
		h.defaults = readDefaults(o.at("defaults"))
	}
	if cut || !o.require("joints", "a list of joints") {
		return h, nil
	}
	joints := o.at("joints")
	whole := joints.items("joint")
	if joints.node.kind == list && len(whole) == 0 {
		joints.wrong("the register has no joints", "list at least one joint under joints")
	}
	return h, whole
}

// readDefaults returns the defaults that joints are laid over. Their unknown keys
// are noted in the words in which each joint will note them, and so shown once.
func readDefaults(f field) *node {
	if !f.is(mapping, "write it as {surfaces: Rz 16 um}") {
		return &node{kind: mapping, partial: true}
	}
	f.name = "the joint"
	f.object(jointKeys...)
	return f.node
}

// jointResult is what one chunk gives.
type jointResult struct {
	joints   []located
	problems []Problem
}

func readChunk(s *source, h header, c chunk) jointResult {
	p := &problems{source: s}
	items := parse(p, c)
	var result jointResult
	if items != nil && items.kind == list {
		for _, item := range items.items {
			r := readJoint(s, h, item)
			result.joints = append(result.joints, r.joints...)
			result.problems = append(result.problems, r.problems...)
		}
	}
	result.problems = append(p.all, result.problems...)
	return result
}

// readJoint reads one joint and judges it by the rules that rest on nothing
// unread.
func readJoint(s *source, h header, own *node) jointResult {
	d := &decoder{problems: &problems{source: s}, library: h.library}
	whole := field{d, own, "a joint", ""}
	if !whole.is(mapping, "write it as - id: A-010, with its other keys below") {
		return jointResult{problems: d.all}
	}
	n := mergeJoint(h.defaults, own)
	j := d.joint(n)
	j.Assembly, j.Revision, j.PreparedBy = h.assembly, h.revision, h.preparedBy
	for _, f := range j.Faults() {
		if d.judges(f) {
			d.at(locate(n, f.Path), f.Message, f.Mend)
		}
	}
	id := Problem{File: s.name}
	if v := n.get("id"); v != nil {
		id.Line, id.Column, id.Text = v.pos.line, v.pos.column, s.line(v.pos.line)
	}
	return jointResult{[]located{{j, id}}, d.all}
}

// locate finds the place of a path such as "clamped[1].hole"; where the path
// ends early, the place of what is there.
func locate(n *node, path string) position {
	pos := n.pos
	for _, step := range strings.Split(path, ".") {
		key, index, indexed := strings.Cut(strings.TrimSuffix(step, "]"), "[")
		if n = n.get(key); n == nil {
			return pos
		}
		pos = n.pos
		if !indexed {
			continue
		}
		i, err := strconv.Atoi(index)
		if err != nil || i >= len(n.items) {
			return pos
		}
		n = n.items[i]
		pos = n.pos
	}
	return pos
}

// inParallel calls do for 0..n-1 on all cores.
func inParallel(n int, do func(int)) {
	const block = 16 // joints a worker takes at a time
	next := make(chan int)
	var workers sync.WaitGroup
	for range min(runtime.GOMAXPROCS(0), n) {
		workers.Go(func() {
			for from := range next {
				for i := from; i < min(from+block, n); i++ {
					do(i)
				}
			}
		})
	}
	for from := 0; from < n; from += block {
		next <- from
	}
	close(next)
	workers.Wait()
}
