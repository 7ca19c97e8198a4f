package job

import (
	"math"
	"slices"
	"strconv"
	"strings"

	"pinwright/parts/linkage"
)

// cycleTable is the positions of joints through the cycle.
type cycleTable struct {
	file      string
	tolerance float64 // mm
	columns   []jointColumn
	drive     []cell          // as written, empty when there is no such column
	rows      []spot          // place of each row
	wrong     map[string]bool // ground joints that the table puts elsewhere than the job
}

// jointColumn is the way of one joint.
type jointColumn struct {
	joint string
	at    spot
	path  []linkage.Point // in the order of the rows
}

func (c *cycleTable) path(joint string) []linkage.Point {
	for _, col := range c.columns {
		if col.joint == joint {
			return col.path
		}
	}
	return nil
}

// row names a row for a message.
func (c *cycleTable) row(i int) string {
	s := "line " + strconv.Itoa(c.rows[i].Line)
	if len(c.drive) > 0 {
		s += " (drive " + c.drive[i].text + ")"
	}
	return s
}

// cycle reads the table of joint coordinates; nil when there is none or it is wrong.
func (r *reader) cycle(v *value) *cycleTable {
	if !v.ok() {
		return nil
	}
	rows, ok := r.csvTable(v.get("file"))
	if !ok {
		return nil
	}
	c := &cycleTable{wrong: map[string]bool{}, file: v.get("file").text, tolerance: v.get("tolerance").numberOr(0.01)}
	heading := rows[0]
	driveColumn, driveUnit := -1, ""
	type pair struct {
		x, y         int
		xUnit, yUnit string
		at           spot
	}
	pairs := map[string]*pair{}
	var order []string
	sound := true
	for i, h := range heading {
		name, unit := h.text, ""
		if m := unitSuffix.FindStringSubmatch(name); m != nil {
			if _, known := unitNamed(m[2]); known {
				name, unit = m[1], m[2]
			}
		}
		if name == "drive" {
			if driveColumn >= 0 {
				r.fail(h.at, "keep one of them", "column drive is there twice")
				sound = false
			}
			if unit != "" && !slices.Contains(unitNames(angle), unit) {
				r.fail(h.at, "the units are "+oneOf(unitNames(angle)), "%s is no unit of an angle", unit)
				sound = false
			}
			driveColumn, driveUnit = i, unit
			continue
		}
		joint, axis, dotted := strings.Cut(name, ".")
		if !dotted || axis != "x" && axis != "y" || !jointName.form.MatchString(joint) {
			r.fail(h.at, "the columns are drive (may be absent), then NAME.x and NAME.y for each joint", "unknown column %s", short(h.text))
			sound = false
			continue
		}
		if unit != "" && !slices.Contains(unitNames(length), unit) {
			r.fail(h.at, "the units are "+oneOf(unitNames(length)), "%s is no unit of a length", unit)
			sound = false
		}
		p := pairs[joint]
		if p == nil {
			p = &pair{x: -1, y: -1, at: h.at}
			pairs[joint] = p
			order = append(order, joint)
		}
		column, columnUnit := &p.x, &p.xUnit
		if axis == "y" {
			column, columnUnit = &p.y, &p.yUnit
		}
		if *column >= 0 {
			r.fail(h.at, "keep one of them", "column %s.%s is there twice", joint, axis)
			sound = false
		}
		*column, *columnUnit = i, unit
	}
	for _, joint := range order {
		p := pairs[joint]
		if p.x < 0 || p.y < 0 {
			lacks := ".x"
			if p.y < 0 {
				lacks = ".y"
			}
			r.fail(p.at, "add the column", "joint %s has no column %s%s", joint, joint, lacks)
			sound = false
		}
	}
	if !sound {
		return nil
	}
	for _, joint := range order {
		c.columns = append(c.columns, jointColumn{joint: joint, at: pairs[joint].at})
	}
	coordinate := between(length, -farthest, farthest)
	for _, row := range rows[1:] {
		if !r.fits(row, heading) {
			sound = false
			continue
		}
		c.rows = append(c.rows, row[0].at)
		if driveColumn >= 0 {
			wide := between(angle, -1000*fullTurn, 1000*fullTurn)
			_, ok := r.cellQuantity(row[driveColumn], &wide, "drive", driveUnit)
			sound = sound && ok
			c.drive = append(c.drive, row[driveColumn])
		}
		for i := range c.columns {
			col := &c.columns[i]
			p := pairs[col.joint]
			x, okX := r.cellQuantity(row[p.x], &coordinate, col.joint+".x", p.xUnit)
			y, okY := r.cellQuantity(row[p.y], &coordinate, col.joint+".y", p.yUnit)
			sound = sound && okX && okY
			col.path = append(col.path, linkage.Point{X: x, Y: y})
		}
	}
	if sound && len(c.rows) < 2 {
		r.fail(c.rows[0], "export the whole cycle", "one position only: whether a link keeps its length shows in two or more")
		sound = false
	}
	if !sound {
		return nil
	}
	return c
}

