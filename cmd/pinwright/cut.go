package main

import (
	"crypto/sha256"
	"encoding/hex"
	"errors"
	"fmt"
	"io/fs"
	"os"

	"github.com/spf13/cobra"

	"pinwright/export/files"
	"pinwright/export/proof"
	"pinwright/parts/job"
)

func cutCommand(t terminal) *cobra.Command {
	var dir string
	var effort int
	var asJSON, quiet bool
	var o output
	c := &cobra.Command{
		Use:   "cut JOB -o DIR",
		Short: "Write cut files, lists and papers for a job",
		Long: `Works a job out and writes everything into DIR: a DXF, PDF and SVG for every
sheet, parts.csv, hardware.csv, path.csv, papers.pdf and manifest.json. It ends by
reading the DXF back and proving the finished parts; if anything is wrong nothing
is written. All files appear together; a rerun replaces them and leaves files that
are not Pinwright's alone.

` + cautionShort,
		Example: `  pinwright cut arm.yaml -o out
  pinwright cut arm.yaml -o out --effort 20        try harder to save sheets
  pinwright cut arm.yaml -o out --part-files       a drawing for every part as well`,
		Args: one("job file"),
		RunE: func(c *cobra.Command, args []string) error {
			if dir == "" {
				return errors.New("cut: say where the files go: -o DIR")
			}
			if effort < 1 {
				return fmt.Errorf("cut: an effort of %d is none: give 1 or more", effort)
			}
			j, sum, err := readJob(args[0])
			if err != nil {
				return err
			}
			p, err := buildable(j)
			if err != nil {
				return refused(err)
			}
			p.sum = sum
			if err := p.prove(); err != nil {
				return refused(err)
			}
			if err := p.arrange(c.Context(), effort, t.progress("layout", quiet || asJSON)); err != nil {
				return refused(err)
			}
			set, err := p.files(o)
			if err != nil {
				return refused(err)
			}
			report, err := proof.Check(inMemory(set))
			if err != nil {
				return refused(err)
			}
			if !report.OK {
				if err := report.Write(t.err); err != nil {
					return system(err)
				}
				return refused(errors.New("the cut files would not give the parts; nothing was written. This is a fault of Pinwright: please report it with the job file"))
			}
			if err := files.Commit(dir, set, nil); err != nil {
				return system(err)
			}
			if asJSON {
				return tellProof(t.out, report, true)
			}
			if quiet {
				return nil
			}
			p.tell(t, dir, len(set))
			if err := p.printMounts(t.out); err != nil {
				return refused(err)
			}
			return tellProof(t.out, report, false)
		},
	}
	f := c.Flags()
	f.StringVarP(&dir, "out", "o", "", "directory for the files (made if need be)")
	f.IntVar(&effort, "effort", 1, "layouts to try; more may save a sheet and takes longer")
	f.BoolVar(&o.partFiles, "part-files", false, "also write a DXF for every part")
	f.BoolVar(&o.letter, "letter", false, "papers on US Letter instead of A4")
	f.BoolVar(&o.decimalComma, "decimal-comma", false, "lists with decimal comma and semicolons")
	f.BoolVar(&asJSON, "json", false, "print the proof as JSON")
	f.BoolVarP(&quiet, "quiet", "q", false, "print nothing but errors")
	return c
}

// readJob reads a job file and takes the hash of its content.
func readJob(path string) (job.Job, string, error) {
	// The strict reader goes first: it refuses what is no plain file and would keep us waiting.
	j, err := job.Read(path)
	var missing *fs.PathError
	if errors.As(err, &missing) {
		return j, "", system(err)
	}
	if err != nil {
		return j, "", refused(err)
	}
	data, err := os.ReadFile(path)
	if err != nil {
		return j, "", system(err)
	}
	sum := sha256.Sum256(data)
	return j, hex.EncodeToString(sum[:]), nil
}

// tell says what was written.
func (p plan) tell(t terminal, dir string, count int) {
	fmt.Fprintf(t.out, "%s: %d parts on %d sheets, %d files in %s\n", p.job.Name, len(p.parts), len(p.sheets), count, dir)
	for i, s := range p.sheets {
		fmt.Fprintf(t.out, "  %-24s %3.0f %% filled  (%s)\n", s.Name+".dxf", 100*p.layout.Sheets[i].Fill, s.Title)
	}
}
