package proof

import (
	"math"
	"sort"

	"pinwright/export/manifest"
	"pinwright/parts/outline"
)

// feature is a place of a part that can be told apart on the finished piece: the middle of its
// outside (the first feature of every part) or a hole.
type feature struct {
	at   outline.Point
	size float64 // diameter of a round hole, minus the perimeter of another, 0 of the outside
}

// expectedFeatures lists the features of a part as the manifest has them, in the part's frame.
func expectedFeatures(p manifest.Part) []feature {
	all := []feature{{at: outline.Point(p.Outside.Middle)}}
	for _, h := range p.Holes {
		if h.Diameter > 0 {
			all = append(all, feature{outline.Point(h.Centre), h.Diameter})
		} else {
			all = append(all, feature{outline.Point(h.Measure.Middle), -h.Measure.Perimeter})
		}
	}
	return all
}

// features lists the features of a piece, on the sheet.
func (p piece) features() []feature {
	all := []feature{{at: outline.Point(p.measure.Middle)}}
	for _, h := range p.holes {
		if h.circle != nil {
			all = append(all, feature{h.centre(), 2 * h.circle.Radius})
		} else {
			all = append(all, feature{h.centre(), -h.measure.Perimeter})
		}
	}
	return all
}

// fit is how a part lies as a piece on the sheet.
type fit struct {
	motion outline.Transform
	pairs  []int   // for every hole of the part the opening of the piece, -1: none
	out    int     // features that disagree in place or size, or have no partner
	sum    float64 // of the squared distances, the disagreeing ones counted alike
}

func (f fit) better(g fit) bool {
	return f.out < g.out || f.out == g.out && f.sum < g.sum
}

// mostAnchors caps the pairs of expected features by which a fit is tried; the longest come first.
const mostAnchors = 60

// lay finds the rigid motion under which most features of a part agree with those of a piece. Two
// features, the anchors, fix a motion; every pair of the piece at their distance is tried. One hole
// that was moved then stands out alone and does not drag the others with it, as it would in a least
// squares fit. usual is the motion when there is nothing to turn by.
//
// Where the features agree under several motions (a bar with two like holes), the contours decide: the
// first motion is taken that also turns them as they should be, and the usual one is tried first. A part
// that no motion turns right has one disagreement.
//
// Running time is O(h^2) for a part of h holes that agrees, by its longest pair of anchors.
func lay(part manifest.Part, p *piece, usual outline.Transform) fit {
	want, have := expectedFeatures(part), p.features()
	try := func(m outline.Transform) fit {
		f := judge(want, have, m)
		if f.out == 0 && !p.turned(part, f) {
			f.out = 1
		}
		return f
	}
	type anchor struct {
		i, j int
		d    float64
	}
	var anchors []anchor
	for i := range want {
		for j := i + 1; j < len(want); j++ {
			if d := want[i].at.Dist(want[j].at); d > 10*limit {
				anchors = append(anchors, anchor{i, j, d})
			}
		}
	}
	sort.SliceStable(anchors, func(a, b int) bool { return anchors[a].d > anchors[b].d })
	anchors = anchors[:min(len(anchors), mostAnchors)]

	// Whatever else fails, the piece's middle lies on the part's.
	still := usual
	still.Move = outline.Point{}
	at := still.Apply(want[0].at)
	still.Move = outline.Point{X: have[0].at.X - at.X, Y: have[0].at.Y - at.Y}
	best := try(still)

	for _, a := range anchors {
		if best.out == 0 {
			break
		}
		for i := range have {
			for j := range have {
				if i == j || (a.i == 0) != (i == 0) || (a.j == 0) != (j == 0) {
					continue // the outside goes with the outside
				}
				if math.Abs(have[i].at.Dist(have[j].at)-a.d) > 2*limit {
					continue
				}
				m := carry(want[a.i].at, want[a.j].at, have[i].at, have[j].at, usual.Mirror)
				if f := try(m); f.better(best) {
					best = f
				}
			}
		}
	}
	return best
}

// turned says whether the contours of a piece that are not round are turned as those of the part: by the
// boxes round them, in the part's frame.
func (p *piece) turned(part manifest.Part, f fit) bool {
	if boxError(part.Outside, p.edge, f) > limit {
		return false
	}
	for i, h := range part.Holes {
		if h.Diameter == 0 && f.pairs[i] >= 0 && boxError(h.Measure, p.holes[f.pairs[i]].edge, f) > limit {
			return false
		}
	}
	return true
}

// boxError is how far the box round a contour, taken back into the part's frame, differs from the one
// that it should have.
func boxError(want manifest.Measure, o outline.Outline, f fit) float64 {
	box := o.Transform(f.motion.Inverse()).Bounds()
	return math.Max(
		math.Max(math.Abs(box.Min.X-want.Low.X), math.Abs(box.Min.Y-want.Low.Y)),
		math.Max(math.Abs(box.Max.X-want.High.X), math.Abs(box.Max.Y-want.High.Y)))
}

// carry is the motion that takes a to p and the direction a-b to p-q.
func carry(a, b, p, q outline.Point, mirror bool) outline.Transform {
	turn := outline.Place(0, mirror, outline.Point{})
	from, to := turn.Apply(a), turn.Apply(b)
	angle := math.Atan2(q.Y-p.Y, q.X-p.X) - math.Atan2(to.Y-from.Y, to.X-from.X)
	m := outline.Place(angle, mirror, outline.Point{})
	at := m.Apply(a)
	m.Move = outline.Point{X: p.X - at.X, Y: p.Y - at.Y}
	return m
}

// judge pairs the features under a motion, the nearest first, and counts those that disagree.
func judge(want, have []feature, m outline.Transform) fit {
	f := fit{motion: m, pairs: make([]int, len(want)-1)}
	type pair struct {
		w, h int
		d    float64
		same bool
	}
	pairs := make([]pair, 0, len(want)*len(have))
	for w := range want {
		at := m.Apply(want[w].at)
		for h := range have {
			if (w == 0) != (h == 0) {
				continue
			}
			pairs = append(pairs, pair{w, h, at.Dist(have[h].at), math.Abs(want[w].size-have[h].size) <= limit})
		}
	}
	sort.Slice(pairs, func(a, b int) bool {
		if pairs[a].d != pairs[b].d {
			return pairs[a].d < pairs[b].d
		}
		if pairs[a].w != pairs[b].w {
			return pairs[a].w < pairs[b].w
		}
		return pairs[a].h < pairs[b].h
	})
	done, used := make([]bool, len(want)), make([]bool, len(have))
	for i := range f.pairs {
		f.pairs[i] = -1
	}
	for _, p := range pairs {
		if done[p.w] || used[p.h] {
			continue
		}
		done[p.w], used[p.h] = true, true
		if p.w > 0 {
			f.pairs[p.w-1] = p.h - 1
		}
		if p.d > limit || !p.same {
			f.out++
		}
		f.sum += math.Min(p.d*p.d, 1)
	}
	f.out += max(len(want), len(have)) - min(len(want), len(have))
	return f
}