// jointsOfCycle takes the places of the joints from the first row, adds moving joints that only the
// table and the links know, and checks that ground pivots stand where the job says.
func (r *reader) jointsOfCycle(joints []linkage.Joint, c *cycleTable, drafts []draft) []linkage.Joint {
	for i := range joints {
		path := c.path(joints[i].Name)
		if path == nil {
			continue
		}
		if g := joints[i].Ground; g != nil {
			at := c.columnAt(joints[i].Name)
			for k, p := range path {
				if d := p.Dist(g.At); d > c.tolerance {
					c.wrong[joints[i].Name] = true
					r.fail(at, "correct the ground place, or take the ground out if the joint moves", "ground joint %s: the job puts it at [%s, %s], %s of the table %s mm from there (tolerance %s mm)",
						joints[i].Name, figure(g.At.X), figure(g.At.Y), c.row(k), figure(d), figure(c.tolerance))
					break
				}
			}
			continue
		}
		near := path[0]
		joints[i].Near = &near
	}
	for _, col := range c.columns {
		if slices.ContainsFunc(joints, func(j linkage.Joint) bool { return j.Name == col.joint }) {
			continue
		}
		if !slices.ContainsFunc(drafts, func(d draft) bool { return d.names(col.joint) }) {
			continue
		}
		near := col.path[0]
		joints = append(joints, linkage.Joint{Name: col.joint, Near: &near})
		r.places["linkage.joints."+col.joint] = col.at.Position
	}
	return joints
}

// names tells whether the link's stated pins hold the joint.
func (d *draft) names(joint string) bool {
	return slices.ContainsFunc(d.v.get("pins").each(), func(p *value) bool { return p.text == joint })
}

func (c *cycleTable) columnAt(joint string) spot {
	for _, col := range c.columns {
		if col.joint == joint {
			return col.at
		}
	}
	return spot{}
}

