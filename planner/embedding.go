package planner

import (
	"embed"
	"sync"

	"clampback/planner/table"
)

//go:embed *.csv
var tables embed.FS

// embeddingGuide is one row of the guideline's Table 5: the embedding of each
// kind of interface, um.
type embeddingGuide struct {
	load           string  // "axial" or "shear"
	roughnessFrom  float64 // Rz, um
	thread         float64
	bearingFace    float64
	innerInterface float64
}

var embeddingGuides = sync.OnceValue(func() []embeddingGuide {
	var rows []embeddingGuide
	for _, r := range table.Read(tables, "embedding.csv") {
		rows = append(rows, embeddingGuide{
			load:           r.Text("load"),
			roughnessFrom:  r.Number("rz_from"),
			thread:         r.Number("thread"),
			bearingFace:    r.Number("bearing_face"),
			innerInterface: r.Number("inner_interface"),
		})
	}
	return rows
})

// MaxRoughness is the Rz at which Table 5 ends, mm.
const MaxRoughness = 0.160

// findEmbedding returns the row for a load direction and a roughness Rz in mm
// below MaxRoughness: the last that begins at or below it.
func findEmbedding(load string, roughness float64) embeddingGuide {
	var found embeddingGuide
	for _, g := range embeddingGuides() {
		if g.load == load && roughness*1000 >= g.roughnessFrom {
			found = g
		}
	}
	return found
}
