package steps

import (
	"fmt"
	"strings"
)

// Words tells what is done with the part, a sentence for every pin in the order in which the hands need
// them: what is pressed in and the bolts that go through it, then where it goes, then what closes pins.
func (s Step) Words() []string {
	var before, after []string
	var on []string
	for _, d := range s.Deeds {
		if what := d.whats(d.Press); what != "" {
			before = append(before, fmt.Sprintf("%s: press %s into it.", d.Joint, what))
		}
		if d.Begin {
			before = append(before, d.begin())
		} else {
			on = append(on, d.seat())
		}
		if d.Close {
			after = append(after, d.close()...)
		}
	}
	out := before
	if len(on) > 0 {
		out = append(out, "Put it on "+enumerate(on)+".")
	}
	if s.How != "" {
		out = append(out, s.How)
	}
	return append(out, after...)
}

// Takes is the part by its mark, with its name where the mark does not tell it.
func (s Step) Takes() string {
	plain := strings.ToUpper(strings.ReplaceAll(s.Part, ".", " "))
	switch {
	case s.Mark == "":
		return s.Part
	case strings.HasPrefix(s.Mark, plain):
		return s.Mark
	}
	return fmt.Sprintf("%s (%s)", s.Mark, s.Part)
}

func (d Deed) begin() string {
	if what := d.whats(d.Under); what != "" {
		return fmt.Sprintf("%s: put %s on %s and push it up through the part.", d.Joint, what, d.pin.Through)
	}
	return fmt.Sprintf("%s: push %s up through the part.", d.Joint, d.pin.Through)
}

func (d Deed) seat() string {
	if what := d.whats(d.Under); what != "" {
		return fmt.Sprintf("%s over %s", d.Joint, what)
	}
	return d.Joint
}

// close says what goes over the last part, then the notes, the joint named once.
func (d Deed) close() []string {
	var out []string
	if what := d.whats(d.Over); what != "" {
		out = append(out, fmt.Sprintf("close with %s.", what))
	}
	out = append(out, d.pin.Notes...)
	if len(out) > 0 {
		out[0] = d.Joint + ": " + out[0]
	}
	return out
}

// whats names items in the order in which they go on.
func (d Deed) whats(items []int) string {
	names := make([]string, len(items))
	for i, k := range items {
		names[i] = d.pin.Items[k].What
	}
	return enumerate(names)
}

// enumerate joins names with commas and an "and" before the last.
func enumerate(names []string) string {
	if len(names) < 2 {
		return strings.Join(names, "")
	}
	return strings.Join(names[:len(names)-1], ", ") + " and " + names[len(names)-1]
}