// lengthsFromCycle recovers the lengths of a link from the positions of its pins.
//
//  1. The distance of every pair of pins is followed through the rows; one that changes by more than
//     the tolerance is an error with both rows.
//  2. A pin that lies on the other side of the link than in the first row (a flipped assembly) is an
//     error: distances do not show it.
//  3. Lengths that fix the link's shape and are stated in the job stay as stated and must be those of
//     the table within the tolerance; else the lengths are those of the table.
//
// Time: rows times pairs of pins.
func (r *reader) lengthsFromCycle(dr *draft, c *cycleTable) {
	samples := make([][]linkage.Point, len(c.rows))
	for _, p := range dr.pins {
		path := c.path(p)
		if path == nil {
			path = r.fixedPath(p, len(c.rows))
		}
		switch {
		case c.wrong[p]:
			dr.sound = false
			return
		case path == nil && len(dr.lengths) == 0:
			r.fail(dr.at, "add columns "+p+".x and "+p+".y to "+short(c.file)+", or state the lengths of the link", "link %s: the cycle has no joint %s", dr.name, p)
			dr.sound = false
			return
		case path == nil:
			return
		}
		for row := range samples {
			samples[row] = append(samples[row], path[row])
		}
	}
	link := []linkage.Link{{Name: dr.name, Pins: dr.pins}}
	all, err := linkage.Distances(link, dr.pins, samples)
	if err != nil {
		r.fail(dr.at, "", "%v", err)
		dr.sound = false
		return
	}
	for _, d := range all {
		if d.Max-d.Min > c.tolerance {
			r.fail(c.rows[d.MaxAt], "are these joints on one link? If so, correct the table, or state a larger tolerance",
				"link %s stretches: %s-%s is %s mm at %s and %s mm at %s, %s mm apart (tolerance %s mm)",
				dr.name, d.A, d.B, figure(d.Min), c.row(d.MinAt), figure(d.Max), c.row(d.MaxAt), figure(d.Max-d.Min), figure(c.tolerance))
			dr.sound = false
		} else if d.Mean == 0 {
			r.fail(c.columnAt(d.B), "make them one joint", "link %s: joints %s and %s are at the same place", dr.name, d.A, d.B)
			dr.sound = false
		}
	}
	if !dr.sound || r.flips(dr, c, samples) {
		dr.sound = false
		return
	}
	for _, d := range all {
		for _, s := range dr.lengths {
			if s.joins(d.A, d.B) && math.Abs(s.mm-d.Mean) > c.tolerance {
				r.fail(s.at, "keep the right one", "link %s: %s is %s mm here, but %s mm in the cycle %s (tolerance %s mm)", dr.name, s.pair(), figure(s.mm), figure(d.Mean), short(c.file), figure(c.tolerance))
			}
		}
	}
	if len(dr.lengths) > 0 && len(missingPairs(dr.pins, dr.lengths)) == 0 {
		return
	}
	recovered, err := linkage.Recover(link, dr.pins, samples, c.tolerance)
	if err != nil {
		r.fail(dr.at, "", "%v", err)
		dr.sound = false
		return
	}
	dr.lengths = nil // a few stated ones do not fix the shape: that is the table's
	for _, l := range recovered[0].Lengths {
		r.state(dr, stated{l.A, l.B, l.MM, c.rows[0], "the cycle"})
	}
}

// flips reports a pin that changes sides.
func (r *reader) flips(dr *draft, c *cycleTable, samples [][]linkage.Point) bool {
	first := samples[0]
	base, far := 0, 1
	for i := range first {
		for k := range i {
			if first[k].Dist(first[i]) > first[base].Dist(first[far]) {
				base, far = k, i
			}
		}
	}
	// A needle of a triangle turns a small error of length into a large one of height.
	enough := math.Max(c.tolerance, math.Sqrt(c.tolerance*first[base].Dist(first[far])))
	for row, now := range samples {
		for i := range now {
			if math.Abs(aside(now[base], now[far], now[i])-aside(first[base], first[far], first[i])) > 2*enough {
				r.fail(c.rows[row], "export one assembly of the linkage", "link %s: pin %s changes sides at %s", dr.name, dr.pins[i], c.row(row))
				return true
			}
		}
	}
	return false
}

// fixedPath stands still at a ground pivot that the table leaves out; nil for a moving joint.
func (r *reader) fixedPath(joint string, rows int) []linkage.Point {
	at, ok := r.groundAt[joint]
	if !ok {
		return nil
	}
	path := make([]linkage.Point, rows)
	for i := range path {
		path[i] = at
	}
	return path
}

// aside is how far p lies to the left of the line from a to b, mm.
func aside(a, b, p linkage.Point) float64 { return b.Sub(a).Unit().Cross(p.Sub(a)) }
