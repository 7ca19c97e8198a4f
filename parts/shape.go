package parts

import (
	"math"

	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// body returns the outline of a link without its holes, in the link's frame, and false (with the
// error told) if the wanted shape does not come out.
func (k *maker) body(l job.Link, seats []seat) (outline.Outline, bool) {
	radii := k.radii(l, seats)
	discs := make([]outline.Disc, len(seats))
	for i, s := range seats {
		discs[i] = outline.Disc{Centre: s.at, Radius: radii[i]}
	}
	path := "linkage.links." + l.Name
	switch l.Shape {
	case job.Waisted:
		return k.waisted(l, discs)
	case job.Bent:
		return k.bent(l, discs)
	case job.Spider:
		return k.one(path, l.Name, spider(l, seats, discs))
	case job.DiscForm:
		reach := 0.0
		for _, d := range discs {
			reach = max(reach, d.Centre.Dist(discs[0].Centre)+d.Radius)
		}
		return outline.Circle(discs[0].Centre, reach), true
	case job.Plate:
		return outline.Hull(discs...), true
	}
	return k.one(path, l.Name, bar(l, discs))
}

// one takes the only region of a shape; several, or one with a hole, are an error.
func (k *maker) one(path, link string, rs []outline.Region) (outline.Outline, bool) {
	if len(rs) == 1 && len(rs[0].Holes) == 0 {
		return rs[0].Outer, true
	}
	k.fail(path, "", "link %s: its outline falls into %d pieces or closes on itself", link, len(rs))
	return nil, false
}

// bar is the hull of its discs; with a given width, a bar of that width with a round boss wherever a
// hole wants more, its inside corners filleted.
func bar(l job.Link, discs []outline.Disc) []outline.Region {
	if l.Width == 0 {
		return []outline.Region{{Outer: outline.Hull(discs...)}}
	}
	slim := make([]outline.Disc, len(discs))
	shapes := []outline.Region{{}}
	for i, d := range discs {
		slim[i] = outline.Disc{Centre: d.Centre, Radius: min(d.Radius, l.Width/2)}
		if d.Radius > l.Width/2 {
			shapes = append(shapes, outline.Region{Outer: outline.Circle(d.Centre, d.Radius)})
		}
	}
	shapes[0].Outer = outline.Hull(slim...)
	if len(shapes) == 1 {
		return shapes
	}
	return outline.RoundInside(outline.Union(shapes...), fillet(l, l.Width/2))
}

// fillet is the radius of inside corners: as given, else half an arm's width.
func fillet(l job.Link, arm float64) float64 {
	if l.Fillet > 0 {
		return l.Fillet
	}
	return arm
}

// spider has an arm from the middle of the pins to each of them, as wide as given, else as the
// slimmest pin asks for, and filleted inside corners.
func spider(l job.Link, seats []seat, discs []outline.Disc) []outline.Region {
	var middle outline.Point
	for _, d := range discs {
		middle = middle.Add(d.Centre.Scale(1 / float64(len(discs))))
	}
	arm := l.Width / 2
	if arm == 0 {
		arm = math.Inf(1)
		for i, d := range discs {
			if seats[i].toe == 0 {
				arm = min(arm, d.Radius)
			}
		}
		if math.IsInf(arm, 1) {
			arm = discs[0].Radius
		}
	}
	var shapes []outline.Region
	for _, d := range discs {
		shapes = append(shapes,
			outline.Region{Outer: outline.Hull(outline.Disc{Centre: middle, Radius: arm}, outline.Disc{Centre: d.Centre, Radius: min(arm, d.Radius)})},
			outline.Region{Outer: outline.Circle(d.Centre, d.Radius)})
	}
	return outline.RoundInside(outline.Union(shapes...), fillet(l, arm))
}
