package proof_test

import (
	"fmt"
	"testing"

	"pinwright/export/proof"
	"pinwright/parts/outline"
)

// A thousand parts on one large sheet: two hundred each of five lengths.
func BenchmarkProofOf1000Parts(b *testing.B) {
	var parts []placed
	for i := range 1000 {
		m := bar(fmt.Sprintf("bar-%d", i), 30+float64(i%5)*2.5)
		parts = append(parts, placed{m, outline.Place(0, false, pt(20+float64(i%20)*64, 20+float64(i/20)*20))})
	}
	folder := newRun(1300, 1040, parts...).write(b, false, nil)
	b.ReportAllocs()
	for b.Loop() {
		r, err := proof.Check(folder)
		if err != nil || !r.OK {
			b.Fatal(err, printed(b, r))
		}
	}
}

func BenchmarkProofOfTheDemoSheet(b *testing.B) {
	folder := demo().write(b, false, nil)
	for b.Loop() {
		if _, err := proof.Check(folder); err != nil {
			b.Fatal(err)
		}
	}
}
