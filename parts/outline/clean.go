package outline

import "math"

// Clean returns the outline in canonical form: no segments without length, pieces of one line or one
// circle joined, a full circle as two half circles, arcs of more than three quarters of a turn as two
// equal halves, starting at the lowest vertex and of several the leftmost. It runs the same way
// round. The result is nil if nothing is left, or if the outline has numbers that are none.
func (o Outline) Clean() Outline {
	if !o.usable() {
		return nil
	}
	return tidy(o, toleranceFor(o.Bounds()))
}

// AsCircle returns centre and radius if the outline is one full circle, either way round.
func (o Outline) AsCircle() (centre Point, radius float64, ok bool) {
	if len(o) == 2 && o[0].Bulge == o[1].Bulge && math.Abs(o[0].Bulge) == 1 {
		d := o[0].Dist(o[1].Point)
		if !(d > 0) || !o.usable() {
			return Point{}, 0, false
		}
		return o[0].Lerp(o[1].Point, 0.5), d / 2, true
	}
	for _, v := range o {
		if v.Bulge == 0 {
			return Point{}, 0, false
		}
	}
	if c := o.Clean(); len(c) == 2 && c[0].Bulge == c[1].Bulge && math.Abs(c[0].Bulge) == 1 {
		return c.AsCircle()
	}
	return Point{}, 0, false
}

// run is a piece of outline while pieces of the same line or circle are being joined.
type run struct {
	a, b    Point
	carrier curve   // the longest piece so far: the line or circle of all of them
	sweep   float64 // of all pieces together
	pieces  int
	through []Point // the vertices dropped
}

// tidy does the work of Clean: see there.
func tidy(o Outline, tol float64) Outline {
	// 1. Drop what has no length: a vertex goes with the last one kept.
	vs := make(Outline, 0, len(o))
	cs := make([]curve, 0, len(o))
	for i := range o {
		if c := o.curve(i); c.len > 4*tol || c.a.Dist(c.b) > tol {
			vs = append(vs, o[i])
			cs = append(cs, c)
		}
	}
	if len(vs) < 2 {
		return nil
	}
	if len(vs) < len(o) {
		for i := range vs {
			cs[i] = vs.curve(i)
		}
	}
	return tidyCurves(cs, tol)
}

// tidyCurves does the rest of tidy for curves with a length. It may overwrite cs.
func tidyCurves(cs []curve, tol float64) Outline {
	if cs = withoutSpikes(cs, tol); len(cs) < 2 {
		return nil
	}
	// 2. Mostly no segment goes on in the direction of the one before it, and nothing can be joined.
	smooth := false
	for i := range cs {
		c, d := &cs[i], &cs[(i+1)%len(cs)]
		if c.bends(d, tol) {
			continue
		}
		smooth = true
		break
	}
	if !smooth {
		out := make(Outline, 0, len(cs)+2)
		for i := range cs {
			r := run{a: cs[i].a, b: cs[i].b, carrier: cs[i], sweep: cs[i].sweep(), pieces: 1}
			out = r.write(out, tol)
		}
		return startLowest(out, tol)
	}
	return joinRuns(cs, tol)
}

// withoutSpikes removes places where the outline goes out and comes back the same way within the tolerance.
func withoutSpikes(cs []curve, tol float64) []curve {
	for i := 0; i < len(cs) && len(cs) > 1; {
		n := len(cs)
		j := (i + 1) % n
		c, d := cs[i], cs[j]
		if c.u.Dot(d.t) > -0.9 {
			i++
			continue
		}
		// The far end of the shorter one must lie on the longer one, and its middle too.
		short, long, end := &c, &d, c.a
		if d.len < c.len {
			short, long, end = &d, &c, d.b
		}
		if _, ok := long.on(end, 4*tol); !ok || math.Abs(long.left(short.mid())) > 4*tol {
			i++
			continue
		}
		var rest curve
		s := max(0, min(long.len, long.param(end)))
		if d.len < c.len {
			rest = newCurve(c.a, d.b, c.part(0, s))
		} else {
			rest = newCurve(c.a, d.b, d.part(s, d.len))
		}
		cs[i] = rest
		cs = append(cs[:j], cs[j+1:]...)
		if j == 0 {
			i-- // the first one went, all others moved down
		}
		if rest.len <= 4*tol {
			// Nothing is left of it: the neighbours meet. Its ends are one place but for the tolerance.
			cs = append(cs[:i], cs[i+1:]...)
			if m := len(cs); m > 0 {
				b := &cs[(i+m-1)%m]
				*b = newCurve(b.a, cs[i%m].a, b.bulge)
			}
		}
		i = max(0, i-1)
	}
	return cs
}

// bends says that d goes on from the end of c in another direction than c arrives, or with another
// curvature, by enough that they are no pieces of one line or circle. Over a short length l the one strays
// from the other's circle by angle l + difference of curvature l^2/2; if that is within the tolerance at l and at
// l/2, the first term is within 5 and the second within 6 tolerances.
func (c *curve) bends(d *curve, tol float64) bool {
	if (c.k == 0) != (d.k == 0) || c.k*d.k < 0 || c.u.Dot(d.t) <= 0 {
		return true
	}
	l := min(c.len, d.len)
	if math.Abs(c.u.Cross(d.t))*l > 10*tol {
		return true
	}
	l = min(l, 0.5/max(c.k, -c.k, d.k, -d.k))
	return math.Abs(c.k-d.k)*l*l/2 > 15*tol
}

