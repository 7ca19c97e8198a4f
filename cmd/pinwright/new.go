package main

import (
	"errors"
	"fmt"
	"io/fs"
	"os"

	"github.com/spf13/cobra"

	"pinwright/parts/job"
)

func newCommand(t terminal) *cobra.Command {
	var schema bool
	c := &cobra.Command{
		Use:   "new [FILE]",
		Short: "Write a commented starter job",
		Long: `Writes a starter job, every key explained, to FILE or to standard output.
An existing file is never overwritten.`,
		Example: `  pinwright new arm.yaml
  pinwright new --schema > pinwright.schema.json     for editors that complete keys`,
		Args: cobra.MaximumNArgs(1),
		RunE: func(_ *cobra.Command, args []string) error {
			text := job.Starter()
			if schema {
				text = job.Schema()
			}
			if len(args) == 0 {
				if _, err := t.out.Write(text); err != nil {
					return system(err)
				}
				return nil
			}
			f, err := os.OpenFile(args[0], os.O_WRONLY|os.O_CREATE|os.O_EXCL, 0o644)
			if errors.Is(err, fs.ErrExist) {
				return system(fmt.Errorf("%s exists already and is left as it is: give another name", args[0]))
			}
			if err != nil {
				return system(err)
			}
			if _, err := f.Write(text); err != nil {
				return system(errors.Join(err, f.Close()))
			}
			if err := f.Close(); err != nil {
				return system(err)
			}
			fmt.Fprintf(t.err, "wrote %s\n", args[0])
			return nil
		},
	}
	c.Flags().BoolVar(&schema, "schema", false, "write the JSON Schema of the job file instead")
	return c
}
