package main

import (
	"bytes"
	"slices"
	"strconv"
	"strings"

	"pinwright/export/files"
	"pinwright/export/picture"
	"pinwright/export/svg"
	"pinwright/parts"
	"pinwright/parts/stack"
)

// Size of the pictures that go beside the cut files, mm: no wider, and about as high where the content
// can be set higher or wider.
const (
	pictureWidth  = 180
	pictureHeight = 240
	sideHeight    = 320 // of the side view: enough for 2 : 1 with the pins of most jobs
)

// pictures draws, as files, every sheet, the mechanism and its planes, and the pins of one copy.
func (p plan) pictures() ([]files.File, error) {
	var out []files.File
	add := func(name string, pic picture.Picture, err error) error {
		if err != nil {
			return err
		}
		var b bytes.Buffer
		if err := svg.WritePicture(&b, pic); err != nil {
			return err
		}
		out = append(out, files.File{Name: "pictures/" + name + ".svg", Data: b.Bytes()})
		return nil
	}
	for _, s := range p.sheets {
		pic, err := picture.Layout(s, pictureWidth, 1000)
		if err := add(s.Name, pic, err); err != nil {
			return nil, err
		}
	}
	order, err := p.assembling()
	if err != nil {
		return nil, err
	}
	scene := p.scene()
	front, err := picture.FrontView(scene, pictureWidth, pictureHeight)
	if err := add("front", front, err); err != nil {
		return nil, err
	}
	planes, err := picture.Planes(scene, pictureWidth, pictureHeight)
	if err != nil {
		return nil, err
	}
	for i, pic := range planes {
		name := "planes"
		if len(planes) > 1 {
			name += "-" + strconv.Itoa(i+1)
		}
		if err := add(name, pic, nil); err != nil {
			return nil, err
		}
	}
	side, err := picture.SideView(p.sideKits(order), p.sideLevels(), pictureWidth, sideHeight)
	return out, add("side", side, err)
}

// sideKey explains the side view, in so many lines on a page.
const (
	sideKeyLines = 3
	sideKey      = "To the left of each pin are its dimensions in mm: the length of the bolt or shaft; next to it what is clamped, from the head to the nut, then the nut and the thread past it. To the right is what is on the pin, with thicknesses."
)

// sideKits are the kits of the first copy as pieces to be drawn; all copies carry the same.
func (p plan) sideKits(order assembling) []picture.Kit {
	var out []picture.Kit
	for _, k := range p.firstKits() {
		kit := picture.Kit{Name: k.Joint, Text: k.Through.Designation}
		kit.Pieces = append(kit.Pieces, picture.Piece{
			Kind: picture.ShankPiece, From: k.Through.From, To: k.Through.To, Outer: k.Through.Diameter,
		})
		for i, e := range k.Elements {
			piece := pieceOf(e, k.Through.Diameter)
			piece.Step = order.stepOf(k.Joint, i)
			if piece.Kind == picture.PartPiece {
				piece.Tint = p.tintOf(p.partAt(e))
			}
			if seat := seatIn(k, e); seat > 0 {
				piece.Outer, piece.Inner = max(piece.Outer, seat+2*k.Through.Diameter), seat
			}
			kit.Pieces = append(kit.Pieces, piece)
		}
		out = append(out, kit)
	}
	return out
}

// tintOf is the place of a part among those of the first copy, which tells its tint in all pictures.
func (p plan) tintOf(name string) int {
	return slices.IndexFunc(p.firstParts(), func(part parts.Part) bool { return part.Name == name })
}

// firstKits are those of the first copy.
func (p plan) firstKits() []stack.Kit {
	var out []stack.Kit
	for _, k := range p.kits {
		if k.Copy == p.job.Copies[0].Name {
			out = append(out, k)
		}
	}
	return out
}

// seatIn is the diameter of the bearing or the sleeve that sits in a part of a kit, 0 for none.
func seatIn(k stack.Kit, e stack.Element) float64 {
	if e.Kind != stack.PartElement {
		return 0
	}
	i := slices.IndexFunc(k.Elements, func(b stack.Element) bool {
		return (b.Kind == stack.BearingElement || b.Kind == stack.SleeveElement) && b.Part == e.Part
	})
	if i < 0 {
		return 0
	}
	return k.Elements[i].Diameter
}

// pieceOf draws an element of a kit. Parts are drawn as wide as three times the pin.
func pieceOf(e stack.Element, pin float64) picture.Piece {
	piece := picture.Piece{Name: e.What, From: e.From, To: e.To, Outer: e.Diameter, Inner: pin}
	switch e.Kind {
	case stack.HeadElement:
		piece.Kind, piece.Inner = picture.HeadPiece, 0
		piece.Name = ""
	case stack.NutElement:
		piece.Kind = picture.NutPiece
	case stack.WasherElement:
		piece.Kind = picture.WasherPiece
	case stack.SpacerElement:
		piece.Kind, piece.Name = picture.SpacerPiece, "spacer"
	case stack.CollarElement:
		piece.Kind, piece.Name = picture.SpacerPiece, "collar"
		if strings.HasPrefix(e.What, "push-on") {
			piece.Name = "push-on ring"
		}
	case stack.SleeveElement:
		piece.Kind, piece.Name = picture.SeatPiece, "sleeve"
	case stack.RodEndElement:
		piece.Kind, piece.Name = picture.SpacerPiece, "rod end"
	case stack.BearingElement:
		piece.Kind, piece.Name = picture.SeatPiece, "bearing "+e.What
	default:
		piece.Kind, piece.Name, piece.Outer = picture.PartPiece, e.Part, 3*pin
	}
	return piece
}

func (p plan) sideLevels() []picture.Level {
	var out []picture.Level
	for _, l := range p.levels {
		out = append(out, picture.Level{Name: "plane " + strconv.Itoa(l.Plane), From: l.From, To: l.To})
	}
	return out
}
