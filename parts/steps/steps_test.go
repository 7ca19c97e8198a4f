package steps_test

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"pinwright/parts/steps"
)

func ExampleOrder() {
	washer := steps.Item{What: "washer ISO 7089 4"}
	order, err := steps.Order(
		[]steps.Part{
			{Name: "left-1.coupler", Mark: "LEFT-1 COUPLER", Height: 4},
			{Name: "left-1.crank", Mark: "LEFT-1 CRANK 0°"},
		},
		[]steps.Pin{{
			Joint: "A", Through: "ISO 4762 M4x16", Notes: []string{"Leave 0.2 mm of play."},
			Items: []steps.Item{washer, {Part: "left-1.crank"}, washer, {Part: "left-1.coupler"}, washer, {What: "nut DIN 985 M4"}},
		}},
	)
	if err != nil {
		panic(err)
	}
	for _, s := range order {
		fmt.Printf("Step %d, %s: %s\n", s.Number, s.Takes(), strings.Join(s.Words(), " "))
	}
	// Output:
	// Step 1, LEFT-1 CRANK 0°: A: put washer ISO 7089 4 on ISO 4762 M4x16 and push it up through the part.
	// Step 2, LEFT-1 COUPLER: Put it on A over washer ISO 7089 4. A: close with washer ISO 7089 4 and nut DIN 985 M4. Leave 0.2 mm of play.
}

// Every item of every pin is in exactly one step, every part in one, and a part comes after everything
// under it on all of its pins.
func TestEveryItemOnce(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		parts, pins := drawn(t)
		order, err := steps.Order(parts, pins)
		if err != nil {
			t.Fatal(err)
		}
		byJoint := map[string]int{}
		for i, p := range pins {
			byJoint[p.Joint] = i
		}
		count := make([][]int, len(pins))
		for i, p := range pins {
			count[i] = make([]int, len(p.Items))
		}
		if len(order) != len(parts) {
			t.Fatalf("%d steps for %d parts", len(order), len(parts))
		}
		var on []string
		for n, s := range order {
			if s.Number != n+1 || slices.Contains(on, s.Part) {
				t.Fatalf("step %d: number %d, part %s", n+1, s.Number, s.Part)
			}
			on = append(on, s.Part)
			for _, d := range s.Deeds {
				i := byJoint[d.Joint]
				for _, items := range [][]int{d.Press, d.Under, d.Over} {
					for _, k := range items {
						count[i][k]++
					}
				}
				at := slices.IndexFunc(pins[i].Items, func(item steps.Item) bool { return item.Part == s.Part && !item.Seat })
				if at != d.Part {
					t.Fatalf("step %d, joint %s: part is item %d, not %d", s.Number, d.Joint, d.Part, at)
				}
				count[i][at]++
				for k, item := range pins[i].Items {
					// What is below is there by now; what is above is only there if it closes the pin or sits in the part.
					if item.Seat {
						continue
					}
					if (k <= at || d.Close) != (count[i][k] == 1) {
						t.Fatalf("step %d, joint %s: item %d is on %d times when item %d goes on", s.Number, d.Joint, k, count[i][k], at)
					}
				}
				if d.Begin != !slices.ContainsFunc(pins[i].Items[:at], func(item steps.Item) bool { return item.Part != "" && !item.Seat }) {
					t.Fatalf("step %d, joint %s: begins %v", s.Number, d.Joint, d.Begin)
				}
			}
			for _, p := range parts {
				if p.Name == s.Part {
					for _, a := range p.After {
						if !slices.Contains(on, a) {
							t.Fatalf("%s goes on before %s", s.Part, a)
						}
					}
				}
			}
		}
		for i, c := range count {
			for k, n := range c {
				if n != 1 {
					t.Fatalf("joint %s: item %d (%s) is in %d steps", pins[i].Joint, k, pins[i].Items[k].What, n)
				}
			}
		}
	})
}

