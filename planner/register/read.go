package register

import (
	"fmt"
	"runtime"
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
		all = append(all, sorted(problems)...)
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
}

func readSource(in Source) ([]located, []Problem) {
	s, bad := guard(in)
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
	top := parse(p, headChunk)
	if top == nil {
		if len(p.all) == 0 {
			p.at(position{1, 1}, "the register is empty", "begin with assembly, revision and joints")
		}
		return nil, p.all
	}
	h, whole := readHeader(&decoder{p}, top, len(chunks) > 0)

	// Each joint is parsed and judged by itself, on all cores; the results keep
	// their order.
	results := make([]jointResult, len(chunks)+len(whole))
	for i, n := range whole {
		results[i] = readJoint(s, h, n, len(p.all) == 0)
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
// returned as nodes.
func readHeader(d *decoder, top *node, cut bool) (header, []*node) {
	o := d.object(top, "the register", "assembly", "revision", "prepared_by", "defaults", "joints")
	h := header{revision: o.label("revision"), preparedBy: o.label("prepared_by"), defaults: o.node.get("defaults")}
	if o.require("assembly", "the machine the joints belong to") {
		h.assembly = o.label("assembly")
	}
	if h.defaults != nil {
		d.object(h.defaults, "defaults", jointKeys...)
	}
	if cut || !o.require("joints", "a list of joints") {
		return h, nil
	}
	whole := d.list(o.node.get("joints"), "joints")
	if len(whole) == 0 {
		d.at(o.node.get("joints").pos, "the register has no joints", "list at least one joint under joints")
	}
	return h, whole
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
			r := readJoint(s, h, item, len(p.all) == 0)
			result.joints = append(result.joints, r.joints...)
			result.problems = append(result.problems, r.problems...)
		}
	}
	result.problems = append(p.all, result.problems...)
	return result
}

// readJoint reads one joint. Its faults are judged only when it reads well and
// its text was whole, else they would mislead.
func readJoint(s *source, h header, own *node, whole bool) jointResult {
	d := &decoder{&problems{source: s}}
	if own.kind != mapping {
		d.at(own.pos, fmt.Sprintf("a joint is %s, but a mapping belongs here", own.kind),
			"write it as - id: A-010, with its other keys below")
		return jointResult{problems: d.all}
	}
	n := merge(h.defaults, own)
	j := d.joint(n)
	j.Assembly, j.Revision, j.PreparedBy = h.assembly, h.revision, h.preparedBy
	if whole && len(d.all) == 0 {
		for _, f := range j.Faults() {
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
