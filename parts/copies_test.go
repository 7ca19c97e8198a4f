package parts

import (
	"math"
	"strings"
	"testing"

	"pinwright/parts/job"
	"pinwright/parts/mark"
	"pinwright/parts/outline"
)

func fourCopies(j *job.Job) {
	j.Copies = []job.Copy{{Name: "left-1"}, {Name: "left-2", Phase: math.Pi}, {Name: "right-1", Mirror: true, Phase: math.Pi / 6}, {Name: "right-2", Mirror: true, Phase: 3 * math.Pi / 2}}
	l := link(j, "crank")
	l.PhaseMark = true
	l.Bores = []job.Bore{{Joint: "O", Kind: job.DBore, Diameter: 8, Flat: 7}}
	l.Width = 22
}

// On a shaft at the job's angle 0 the arm of a copy with phase f points to f, mirrored to 180 - f; the
// flats and phase marks of all of them must then point along x, whatever the order of the pins.
func TestCranksOfAllCopiesFitOneShaft(t *testing.T) {
	for _, turned := range []bool{false, true} {
		j := fourBar(fourCopies)
		if turned { // the ground pin second
			j.Linkage.Links[0].Pins = []string{"A", "O"}
		}
		all := make1(t, j)
		n := 0
		for i, p := range all {
			if p.Link != "crank" {
				continue
			}
			c := j.Copies[n]
			n++
			bore := 0
			for p.Holes[bore].Joint != "O" {
				bore++
			}
			centre, arm := p.Holes[bore].Centre, p.Holes[1-bore].Centre
			points := c.Phase
			if c.Mirror {
				points = math.Pi - c.Phase
			}
			turn := outline.Place(points-arm.Sub(centre).Angle(), false, outline.Point{})
			// The flat: its middle is the point of the bore that is nearest to the centre.
			flat := turn.Apply(p.Region.Holes[bore].Nearest(centre).A.Sub(centre))
			if flat.Dist(pt(3, 0)) > 1e-9 {
				t.Errorf("%s (%d): the flat is at %v, want (3, 0)", p.Name, i, flat)
			}
			line := p.Mark.Strokes[len(p.Mark.Strokes)-1]
			from, to := turn.Apply(line[0].Sub(centre)), turn.Apply(line[len(line)-1].Sub(centre))
			if math.Abs(from.Y) > 1e-9 || math.Abs(to.Y) > 1e-9 || !(0 < from.X && from.X+2 <= to.X+1e-9) {
				t.Errorf("%s: the phase mark runs from %v to %v", p.Name, from, to)
			}
			if !strings.HasSuffix(p.Mark.Text, degrees(c.Phase)) {
				t.Errorf("%s is marked %q", p.Name, p.Mark.Text)
			}
		}
		if n != 4 {
			t.Errorf("%d cranks", n)
		}
	}
}

// A mirrored link is the mirror image in the x axis of its frame; a mirrored frame plate that in the
// linkage's y axis. The text stays readable.
func TestMirroredCopies(t *testing.T) {
	j := fourBar(framed, func(j *job.Job) { j.Copies = []job.Copy{{Name: "left"}, {Name: "right", Mirror: true}} })
	all := make1(t, j)
	half := len(all) / 2
	for i, left := range all[:half] {
		right := all[half+i]
		flip := func(p outline.Point) outline.Point { return pt(p.X, -p.Y) }
		switch {
		case strings.HasPrefix(left.Link, "cross"):
			flip = func(p outline.Point) outline.Point { return p }
		case left.Link == "back" || left.Link == "front":
			flip = func(p outline.Point) outline.Point { return pt(-p.X, p.Y) }
		}
		if right.Link != left.Link || right.Copy != "right" || len(right.Holes) != len(left.Holes) {
			t.Fatalf("%s and %s", left.Name, right.Name)
		}
		near(t, left.Link+" area", right.Region.Area(), left.Region.Area(), 1e-9)
		for k := range left.Holes {
			if d := right.Holes[k].Centre.Dist(flip(left.Holes[k].Centre)); d > 1e-9 {
				t.Errorf("%s: %s is %v off", left.Link, left.Holes[k].Name, d)
			}
			for _, s := range left.Region.Holes[k].Segments() {
				if d := right.Region.Holes[k].Nearest(flip(s.At(0.3))).Distance; d > 1e-9 {
					t.Errorf("%s: %s is %v off", left.Link, left.Holes[k].Name, d)
				}
			}
		}
		for _, s := range left.Region.Outer.Segments() {
			if d := right.Region.Outer.Nearest(flip(s.At(0.3))).Distance; d > 1e-9 {
				t.Errorf("%s: outline %v off", left.Link, d)
			}
		}
		if left.Mark.Text == right.Mark.Text {
			t.Errorf("both are marked %s", left.Mark.Text)
		}
	}
	for _, p := range all {
		readable(t, p)
	}
}

// readable checks that the first letter is L or R as it is written, not its mirror image: the foot of
// an L turns to the left of its stem, the bow of an R to the right.
func readable(t testing.TB, p Part) {
	t.Helper()
	s := p.Mark.Strokes[0].Segments()
	switch p.Mark.Text[0] {
	case 'L':
		if s[0].B.Sub(s[0].A).Cross(s[1].B.Sub(s[1].A)) <= 0 {
			t.Errorf("%s: the mark is mirrored", p.Name)
		}
	case 'R':
		if s[2].Bulge >= 0 {
			t.Errorf("%s: the mark is mirrored", p.Name)
		}
	}
}

// Marks tell all parts apart and keep clear of every cut.
func TestMarks(t *testing.T) {
	j := fourBar(framed, fourCopies, func(j *job.Job) { link(j, "coupler").Windows = true })
	seen := map[string]string{}
	for _, p := range make1(t, j) {
		if other, taken := seen[p.Mark.Text]; taken {
			t.Errorf("%s and %s are both marked %s", other, p.Name, p.Mark.Text)
		}
		seen[p.Mark.Text] = p.Name
		if c := mark.Clearance(p.Region, p.Mark.Strokes); c < markClear-1e-9 {
			t.Errorf("%s: a stroke comes to %v mm from a cut", p.Name, c)
		}
		want := strings.ToUpper(p.Copy + " " + p.Link)
		if !strings.HasPrefix(p.Mark.Text, want) {
			t.Errorf("%s is marked %q", p.Name, p.Mark.Text)
		}
	}
}

// A small part takes a number, and one with no room for that an error.
func TestMarksOfSmallParts(t *testing.T) {
	small := func(bolt string, length float64) func(*job.Job) {
		return func(j *job.Job) {
			pin(j, "O").Bolt, pin(j, "A").Bolt = bolt, bolt
			j.Linkage.Links[0].Lengths[0].MM = length
			j.Copies[0].Name = "left-hand-side"
		}
	}
	p := part(t, "left-hand-side.crank", small("M3", 11))
	if p.Mark.Text != "P1" {
		t.Errorf("marked %q", p.Mark.Text)
	}
	message := failing(t, fourBar(small("M2", 5.5), func(j *job.Job) { link(j, "crank").Width = 8.4 }))
	if !strings.Contains(message, "crank: there is no room for a mark") {
		t.Errorf("%q", message)
	}
}