// drawn makes a mechanism of parts on planes, and pins through some of them with loose things between.
func drawn(t *rapid.T) ([]steps.Part, []steps.Pin) {
	var parts []steps.Part
	for i := range rapid.IntRange(1, 9).Draw(t, "parts") {
		p := steps.Part{Name: fmt.Sprint("p", i), Mark: fmt.Sprint("P", i), Height: float64(rapid.IntRange(0, 5).Draw(t, "plane"))}
		for _, q := range parts {
			if q.Height < p.Height && rapid.IntRange(0, 7).Draw(t, "after") == 0 {
				p.After = append(p.After, q.Name)
			}
		}
		parts = append(parts, p)
	}
	var pins []steps.Pin
	for i := range rapid.IntRange(0, 8).Draw(t, "pins") {
		pin := steps.Pin{Joint: fmt.Sprint("J", i), Through: "bolt"}
		loose := func() {
			for range rapid.IntRange(0, 3).Draw(t, "loose") {
				pin.Items = append(pin.Items, steps.Item{What: "washer"})
			}
		}
		// Parts of different planes, from bottom to top.
		byPlane := map[float64]string{}
		for _, p := range parts {
			if rapid.Bool().Draw(t, "on it") || len(byPlane) == 0 {
				byPlane[p.Height] = p.Name
			}
		}
		loose()
		for plane := range 6 {
			name, ok := byPlane[float64(plane)]
			if !ok {
				continue
			}
			seat := rapid.IntRange(0, 3).Draw(t, "seat")
			if seat == 1 {
				pin.Items = append(pin.Items, steps.Item{What: "bearing", Part: name, Seat: true})
			}
			pin.Items = append(pin.Items, steps.Item{Part: name})
			if seat == 2 {
				pin.Items = append(pin.Items, steps.Item{What: "bearing", Part: name, Seat: true})
			}
			loose()
		}
		pins = append(pins, pin)
	}
	return parts, pins
}

func TestErrors(t *testing.T) {
	on := func(joint string, parts ...string) steps.Pin {
		p := steps.Pin{Joint: joint}
		for _, name := range parts {
			p.Items = append(p.Items, steps.Item{Part: name})
		}
		return p
	}
	two := []steps.Part{{Name: "a"}, {Name: "b"}}
	for want, got := range map[string]error{
		"steps: a, b cannot be put on: each waits for another of them to be under it; check their planes": fault(two, on("J", "a", "b"), on("K", "b", "a")),
		"steps: joint J carries part c, which is not in the list":                                         fault(two, on("J", "a", "c")),
		"steps: joint J carries part a twice":                                                             fault(two, on("J", "a", "b", "a")),
		"steps: joint J carries no part":                                                                  fault(two, steps.Pin{Joint: "J"}),
		"steps: part a is twice in the list":                                                              fault([]steps.Part{{Name: "a"}, {Name: "a"}}),
		"steps: part a goes on after x, which is not in the list":                                         fault([]steps.Part{{Name: "a", After: []string{"x"}}}),
		"steps: joint J: bearing 624 sits in b, which is not on the pin":                                  fault(two, steps.Pin{Joint: "J", Items: []steps.Item{{Part: "a"}, {What: "bearing 624", Part: "b", Seat: true}}}),
	} {
		if got == nil || got.Error() != want {
			t.Errorf("got  %v\nwant %s", got, want)
		}
	}
}

func fault(parts []steps.Part, pins ...steps.Pin) error {
	_, err := steps.Order(parts, pins)
	return err
}

// A part whose mark is only a number is told by its name as well.
func TestNumberedMark(t *testing.T) {
	order, err := steps.Order([]steps.Part{{Name: "left-1.toe", Mark: "P7"}}, []steps.Pin{{
		Joint: "B", Through: "ISO 4762 M4x20",
		Items: []steps.Item{{What: "bearing 624", Part: "left-1.toe", Seat: true}, {Part: "left-1.toe"}},
	}})
	if err != nil {
		t.Fatal(err)
	}
	want := "P7 (left-1.toe): B: press bearing 624 into it. B: push ISO 4762 M4x20 up through the part."
	if got := order[0].Takes() + ": " + strings.Join(order[0].Words(), " "); got != want {
		t.Errorf("got  %s\nwant %s", got, want)
	}
}
