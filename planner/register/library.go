package register

import (
	"errors"
	"path/filepath"
	"slices"

	"clampback/planner/fastener"
	"clampback/planner/quantity"
)

// library is what a plant adds to the program's own tables: read from files beside
// the register, looked up first. A nil one is empty.
type library struct {
	materials map[string]fastener.Material
	classes   map[string]fastener.PropertyClass
	threads   map[string]fastener.Thread
	heads     map[sized]fastener.Head
	nuts      map[sized]fastener.Nut
	washers   map[sized]fastener.Washer
	names     map[string][]string // by kind, as the files have them
}

// sized is a part of one thread.
type sized struct{ name, thread string }

func newLibrary() *library {
	return &library{
		materials: map[string]fastener.Material{}, classes: map[string]fastener.PropertyClass{},
		threads: map[string]fastener.Thread{}, heads: map[sized]fastener.Head{}, nuts: map[sized]fastener.Nut{},
		washers: map[sized]fastener.Washer{}, names: map[string][]string{},
	}
}

// readLibraries reads the files that a register names: one, or a list of them.
func readLibraries(f field) *library {
	l := newLibrary()
	if f.node.kind != list {
		l.readFile(f)
		return l
	}
	for _, item := range f.items("library") {
		l.readFile(item)
	}
	return l
}

// readFile reads one file. Its problems stand with its own lines.
func (l *library) readFile(f field) {
	name := f.text()
	if name == "" {
		return
	}
	data, ok := f.open(name)
	if !ok {
		return
	}
	shown := name
	if !filepath.IsAbs(name) {
		shown = filepath.Join(filepath.Dir(f.d.source.name), name)
	}
	s, bad := guard(Source{Name: shown, Data: data})
	f.d.all = append(f.d.all, bad...)
	if len(bad) > 0 {
		f.lose()
		return
	}
	d := &decoder{problems: &problems{source: s}}
	if top := parse(d.problems, chunk{1, s.lines}); top != nil {
		l.read(field{d, top, "the library", ""}, filepath.Base(name))
	} else if len(d.all) == 0 {
		d.at(position{1, 1}, "the library is empty", "begin with materials, property_classes, threads, heads, nuts or washers")
	}
	if len(d.all) > 0 {
		f.lose()
		f.d.all = append(f.d.all, d.all...)
	}
}

// shelfEntry is one entry of a library while it is read.
type shelfEntry struct {
	*object
	name   string
	source string
}

// read reads the sections. Threads come first: parts name them.
func (l *library) read(f field, file string) {
	o := f.object("threads", "materials", "property_classes", "heads", "nuts", "washers")
	section := func(key, kind string, keys []string, read func(shelfEntry)) {
		if !o.stated(key) {
			return
		}
		for _, item := range o.at(key).items(kind) {
			e := shelfEntry{object: item.object(append([]string{"name", "source"}, keys...)...)}
			named, sourced := e.require("name", "WS-12"), e.require("source", "works standard 12")
			if named && sourced {
				e.name, e.source = e.at("name").label(), "library "+file+": "+e.at("source").label()
			}
			before := len(e.d.all)
			if read(e); e.name != "" && len(e.d.all) == before {
				l.names[kind] = append(l.names[kind], e.name)
			}
		}
	}
	section("threads", "thread", []string{"diameter", "pitch"}, l.readThread)
	f.d.libraryLost = len(f.d.all) > 0 // parts may name a thread that could not be read
	section("materials", "material", []string{"modulus", "bearing_pressure", "expansion", "shear_strength", "tensile_strength"}, l.readMaterial)
	section("property_classes", "property class", []string{"yield", "tensile", "shear_ratio", "modulus", "expansion"}, l.readClass)
	section("heads", "head", []string{"thread", "bearing_diameter", "height", "width_across_flats"}, l.readHead)
	section("nuts", "nut", []string{"thread", "bearing_diameter", "height", "width_across_flats"}, l.readNut)
	section("washers", "washer", []string{"thread", "inner_diameter", "outer_diameter", "thickness", "bearing_pressure", "modulus", "expansion"},
		l.readWasher)
}

// need returns the quantity of a key that must be there and above 0.
func (e shelfEntry) need(key, example string, dim quantity.Dimension) float64 {
	if !e.require(key, example) {
		return 0
	}
	v := e.at(key).some(dim)
	if v < 0 {
		e.at(key).wrong(key+" is negative", "state a value above 0, for example "+example)
	}
	return v
}

