package job

import (
	"reflect"
	"strconv"
	"strings"
	"testing"
)

// TestPinDefaults: what a pin takes from the default, and what it does not.
func TestPinDefaults(t *testing.T) {
	read := func(pins string) map[string]Pin {
		t.Helper()
		text := `job: pins
units: {length: mm, angle: deg}
linkage:
  joints: {O: {ground: [0, 0]}, D: {ground: [80, 0]}, A: {near: [25, 0]}, B: {near: [59, 61]}}
  links:
    crank: {pins: [O, A], length: 25, drive: full-turn, plane: 2}
    coupler: {pins: [A, B], length: 70, plane: 3}
    rocker: {pins: [D, B], length: 65, plane: 4}
frame: {plates: {back: {plane: 0}, front: {plane: 9, pivots: [D]}}}
pins: ` + pins + `
stock: {clear3: {material: cast acrylic, thickness: 3, sheet: [600, 400], margin: 5, kerf: 0.18}}
`
		j, err := Parse("pins.yaml", []byte(text), nil)
		if err != nil {
			t.Fatal(err)
		}
		byJoint := map[string]Pin{}
		for _, p := range j.Pins {
			byJoint[p.Joint] = p
		}
		return byJoint
	}
	clear := 0.3
	for _, c := range []struct {
		pins, joint string
		want        Pin
	}{
		{`{default: {bolt: M4}}`, "O", Pin{Kind: BoltPin, Bolt: "M4", Fit: "medium", Head: "socket", Nut: "lock", Washer: "normal"}},
		{`{default: {bolt: "#8"}}`, "O", Pin{Kind: BoltPin, Bolt: "#8", Fit: "normal", Head: "socket", Nut: "lock", Washer: "normal"}},
		{`{default: {bolt: M4, fit: coarse, nut: thin, washer: none, head: button}, B: {fit: fine}}`, "B", Pin{Kind: BoltPin, Bolt: "M4", Fit: "fine", Head: "button", Nut: "thin", Washer: "none"}},
		{`{default: {bolt: M4, fit: coarse}, B: {bolt: M5}}`, "B", Pin{Kind: BoltPin, Bolt: "M5", Fit: "coarse", Head: "socket", Nut: "lock", Washer: "normal"}},
		{`{default: {bolt: M4, clearance: 0.3}}`, "B", Pin{Kind: BoltPin, Bolt: "M4", Clearance: &clear, Head: "socket", Nut: "lock", Washer: "normal"}},
		{`{default: {bolt: M4, clearance: 0.3}, B: {fit: fine}}`, "B", Pin{Kind: BoltPin, Bolt: "M4", Fit: "fine", Head: "socket", Nut: "lock", Washer: "normal"}},
		{`{default: {bolt: M4, fit: fine}, B: {clearance: 0.3}}`, "B", Pin{Kind: BoltPin, Bolt: "M4", Clearance: &clear, Head: "socket", Nut: "lock", Washer: "normal"}},
		// A bearing takes neither the bolt nor the fit of bolts, but head, nut and washers.
		{`{default: {bolt: M4, fit: fine, nut: thin}, B: {bearing: 625, in: [rocker]}}`, "B", Pin{Kind: BearingPin, Bearing: "625", Bolt: "M5", Fit: "press", Seats: []string{"rocker"}, Head: "socket", Nut: "thin", Washer: "normal"}},
		{`{default: {bolt: M4}, D: {bearing: MF105, bolt: M4, fit: N7, in: [back, front, rocker]}}`, "D", Pin{Kind: BearingPin, Bearing: "MF105", Bolt: "M4", Fit: "N7", Seats: []string{"back", "front", "rocker"}, Head: "socket", Nut: "lock", Washer: "normal"}},
		{`{default: {bolt: M4, fit: fine, head: button}, O: {shaft: 0.25in}}`, "O", Pin{Kind: ShaftPin, Shaft: 6.35, Fit: "running", Washer: "normal"}},
		{`{default: {bolt: M4, nut: plain}, B: {sleeve: 6, in: [rocker], play: [0.1, 0.4]}}`, "B", Pin{Kind: SleevePin, Bolt: "M4", Sleeve: 6, Seats: []string{"rocker"}, Fit: "running", Head: "socket", Nut: "plain", Washer: "normal", Play: [2]float64{0.1, 0.4}}},
		{`{default: {bolt: M4, play: [0, 0.2], excess: 5}, A: {clamp: crank}}`, "A", Pin{Kind: ClampPin, Bolt: "M4", Clamped: "crank", Fit: "medium", Head: "socket", Nut: "lock", Washer: "normal", Play: [2]float64{0, 0.2}, Excess: 5}},
		{`{default: {bolt: M4, play: [0, 0.2]}, B: {bolt: M5, rod-end: head}}`, "B", Pin{Kind: RodEndPin, Bolt: "M5", RodEnd: HeadSide, Fit: "medium", Head: "socket", Nut: "lock", Washer: "normal"}},
		{`{default: {bolt: M4, excess: 5}, O: {shaft: 6, retain: ring}}`, "O", Pin{Kind: ShaftPin, Shaft: 6, Retain: RingRetainer, Fit: "running", Washer: "normal"}},
		{`{default: {shaft: 6, fit: sliding}}`, "A", Pin{Kind: ShaftPin, Shaft: 6, Fit: "sliding", Washer: "normal"}},
	} {
		got := read(c.pins)[c.joint]
		c.want.Joint = c.joint
		if !reflect.DeepEqual(got, c.want) {
			t.Errorf("%s: %s is %+v, want %+v", c.pins, c.joint, got, c.want)
		}
	}
}

// The bores of bearings against ISO 15: the last digit of the 62x, 63x, 68x and 69x designations is
// the bore in mm up to 9; 00, 01, 02, 03 mean 10, 12, 15, 17 mm; then the bore over five. MR: the last
// digit is the bore, the digits before it the outside diameter.
func TestBearingBores(t *testing.T) {
	for _, name := range bearingNames() {
		bore, ok := bearingBore(name)
		want := float64(name[len(name)-1] - '0')
		if number := strings.TrimPrefix(name, "F"); strings.HasPrefix(number, "6") && len(number) == 4 {
			want = []float64{10, 12, 15, 17, 20}[number[3]-'0']
		}
		if !ok || bore != want {
			t.Errorf("%s: bore %v, want %v", name, bore, want)
		}
	}
	// Number sizes of inch screws are 0.060 + 0.013 n inch.
	for _, n := range []int{2, 3, 4, 5, 6, 8, 10} {
		got, ok := boltDiameter("#" + strconv.Itoa(n))
		if want := (0.060 + 0.013*float64(n)) * 25.4; !ok || got < want-5e-4 || got > want+5e-4 {
			t.Errorf("#%d is %v mm, want %v", n, got, want)
		}
	}
}
