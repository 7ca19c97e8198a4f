package linkage

import (
	"fmt"
	"math"
	"strings"
)

// agrees is how far a redundant length may be from what the others give, mm: the accuracy that is
// promised for centre distances.
const agrees = 0.001 + 1e-9

// straightWithin is how far three lengths may be from lying on one line, mm, and still mean a straight
// link: one and a half units of their last decimal, at most a thousandth. Lengths typed with three
// decimals (33.333 + 33.333 = 66.667) must not give a bulge, for a thousandth of slack would push the
// middle pin a fifth of a millimetre sideways; lengths with all their digits mean what they say.
func straightWithin(lengths ...float64) float64 {
	decimals := 0
	for _, x := range lengths {
		scale := math.Pow10(decimals)
		for decimals < 9 && math.Abs(x*scale-math.Round(x*scale)) > 1e-5 {
			decimals++
			scale *= 10
		}
	}
	return math.Min(agrees, 1.5*math.Pow10(-decimals))
}

// apart is the least distance of two pins of a link, mm.
const apart = 1e-3

// shapes returns every rigid shape that the lengths of a link allow, as local points in the order of
// the pins: first pin at the origin, second on the positive x axis. Mirror images are separate
// entries; pins on one line give one shape only. It follows the lengths from triangle to triangle:
//
//  1. start with a pin pair whose length is given;
//  2. place any pin that has two given lengths to placed pins by two circles: two sides, or one when
//     the three lie on one line; a third given length decides, and is checked;
//  3. when all pins are placed, move the first pin to the origin and the second onto the x axis.
//
// Time grows with 2^(n-2) for n pins.
func shapes(l Link) ([][]Point, error) {
	n := len(l.Pins)
	at := map[string]int{}
	for i, p := range l.Pins {
		at[p] = i
	}
	d := make([][]float64, n) // 0: not given
	for i := range d {
		d[i] = make([]float64, n)
	}
	for _, g := range l.Lengths {
		i, j := at[g.A], at[g.B]
		d[i][j], d[j][i] = g.MM, g.MM
	}
	if n == 2 {
		return [][]Point{{{}, {X: d[0][1]}}}, nil
	}
	order, stuck := placingOrder(d)
	if order == nil {
		return nil, fmt.Errorf("link %s: the lengths do not fix where pin %s is: give two lengths from it to pins that are fixed already", l.Name, l.Pins[stuck])
	}
	name := func(i, j int) string { return l.Pins[i] + "-" + l.Pins[j] }

	found := [][]Point{make([]Point, n)}
	found[0][order[1]] = Point{X: d[order[0]][order[1]]}
	for k := 2; k < n; k++ {
		pin := order[k]
		var next [][]Point
		var why error
		for _, pts := range found {
			two, err := placePin(pts, order[:k], pin, d, name)
			if err != nil {
				why = fmt.Errorf("link %s: %w", l.Name, err)
				continue
			}
			for _, p := range two {
				q := append([]Point(nil), pts...)
				q[pin] = p
				next = append(next, q)
			}
		}
		if len(next) == 0 {
			return nil, why
		}
		found = next
	}
	for i := range found {
		found[i] = inFrame(found[i])
	}
	found = distinctShapes(found)
	if len(found) == 0 {
		return nil, fmt.Errorf("link %s: its lengths put two pins into one place: make them one joint", l.Name)
	}
	return found, nil
}

// placingOrder lists the pins so that each after the second has two given lengths to earlier ones.
// When there is no such order it returns nil and a pin that could not be placed.
func placingOrder(d [][]float64) (order []int, stuck int) {
	n := len(d)
	best := 0
	for i := 0; i < n; i++ {
		for j := i + 1; j < n; j++ {
			if d[i][j] == 0 {
				continue
			}
			o := []int{i, j}
			in := make([]bool, n)
			in[i], in[j] = true, true
			for grown := true; grown; {
				grown = false
				for k := 0; k < n; k++ {
					ties := 0
					for _, m := range o {
						if d[k][m] > 0 {
							ties++
						}
					}
					if !in[k] && ties >= 2 {
						o, in[k], grown = append(o, k), true, true
					}
				}
			}
			if len(o) == n {
				return o, 0
			}
			if len(o) > best {
				best = len(o)
				for k := n - 1; k >= 0; k-- {
					if !in[k] {
						stuck = k
					}
				}
			}
		}
	}
	return nil, stuck
}

