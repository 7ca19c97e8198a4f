package main

import (
	"fmt"
	"math"

	"pinwright/export"
	"pinwright/nest"
	"pinwright/parts/job"
	"pinwright/parts/outline"
)

// piece is what the beam does for part i.
func (p plan) piece(i int) export.Piece {
	return export.Piece{Part: p.parts[i].Name, Outside: p.cuts[i].Outside, Inside: p.cuts[i].Inside, Marks: p.parts[i].Mark.Strokes}
}

// draw turns the layout into sheets with their steps in the order of the work.
func (p plan) draw() ([]export.Sheet, error) {
	sheets := make([]export.Sheet, len(p.layout.Sheets))
	owner := make([][]int, len(sheets)) // part of each step
	used := make([]int, len(p.job.Stock))
	total := make([]int, len(p.job.Stock))
	for _, s := range p.layout.Sheets {
		total[s.Stock]++
	}
	for i, s := range p.layout.Sheets {
		k := p.job.Stock[s.Stock]
		used[s.Stock]++
		sheets[i] = export.Sheet{
			Name:  fmt.Sprintf("sheet-%s-%d", k.Name, used[s.Stock]),
			Title: fmt.Sprintf("%s: %s %g mm (measured %g), sheet %d of %d", k.Name, k.Material, k.Thickness, k.Measured, used[s.Stock], total[s.Stock]),
			Width: k.Width, Height: k.Height,
		}
	}
	for _, at := range p.layout.Placements {
		steps := p.piece(at.Item).Place(at.At)
		sheets[at.Sheet].Steps = append(sheets[at.Sheet].Steps, steps...)
		for range steps {
			owner[at.Sheet] = append(owner[at.Sheet], at.Item)
		}
	}
	for i := range sheets {
		sheets[i].Steps = inOrder(sheets[i].Steps, owner[i])
	}
	return sheets, nil
}

// inOrder puts the steps of a sheet in the order of the work.
func inOrder(steps []export.Step, owner []int) []export.Step {
	work := make([]nest.Cutting, len(steps))
	for i, s := range steps {
		work[i] = nest.Cutting{Part: owner[i], Closed: s.Closed, Open: s.Open}
	}
	out := make([]export.Step, 0, len(steps))
	for _, i := range nest.Order(work) {
		out = append(out, steps[i])
	}
	return out
}

// drawPart is a drawing of part i on its own, as large as its cut path, the corner at the origin.
func (p plan) drawPart(i int) export.Sheet {
	box := p.cuts[i].Outside.Bounds()
	steps := p.piece(i).Place(outline.Place(0, false, box.Min.Scale(-1)))
	owner := make([]int, len(steps))
	return export.Sheet{
		Name: p.parts[i].Name, Title: p.parts[i].Name,
		Width: box.Width(), Height: box.Height(), Steps: inOrder(steps, owner),
	}
}

// turns are the turns that a stock allows, radians; nil: any.
func turnsOf(g job.Grain) []float64 {
	switch g {
	case job.HalfTurn:
		return []float64{0, math.Pi}
	case job.Quarter:
		return []float64{0, math.Pi / 2, math.Pi, -math.Pi / 2}
	case job.Fixed:
		return []float64{0}
	}
	return nil
}
