package main

import (
	"fmt"
	"io"
	"strings"

	"github.com/spf13/cobra"

	"clampback/planner"
	"clampback/report/card"
)

// cardFlags are the flags of the card command.
type cardFlags struct {
	out            string
	together       string
	paper          string
	withDiagram    bool
	showInfeasible bool
}

func newCard() *cobra.Command {
	var f cardFlags
	c := &cobra.Command{
		Use:   "card FILE... --out DIR",
		Short: "Write a torque card for each joint",
		Long: `Write a PDF card for each joint: what to tighten, tool and setting, steps, order,
what is not OK and what to do then. An infeasible joint gets no card.`,
		Example: `  clampback card pump.yaml --out cards
  clampback card pump.yaml --together pump.pdf --paper A4 --with-diagram`,
		Args: cobra.MinimumNArgs(1),
		RunE: func(c *cobra.Command, files []string) error {
			if f.out == "" && f.together == "" {
				return mendable("write --out DIR or --together FILE.pdf", "nowhere to write the cards to")
			}
			paper, err := card.ParsePaper(f.paper)
			if err != nil {
				return mendable("write --paper A4, A5 or letter", "%w", err)
			}
			plans, err := planFiles(c, files)
			if err != nil {
				return err
			}
			options := card.Options{Paper: paper, WithDiagram: f.withDiagram, ShowInfeasible: f.showInfeasible}
			return writeCards(c, files, plans, f, options)
		},
	}
	c.Flags().StringVar(&f.out, "out", "", "folder for one PDF a joint")
	c.Flags().StringVar(&f.together, "together", "", "one PDF for all joints, with bookmarks")
	c.Flags().StringVar(&f.paper, "paper", "A5", "A4, A5 or letter")
	c.Flags().BoolVar(&f.withDiagram, "with-diagram", false, "add a calculation page with the joint diagram")
	c.Flags().BoolVar(&f.showInfeasible, "show-infeasible", false,
		"write a page that forbids tightening for an infeasible joint")
	return c
}

func writeCards(c *cobra.Command, files []string, plans []planner.Plan, f cardFlags, options card.Options) error {
	shown := plans
	if !options.ShowInfeasible {
		shown = feasibleOnly(c.ErrOrStderr(), plans)
	}
	if len(shown) > 0 && f.out != "" {
		if err := writeSeparate(c, shown, f.out, options); err != nil {
			return err
		}
	}
	if len(shown) > 0 && f.together != "" {
		err := writeFile(c.Context(), f.together, files, func(w io.Writer) error {
			return card.WriteTogether(w, shown, options)
		})
		if err != nil {
			return err
		}
		fmt.Fprintf(c.ErrOrStderr(), "%s: %d cards\n", f.together, len(shown))
	}
	return verdict(plans)
}

// feasibleOnly returns the joints that get a card and says which get none.
func feasibleOnly(w io.Writer, plans []planner.Plan) []planner.Plan {
	var feasible []planner.Plan
	for _, p := range plans {
		if p.Feasible {
			feasible = append(feasible, p)
			continue
		}
		fmt.Fprintf(w, "%s: no card, the joint is infeasible: %s\n", p.ID, strings.Join(p.Binds, "; "))
	}
	return feasible
}

// writeSeparate writes one document a joint, all or none.
func writeSeparate(c *cobra.Command, plans []planner.Plan, dir string, options card.Options) error {
	taken := map[string]string{} // file name without case -> id
	for _, p := range plans {
		name := strings.ToLower(p.ID)
		if other, ok := taken[name]; ok {
			return mendable("give one of them another id",
				"joints %s and %s differ only in case and would share a file", other, p.ID)
		}
		taken[name] = p.ID
	}
	b, err := newBatch(c.Context(), dir)
	if err != nil {
		return err
	}
	defer b.Close()
	bar := newProgress(c.ErrOrStderr(), len(plans), "cards")
	defer bar.done()
	for _, p := range plans {
		err := b.Write(p.ID+".pdf", func(w io.Writer) error { return card.Write(w, p, options) })
		if err != nil {
			return err
		}
		bar.step()
	}
	if err := b.Commit(); err != nil {
		return err
	}
	fmt.Fprintf(c.ErrOrStderr(), "%s: %d cards\n", dir, len(plans))
	return nil
}
