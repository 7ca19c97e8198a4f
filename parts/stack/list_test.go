package stack

import (
	"slices"
	"testing"

	"pinwright/parts/job"
)

func TestPacked(t *testing.T) {
	for _, c := range []struct{ pieces, size, count int }{
		{1, 10, 1},
		{10, 10, 1},
		{11, 25, 1},
		{49, 50, 1},
		{51, 100, 1},
		{101, 100, 2},
		{950, 100, 10},
	} {
		if size, count := packed(c.pieces); size != c.size || count != c.count {
			t.Errorf("%d pieces: %d packs of %d, want %d of %d", c.pieces, count, size, c.count, c.size)
		}
	}
}

func TestSpare(t *testing.T) {
	for _, c := range []struct {
		need  int
		spare job.Spare
		want  int
	}{
		{12, job.Spare{Percent: 10, Least: 1}, 2}, // 1.2, rounded up
		{10, job.Spare{Percent: 10, Least: 1}, 1},
		{30, job.Spare{Percent: 10}, 3}, // 3.0000000000000004 in binary is 3
		{3, job.Spare{Percent: 10, Least: 4}, 4},
		{3, job.Spare{}, 0},
	} {
		if got := spare(c.need, c.spare); got != c.want {
			t.Errorf("%d with %+v: %d, want %d", c.need, c.spare, got, c.want)
		}
	}
}

// The list of the arms, counted by hand: four arms, each with one bolt through both plates (C), two
// through two links (A, B) and a shaft; two mounting holes each. Washers M4: C 5 (head, back, rocker
// from both sides, front, nut: head|back, back|spacer, spacer|rocker, rocker|front, front|nut), A and B
// 3 each: 44. 10 % spare, rounded up, at least 1.
func TestArmsList(t *testing.T) {
	j, err := job.Read("testdata/arms.yaml")
	if err != nil {
		t.Fatal(err)
	}
	lines := List(j, build(t, j))
	for _, want := range []struct {
		what               string
		length             float64
		need, spare, packs int
		joints             []string
	}{
		{"ISO 4762 M4x16", 16, 8, 1, 1, []string{"A", "B"}},
		{"ISO 4762 M4x40", 40, 4, 1, 1, []string{"C"}},
		{"screw M4", 0, 8, 1, 1, []string{"mount"}},
		{"DIN 985 M4", 0, 12, 2, 1, []string{"C", "A", "B"}},
		{"ISO 7089 4", 0, 44, 5, 1, []string{"C", "A", "B"}},
		{"spacer for M4", 12.7, 4, 1, 0, []string{"C"}},
		{"shaft collar for 6 mm shaft", 0, 4, 1, 0, []string{"O"}},
	} {
		i := slices.IndexFunc(lines, func(l Line) bool { return l.Designation == want.what })
		if i < 0 {
			t.Errorf("no line for %s", want.what)
			continue
		}
		l := lines[i]
		if !near(l.Length, want.length) || l.Need != want.need || l.Spare != want.spare || l.Buy != want.need+want.spare || l.Packs != want.packs || !slices.Equal(l.Joints, want.joints) {
			t.Errorf("%s: %+v, want %+v", want.what, l, want)
		}
	}
	kinds := make([]int, len(lines))
	for i, l := range lines {
		kinds[i] = slices.Index(shelf, l.Kind)
	}
	if !slices.IsSorted(kinds) {
		t.Errorf("shelves out of order: %v", kinds)
	}
}

// Axles without locknut want thread lock, once; hubs their screws.
func TestConsumablesAndHubs(t *testing.T) {
	four := []job.Bore{{Joint: "A", Kind: job.HubBore, Diameter: 6, Bolts: 4, Circle: 20, Hole: 3.4}}
	three := []job.Bore{{Joint: "B", Kind: job.HubBore, Diameter: 6, Bolts: 3, Circle: 20, Hole: 3.4}}
	links := []at{{name: "a", stock: "s", plane: 1, pins: []string{"A", "B"}, bores: four}, {name: "b", stock: "s", plane: 2, pins: []string{"A", "B"}, bores: three}}
	one, other := bolt("A", "M4"), bolt("B", "M4")
	one.Nut, other.Nut = "plain", "thin"
	j := jobOf(links, []job.Pin{one, other}, nil, sheet("s", 3.1, 3))
	j.Copies = []job.Copy{{Name: "left"}, {Name: "right"}}
	lines := List(j, build(t, j))
	last := lines[len(lines)-1]
	if last.Kind != ConsumableLine || last.Need != 1 || last.Buy != 1 || !slices.Equal(last.Joints, []string{"A", "B"}) {
		t.Errorf("%+v", last)
	}
	if l := lines[0]; l.Designation != "screw for a hole of 3.4 mm" || l.Need != 2*(4+3) {
		t.Errorf("%+v", l)
	}
}