// free notes a name that is taken, by the file itself or by the program's tables.
func (e shelfEntry) free(kind string, twice, builtIn bool) bool {
	switch {
	case e.name == "":
		return false
	case twice:
		e.at("name").wrong("the "+kind+" "+e.name+" stands twice in the library", "give each a name of its own")
	case builtIn:
		e.at("name").wrong("the "+kind+" "+e.name+" is in the program's own table", "give yours another name")
	default:
		return true
	}
	return false
}

func (l *library) readThread(e shelfEntry) {
	t := fastener.Thread{
		Designation: e.name,
		Diameter:    e.need("diameter", "12 mm", quantity.Length),
		Pitch:       e.need("pitch", "1.25 mm", quantity.Length),
	}
	if t.Diameter > 0 && t.Pitch > 0 && t.MinorDiameter() < t.Diameter/2 {
		e.at("pitch").wrong("the pitch leaves no core of the thread", "state the pitch of an ISO profile, 60 deg, for example 1.25 mm")
	}
	_, twice := l.threads[e.name]
	_, err := fastener.ParseThread(e.name)
	if e.free("thread", twice, err == nil) {
		l.threads[e.name] = t
	}
}

func (l *library) readMaterial(e shelfEntry) {
	m := fastener.Material{
		Name:             e.name,
		Modulus:          e.need("modulus", "205 GPa", quantity.Pressure),
		LimitingPressure: e.need("bearing_pressure", "500 MPa", quantity.Pressure),
		Expansion:        e.need("expansion", "11.5 um/m/K", quantity.Expansion),
		ShearStrength:    e.some("shear_strength", quantity.Pressure),
		TensileStrength:  e.some("tensile_strength", quantity.Pressure),
		Source:           e.source,
	}
	_, twice := l.materials[e.name]
	_, err := fastener.FindMaterial(e.name)
	if e.free("material", twice, err == nil) {
		l.materials[e.name] = m
	}
}

func (l *library) readClass(e shelfEntry) {
	c := fastener.PropertyClass{
		Name:            e.name,
		YieldStrength:   e.need("yield", "900 MPa", quantity.Pressure),
		TensileStrength: e.need("tensile", "1000 MPa", quantity.Pressure),
		ShearRatio:      e.need("shear_ratio", "0.6", quantity.Ratio),
		Modulus:         e.need("modulus", "205 GPa", quantity.Pressure),
		Expansion:       e.need("expansion", "11.5 um/m/K", quantity.Expansion),
		Source:          e.source,
	}
	if c.YieldStrength > c.TensileStrength && c.TensileStrength > 0 {
		e.at("yield").wrong("the yield strength is above the tensile strength", "state both as the bolt's standard has them")
	}
	if c.ShearRatio > 1 {
		e.at("shear_ratio").wrong("the shear strength is above the tensile strength", "state tau_B over R_m, usually 0.6")
	}
	_, twice := l.classes[e.name]
	if e.free("property class", twice, knownClass(e.name)) {
		l.classes[e.name] = c
	}
}

// knownClass reports whether the program has a class of that name at some size.
func knownClass(name string) bool {
	for _, size := range []string{"M12", "1/2-13 UNC"} {
		t, err := fastener.ParseThread(size)
		if err != nil {
			continue
		}
		var unknown *fastener.UnknownError
		if _, err = fastener.FindClass(name, t); !errors.As(err, &unknown) {
			return true
		}
	}
	return false
}

// thread returns the thread that a part is for.
func (l *library) thread(e shelfEntry) fastener.Thread {
	if !e.require("thread", "M12") {
		return fastener.Thread{}
	}
	return lookUp(e.at("thread"), l.findThread)
}

func (l *library) readHead(e shelfEntry) {
	t := l.thread(e)
	h := fastener.Head{
		Kind: e.name, Standard: "(plant library)", Source: e.source,
		BearingDiameter:  e.need("bearing_diameter", "17.2 mm", quantity.Length),
		Height:           e.need("height", "8 mm", quantity.Length),
		WidthAcrossFlats: e.need("width_across_flats", "18 mm", quantity.Length),
	}
	key := sized{e.name, t.Designation}
	_, twice := l.heads[key]
	_, err := fastener.FindHead(e.name, t)
	if e.free("head", twice, err == nil || e.name == "stud") && t.Diameter > 0 {
		l.heads[key] = h
	}
}

