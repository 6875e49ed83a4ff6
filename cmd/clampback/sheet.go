package main

import (
	"fmt"
	"io"
	"strings"

	"github.com/spf13/cobra"

	"clampback/report/sheet"
)

func newSheet() *cobra.Command {
	var out string
	c := &cobra.Command{
		Use:   "sheet FILE... --out BOOK.xlsx",
		Short: "Write the audit workbook with live formulas",
		Long: `Write a workbook for audits: a register with one row a joint, and for each joint
a calculation sheet whose formulas are live from inputs to torque.`,
		Example: `  clampback sheet pump.yaml --out pump.xlsx`,
		Args:    cobra.MinimumNArgs(1),
		RunE: func(c *cobra.Command, files []string) error {
			if !strings.HasSuffix(strings.ToLower(out), ".xlsx") {
				return mendable("write --out BOOK.xlsx", "%q is no name of a workbook", out)
			}
			plans, err := planFiles(c, files)
			if err != nil {
				return err
			}
			err = writeFile(c.Context(), out, files, func(w io.Writer) error {
				return sheet.Write(w, plans, sheet.Options{})
			})
			if err != nil {
				return err
			}
			fmt.Fprintf(c.ErrOrStderr(), "%s: %d joints\n", out, len(plans))
			return verdict(plans)
		},
	}
	c.Flags().StringVar(&out, "out", "", "workbook to write (required)")
	cobra.CheckErr(c.MarkFlagRequired("out"))
	return c
}
