// Package fastener holds what a catalogue of fasteners and materials knows:
// ISO metric threads, heads, nuts, washers, clearance holes, property classes
// and the materials of clamped parts. Its tables are embedded CSV files with a
// source column; what a standard computes (thread geometry) is computed.
//
// In: a designation as the trade writes it ("M12x1.25", "hexagon flange",
// "10.9", "EN-GJL-250"). Out: plain dimensions in mm, N and MPa. It never
// guesses: an unknown designation is a table.UnknownError that lists what is known.
//
// A record that is Own comes from a user's own library and not from these tables:
// only what it states is known of it, however its name reads.
package fastener

import "strings"

// Head is a bolt head of one size, from its product standard.
type Head struct {
	Kind             string  // "hexagon", "hexagon flange", "socket cap"
	Standard         string  // product standard, for example "ISO 4014"
	BearingDiameter  float64 // d_W, mm: smallest outer diameter of the bearing face
	Height           float64 // k, mm, nominal
	WidthAcrossFlats float64 // s, mm: spanner size, or hexagon key size of a socket cap head
	Source           string  // table and mark of the row

	Own bool // of a user's own library
}

// Nut is a nut of one size, from its product standard.
type Nut struct {
	Kind             string  // "hexagon", "hexagon flange"
	Standard         string  // product standard, for example "ISO 4032"
	BearingDiameter  float64 // d_W, mm: smallest outer diameter of the bearing face
	Height           float64 // m, mm: least height (m min), so the thread that is surely there
	WidthAcrossFlats float64 // s, mm
	Source           string

	Own bool // of a user's own library
}

// Washer is a plain washer of one size, from its product standard.
type Washer struct {
	Standard         string  // "ISO 7089"
	InnerDiameter    float64 // d1, mm
	OuterDiameter    float64 // d2, mm
	Thickness        float64 // h, mm
	HardnessHV       float64 // hardness class
	LimitingPressure float64 // p_G, MPa, of the washer's own steel
	Modulus          float64 // E, MPa
	Expansion        float64 // alpha, 1/K
	Source           string

	Own bool // of a user's own library
}

// PropertyClass is the strength of a bolt, ISO 898-1, at one thread size.
type PropertyClass struct {
	Name            string  // "8.8"
	TensileStrength float64 // R_m min, MPa
	YieldStrength   float64 // R_p0.2 min (R_eL where the class has one), MPa
	ProofStress     float64 // S_p, MPa
	ShearRatio      float64 // tau_B/R_m, VDI 2230-1
	Modulus         float64 // E_S, MPa
	Expansion       float64 // alpha_S, 1/K
	Source          string

	Own bool // of a user's own library
}

// Material is the material of a clamped or tapped part.
type Material struct {
	Name             string
	Modulus          float64 // E, MPa
	LimitingPressure float64 // p_G, MPa; 0: not known
	Expansion        float64 // alpha, 1/K
	ShearStrength    float64 // tau_B, MPa; 0: not known
	TensileStrength  float64 // R_m min, MPa; 0: not known
	Source           string

	Own bool // of a user's own library
}

// NutClass returns the least nut class that belongs to the bolt's: its figure before
// the dot, ISO 898-2; the same class of stainless steel, ISO 3506-2; the same grade,
// SAE J995; what ASTM A193 and A320 recommend. Of a user's own class, that of the
// bolts of ISO 898-1 which are at least as strong, "" where there are none. From memory
// but for ISO 898-2.
func (c PropertyClass) NutClass() string {
	if c.Own {
		return nutClassOf(c.TensileStrength)
	}
	switch {
	case strings.HasPrefix(c.Name, "A2-"), strings.HasPrefix(c.Name, "A4-"), strings.HasPrefix(c.Name, "SAE"):
		return c.Name
	case strings.Contains(c.Name, "B8M"):
		return "ASTM A194 8M"
	case strings.Contains(c.Name, "B8"):
		return "ASTM A194 8"
	case strings.Contains(c.Name, "B7M"), strings.Contains(c.Name, "L7M"):
		return "ASTM A194 2HM"
	case strings.HasPrefix(c.Name, "A193"):
		return "ASTM A194 2H"
	case strings.HasPrefix(c.Name, "A320"):
		return "ASTM A194 7"
	case c.Name == "A574":
		return "SAE grade 8"
	}
	class, _, _ := strings.Cut(c.Name, ".")
	return class
}

// nutClassOf returns the least nut class for bolts of that R_m, MPa.
func nutClassOf(tensileStrength float64) string {
	for _, n := range nutClasses {
		if tensileStrength <= n.tensileStrength {
			return n.name
		}
	}
	return ""
}

// nutClasses are the nut classes with the greatest R_m min, MPa, of the bolts of
// ISO 898-1 Table 3 that each goes with by ISO 898-2.
var nutClasses = []struct {
	name            string
	tensileStrength float64
}{{"5", 520}, {"6", 600}, {"8", 830}, {"10", 1040}, {"12", 1220}}
