package material_test

import (
	"fmt"

	"pinwright/parts/material"
)

// What a sheet asks for, and what must not go into the laser.
func Example() {
	m, err := material.Lookup("acrylic")
	if err != nil {
		fmt.Println(err)
		return
	}
	least, most, _ := m.Thickness(3)
	fmt.Printf("%s: %s\n", m.Name, m.Note)
	fmt.Printf("3 mm may be %.1f to %.1f mm\n", least, most)
	d := m.EdgeDistance(3, 4.5)
	fmt.Printf("a hole of 4.5 mm wants its centre %.2f mm from the edge, at least %.2f mm\n", d.Want, d.Refuse)

	_, err = material.Lookup("vinyl")
	fmt.Println(err)
	// Output:
	// cast acrylic: acrylic may be cast or extruded: taken as cast, whose thickness varies more
	// 3 mm may be 2.3 to 3.7 mm
	// a hole of 4.5 mm wants its centre 9.00 mm from the edge, at least 6.75 mm
	// vinyl (PVC) must not go into a laser: it holds chlorine: hydrogen chloride poisons people and corrodes the machine (university and workshop laser safety pages, 2+ places)
}
