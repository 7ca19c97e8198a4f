package linkage

import (
	"math"
	"testing"
)

func pt(x, y float64) *Point { return &Point{X: x, Y: y} }

func ground(x, y float64) *Ground { return &Ground{At: Point{X: x, Y: y}} }

func bar2(name, a, b string, mm float64) Link {
	return Link{Name: name, Pins: []string{a, b}, Lengths: []Length{{a, b, mm}}}
}

func tri(name, a, b, c string, ab, bc, ac float64) Link {
	return Link{Name: name, Pins: []string{a, b, c}, Lengths: []Length{{a, b, ab}, {b, c, bc}, {a, c, ac}}}
}

func jansen() Linkage {
	return Linkage{
		Joints: []Joint{
			{Name: "O", Ground: ground(0, 0)}, {Name: "B", Ground: ground(-38, -7.8)},
			{Name: "X", Near: pt(15, 0)}, {Name: "C", Near: pt(-30, 30)}, {Name: "D", Near: pt(-20, -45)},
			{Name: "E", Near: pt(-75, 5)}, {Name: "F", Near: pt(-65, -35)}, {Name: "foot", Near: pt(-43, -90)},
		},
		Links: []Link{
			bar2("crank", "O", "X", 15), bar2("j", "X", "C", 50), bar2("k", "X", "D", 61.9),
			tri("upper", "B", "C", "E", 41.5, 55.8, 40.1), bar2("c", "B", "D", 39.3), bar2("f", "E", "F", 39.4),
			tri("lower", "D", "F", "foot", 36.7, 65.7, 49),
		},
		Drive: Drive{Link: "crank", To: 2 * math.Pi, Full: true},
		Trace: []string{"foot"},
	}
}

func TestJansenFast(t *testing.T) {
	m, err := New(jansen())
	if err != nil {
		t.Fatal(err)
	}
	c, err := m.Cycle(12, nil)
	if err != nil {
		t.Fatal(err)
	}
	t.Log(m.Ambiguity(), m.gruebler, c.Closure())
	for _, p := range c.Path("foot") {
		t.Log(p)
	}
}

func BenchmarkEightBarLeg(b *testing.B) {
	m, err := New(jansen())
	if err != nil {
		b.Fatal(err)
	}
	w := newWalker(m.prog.clone(), m.start)
	const steps = 360
	b.ReportAllocs()
	b.ResetTimer()
	turn := 0.0
	for range b.N {
		for k := 1; k <= steps; k++ {
			w.to(turn + 2*math.Pi*float64(k)/steps)
		}
		turn += 2 * math.Pi
	}
	b.ReportMetric(float64(b.N*steps)/b.Elapsed().Seconds(), "steps/s")
}

func TestJansenReport(t *testing.T) {
	r, err := Analyse(jansen(), Options{})
	if err != nil {
		t.Fatal(err)
	}
	t.Logf("%+v", r)
}