// placePin returns the one or two places of a pin from its lengths to pins that are placed.
func placePin(pts []Point, placed []int, pin int, d [][]float64, name func(i, j int) string) ([]Point, error) {
	a, b, span := -1, -1, -1.0
	for i, m := range placed {
		for _, o := range placed[:i] {
			if d[pin][m] > 0 && d[pin][o] > 0 && dist(pts[m], pts[o]) > span {
				a, b, span = o, m, dist(pts[m], pts[o])
			}
		}
	}
	ra, rb := d[pin][a], d[pin][b]
	sides := [3]float64{ra, rb, span}
	names := [3]string{name(pin, a), name(pin, b), name(a, b)}
	long := 0
	for i := range sides {
		if sides[i] > sides[long] {
			long = i
		}
	}
	o1, o2 := (long+1)%3, (long+2)%3
	slack := sides[o1] + sides[o2] - sides[long]
	straight := straightWithin(ra, rb, d[a][b])
	if slack < -straight {
		return nil, fmt.Errorf("lengths %s %s, %s %s and %s %s make no triangle: %s is %s longer than the other two together: shorten it or lengthen them",
			names[0], millimetres(sides[0]), names[1], millimetres(sides[1]), names[2], millimetres(sides[2]),
			names[long], millimetres(-slack))
	}
	u := Point{X: (pts[b].X - pts[a].X) / span, Y: (pts[b].Y - pts[a].Y) / span}
	var out []Point
	if slack <= straight {
		x := ra // along a to b, on the far side of a when the pin lies behind it
		switch long {
		case 0: // beyond b
			x = (ra + span + rb) / 2
		case 1: // behind a
			x = -(ra + rb - span) / 2
		case 2: // between
			x = (ra + span - rb) / 2
		}
		out = []Point{addScaled(pts[a], x, u)}
	} else {
		x := ((ra-rb)*(ra+rb) + span*span) / (2 * span)
		h := math.Sqrt(math.Max(0, (ra-x)*(ra+x)))
		foot := addScaled(pts[a], x, u)
		out = []Point{addScaled(foot, h, left(u)), addScaled(foot, -h, left(u))}
	}
	var fit []Point
	worst, which, gives := math.Inf(1), 0, 0.0
	for _, p := range out {
		off, w, v := 0.0, 0, 0.0
		for _, m := range placed {
			if d[pin][m] == 0 {
				continue
			}
			if e := math.Abs(dist(p, pts[m]) - d[pin][m]); e > off {
				off, w, v = e, m, dist(p, pts[m])
			}
		}
		if off <= agrees {
			fit = append(fit, p)
		}
		if off < worst {
			worst, which, gives = off, w, v
		}
	}
	if len(fit) == 0 {
		return nil, fmt.Errorf("length %s %s does not agree with the others, which make it %s: leave it out or correct it by %s",
			name(pin, which), millimetres(d[pin][which]), millimetres(gives), millimetres(worst))
	}
	return fit, nil
}

// inFrame moves the points so that the first is the origin and the second on the positive x axis.
func inFrame(pts []Point) []Point {
	d := sub(pts[1], pts[0])
	n := norm(d)
	u := Point{X: 1}
	if n > 0 {
		u = Point{X: d.X / n, Y: d.Y / n}
	}
	out := make([]Point, len(pts))
	for i, p := range pts {
		q := sub(p, pts[0])
		out[i] = Point{X: dot(u, q), Y: cross(u, q)}
	}
	out[0], out[1] = Point{}, Point{X: n}
	return out
}

// distinctShapes leaves out repeated shapes and those that put two pins into one place.
func distinctShapes(all [][]Point) [][]Point {
	var out [][]Point
next:
	for _, s := range all {
		for i := range s {
			for j := range i {
				if dist(s[i], s[j]) < apart {
					continue next
				}
			}
		}
		for _, t := range out {
			same := true
			for i := range s {
				same = same && dist(s[i], t[i]) < 1e-9
			}
			if same {
				continue next
			}
		}
		out = append(out, s)
	}
	return out
}

// checkLengths reports what is wrong with the lengths of a link whose pins are known to be sound.
func checkLengths(l Link) []error {
	var errs []error
	bad := func(format string, a ...any) {
		errs = append(errs, fmt.Errorf("link %s: "+format, append([]any{l.Name}, a...)...))
	}
	has := map[string]bool{}
	for _, p := range l.Pins {
		has[p] = true
	}
	seen := map[[2]string]float64{}
	for _, g := range l.Lengths {
		switch {
		case !has[g.A] || !has[g.B]:
			miss := g.A
			if has[g.A] {
				miss = g.B
			}
			bad("length %s-%s: %s is not one of its pins (%s)", g.A, g.B, miss, strings.Join(l.Pins, ", "))
			continue
		case g.A == g.B:
			bad("length %s-%s is from a pin to itself: name two pins", g.A, g.B)
			continue
		case !finite(g.MM) || g.MM <= 0:
			bad("length %s-%s is %s: it must be more than 0", g.A, g.B, millimetres(g.MM))
			continue
		case g.MM > 1e6 || g.MM < 1e-3:
			bad("length %s-%s is %s: a length is from 0.001 mm to 1000000 mm", g.A, g.B, millimetres(g.MM))
			continue
		}
		key := [2]string{g.A, g.B}
		if g.B < g.A {
			key = [2]string{g.B, g.A}
		}
		if old, ok := seen[key]; ok {
			bad("length %s-%s is given twice, %s and %s: keep one", g.A, g.B, millimetres(old), millimetres(g.MM))
			continue
		}
		seen[key] = g.MM
	}
	if want := 2*len(l.Pins) - 3; len(errs) == 0 && len(seen) < want {
		bad("%d pins want %d lengths to fix the shape, %d given", len(l.Pins), want, len(seen))
	}
	return errs
}
