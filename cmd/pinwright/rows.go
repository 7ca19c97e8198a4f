package main

import (
	"math"
	"strings"

	"pinwright/export/list"
	"pinwright/parts/job"
	"pinwright/parts/linkage"
)

// pathTable lists where every joint is through the cycle, and at what angle each copy's drive stands.
func pathTable(j job.Job, c *linkage.Cycle) list.PathTable {
	var t list.PathTable
	l := c.Mechanism().Linkage()
	for _, joint := range l.Joints {
		t.Points = append(t.Points, joint.Name)
	}
	if len(j.Copies) > 1 {
		for _, k := range j.Copies {
			t.Copies = append(t.Copies, k.Name)
		}
	}
	for _, p := range c.Positions {
		row := list.PathRow{DriveDeg: degrees(p.Angle), At: p.Places}
		if len(j.Copies) > 1 {
			for _, k := range j.Copies {
				row.CopyDeg = append(row.CopyDeg, turn(degrees(p.Angle+k.Phase)))
			}
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

// turn brings an angle in degrees to 0 up to, not including, 360.
func turn(deg float64) float64 {
	deg = math.Mod(deg, 360)
	if deg < 0 {
		deg += 360
	}
	return deg
}

// partRows lists the parts as they are cut.
func (p plan) partRows() []list.PartRow {
	out := make([]list.PartRow, len(p.parts))
	for i, part := range p.parts {
		s, _ := stockNamed(p.job, part.Stock)
		box := part.Region.Bounds()
		way := p.cuts[i].Outside.Length()
		for _, h := range p.cuts[i].Inside {
			way += h.Length()
		}
		out[i] = list.PartRow{
			Part: part.Name, Link: part.Link, Copy: part.Copy, Stock: part.Stock, Plane: part.Plane,
			Mark: part.Mark.Text, Quantity: 1, WidthMM: box.Width(), HeightMM: box.Height(),
			AreaMM2: part.Region.Area(), CutLengthMM: way, MassG: mass(s, part.Region), Holes: len(part.Holes),
		}
	}
	for _, at := range p.layout.Placements {
		out[at.Item].Sheet = p.sheets[at.Sheet].Name
	}
	return out
}

// hardwareRows is the shopping list.
func (p plan) hardwareRows() []list.HardwareRow {
	out := make([]list.HardwareRow, len(p.lines))
	for i, l := range p.lines {
		out[i] = list.HardwareRow{
			Item: l.Designation, Kind: string(l.Kind), LengthMM: l.Length, Need: l.Need, Spare: l.Spare, Buy: l.Buy,
			Packs: l.Packs, MassG: l.Mass, WhereUsed: strings.Join(l.Joints, " "), Note: l.Note,
		}
	}
	return out
}
