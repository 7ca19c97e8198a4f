// Package steps puts the assembly of one copy in order: which part goes on when, and what goes on the
// pins before and after it.
//
// It works on plain values, from bottom to top as everything in the side view. Plan:
//
//  1. On every pin each part lies over the part before it; besides, a part may name others that must
//     be there first. That is a graph of what comes before what.
//  2. The parts are taken from it one by one, of those that are free always the lowest (then the first
//     in the list), so that the mechanism grows from the rear to the front.
//  3. Whatever lies on a pin below its lowest part is put on the bolt or shaft, which then goes up
//     through that part; what lies between two parts goes on before the upper one; what lies above the
//     last part closes the pin. What sits in a part is pressed in before the part goes on.
//
// Running time is quadratic in the parts, which are few.
package steps

import (
	"fmt"
	"slices"
	"strings"
)

// Part is one flat part of the copy.
type Part struct {
	Name   string   // unique among the parts
	Mark   string   // engraved on it
	Height float64  // of its lower face, mm: the lower of two free parts goes on first
	After  []string // names of parts that must be there before, besides those under it on its pins
	How    string   // a sentence on what the pins do not tell: tabs that go into slots; may be empty
}

// Pin is what one joint carries, from bottom to top.
type Pin struct {
	Joint   string
	Through string // bolt or shaft: "ISO 4762 M4x16", "shaft 6 mm, 23.4 mm long"
	Items   []Item
	Notes   []string // sentences for whoever closes the pin
}

// Item is one thing on a pin.
type Item struct {
	What string // "washer ISO 7089 4"; of a part nothing
	Part string // the part that it is, or that it sits in
	Seat bool   // it sits in the part: a bearing
}

// part tells whether the item is a part.
func (i Item) part() bool { return i.Part != "" && !i.Seat }

// Deed is what is done on one pin in one step.
type Deed struct {
	Joint string
	Part  int   // the item that the part is, as an index of the pin's Items
	Press []int // items that are pressed into the part, likewise, ascending
	Under []int // that go on the pin under the part
	Begin bool  // the bolt or shaft goes up through the part, the items under it already on
	Over  []int // that close the pin over the part
	Close bool  // nothing more goes on the pin

	pin Pin
}

// Step is one part put on.
type Step struct {
	Number int // from 1
	Part   string
	Mark   string
	How    string
	Deeds  []Deed // one for every pin that the part is on, in the order of the pins
}

// Order gives the steps of the assembly, one for each part. Every item of every pin is in exactly one
// of them, and every part comes after those under it on all of its pins.
//
// It errs when a pin names a part that is not in the list or has no part at all, when a part is twice on
// one pin or twice in the list, and when parts lie over each other in a circle.
func Order(parts []Part, pins []Pin) ([]Step, error) {
	before, err := precedence(parts, pins)
	if err != nil {
		return nil, err
	}
	var out []Step
	done := make([]bool, len(parts))
	for range parts {
		next := -1
		for i, p := range parts {
			if done[i] || slices.ContainsFunc(before[i], func(b int) bool { return !done[b] }) {
				continue
			}
			if next < 0 || p.Height < parts[next].Height {
				next = i
			}
		}
		if next < 0 {
			return nil, circle(parts, done)
		}
		done[next] = true
		out = append(out, step(len(out)+1, parts[next], pins))
	}
	return out, nil
}

// precedence lists for every part the parts that must be there before, as indices.
func precedence(parts []Part, pins []Pin) ([][]int, error) {
	index := map[string]int{}
	for i, p := range parts {
		if _, twice := index[p.Name]; twice {
			return nil, fmt.Errorf("steps: part %s is twice in the list", p.Name)
		}
		index[p.Name] = i
	}
	before := make([][]int, len(parts))
	for i, p := range parts {
		for _, name := range p.After {
			k, ok := index[name]
			if !ok {
				return nil, fmt.Errorf("steps: part %s goes on after %s, which is not in the list", p.Name, name)
			}
			before[i] = append(before[i], k)
		}
	}
	for _, pin := range pins {
		last := -1
		seen := map[string]bool{}
		for _, item := range pin.Items {
			if item.Part == "" {
				continue
			}
			i, ok := index[item.Part]
			if !ok {
				return nil, fmt.Errorf("steps: joint %s carries part %s, which is not in the list", pin.Joint, item.Part)
			}
			if item.Seat {
				continue
			}
			if seen[item.Part] {
				return nil, fmt.Errorf("steps: joint %s carries part %s twice", pin.Joint, item.Part)
			}
			seen[item.Part] = true
			if last >= 0 {
				before[i] = append(before[i], last)
			}
			last = i
		}
		if last < 0 {
			return nil, fmt.Errorf("steps: joint %s carries no part", pin.Joint)
		}
		for _, item := range pin.Items {
			if item.Seat && !seen[item.Part] {
				return nil, fmt.Errorf("steps: joint %s: %s sits in %s, which is not on the pin", pin.Joint, item.What, item.Part)
			}
		}
	}
	return before, nil
}

// circle names what is left when nothing is free.
func circle(parts []Part, done []bool) error {
	var names []string
	for i, p := range parts {
		if !done[i] {
			names = append(names, p.Name)
		}
	}
	return fmt.Errorf("steps: %s cannot be put on: each waits for another of them to be under it; check their planes", strings.Join(names, ", "))
}

// step collects what is done when a part goes on.
func step(number int, part Part, pins []Pin) Step {
	s := Step{Number: number, Part: part.Name, Mark: part.Mark, How: part.How}
	for _, pin := range pins {
		at := slices.IndexFunc(pin.Items, func(i Item) bool { return i.part() && i.Part == part.Name })
		if at < 0 {
			continue
		}
		d := Deed{Joint: pin.Joint, Part: at, Begin: true, Close: true, pin: pin}
		for i := at - 1; i >= 0; i-- {
			if pin.Items[i].part() {
				d.Begin = false
				break
			}
			if !pin.Items[i].Seat {
				d.Under = append(d.Under, i)
			}
		}
		slices.Reverse(d.Under)
		d.Close = !slices.ContainsFunc(pin.Items[at+1:], Item.part)
		for i, item := range pin.Items {
			switch {
			case item.Seat && item.Part == part.Name:
				d.Press = append(d.Press, i)
			case d.Close && i > at && !item.Seat:
				d.Over = append(d.Over, i)
			}
		}
		s.Deeds = append(s.Deeds, d)
	}
	return s
}
