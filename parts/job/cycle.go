package job

import (
	"math"
	"slices"
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
	s := "line " + itoa(c.rows[i].Line)
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
				if d := math.Hypot(p.X-g.At.X, p.Y-g.At.Y); d > c.tolerance {
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
//  1. The distance of every pair is followed through the rows; one that changes by more than the
//     tolerance is an error with both rows.
//  2. In every row the pins are written in a frame on the link (origin in one pin, x axis through the
//     one farthest from it); the mean over the rows is the link's form. The lengths are the distances
//     of these mean places, so they agree with each other however the table was rounded.
//  3. A pin that changes sides (a flipped assembly in the table) shows as a place that moves.
//
// Lengths that the job states itself stay as stated and must be those of the table within the
// tolerance. Time: rows times pairs of pins.
func (r *reader) lengthsFromCycle(dr *draft, c *cycleTable) {
	paths := make([][]linkage.Point, len(dr.pins))
	for i, p := range dr.pins {
		if c.wrong[p] {
			dr.sound = false
			return
		}
		paths[i] = c.path(p)
		if paths[i] != nil {
			continue
		}
		if fixed := r.fixedPath(p, len(c.rows)); fixed != nil {
			paths[i] = fixed
			continue
		}
		if len(dr.lengths) == 0 {
			r.fail(dr.at, "add columns "+p+".x and "+p+".y to "+short(c.file)+", or state the lengths of the link", "link %s: the cycle has no joint %s", dr.name, p)
			dr.sound = false
		}
		return
	}
	base, far := 0, 1
	for i := range paths {
		for k := range i {
			if distance(paths[k][0], paths[i][0]) > distance(paths[base][0], paths[far][0]) {
				base, far = k, i
			}
			r.stretch(dr, c, paths, k, i)
		}
	}
	if !dr.sound {
		return
	}
	form := make([]linkage.Point, len(paths))
	for row := range c.rows {
		for i := range paths {
			p := inFrame(paths[base][row], paths[far][row], paths[i][row])
			form[i].X += p.X / float64(len(c.rows))
			form[i].Y += p.Y / float64(len(c.rows))
		}
	}
	for row := range c.rows {
		for i := range paths {
			p := inFrame(paths[base][row], paths[far][row], paths[i][row])
			// A needle of a triangle turns a small error of length into a large one of height.
			if first := inFrame(paths[base][0], paths[far][0], paths[i][0]); math.Abs(p.Y-first.Y) > math.Max(c.tolerance, math.Sqrt(c.tolerance*distance(form[base], form[far]))) {
				r.fail(c.rows[row], "export one assembly of the linkage", "link %s: pin %s changes sides at %s", dr.name, dr.pins[i], c.row(row))
				dr.sound = false
				return
			}
		}
	}
	given := slices.Clone(dr.lengths)
	if len(given) > 0 && len(missingPairs(dr.pins, given)) > 0 {
		given = nil // a few lengths only: they are checked, the form is the table's
		kept := dr.lengths
		dr.lengths = nil
		defer func() { r.agree(dr, c, kept) }()
	}
	for i := range paths {
		for k := range i {
			d := distance(form[k], form[i])
			if given == nil {
				if d == 0 {
					r.fail(c.columnAt(dr.pins[i]), "make them one joint", "link %s: joints %s and %s are at the same place", dr.name, dr.pins[k], dr.pins[i])
					dr.sound = false
					return
				}
				r.state(dr, stated{dr.pins[k], dr.pins[i], d, c.rows[0], "the cycle"})
				continue
			}
			r.agreeOne(dr, c, given, dr.pins[k], dr.pins[i], d)
		}
	}
}

// agree checks lengths of the job against those of the table.
func (r *reader) agree(dr *draft, c *cycleTable, kept []stated) {
	for _, s := range dr.lengths {
		r.agreeOne(dr, c, kept, s.a, s.b, s.mm)
	}
}

func (r *reader) agreeOne(dr *draft, c *cycleTable, kept []stated, a, b string, mm float64) {
	for _, s := range kept {
		if s.joins(a, b) && math.Abs(s.mm-mm) > c.tolerance {
			r.fail(s.at, "keep the right one", "link %s: %s is %s mm here, but %s mm in the cycle %s (tolerance %s mm)", dr.name, s.pair(), figure(s.mm), figure(mm), short(c.file), figure(c.tolerance))
		}
	}
}

// stretch reports a pair of pins whose distance changes.
func (r *reader) stretch(dr *draft, c *cycleTable, paths [][]linkage.Point, a, b int) {
	least, most := 0, 0
	for row := range c.rows {
		d := distance(paths[a][row], paths[b][row])
		if d < distance(paths[a][least], paths[b][least]) {
			least = row
		}
		if d > distance(paths[a][most], paths[b][most]) {
			most = row
		}
	}
	low, high := distance(paths[a][least], paths[b][least]), distance(paths[a][most], paths[b][most])
	if high-low > c.tolerance {
		r.fail(c.rows[most], "are these joints on one link? If so, correct the table, or state a larger tolerance",
			"link %s stretches: %s-%s is %s mm at %s and %s mm at %s, %s mm apart (tolerance %s mm)",
			dr.name, dr.pins[a], dr.pins[b], figure(low), c.row(least), figure(high), c.row(most), figure(high-low), figure(c.tolerance))
		dr.sound = false
	}
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

func distance(a, b linkage.Point) float64 { return math.Hypot(b.X-a.X, b.Y-a.Y) }

// inFrame writes p in the frame with its origin in a and its x axis through b.
func inFrame(a, b, p linkage.Point) linkage.Point {
	l := distance(a, b)
	if l == 0 {
		return linkage.Point{}
	}
	ux, uy := (b.X-a.X)/l, (b.Y-a.Y)/l
	x, y := p.X-a.X, p.Y-a.Y
	return linkage.Point{X: ux*x + uy*y, Y: ux*y - uy*x}
}
