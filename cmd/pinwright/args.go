package main

import (
	"fmt"

	"github.com/spf13/cobra"
)

// one wants exactly one argument, and says what it is and how the line is written.
func one(what string) cobra.PositionalArgs {
	return func(c *cobra.Command, args []string) error {
		if len(args) == 1 {
			return nil
		}
		return fmt.Errorf("%s wants one %s and got %d: pinwright %s", c.Name(), what, len(args), c.Use)
	}
}
