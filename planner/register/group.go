package register

import (
	"errors"
	"fmt"
	"path/filepath"
	"strings"

	"clampback/planner"
	"clampback/planner/group"
	"clampback/planner/pattern"
	"clampback/planner/quantity"
)

// readGroup reads the loads on the whole joint, which are shared out over the
// pattern, or the bolt forces that a finite-element run gave.
func readGroup(joint *object, j *planner.Joint) []group.Share {
	o := joint.at("group").object("loads", "forces")
	loads, forces := o.stated("loads"), o.stated("forces")
	switch {
	case loads && forces:
		o.at("forces").wrong("the group states both loads and forces", "keep one of them")
	case loads:
		return shareLoads(joint, j, o.at("loads"))
	case forces:
		return readForces(joint, j, o.at("forces"))
	case o.d.knows(o.path):
		o.wrong("the group states neither loads nor forces",
			"add loads: [{case: start-up, force: [0 kN, 0 kN, 40 kN]}], or forces: bolt-forces.csv")
	}
	return nil
}

// shareLoads reads load cases and shares them out over the pattern, unless the
// rules will refuse the pattern.
func shareLoads(joint *object, j *planner.Joint, f field) []group.Share {
	var loads []group.Load
	for _, item := range f.items("load case") {
		loads = append(loads, readCase(item))
	}
	d, points := joint.d, j.Pattern.Points
	if !joint.stated("pattern") && d.knows("pattern") {
		f.wrong("the loads of the group need to know where the bolts sit", "add pattern: {circle: 180 mm}")
	}
	noCircle := j.Pattern.Kind == pattern.Circle && j.Pattern.Diameter == 0
	if !d.knows("pattern") || !d.knows("count") || len(points) != j.Count || j.Count < 1 || noCircle {
		return nil
	}
	shares, err := group.Distribute(points, loads)
	var e *group.FaultsError
	if !errors.As(err, &e) {
		j.GroupLoads = loads
		return shares
	}
	noteFaults(joint, e.Faults)
	return nil
}

// noteFaults gives what is wrong with loads and positions their place.
func noteFaults(joint *object, faults []group.Fault) {
	var last position // of a fault of the pattern: where it has no list of points, one says enough
	for _, fault := range faults {
		path, ofPattern := "group."+fault.Path, strings.HasPrefix(fault.Path, "points")
		if ofPattern {
			path = "pattern." + fault.Path
		}
		pos := locate(joint.node, path)
		if !joint.d.knows(path) || ofPattern && pos == last {
			continue
		}
		joint.d.at(pos, fault.Message, fault.Mend)
		if ofPattern {
			last = pos
		}
	}
	if last != (position{}) {
		joint.miss("pattern") // what else is wrong with it follows from that
	}
	joint.miss("group")
}

// readCase reads one load case; moment and point of action may be left out.
func readCase(f field) group.Load {
	o := f.object("case", "force", "moment", "at")
	var l group.Load
	if o.require("case", "start-up") {
		l.Name = o.at("case").label()
	}
	if o.require("force", vectorExamples[quantity.Force]) {
		l.Force = readVector(o.at("force"), quantity.Force)
	}
	if o.stated("moment") {
		l.Moment = readVector(o.at("moment"), quantity.Torque)
	}
	if o.stated("at") {
		l.At = readVector(o.at("at"), quantity.Length)
	}
	return l
}

var vectorExamples = map[quantity.Dimension]string{
	quantity.Force:  "[0 kN, 0 kN, 40 kN]",
	quantity.Torque: "[0 N.m, 1200 N.m, 0 N.m]",
	quantity.Length: "[0 mm, 0 mm, 150 mm]",
}

// readVector reads three quantities: along x, y and z.
func readVector(f field, dim quantity.Dimension) group.Vector {
	mend := "write it as " + vectorExamples[dim] + ", along x, y and z"
	if !f.is(list, mend) {
		return group.Vector{}
	}
	items := f.items(f.name)
	if len(items) != 3 {
		f.wrong(fmt.Sprintf("%s has %d values, but three belong here", f.name, len(items)), mend)
		return group.Vector{}
	}
	var v group.Vector
	for i, value := range []*float64{&v.X, &v.Y, &v.Z} {
		items[i].name = f.name + " " + "xyz"[i:i+1]
		*value = items[i].quantity(dim)
	}
	return v
}

// readForces reads a table of bolt forces beside the register, which must hold
// those of every bolt.
func readForces(joint *object, j *planner.Joint, f field) []group.Share {
	name := f.text()
	if name == "" {
		return nil
	}
	data, ok := f.open(name)
	if !ok {
		return nil
	}
	name = f.beside(name)
	shares, err := group.ReadCSV(name, data)
	var e *group.ProblemsError
	if errors.As(err, &e) {
		for _, p := range e.Problems {
			f.d.all = append(f.d.all, Problem{e.File, p.Line, p.Column, p.Text, p.Message, p.Mend})
		}
		f.lose()
		return nil
	}
	if !joint.d.knows("count") || j.Count < 1 {
		return nil
	}
	bolts, missing := boltsOf(shares)
	switch last := shares[bolts-1].Bolt; {
	case last > j.Count:
		f.wrong(fmt.Sprintf("forces: %s has forces of bolt %d, but the joint has %d bolts", name, last, j.Count),
			"make count and the table agree: bolts are numbered from 1 to count")
	case bolts < j.Count:
		f.wrong(fmt.Sprintf("forces: %s has forces of %d bolts, but the joint has %d: those of bolt %d are missing", name,
			bolts, j.Count, missing), "add the rows of every bolt; of a symmetric model, those of the mirrored ones too")
	default:
		return shares
	}
	return nil
}

// boltsOf counts the bolts of a table and returns the first number from 1 that it
// lacks. Every case has the same bolts, in ascending order.
func boltsOf(shares []group.Share) (bolts, missing int) {
	missing = 1
	for bolts < len(shares) && shares[bolts].Case == shares[0].Case {
		if shares[bolts].Bolt == missing {
			missing++
		}
		bolts++
	}
	return bolts, missing
}

// beside returns the name of a file that the register names as messages print it.
func (f field) beside(name string) string {
	if filepath.IsAbs(name) {
		return name
	}
	return filepath.Join(filepath.Dir(f.d.source.name), name)
}

// open reads a file that the value names, and notes why it cannot.
func (f field) open(name string) ([]byte, bool) {
	if f.d.source.open == nil {
		f.wrong(fmt.Sprintf("%s: this register has no folder from which to read %s", f.name, name),
			"save the register as a file and name it on the command line")
		return nil, false
	}
	data, err := f.d.source.open(name)
	if err != nil {
		f.wrong(fmt.Sprintf("%s: %v", f.name, err),
			"check the name, which counts from the register's folder, and that it is a file that you may read")
		return nil, false
	}
	return data, true
}
