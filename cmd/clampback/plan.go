package main

import (
	"github.com/spf13/cobra"

	"clampback/planner"
	"clampback/report"
)

func newPlan() *cobra.Command {
	var format string
	var trace bool
	c := &cobra.Command{
		Use:   "plan FILE...",
		Short: "Work joints back and print requirement, losses, window and target",
		Long: `Plan every joint of the registers and print the work-back: what must remain in
service, what is lost on the way, the preload and torque window, the target,
what binds, the checks and the assumptions.`,
		Example: `  clampback plan pump.yaml
  clampback plan --trace pump.yaml
  clampback plan --format json pump.yaml gearbox.yaml > plan.json`,
		Args: cobra.MinimumNArgs(1),
		RunE: func(c *cobra.Command, files []string) error {
			if format != "text" && format != "json" {
				return mendable("write --format text or --format json", "unknown format %q", format)
			}
			joints, err := readJoints(c, files)
			if err != nil {
				return err
			}
			feasible := true
			plans := func(yield func(planner.Plan, error) bool) {
				for p, err := range planEach(c, joints) {
					feasible = feasible && p.Feasible
					if !yield(p, err) {
						return
					}
				}
			}
			out := stoppable{c.Context(), c.OutOrStdout()}
			if format == "json" {
				h := planner.Headings(joints)
				err = report.WriteJSON(out, h.Assembly, h.Revision, plans)
			} else {
				err = report.WriteText(out, plans, report.TextOptions{Trace: trace, Colour: useColour(c.OutOrStdout())})
			}
			if err == nil && !feasible {
				return errInfeasible
			}
			return err
		},
	}
	c.Flags().StringVar(&format, "format", "text", `"text" to read, "json" for the plan record`)
	c.Flags().BoolVar(&trace, "trace", false, "print every line of the calculation with its source")
	return c
}
