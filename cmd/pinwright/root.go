package main

import (
	"context"
	"errors"
	"fmt"

	"github.com/spf13/cobra"
)

// version is the program's, written into the manifest of every run.
const version = "0.1.0"

// Exit statuses.
const (
	statusFine    = 0
	statusRefused = 1 // the job cannot be built, or the proof failed
	statusUsage   = 2 // the command line is wrong
	statusSystem  = 3 // a file could not be read or written
)

// failure is an error with the exit status that it asks for.
type failure struct {
	status int
	err    error
}

func (f failure) Error() string { return f.err.Error() }
func (f failure) Unwrap() error { return f.err }

func refused(err error) error { return failure{statusRefused, err} }
func system(err error) error  { return failure{statusSystem, err} }

// run is the whole program: it reads args, writes to t and returns the exit status.
func run(ctx context.Context, args []string, t terminal) int {
	root := rootCommand(t)
	root.SetArgs(args)
	root.SetOut(t.out)
	root.SetErr(t.err)
	err := root.ExecuteContext(ctx)
	if err == nil {
		return statusFine
	}
	status := statusUsage
	var f failure
	if errors.As(err, &f) {
		status = f.status
	}
	fmt.Fprintf(t.err, "%s %s\n", t.paint("1", "pinwright:", t.errTTY), err)
	if status == statusUsage {
		fmt.Fprintln(t.err, "pinwright --help shows the commands")
	}
	return status
}

func rootCommand(t terminal) *cobra.Command {
	root := &cobra.Command{
		Use:   "pinwright",
		Short: "From link lengths to cut-ready laser sheets",
		Long: `Pinwright takes a planar linkage whose lengths are already solved and carries it
to cut-ready laser sheets: part outlines with their holes, kerf compensation,
parts laid on the sheets you have, DXF, PDF and SVG cut files, and a list of the
bolts, washers, spacers, nuts and bearings to buy. It reads its own cut files
back and proves that the parts go together.

Exit status: 0 fine; 1 the job cannot be built or the proof failed; 2 the
command line is wrong; 3 a file could not be read or written.

` + cautionShort,
		Example: `  pinwright new > arm.yaml              start a job file
  pinwright check arm.yaml              does it close, turn and fit, without writing anything
  pinwright cut arm.yaml -o out         write the sheets, lists and proof into out/
  pinwright proof out                   prove the files in out/ again before cutting`,
		Version:       version,
		SilenceUsage:  true,
		SilenceErrors: true,
		Args:          cobra.NoArgs,
		RunE:          func(c *cobra.Command, _ []string) error { return c.Help() },
	}
	root.SetVersionTemplate("pinwright {{.Version}}\n")
	root.AddCommand(cutCommand(t), checkCommand(t), listCommand(t), proofCommand(t), newCommand(t), fitCommand(t))
	return root
}

// cautionShort is what every user should have read once.
const cautionShort = `A laser can blind, burn and set fire; cutting gives off fumes. Follow the laser's
manual, local codes and the people in charge of it, and stay with it while it
works. Linkages pinch. Strength figures are estimates for models and prototypes,
not for anything that carries people.`
