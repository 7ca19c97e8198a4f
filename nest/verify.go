package nest

import (
	"cmp"
	"errors"
	"fmt"
	"math"
	"slices"

	"pinwright/parts/outline"
)

const (
	// tolerance is what the exact check allows for rounding in moving shapes, mm.
	tolerance = 1e-6
	// sameAngle is what it allows for rounding in turning them, radians.
	sameAngle = 1e-9
)

// Verify checks a layout on lines and arcs, exactly but for rounding (a millionth of a millimetre):
//
//   - cut paths of different parts keep Web+Kerf from each other and lie outside each other, or in each
//     other's windows; where Web+Kerf is nothing they may touch and not overlap;
//   - every part keeps Margin+Kerf/2 from the edge of its sheet;
//   - every part lies on its own stock, turned and flipped as it may be, and moved without stretching;
//   - every copy has one place or is among the leftovers, and no more sheets are used than there are.
//
// The error names every fault: the parts, the sheet and by how much. Running time is that of sorting the
// parts of a sheet, and of the distances of those that come near each other.
func Verify(items []Item, stock []Stock, l Layout) error {
	if err := l.counts(items, stock); err != nil {
		return err
	}
	var faults []error
	on := make([][]laid, len(l.Sheets))
	for _, p := range l.Placements {
		it, k := items[p.Item], stock[l.Sheets[p.Sheet].Stock]
		name := it.copyName(p.Item, p.Copy)
		if err := it.allows(p.At); err != nil {
			faults = append(faults, fmt.Errorf("nest: %s on sheet %d %w", name, p.Sheet+1, err))
			continue
		}
		r := it.Shape.Transform(p.At)
		box := r.Outer.Bounds()
		_, edge := k.clearance()
		if least := min(box.Min.X, box.Min.Y, k.Width-box.Max.X, k.Height-box.Max.Y); !(least >= edge-tolerance) {
			faults = append(faults, fmt.Errorf("nest: %s on sheet %d is %.4f mm from the edge, wanted are %.4f mm: %.4f mm too little", name, p.Sheet+1, least, edge, edge-least))
		}
		on[p.Sheet] = append(on[p.Sheet], laid{name, r, outline.EdgesOf(r), box})
	}
	for i := range on {
		between, _ := stock[l.Sheets[i].Stock].clearance()
		faults = append(faults, apart(on[i], between, i+1)...)
	}
	return errors.Join(faults...)
}

// copyName names a copy of item i in messages.
func (it Item) copyName(i, copied int) string {
	if it.Quantity == 1 {
		return it.called(i)
	}
	return fmt.Sprintf("%s (copy %d)", it.called(i), copied+1)
}

// counts checks the numbers of a layout: indices, copies, sheets.
func (l Layout) counts(items []Item, stock []Stock) error {
	used := make([]int, len(stock))
	for i, s := range l.Sheets {
		if s.Stock < 0 || s.Stock >= len(stock) {
			return fmt.Errorf("nest: sheet %d is of stock %d, which is not there", i+1, s.Stock)
		}
		if used[s.Stock]++; used[s.Stock] == stock[s.Stock].Quantity+1 {
			return fmt.Errorf("nest: more than the %d sheets of %s are used", stock[s.Stock].Quantity, stock[s.Stock].Name)
		}
	}
	there := make([]map[int]bool, len(items))
	for _, p := range l.Placements {
		if p.Item < 0 || p.Item >= len(items) || p.Sheet < 0 || p.Sheet >= len(l.Sheets) {
			return fmt.Errorf("nest: a placement of item %d on sheet %d, which are not there", p.Item+1, p.Sheet+1)
		}
		it := items[p.Item]
		if k := stock[l.Sheets[p.Sheet].Stock]; k.Name != it.Stock {
			return fmt.Errorf("nest: %s wants %s and lies on %s", it.called(p.Item), it.Stock, k.Name)
		}
		if p.Copy < 0 || p.Copy >= it.Quantity || there[p.Item][p.Copy] {
			return fmt.Errorf("nest: copy %d of %d of %s is placed twice or not asked for", p.Copy+1, it.Quantity, it.called(p.Item))
		}
		if there[p.Item] == nil {
			there[p.Item] = map[int]bool{}
		}
		there[p.Item][p.Copy] = true
	}
	left := make([]int, len(items))
	for _, x := range l.Left {
		if x.Item < 0 || x.Item >= len(items) || x.Copies < 1 {
			return fmt.Errorf("nest: %d copies of item %d are said to be left over", x.Copies, x.Item+1)
		}
		left[x.Item] += x.Copies
	}
	for i, it := range items {
		if n := len(there[i]) + left[i]; n != it.Quantity {
			return fmt.Errorf("nest: %d copies of %s are placed or left over, %d are asked for", n, it.called(i), it.Quantity)
		}
	}
	return nil
}

// allows says what is wrong with the motion of a part, if anything.
func (it Item) allows(t outline.Transform) error {
	if n := math.Hypot(t.Cos, t.Sin); !(math.Abs(n-1) < sameAngle) || math.IsNaN(t.Move.X+t.Move.Y) {
		return errors.New("is moved by what is no motion")
	}
	if t.Mirror && !it.Flip {
		return errors.New("is turned over, which it may not be")
	}
	if it.Angles != nil && !slices.ContainsFunc(it.Angles, func(a float64) bool {
		return math.Abs(math.Remainder(a-t.Angle(), 2*math.Pi)) < sameAngle
	}) {
		return fmt.Errorf("is turned by %.3f deg, which it may not be", t.Angle()*180/math.Pi)
	}
	return nil
}

// laid is a part at its place.
type laid struct {
	name  string
	shape outline.Region
	edges outline.Edges
	box   outline.Box
}

// apart lists the pairs of parts of a sheet that are closer than they may be. Parts are sorted by their
// left end, and each is compared with those that begin before it ends.
func apart(parts []laid, between float64, sheet int) (faults []error) {
	slices.SortStableFunc(parts, func(a, b laid) int { return cmp.Compare(a.box.Min.X, b.box.Min.X) })
	for i, a := range parts {
		for _, b := range parts[i+1:] {
			if b.box.Min.X >= a.box.Max.X+between {
				break
			}
			// Where parts may touch, a distance of nothing says nothing yet.
			if a.box.Distance(b.box) > between || (between > 0 && a.box.Distance(b.box) == between) {
				continue
			}
			near, closer := a.edges.Closer(b.edges, between-tolerance)
			if between > tolerance && !closer {
				continue
			}
			if near.Distance <= tolerance || between <= tolerance {
				if outline.Overlap(a.shape, b.shape, tolerance) {
					faults = append(faults, fmt.Errorf("nest: %s and %s on sheet %d overlap by %.4f mm2", a.name, b.name, sheet,
						outline.Area(outline.Intersection([]outline.Region{a.shape}, []outline.Region{b.shape}))))
					continue
				}
				if between <= tolerance {
					continue
				}
			}
			faults = append(faults, fmt.Errorf("nest: %s and %s on sheet %d are %.4f mm apart, wanted are %.4f mm: %.4f mm too little",
				a.name, b.name, sheet, near.Distance, between, between-near.Distance))
		}
	}
	return faults
}
