package report

import (
	"bufio"
	"bytes"
	"encoding/json"
	"fmt"
	"io"
	"iter"

	"clampback/planner"
)

// WriteJSON writes the plan record of a register as one JSON object: its
// headings, then each joint as it comes, so that memory does not grow with the
// register. The error is the writer's or the first of the plans.
func WriteJSON(w io.Writer, assembly, revision string, plans iter.Seq2[planner.Plan, error]) error {
	out := bufio.NewWriter(w)
	heading, err := indented(struct {
		Assembly string `json:"assembly"`
		Revision string `json:"revision"`
	}{assembly, revision})
	if err != nil {
		return err
	}
	// The heading's closing brace comes after the joints.
	fmt.Fprintf(out, "%s,\n \"joints\": [", bytes.TrimSuffix(heading, []byte("\n}\n")))
	separator := ""
	for plan, err := range plans {
		if err != nil {
			return err
		}
		record, err := indented(plan)
		if err != nil {
			return fmt.Errorf("joint %s: %w", plan.ID, err)
		}
		fmt.Fprintf(out, "%s\n%s", separator, bytes.TrimSuffix(record, []byte("\n")))
		separator = ","
	}
	fmt.Fprint(out, "\n ]\n}\n")
	return out.Flush()
}

// indented returns a value as JSON that a person can read too.
func indented(v any) ([]byte, error) {
	var b bytes.Buffer
	encoder := json.NewEncoder(&b)
	encoder.SetEscapeHTML(false)
	encoder.SetIndent("", " ")
	err := encoder.Encode(v)
	return b.Bytes(), err
}
