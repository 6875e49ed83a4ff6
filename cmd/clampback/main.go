// Command clampback plans the tightening of bolted joints: it works back from
// the clamp force a joint must hold in service to the torque that gives it,
// and writes cards and workbooks. It parses flags, opens files and prints;
// every number comes from package planner.
package main

import (
	"context"
	"errors"
	"io"
	"os"
	"os/signal"
	"syscall"

	"github.com/spf13/cobra"
)

// The exit statuses of every command.
const (
	exitFeasible    = 0
	exitInfeasible  = 1
	exitBadInput    = 2
	exitInterrupted = 130
)

// errInfeasible ends a command that did its work and found a joint that cannot
// be tightened as stated. It is not printed: the result already says it.
var errInfeasible = errors.New("some joint is infeasible")

func main() {
	os.Exit(run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr))
}

// run is the program without its process: arguments in, exit status out.
func run(args []string, stdin io.Reader, stdout, stderr io.Writer) int {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM, syscall.SIGHUP)
	defer stop()
	context.AfterFunc(ctx, stop) // a second Ctrl-C ends the program at once
	root := newRoot()
	root.SetArgs(args)
	root.SetIn(stdin)
	root.SetOut(stdout)
	root.SetErr(stderr)
	err := root.ExecuteContext(ctx)
	switch {
	case err == nil:
		return exitFeasible
	case errors.Is(err, errInfeasible):
		return exitInfeasible
	case errors.Is(err, context.Canceled):
		printError(stderr, errors.New("interrupted; only files named above were written"))
		return exitInterrupted
	}
	printError(stderr, err)
	return exitBadInput
}

func newRoot() *cobra.Command {
	root := &cobra.Command{
		Use:   "clampback",
		Short: "Plan the tightening of bolted joints",
		Long: `clampback works a bolted joint back from the clamp force it must still hold in
service to the tightening instruction that gives it: preload window, torque,
angle. It checks the joint and writes cards for the shop floor and workbooks
for audits.

A FILE is a joint register in YAML; "-" is standard input.

Exit status: 0 every joint is feasible, 1 some joint is infeasible, 2 bad input
or usage.`,
		SilenceErrors: true,
		SilenceUsage:  true,
		Args:          cobra.NoArgs,
		RunE:          func(c *cobra.Command, _ []string) error { return c.Help() },
	}
	root.CompletionOptions.HiddenDefaultCmd = false
	root.AddCommand(newPlan(), newCard(), newSheet(), newMan())
	return root
}