// joinRuns joins the segments of a closed outline that are pieces of one line or circle.
func joinRuns(cs []curve, tol float64) Outline {
	runs := make([]run, len(cs))
	for i, c := range cs {
		runs[i] = run{a: c.a, b: c.b, carrier: c, sweep: c.sweep(), pieces: 1}
	}
	// 3. Start at a true corner, so that no run is cut in two by the start.
	n := len(runs)
	start := -1
	for i := range runs {
		prev := runs[(i+n-1)%n]
		if _, ok := prev.join(&runs[i], tol); !ok {
			start = i
			break
		}
	}
	if start < 0 {
		start = 0
	}
	// 4. Join.
	joined := make([]run, 0, n)
	for i := range n {
		r := runs[(start+i)%n]
		if m := len(joined); m > 0 {
			if j, ok := joined[m-1].join(&r, tol); ok {
				joined[m-1] = j
				continue
			}
		}
		joined = append(joined, r)
	}
	if m := len(joined); m > 1 {
		if j, ok := joined[m-1].join(&joined[0], tol); ok {
			joined[0] = j
			joined = joined[:m-1]
		}
	}
	if len(joined) == 1 {
		if math.Abs(joined[0].sweep) < math.Pi {
			return nil // a line there and back
		}
		return joined[0].circle()
	}
	// 5. Write.
	out := make(Outline, 0, len(joined))
	for i := range joined {
		out = joined[i].write(out, tol)
	}
	return startLowest(out, tol)
}

// join returns the run that continues r with s, if they are pieces of one line or one circle.
func (r *run) join(s *run, tol float64) (run, bool) {
	rc, sc := &r.carrier, &s.carrier
	if r.pieces == 1 && s.pieces == 1 && rc.bends(sc, tol) {
		return run{}, false
	}
	if (rc.k == 0) != (sc.k == 0) || rc.k*sc.k < 0 {
		return run{}, false
	}
	if rc.k == 0 {
		if rc.t.Dot(sc.t) <= 0 {
			return run{}, false
		}
		line := newCurve(r.a, s.b, 0)
		if math.Abs(line.left(r.b)) > tol {
			return run{}, false
		}
		for _, p := range r.through {
			if math.Abs(line.left(p)) > tol {
				return run{}, false
			}
		}
		return r.with(s, line), true
	}
	// Sweeps of very short arcs are vague, so a full turn is not known exactly.
	if math.Abs(r.sweep+s.sweep) > 2*math.Pi+0.1 || rc.u.Dot(sc.t) <= 0 && r.pieces == 1 && s.pieces == 1 {
		return run{}, false
	}
	if rc.len >= sc.len {
		if !sc.follows(rc, tol) {
			return run{}, false
		}
		return r.with(s, *rc), true
	}
	if !rc.follows(sc, tol) {
		return run{}, false
	}
	for _, p := range r.through {
		if math.Abs(sc.left(p)) > tol {
			return run{}, false
		}
	}
	return r.with(s, *sc), true
}

// follows says whether the arc c lies on the circle of d.
func (c *curve) follows(d *curve, tol float64) bool {
	return math.Abs(d.left(c.a)) <= tol && math.Abs(d.left(c.b)) <= tol && math.Abs(d.left(c.mid())) <= tol
}

func (r *run) with(s *run, carrier curve) run {
	return run{
		a: r.a, b: s.b, carrier: carrier, sweep: r.sweep + s.sweep,
		pieces:  r.pieces + s.pieces,
		through: append(append(append([]Point(nil), r.through...), r.b), s.through...),
	}
}

// circle writes a run of a full turn.
func (r *run) circle() Outline {
	centre := r.carrier.centre()
	o := Circle(centre, 1/math.Abs(r.carrier.k))
	if r.sweep < 0 {
		o[0].Bulge, o[1].Bulge = -1, -1
	}
	return o
}

// write appends the run's vertices.
func (r *run) write(out Outline, tol float64) Outline {
	if r.carrier.k == 0 {
		return append(out, Vertex{Point: r.a})
	}
	if r.pieces == 1 && math.Abs(r.sweep) <= longestArc {
		b := r.carrier.bulge
		if math.Abs(b)*r.a.Dist(r.b)/2 <= tol/2 {
			b = 0 // as good as straight
		}
		return append(out, Vertex{r.a, b})
	}
	// The turn along the carrier from a to b, the one nearest to the sum of the pieces.
	c := &r.carrier
	sweep := c.k * (c.param(r.b) - c.param(r.a))
	sweep += 2 * math.Pi * math.Round((r.sweep-sweep)/(2*math.Pi))
	if math.Abs(sweep) > longestArc {
		centre := c.centre()
		mid := centre.Add(r.a.Sub(centre).rot(math.Cos(sweep/2), math.Sin(sweep/2)))
		return append(out, Vertex{r.a, math.Tan(sweep / 8)}, Vertex{mid, math.Tan(sweep / 8)})
	}
	b := math.Tan(sweep / 4)
	if math.Abs(b)*r.a.Dist(r.b)/2 <= tol/2 {
		b = 0
	}
	return append(out, Vertex{r.a, b})
}

// startLowest turns the order of the vertices so that the lowest is the first, of several the
// leftmost.
func startLowest(o Outline, tol float64) Outline {
	low := o[0].Y
	for _, v := range o {
		low = min(low, v.Y)
	}
	best := -1
	for i, v := range o {
		if v.Y <= low+tol && (best < 0 || v.X < o[best].X) {
			best = i
		}
	}
	out := make(Outline, 0, len(o))
	return append(append(out, o[best:]...), o[:best]...)
}
