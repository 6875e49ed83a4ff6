package planner

import (
	"strings"
	"sync"

	"clampback/planner/table"
)

// softensFrom is the temperature, degC, up to which moduli are taken as at room
// temperature: they fall by some 3 % to there, less than they are known to.
const softensFrom = 100.0

// curve is a property over temperature, as a share of its value at room temperature.
type curve struct {
	source string
	points []curvePoint // ascending in temperature
}

type curvePoint struct {
	temperature float64 // degC
	ratio       float64
}

// at returns the share at a temperature, degC; false beyond the data. Below the first
// point the property is taken as there.
func (c curve) at(temperature float64) (float64, bool) {
	if len(c.points) == 0 || temperature > c.points[len(c.points)-1].temperature {
		return 0, false
	}
	before := c.points[0]
	if temperature <= before.temperature {
		return before.ratio, true
	}
	for _, p := range c.points[1:] {
		if temperature <= p.temperature {
			share := (temperature - before.temperature) / (p.temperature - before.temperature)
			return before.ratio + share*(p.ratio-before.ratio), true
		}
		before = p
	}
	return before.ratio, true
}

// hotTables are the curves of hot.csv and who goes by them.
type hotTables struct {
	curves map[string]curve // by property and name: "modulus/cast iron"
	groups []hotGroup
}

type hotGroup struct {
	kind, prefix string
	curves       map[string]string // property -> name
}

var hot = sync.OnceValue(func() hotTables {
	t := hotTables{curves: map[string]curve{}}
	for _, r := range table.Read(tables, "hot.csv") {
		key := r.Text("property") + "/" + r.Text("of")
		c := t.curves[key]
		c.source = r.Text("source")
		c.points = append(c.points, curvePoint{r.Number("temperature_degC"), r.Number("ratio")})
		t.curves[key] = c
	}
	for _, r := range table.Read(tables, "hot_groups.csv") {
		t.groups = append(t.groups, hotGroup{r.Text("kind"), r.Text("prefix"),
			map[string]string{"modulus": r.Text("modulus"), "yield": r.Text("yield")}})
	}
	return t
})

// hotCurve returns the curve that a material or property class goes by; an empty one
// when nothing is known of it.
func hotCurve(property, kind, name string) curve {
	var found hotGroup
	for _, g := range hot().groups {
		if g.kind == kind && strings.HasPrefix(name, g.prefix) && len(g.prefix) > len(found.prefix) {
			found = g
		}
	}
	return hot().curves[property+"/"+found.curves[property]]
}

// curveName is the name by which a curve is sought: none of a user's own material or
// class, whose name may begin like another's.
func curveName(name string, own bool) string {
	if own {
		return ""
	}
	return name
}

// boltSoftness returns E at room temperature over E_S at a temperature of the bolt.
func (j Joint) boltSoftness(temperature float64) (softness float64, source string, known bool) {
	return softnessOf(j.Bolt.Class.Modulus, j.Bolt.HotModulus, hotCurve("modulus", "class", curveName(j.Bolt.Class.Name, j.Bolt.Class.Own)), temperature)
}

// layerSoftness is boltSoftness for a clamped layer.
func layerSoftness(l layer, temperature float64) (softness float64, source string, known bool) {
	return softnessOf(l.modulus, l.hotModulus, hotCurve("modulus", "material", l.material), temperature)
}

func softnessOf(cold, hotModulus float64, c curve, temperature float64) (softness float64, source string, known bool) {
	if temperature <= softensFrom {
		return 1, "as at room temperature up to 100 degC", true
	}
	if hotModulus > 0 {
		return cold / hotModulus, stated, true
	}
	ratio, known := c.at(temperature)
	if !known {
		return 1, "", false
	}
	return 1 / ratio, c.source, true
}

// hotYield returns the share of the bolt's yield strength that is left at a
// temperature.
func (j Joint) hotYield(temperature float64) (ratio float64, source string, known bool) {
	if temperature <= roomTemperature {
		return 1, "", true
	}
	if j.Bolt.HotYield > 0 {
		return j.Bolt.HotYield / j.Bolt.Class.YieldStrength, stated, true
	}
	c := hotCurve("yield", "class", curveName(j.Bolt.Class.Name, j.Bolt.Class.Own))
	ratio, known = c.at(temperature)
	if !known && temperature <= softensFrom {
		return 1, "not known, as at room temperature up to 100 degC", true
	}
	return ratio, c.source, known
}

// states returns the states of service: as stated, or the ends of the range that bolt
// and parts share.
func (t Temperature) states() []ThermalState {
	if len(t.States) > 0 {
		return t.States
	}
	return []ThermalState{
		{"lowest temperature", t.Service.Low, t.Service.Low}, {"highest temperature", t.Service.High, t.Service.High},
	}
}

// softens reports whether moduli fall in service.
func (t Temperature) softens() bool {
	for _, s := range t.states() {
		if s.Bolt > softensFrom || s.Parts > softensFrom {
			return true
		}
	}
	return false
}
