package main

import (
	"bufio"

	"github.com/spf13/cobra"

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
			plans, err := planFiles(c, files)
			if err != nil {
				return err
			}
			out := bufio.NewWriter(stoppable{c.Context(), c.OutOrStdout()})
			if format == "json" {
				err = report.WriteJSON(out, plans)
			} else {
				err = report.WriteText(out, plans, report.TextOptions{Trace: trace, Colour: useColour(c.OutOrStdout())})
			}
			if err != nil {
				return err
			}
			if err := out.Flush(); err != nil {
				return err
			}
			return verdict(plans)
		},
	}
	c.Flags().StringVar(&format, "format", "text", `"text" to read, "json" for the plan record`)
	c.Flags().BoolVar(&trace, "trace", false, "print every line of the calculation with its source")
	return c
}
