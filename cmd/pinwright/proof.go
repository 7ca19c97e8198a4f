package main

import (
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"io/fs"

	"github.com/spf13/cobra"

	"pinwright/export/proof"
)

// errProof is the end of a proof that failed; what failed has been printed by then.
var errProof = errors.New("the proof failed: do not cut these files")

func proofCommand(t terminal) *cobra.Command {
	var asJSON bool
	c := &cobra.Command{
		Use:   "proof DIR",
		Short: "Read cut files back and hold them against the linkage",
		Long: `Reads the cut files in DIR as a laser would, runs the beam along them in
geometry, and compares the finished parts with what the linkage asks for: every
centre distance, every hole, every gap and margin, the order of the work. Files
that were edited since they were written fail.`,
		Example: `  pinwright proof out
  pinwright proof out --json | jq .ok`,
		Args: one("folder of cut files"),
		RunE: func(_ *cobra.Command, args []string) error {
			report, err := proof.CheckDir(args[0])
			if errors.Is(err, fs.ErrNotExist) || errors.Is(err, fs.ErrPermission) {
				return system(err)
			}
			if err != nil {
				return refused(err)
			}
			return tellProof(t.out, report, asJSON)
		},
	}
	c.Flags().BoolVar(&asJSON, "json", false, "print the report as JSON")
	return c
}

// tellProof prints a report and turns a failed one into an error.
func tellProof(w io.Writer, r proof.Report, asJSON bool) error {
	var err error
	if asJSON {
		err = writeJSON(w, r)
	} else {
		err = r.Write(w)
	}
	if err != nil {
		return system(err)
	}
	if !r.OK {
		return refused(errProof)
	}
	return nil
}

// writeJSON writes a value for machines, indented, one value a run.
func writeJSON(w io.Writer, v any) error {
	enc := json.NewEncoder(w)
	enc.SetEscapeHTML(false)
	enc.SetIndent("", "  ")
	if err := enc.Encode(v); err != nil {
		return fmt.Errorf("json: %w", err)
	}
	return nil
}
