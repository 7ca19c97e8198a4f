package main

import (
	"fmt"
	"io"
	"strconv"
	"strings"
	"text/tabwriter"

	"github.com/spf13/cobra"

	"pinwright/parts/stack"
)

func listCommand(t terminal) *cobra.Command {
	var asJSON, whereUsed bool
	c := &cobra.Command{
		Use:   "list JOB",
		Short: "Print what is to be bought for a job, without writing anything",
		Long: `Prints the hardware of a job as it would be bought: bolts, nuts, washers, spacers,
bearings and what else its pins carry, for all copies, with what is to spare. Spacers
and sleeves that are cut from tube have their cuts below.`,
		Example: `  pinwright list arm.yaml --where-used
  pinwright list arm.yaml --json | jq '.[] | select(.kind == "bolt")'`,
		Args: one("job file"),
		RunE: func(_ *cobra.Command, args []string) error {
			j, _, err := readJob(args[0])
			if err != nil {
				return err
			}
			p, err := buildable(j)
			if err != nil {
				return refused(err)
			}
			if asJSON {
				if err := writeJSON(t.out, listFindings(p.lines)); err != nil {
					return system(err)
				}
				return nil
			}
			if err := printList(t.out, p.lines, whereUsed); err != nil {
				return system(err)
			}
			tubes, err := stack.Tubes(p.job, p.lines)
			if err != nil {
				return refused(err)
			}
			printTubes(t.out, tubes)
			return nil
		},
	}
	c.Flags().BoolVar(&whereUsed, "where-used", false, "say which joints use each thing, and what is to be minded")
	c.Flags().BoolVar(&asJSON, "json", false, "print the list as JSON")
	return c
}

// listed is a line of the list as JSON.
type listed struct {
	Kind      string   `json:"kind"`
	Item      string   `json:"item"`
	LengthMM  float64  `json:"length_mm,omitempty"`
	Need      int      `json:"need"`
	Spare     int      `json:"spare"`
	Buy       int      `json:"buy"`
	Pack      int      `json:"pack,omitempty"`
	Packs     int      `json:"packs,omitempty"`
	MassG     float64  `json:"mass_g,omitempty"`
	WhereUsed []string `json:"where_used"`
	Note      string   `json:"note,omitempty"`
}

func listFindings(lines []stack.Line) []listed {
	out := make([]listed, len(lines))
	for i, l := range lines {
		out[i] = listed{string(l.Kind), l.Designation, l.Length, l.Need, l.Spare, l.Buy, l.Pack, l.Packs, l.Mass, l.Joints, l.Note}
	}
	return out
}

// printList prints the list in columns, and its mass.
func printList(out io.Writer, lines []stack.Line, whereUsed bool) error {
	w := tabwriter.NewWriter(out, 0, 0, 2, ' ', 0)
	head := "buy\tneed\titem\tlength mm\tpacks\tmass g"
	if whereUsed {
		head += "\twhere used\tnote"
	}
	fmt.Fprintln(w, head)
	mass := 0.0
	for _, l := range lines {
		mass += l.Mass
		packs := ""
		if l.Packs > 0 {
			packs = fmt.Sprintf("%d of %d", l.Packs, l.Pack)
		}
		row := fmt.Sprintf("%d\t%d\t%s\t%s\t%s\t%s", l.Buy, l.Need, itemName(l), figureOr(l.Length, 2), packs, figureOr(l.Mass, 1))
		if whereUsed {
			row += "\t" + strings.Join(l.Joints, " ") + "\t" + l.Note
		}
		fmt.Fprintln(w, row)
	}
	if err := w.Flush(); err != nil {
		return err
	}
	_, err := fmt.Fprintf(out, "\nabout %.0f g in all, as far as masses are known\n", mass)
	return err
}

// itemName says what a thing is where its designation alone does not.
func itemName(l stack.Line) string {
	switch l.Kind {
	case stack.NutLine, stack.WasherLine, stack.BearingLine:
		if !strings.Contains(l.Designation, string(l.Kind)) {
			return string(l.Kind) + " " + l.Designation
		}
	}
	return l.Designation
}

// figureOr writes a figure with so many decimals at most, nothing for 0.
func figureOr(v float64, decimals int) string {
	if v == 0 {
		return ""
	}
	return trimmed(strconv.FormatFloat(v, 'f', decimals, 64))
}

// trimmed takes zeros at the end of a decimal away.
func trimmed(s string) string {
	if strings.Contains(s, ".") {
		s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	}
	return s
}

// printTubes tells how tubes are cut, equal ones once.
func printTubes(w io.Writer, tubes []stack.Tube) {
	for _, t := range tubes {
		fmt.Fprintf(w, "\n%s: %d of %g mm, saw cut %g mm\n", t.Designation, len(t.Plan.Bars), t.Length, t.Saw)
		for i := 0; i < len(t.Plan.Bars); {
			words := cutWords(t.Plan.Bars[i].Cuts)
			n := i + 1
			for n < len(t.Plan.Bars) && cutWords(t.Plan.Bars[n].Cuts) == words {
				n++
			}
			fmt.Fprintf(w, "  %d x  %s; %.1f mm left\n", n-i, words, t.Plan.Bars[i].Left)
			i = n
		}
	}
}

// cutWords writes the cuts of a tube, equal ones together: "3 x 12.7, 1 x 8".
func cutWords(cuts []float64) string {
	var words []string
	for i := 0; i < len(cuts); {
		n := i + 1
		for n < len(cuts) && cuts[n] == cuts[i] {
			n++
		}
		words = append(words, fmt.Sprintf("%d x %s", n-i, figureOr(cuts[i], 3)))
		i = n
	}
	return strings.Join(words, ", ")
}