func (l *library) readNut(e shelfEntry) {
	t := l.thread(e)
	n := fastener.Nut{
		Kind: e.name, Standard: "(plant library)", Source: e.source,
		BearingDiameter:  e.need("bearing_diameter", "17.2 mm", quantity.Length),
		Height:           e.need("height", "10 mm", quantity.Length),
		WidthAcrossFlats: e.need("width_across_flats", "18 mm", quantity.Length),
	}
	key := sized{e.name, t.Designation}
	_, twice := l.nuts[key]
	_, err := fastener.FindNut(e.name, t)
	if e.free("nut", twice, err == nil) && t.Diameter > 0 {
		l.nuts[key] = n
	}
}

func (l *library) readWasher(e shelfEntry) {
	t := l.thread(e)
	w := fastener.Washer{
		Standard: e.name, Source: e.source,
		InnerDiameter:    e.need("inner_diameter", "13 mm", quantity.Length),
		OuterDiameter:    e.need("outer_diameter", "24 mm", quantity.Length),
		Thickness:        e.need("thickness", "2.5 mm", quantity.Length),
		LimitingPressure: e.need("bearing_pressure", "760 MPa", quantity.Pressure),
		Modulus:          e.need("modulus", "205 GPa", quantity.Pressure),
		Expansion:        e.need("expansion", "11.5 um/m/K", quantity.Expansion),
	}
	if w.OuterDiameter > 0 && w.OuterDiameter <= w.InnerDiameter {
		e.at("outer_diameter").wrong("the washer is no wider than its hole", "state the outer diameter, for example 24 mm")
	}
	key := sized{e.name, t.Designation}
	_, twice := l.washers[key]
	_, err := fastener.FindWasher(e.name, t)
	if e.free("washer", twice, err == nil) && t.Diameter > 0 {
		l.washers[key] = w
	}
}

// The lookups try the library, then the program's tables; an unknown name lists both.

func (l *library) findThread(name string) (fastener.Thread, error) {
	return find(l, "thread", name, func(l *library) (fastener.Thread, bool) { v, ok := l.threads[name]; return v, ok },
		func() (fastener.Thread, error) { return fastener.ParseThread(name) })
}

func (l *library) findMaterial(name string) (fastener.Material, error) {
	return find(l, "material", name, func(l *library) (fastener.Material, bool) { v, ok := l.materials[name]; return v, ok },
		func() (fastener.Material, error) { return fastener.FindMaterial(name) })
}

func (l *library) findClass(name string, t fastener.Thread) (fastener.PropertyClass, error) {
	return find(l, "property class", name, func(l *library) (fastener.PropertyClass, bool) { v, ok := l.classes[name]; return v, ok },
		func() (fastener.PropertyClass, error) { return fastener.FindClass(name, t) })
}

func (l *library) findHead(name string, t fastener.Thread) (fastener.Head, error) {
	return find(l, "head", name, func(l *library) (fastener.Head, bool) { v, ok := l.heads[sized{name, t.Designation}]; return v, ok },
		func() (fastener.Head, error) { return fastener.FindHead(name, t) })
}

func (l *library) findNut(name string, t fastener.Thread) (fastener.Nut, error) {
	return find(l, "nut", name, func(l *library) (fastener.Nut, bool) { v, ok := l.nuts[sized{name, t.Designation}]; return v, ok },
		func() (fastener.Nut, error) { return fastener.FindNut(name, t) })
}

func (l *library) findWasher(name string, t fastener.Thread) (fastener.Washer, error) {
	return find(l, "washer", name, func(l *library) (fastener.Washer, bool) { v, ok := l.washers[sized{name, t.Designation}]; return v, ok },
		func() (fastener.Washer, error) { return fastener.FindWasher(name, t) })
}

func find[T any](l *library, kind, name string, own func(*library) (T, bool), tables func() (T, error)) (T, error) {
	if l == nil {
		return tables()
	}
	if v, found := own(l); found {
		return v, nil
	}
	v, err := tables()
	var unknown *fastener.UnknownError
	if errors.As(err, &unknown) {
		if slices.Contains(l.names[kind], name) {
			return v, errors.New("the library has the " + kind + " " + name + " for other threads only")
		}
		unknown.Known = append(slices.Clone(unknown.Known), l.names[kind]...)
	}
	return v, err
}
