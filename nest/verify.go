package nest

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"pinwright/parts/outline"
)

// check refuses what cannot be nested, all of it at once.
func check(items []Item, stock []Stock) error {
	var faults []error
	for i, k := range stock {
		if err := k.check(); err != nil {
			faults = append(faults, err)
		}
		if slices.ContainsFunc(stock[:i], func(o Stock) bool { return o.Name == k.Name }) {
			faults = append(faults, fmt.Errorf("nest: stock %s is there twice", k.Name))
		}
	}
	if err := errors.Join(faults...); err != nil {
		return err
	}
	for _, it := range items {
		if err := it.check(stock); err != nil {
			faults = append(faults, fmt.Errorf("nest: %s: %w", it.Name, err))
		}
	}
	return errors.Join(faults...)
}

func (k Stock) check() error {
	for _, v := range []float64{k.Width, k.Height, k.Margin, k.Web, k.Kerf} {
		if math.IsNaN(v) || math.IsInf(v, 0) || v < 0 {
			return fmt.Errorf("nest: stock %s has a size or distance of %g mm", k.Name, v)
		}
	}
	if k.Width == 0 || k.Height == 0 || k.Width > 1e5 || k.Height > 1e5 {
		return fmt.Errorf("nest: stock %s of %g x %g mm is no sheet", k.Name, k.Width, k.Height)
	}
	if k.Quantity < 0 {
		return fmt.Errorf("nest: stock %s has %d sheets", k.Name, k.Quantity)
	}
	return nil
}

func (it Item) check(stock []Stock) error {
	if it.Quantity < 1 {
		return fmt.Errorf("a quantity of %d is nothing to cut", it.Quantity)
	}
	for _, a := range it.Angles {
		if math.IsNaN(a) || math.IsInf(a, 0) {
			return errors.New("an allowed turn is not a number")
		}
	}
	if it.Angles != nil && len(it.Angles) == 0 {
		return errors.New("no turn is allowed at all")
	}
	if err := it.Shape.Validate(); err != nil {
		return err
	}
	i := slices.IndexFunc(stock, func(k Stock) bool { return k.Name == it.Stock })
	if i < 0 {
		return fmt.Errorf("there is no stock %s", it.Stock)
	}
	k := stock[i]
	_, edge := k.clearance()
	w, h := k.Width-2*edge, k.Height-2*edge
	least := outline.Box{}
	for n, a := range turns(it) {
		box := it.Shape.Outer.Transform(outline.Place(a, false, outline.Point{})).Bounds()
		if box.Width() <= w+1e-9 && box.Height() <= h+1e-9 {
			return nil
		}
		if n == 0 || math.Max(box.Width()-w, box.Height()-h) < math.Max(least.Width()-w, least.Height()-h) {
			least = box
		}
	}
	return fmt.Errorf("needs %.1f x %.1f mm, and a sheet of %s has %.1f x %.1f mm inside its margins: use a larger sheet, or split the part",
		least.Width(), least.Height(), k.Name, w, h)
}

// tolerance is what the exact check allows for rounding in moving shapes, mm.
const tolerance = 1e-6

// Verify checks a layout on lines and arcs, exactly but for rounding: cut paths of different parts keep
// their distance and lie outside each other (or in each other's windows), every part keeps the margin,
// and turns and flips are allowed ones. The error names the first parts, the sheet and by how much.
func Verify(items []Item, stock []Stock, l Layout) error {
	placed := make([][]outline.Region, len(l.Sheets))
	who := make([][]int, len(l.Sheets))
	for _, p := range l.Placements {
		if p.Item < 0 || p.Item >= len(items) || p.Sheet < 0 || p.Sheet >= len(l.Sheets) {
			return fmt.Errorf("nest: a placement of item %d on sheet %d, which are not there", p.Item, p.Sheet)
		}
		it := items[p.Item]
		k := stock[l.Sheets[p.Sheet].Stock]
		if k.Name != it.Stock {
			return fmt.Errorf("nest: %s wants %s and lies on %s", it.Name, it.Stock, k.Name)
		}
		if p.At.Mirror && !it.Flip {
			return fmt.Errorf("nest: %s is turned over, which it may not be", it.Name)
		}
		if it.Angles != nil && !slices.ContainsFunc(it.Angles, func(a float64) bool {
			return math.Abs(math.Remainder(a-p.At.Angle(), 2*math.Pi)) < 1e-9
		}) {
			return fmt.Errorf("nest: %s is turned by %.1f deg, which it may not be", it.Name, p.At.Angle()*180/math.Pi)
		}
		r := it.Shape.Transform(p.At)
		_, edge := k.clearance()
		box := r.Outer.Bounds()
		least := min(box.Min.X, box.Min.Y, k.Width-box.Max.X, k.Height-box.Max.Y)
		if least < edge-tolerance {
			return fmt.Errorf("nest: %s on sheet %d is %.4f mm from the edge, wanted are %.4f mm", it.Name, p.Sheet+1, least, edge)
		}
		between, _ := k.clearance()
		for i, other := range placed[p.Sheet] {
			ob := other.Outer.Bounds()
			if ob.Distance(box) >= between {
				continue
			}
			if d := outline.Between(r, other).Distance; d < between-tolerance {
				return fmt.Errorf("nest: %s and %s on sheet %d are %.4f mm apart, wanted are %.4f mm",
					items[who[p.Sheet][i]].Name, it.Name, p.Sheet+1, d, between)
			}
		}
		placed[p.Sheet] = append(placed[p.Sheet], r)
		who[p.Sheet] = append(who[p.Sheet], p.Item)
	}
	return nil
}

// Bound is a number of sheets below which no layout can go, by area alone, for each stock.
func Bound(items []Item, stock []Stock) []int {
	out := make([]int, len(stock))
	for i, k := range stock {
		area := 0.0
		for _, it := range items {
			if it.Stock == k.Name {
				area += it.Shape.Area() * float64(it.Quantity)
			}
		}
		out[i] = int(math.Ceil(area/(k.Width*k.Height) - 1e-12))
	}
	return out
}
