package fastener

import (
	"sync"

	"clampback/planner/table"
)

type nutProof struct {
	class      string
	over, upTo float64 // mm
	stress     float64 // MPa
}

var nutProofs = sync.OnceValue(func() []nutProof {
	var all []nutProof
	for _, r := range table.Read(tables, "nut_proof.csv") {
		all = append(all, nutProof{r.Text("class"), r.Number("over_mm"), r.Number("up_to_mm"), r.Number("stress_MPa")})
	}
	return all
})

// NutProofStress returns the proof stress, MPa, of a nut of that class of ISO 898-2,
// style 1, on the stress area of its thread; false where the standard has none: fine
// and inch threads, other classes, above M39.
func NutProofStress(class string, t Thread) (float64, bool) {
	if !t.Coarse || t.Inch {
		return 0, false
	}
	for _, p := range nutProofs() {
		if p.class == class && p.over < t.Diameter && t.Diameter <= p.upTo {
			return p.stress, true
		}
	}
	return 0, false
}
