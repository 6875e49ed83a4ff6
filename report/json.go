package report

import (
	"encoding/json"
	"io"

	"clampback/planner"
)

// WriteJSON writes the plan record of all joints as one JSON object.
func WriteJSON(w io.Writer, plans []planner.Plan) error {
	encoder := json.NewEncoder(w)
	encoder.SetEscapeHTML(false)
	encoder.SetIndent("", "  ")
	return encoder.Encode(planner.NewRecord(plans))
}
