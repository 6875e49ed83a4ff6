package main

import (
	"os"
	"time"

	"github.com/spf13/cobra"
	"github.com/spf13/cobra/doc"
)

// newMan writes the man pages of all commands, for packagers.
func newMan() *cobra.Command {
	return &cobra.Command{
		Use:   "man DIR",
		Short: "Write the man pages into a folder",
		Args:  cobra.ExactArgs(1),
		RunE: func(c *cobra.Command, args []string) error {
			if err := os.MkdirAll(args[0], 0o755); err != nil {
				return mendable("name a folder that you may write to", "%w", err)
			}
			root := c.Root()
			root.DisableAutoGenTag = true
			// A fixed date: the pages depend on the program alone.
			date := time.Date(2026, time.January, 1, 0, 0, 0, 0, time.UTC)
			return doc.GenManTree(root, &doc.GenManHeader{Section: "1", Source: "clampback", Date: &date}, args[0])
		},
	}
}
