package main

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"path/filepath"
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
			if f.together != "" && !strings.HasSuffix(strings.ToLower(f.together), ".pdf") {
				return mendable("write --together FILE.pdf", "%q is no name of a PDF", f.together)
			}
			if f.out != "" && f.together != "" && filepath.Dir(f.together) == filepath.Clean(f.out) {
				return mendable("name another folder for one of them", "%q lies in the folder of the single cards", f.together)
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
	c.Flags().BoolVar(&f.withDiagram, "with-diagram", false, "add calculation pages with the joint diagram and, of a cyclic load, the fatigue diagrams")
	c.Flags().BoolVar(&f.showInfeasible, "show-infeasible", false,
		"write a page that forbids tightening for an infeasible joint")
	return c
}

func writeCards(c *cobra.Command, files []string, plans []planner.Plan, f cardFlags, options card.Options) error {
	shown, refused := plans, []planner.Plan(nil)
	if !options.ShowInfeasible {
		shown, refused = feasibleOnly(c.ErrOrStderr(), plans)
	}
	if f.out != "" {
		if err := writeSeparate(c, shown, refused, f.out, options); err != nil {
			return err
		}
	}
	if f.together != "" {
		if err := writeOne(c, files, shown, f.together, options); err != nil {
			return err
		}
	}
	return verdict(plans)
}

// feasibleOnly returns the joints that get a card and those that get none, which
// it names.
func feasibleOnly(w io.Writer, plans []planner.Plan) (feasible, infeasible []planner.Plan) {
	for _, p := range plans {
		if p.Feasible {
			feasible = append(feasible, p)
			continue
		}
		infeasible = append(infeasible, p)
		fmt.Fprintf(w, "%s: no card, the joint is infeasible: %s\n", p.ID, strings.Join(p.Binds, "; "))
	}
	return feasible, infeasible
}

// writeOne writes one document for all joints. Where no joint is left to show, an
// older document goes: its cards are no longer true.
func writeOne(c *cobra.Command, files []string, plans []planner.Plan, path string, options card.Options) error {
	if len(plans) == 0 {
		removed, err := removeFile(c.Context(), path, files)
		if err == nil && removed {
			fmt.Fprintf(c.ErrOrStderr(), "%s: removed, no joint has a card any more\n", path)
		}
		return err
	}
	err := writeFile(c.Context(), path, files, func(w io.Writer) error {
		return card.WriteTogether(w, plans, options)
	})
	if err == nil {
		fmt.Fprintf(c.ErrOrStderr(), "%s: %d cards\n", path, len(plans))
	}
	return err
}

// writeSeparate writes one document a joint, all or none. The card of a joint that
// gets none any more goes with them: nobody may work by it.
func writeSeparate(c *cobra.Command, plans, refused []planner.Plan, dir string, options card.Options) error {
	if err := distinctFiles(plans); err != nil {
		return err
	}
	if _, err := os.Stat(dir); len(plans) == 0 && errors.Is(err, fs.ErrNotExist) {
		return nil // nothing to write, nothing to take away
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
	var removed []string
	for _, p := range refused {
		if b.Remove(p.ID + ".pdf") {
			removed = append(removed, p.ID+".pdf")
		}
	}
	if err := b.Commit(); err != nil {
		return err
	}
	for _, name := range removed {
		fmt.Fprintf(c.ErrOrStderr(), "%s: removed, the joint has no card any more\n", filepath.Join(dir, name))
	}
	fmt.Fprintf(c.ErrOrStderr(), "%s: %d cards\n", dir, len(plans))
	return nil
}

// distinctFiles refuses ids that share a file where case does not distinguish.
func distinctFiles(plans []planner.Plan) error {
	taken := map[string]string{} // file name without case -> id
	for _, p := range plans {
		name := strings.ToLower(p.ID)
		if other, ok := taken[name]; ok {
			return mendable("give one of them another id",
				"joints %s and %s differ only in case and would share a file", other, p.ID)
		}
		taken[name] = p.ID
	}
	return nil
}
