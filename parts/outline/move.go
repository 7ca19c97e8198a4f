package outline

// Reverse returns the outline run backwards: counter-clockwise becomes clockwise.
func (o Outline) Reverse() Outline {
	n := len(o)
	if n == 0 {
		return nil
	}
	out := make(Outline, n)
	for i := range o {
		// Vertex i of the result is vertex n-i of o; the segment that leaves it is the one that arrived.
		out[i] = Vertex{Point: o[(n-i)%n].Point, Bulge: -o[(2*n-i-1)%n].Bulge}
	}
	return out
}

// Reverse returns the path run backwards.
func (p Path) Reverse() Path {
	n := len(p)
	if n == 0 {
		return nil
	}
	out := make(Path, n)
	for i := range p {
		out[i].Point = p[n-1-i].Point
		if i < n-1 {
			out[i].Bulge = -p[n-2-i].Bulge
		}
	}
	return out
}

func moved(vs []Vertex, t Transform) []Vertex {
	if vs == nil {
		return nil
	}
	out := make([]Vertex, len(vs))
	for i, v := range vs {
		out[i] = Vertex{Point: t.Apply(v.Point), Bulge: v.Bulge}
		if t.Mirror {
			out[i].Bulge = -v.Bulge
		}
	}
	return out
}

// Transform returns the outline moved by t. A mirroring motion turns counter-clockwise into
// clockwise.
func (o Outline) Transform(t Transform) Outline { return moved(o, t) }

// Transform returns the path moved by t.
func (p Path) Transform(t Transform) Path { return moved(p, t) }

// Transform returns the region moved by t, its outer outline still counter-clockwise and its holes
// clockwise, in the same order.
func (r Region) Transform(t Transform) Region {
	out := Region{Outer: r.Outer.Transform(t)}
	if t.Mirror {
		out.Outer = out.Outer.Reverse()
	}
	if r.Holes != nil {
		out.Holes = make([]Outline, len(r.Holes))
	}
	for i, h := range r.Holes {
		out.Holes[i] = h.Transform(t)
		if t.Mirror {
			out.Holes[i] = out.Holes[i].Reverse()
		}
	}
	return out
}

// TransformAll returns all regions moved by t.
func TransformAll(rs []Region, t Transform) []Region {
	out := make([]Region, len(rs))
	for i, r := range rs {
		out[i] = r.Transform(t)
	}
	return out
}
