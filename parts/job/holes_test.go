package job

import (
	"reflect"
	"testing"

	"pinwright/parts/hardware"
)

// What each kind of pin asks for in a part.
func TestHoleIn(t *testing.T) {
	bolt := func(size, fit string) hardware.Spec {
		return hardware.Spec{Kind: hardware.Bolt, Size: size, Fit: fit}
	}
	shaft := func(d float64, fit string) hardware.Spec {
		return hardware.Spec{Kind: hardware.Shaft, Diameter: d, Fit: fit}
	}
	for _, c := range []struct {
		pin   Pin
		part  string
		plate bool
		want  hardware.Spec
	}{
		{Pin{Kind: BoltPin, Bolt: "M4", Fit: "coarse"}, "a", false, bolt("M4", "coarse")},
		{Pin{Kind: BearingPin, Bearing: "624", Bolt: "M4", Fit: "press", Seats: []string{"a"}}, "a", false, hardware.Spec{Kind: hardware.BearingSeat, Size: "624", Fit: "press"}},
		{Pin{Kind: BearingPin, Bearing: "624", Bolt: "M4", Fit: "press", Seats: []string{"a"}}, "b", false, bolt("M4", "fine")},
		{Pin{Kind: BearingPin, Bearing: "624", Bolt: "#8", Fit: "press", Seats: []string{"a"}}, "b", false, bolt("#8", "close")},
		{Pin{Kind: SleevePin, Sleeve: 6, Bolt: "M4", Fit: "running", Seats: []string{"a"}}, "a", false, shaft(6, "running")},
		{Pin{Kind: SleevePin, Sleeve: 6, Bolt: "M4", Fit: "running", Seats: []string{"a"}}, "b", false, bolt("M4", "fine")},
		{Pin{Kind: ClampPin, Bolt: "M5", Fit: "medium", Clamped: "a"}, "a", false, bolt("M5", "fine")},
		{Pin{Kind: ClampPin, Bolt: "M5", Fit: "medium", Clamped: "a"}, "b", false, bolt("M5", "medium")},
		{Pin{Kind: RodEndPin, Bolt: "M5", Fit: "medium"}, "a", false, bolt("M5", "medium")},
		{Pin{Kind: ShaftPin, Shaft: 6, Fit: "press"}, "a", false, shaft(6, "press")},
		{Pin{Kind: ShaftPin, Shaft: 6, Fit: "press"}, "a", true, shaft(6, "running")},
	} {
		if got := c.pin.HoleIn(c.part, c.plate); !reflect.DeepEqual(got, c.want) {
			t.Errorf("%+v in %s: %+v, want %+v", c.pin, c.part, got, c.want)
		}
	}
}
