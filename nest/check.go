package nest

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"pinwright/parts/outline"
)

const (
	// largestSheet is the longest side of a sheet, mm; a longer one is a slip of units.
	largestSheet = 1e5
	// mostCopies is how many parts are nested at once.
	mostCopies = 1_000_000
)

// check refuses what cannot be nested, all of it at once.
func check(items []Item, stock []Stock) error {
	var faults []error
	for i, k := range stock {
		faults = append(faults, k.faults()...)
		if slices.ContainsFunc(stock[:i], func(o Stock) bool { return o.Name == k.Name }) {
			faults = append(faults, fmt.Errorf("nest: stock %s is there twice: give each kind of sheet its own name", k.Name))
		}
	}
	copies := 0
	for i, it := range items {
		for _, err := range it.faults(stock) {
			faults = append(faults, fmt.Errorf("nest: %s: %w", it.called(i), err))
		}
		// Quantities that are nothing or too much are faults of their own, and must not add up to a sum that
		// wraps round.
		copies += min(max(it.Quantity, 0), mostCopies+1)
		copies = min(copies, mostCopies+1)
	}
	if copies > mostCopies {
		faults = append(faults, fmt.Errorf("nest: more than %d parts are asked for at once: split the job", mostCopies))
	}
	return errors.Join(faults...)
}

// called is the name of item i in messages.
func (it Item) called(i int) string {
	if it.Name == "" {
		return fmt.Sprintf("item %d", i+1)
	}
	return it.Name
}

// sound tells whether v is a number that can be a size.
func sound(v float64) bool { return !math.IsNaN(v) && !math.IsInf(v, 0) && v >= 0 }

// faults lists what is wrong with a stock.
func (k Stock) faults() (out []error) {
	for _, v := range []struct {
		name  string
		value float64
	}{{"width", k.Width}, {"height", k.Height}, {"margin", k.Margin}, {"web", k.Web}, {"kerf", k.Kerf}} {
		if !sound(v.value) {
			out = append(out, fmt.Errorf("nest: stock %s has a %s of %g mm, which is no size", k.Name, v.name, v.value))
		}
	}
	if k.Quantity < 0 {
		out = append(out, fmt.Errorf("nest: stock %s has %d sheets: give 0 or more", k.Name, k.Quantity))
	}
	if len(out) > 0 {
		return out
	}
	if k.Width == 0 || k.Height == 0 || k.Width > largestSheet || k.Height > largestSheet {
		return append(out, fmt.Errorf("nest: stock %s of %g x %g mm is no sheet: sides are above 0 and up to %g mm", k.Name, k.Width, k.Height, largestSheet))
	}
	if w, h := k.free(); w <= 0 || h <= 0 {
		out = append(out, fmt.Errorf("nest: stock %s of %g x %g mm is all margin (%g mm, and half a kerf of %g mm): nothing is left to cut from",
			k.Name, k.Width, k.Height, k.Margin, k.Kerf))
	}
	return out
}

// faults lists what is wrong with an item. Whether it fits its sheet is asked if nothing else is wrong.
func (it Item) faults(stock []Stock) (out []error) {
	if it.Quantity < 1 {
		out = append(out, fmt.Errorf("a quantity of %d is nothing to cut: give 1 or more, or leave the part out", it.Quantity))
	}
	if slices.ContainsFunc(it.Angles, func(a float64) bool { return math.IsNaN(a) || math.IsInf(a, 0) }) {
		out = append(out, errors.New("an allowed turn is not a number"))
	}
	if it.Angles != nil && len(it.Angles) == 0 {
		out = append(out, errors.New("no turn is allowed at all: list the allowed ones, or none for any turn"))
	}
	if err := it.Shape.Validate(); err != nil {
		out = append(out, err)
	}
	i := slices.IndexFunc(stock, func(k Stock) bool { return k.Name == it.Stock })
	if i < 0 {
		return append(out, fmt.Errorf("there is no stock %s", it.Stock))
	}
	if len(out) > 0 || len(stock[i].faults()) > 0 {
		return out
	}
	if err := it.fits(stock[i]); err != nil {
		out = append(out, err)
	}
	return out
}

// fits says by how much an item is too large for a sheet in all its allowed turns, if it is.
func (it Item) fits(k Stock) error {
	w, h := k.free()
	if len(turns(it, w, h)) > 0 || (it.Flip && len(turns(it.flipped(), w, h)) > 0) {
		return nil
	}
	o := it.Shape.Outer
	among, allowed := it.Angles, " in any allowed turn"
	if among == nil {
		among, allowed = []float64{roomiest(o, w, h)}, " however it is turned"
	}
	best := slices.MinFunc(among, func(a, b float64) int {
		if over(o, a, w, h) < over(o, b, w, h) {
			return -1
		}
		return 1
	})
	box := o.Transform(outline.Place(best, false, outline.Point{})).Bounds()
	return fmt.Errorf("needs %.1f x %.1f mm%s, and a sheet of %s has %.1f x %.1f mm inside its margins, so it is %.1f mm too large: use a larger sheet, or split the part",
		box.Width(), box.Height(), allowed, k.Name, w, h, over(o, best, w, h))
}

// flipped is the item turned over.
func (it Item) flipped() Item {
	it.Shape = it.Shape.Transform(outline.Place(0, true, outline.Point{}))
	return it
}

// Bound is a number of sheets below which no layout can go, for each stock: the area of the parts over
// that of the free part of a sheet, with the web and kerf round every part left out.
func Bound(items []Item, stock []Stock) []int {
	out := make([]int, len(stock))
	for i, k := range stock {
		area := 0.0
		for _, it := range items {
			if it.Stock == k.Name {
				area += it.Shape.Area() * float64(it.Quantity)
			}
		}
		if w, h := k.free(); area > 0 && w > 0 && h > 0 {
			out[i] = int(math.Ceil(area/(w*h) - 1e-9))
		}
	}
	return out
}
