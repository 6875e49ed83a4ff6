package planner

import "clampback/planner/fastener"

// nuts judges what is stated of nuts besides their size.
func (v *validator) nuts(j Joint) {
	v.positiveOrNone(j.NutShear, pressures, at("nut.shear_strength"), "the shear strength of the nut", "state it, for example 450 MPa")
	v.require(j.LockNut == nil || j.Nut != nil, at("nut.lock", "nut"), "state a nut, or leave the lock nut out",
		"a lock nut is stated, but there is no nut")
	v.require(j.LockNut == nil || j.HeadNut == nil, at("nut.lock", "bolt.head"), "state a bolt with a head, or leave the lock nut out",
		"a lock nut on a stud is not planned")
	for _, n := range []*fastener.Nut{j.Nut, j.HeadNut} {
		v.require(n == nil || n.Kind != "hexagon thin", at("nut"), "state nut: {kind: hexagon, lock: hexagon thin}, or another nut",
			"a thin nut alone does not carry the bolt: its thread strips first (ISO 4035)")
	}
	for _, nut := range []struct {
		stated bool
		size   float64
	}{{j.HeadNut != nil, heightOf(j.HeadNut)}, {j.LockNut != nil, heightOf(j.LockNut)}} {
		v.require(!nut.stated || nut.size > 0, at("nut", "bolt.thread"), "state the nut, for example hexagon",
			"the nut has no height or no bearing face")
	}
}

// tapped judges a boss and an insert.
func (v *validator) tapped(j Joint) {
	t := j.Tapped
	if t.OuterDiameter != 0 {
		v.require(t.OuterDiameter >= 1.4*j.Bolt.Thread.Diameter && t.OuterDiameter <= lengths.most, at("tapped.outer_diameter", "bolt.thread"),
			"state a boss of 1.4 times the thread or more: thinner ones are not covered by the method",
			"the tapped part is %s wide around a thread of %s", mm(t.OuterDiameter), mm(j.Bolt.Thread.Diameter))
	}
	if t.Insert == nil {
		return
	}
	v.positive(t.Insert.PullOut, forces, at("tapped.insert.pull_out"), "the pull-out strength of the insert", "state it as the maker gives it")
	v.positive(t.Insert.Length, lengths, at("tapped.insert.length"), "the length of the insert", "state it as the maker gives it")
	v.require(t.Insert.Length <= t.Depth || !(t.Depth > 0), at("tapped.insert.length", "tapped.depth"), "state a deeper thread or a shorter insert",
		"the insert of %s is longer than the thread of %s is deep", mm(t.Insert.Length), mm(t.Depth))
}
