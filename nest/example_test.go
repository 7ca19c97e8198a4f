package nest_test

import (
	"context"
	"fmt"

	"pinwright/nest"
	"pinwright/parts/outline"
)

func ExampleNest() {
	items := []nest.Item{{
		Name: "bar", Stock: "clear3", Quantity: 10,
		Shape: outline.Region{Outer: outline.Capsule(outline.Point{}, outline.Point{X: 75}, 7)},
	}}
	stock := []nest.Stock{{Name: "clear3", Width: 200, Height: 100, Quantity: 3, Margin: 5, Web: 3, Kerf: 0.18}}
	layout, err := nest.Nest(context.Background(), items, stock, nest.Options{})
	if err != nil {
		fmt.Println(err)
		return
	}
	fmt.Printf("%d bars on %d sheets, %d left over\n", len(layout.Placements), len(layout.Sheets), len(layout.Left))
	// Output: 10 bars on 1 sheets, 0 left over
}
