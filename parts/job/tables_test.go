package job

import (
	"math"
	"strings"
	"testing"
)

// tableJob reads Watt's linkage or the four-bar with another table and other text.
func tableJob(t *testing.T, name, table string, swap ...string) (Job, error) {
	t.Helper()
	text := `job: tables
units: {length: mm, angle: deg}
linkage:
  joints: {O: {ground: [0, 0]}, D: {ground: [100, 0]}, A: {near: [40, 0]}, B: {near: [137, 71]}}
  NAME
  links:
    crank: {drive: full-turn, plane: 1}
    coupler: {plane: 2}
    rocker: {plane: 3}
pins: {default: {bolt: M4}}
stock: {clear3: {material: cast acrylic, thickness: 3, sheet: [600, 400], margin: 5, kerf: 0.18}}
`
	text = strings.NewReplacer(append([]string{"NAME", name}, swap...)...).Replace(text)
	return Parse("tables.yaml", []byte(text), func(string) ([]byte, error) { return []byte(table), nil })
}

// TestLengthTables: the same table in the forms that spreadsheets write.
func TestLengthTables(t *testing.T) {
	for _, table := range []string{
		"link,from,to,length\ncrank,O,A,40\ncoupler,A,B,120\nrocker,D,B,80\n",
		"\ufefflink;from;to;length\r\ncrank;O;A;40\r\ncoupler;A;B;120\r\nrocker;D;B;80\r\n",
		"# from the solver\n\nlength_cm, to, from, link\n4, A, O, crank\n12, B, A, coupler\n\n8, B, D, rocker\n",
		"\"link\",\"from\",\"to\",\"length\"\n\"crank\",\"O\",\"A\",\"4cm\"\ncoupler,A,B,0.12m\nrocker,D,B,80 mm\n",
		"link,from,to,length_m\ncrank,O,A,40mm\ncoupler,A,B,0.12\nrocker,D,B,0.08",
	} {
		j, err := tableJob(t, "table: any.csv", table)
		if err != nil {
			t.Errorf("%q: %v", table, err)
			continue
		}
		for _, c := range []struct {
			link, a, b string
			want       float64
		}{{"crank", "O", "A", 40}, {"coupler", "A", "B", 120}, {"rocker", "D", "B", 80}} {
			if got := lengthOf(t, j, c.link, c.a, c.b); math.Abs(got-c.want) > 1e-12 {
				t.Errorf("%q: %s is %v", table, c.link, got)
			}
		}
	}
}

// TestPlaces: a link given by places has the distances of all its pairs, a 3-4-5 triangle twice here.
func TestPlaces(t *testing.T) {
	j, err := tableJob(t, "trace: [B]", "", "coupler: {plane: 2}", "coupler: {plane: 2, at: {A: [0, 0], B: [40, 0], E: [40, 30], F: [0, 30]}}",
		"crank: {", "crank: {pins: [O, A], length: 40, ", "rocker: {", "rocker: {pins: [D, B], length: 80, ", "A: {near", "E: {}, F: {near: [0, 1in]}, A: {near")
	if err != nil {
		t.Fatal(err)
	}
	for pair, want := range map[string]float64{"A-B": 40, "B-E": 30, "A-E": 50, "E-F": 40, "A-F": 30, "B-F": 50} {
		a, b, _ := strings.Cut(pair, "-")
		if got := lengthOf(t, j, "coupler", a, b); got != want {
			t.Errorf("%s is %v, want %v", pair, got, want)
		}
	}
	if n := j.Linkage.Joints[3]; n.Name != "F" || n.Near.Y != 25.4 {
		t.Errorf("joint %+v", n)
	}
	if j.Links[1].Shape != Plate {
		t.Errorf("shape %s", j.Links[1].Shape)
	}
}

// TestCycleTables: units in the heading, a missing drive column, a ground pivot in the table, lengths
// stated beside it.
func TestCycleTables(t *testing.T) {
	pins := []string{"crank: {", "crank: {pins: [O, A], ", "coupler: {", "coupler: {pins: [A, B], ", "rocker: {", "rocker: {pins: [D, B], "}
	// Positions by hand: a parallelogram of crank 30 and coupler 100 at 0, 90 and 180 degrees.
	for _, table := range []string{
		"A.x,A.y,B.x,B.y\n30,0,130,0\n0,30,100,30\n-30,0,70,0\n",
		"drive_turn,A.x_cm,A.y_cm,B.x_m,B.y_m,D.x,D.y\n0,3,0,0.13,0,100,0\n0.25,0,3,0.1,0.03,100,0\n0.5,-3,0,0.07,0,100,0\n",
		"drive;B.y;B.x;A.y;A.x\n0;0;130;0;30\n90;30;100;30;0\n180;0;70;0;-30\n",
	} {
		j, err := tableJob(t, "cycle: {file: any.csv}", table, pins...)
		if err != nil {
			t.Errorf("%q: %v", table, err)
			continue
		}
		for _, c := range []struct {
			link, a, b string
			want       float64
		}{{"crank", "O", "A", 30}, {"coupler", "A", "B", 100}, {"rocker", "D", "B", 30}} {
			if got := lengthOf(t, j, c.link, c.a, c.b); math.Abs(got-c.want) > 1e-9 {
				t.Errorf("%q: %s is %v", table, c.link, got)
			}
		}
		// The near places are those of the first row, not those of the job.
		if near := *j.Linkage.Joints[3].Near; math.Abs(near.X-130) > 1e-9 || near.Y != 0 {
			t.Errorf("%q: near %v", table, near)
		}
	}
	// A stated length is kept as stated when the table agrees within the tolerance.
	j, err := tableJob(t, "cycle: {file: any.csv, tolerance: 0.1mm}", "A.x,A.y,B.x,B.y\n30.04,0,130,0\n0,30,100,30\n", append([]string{"plane: 1", "plane: 1, length: 30"}, pins...)...)
	if err != nil {
		t.Fatal(err)
	}
	if got := lengthOf(t, j, "crank", "O", "A"); got != 30 {
		t.Errorf("crank is %v", got)
	}
}

// TestNoTables: without a way to open files a job that names one is refused, not read half.
func TestNoTables(t *testing.T) {
	_, err := Parse("tables.yaml", []byte("job: a\nlinkage:\n  table: x.csv\n"), nil)
	if err == nil || !strings.Contains(err.Error(), "tables.yaml:3:10: x.csv: tables can't be opened here") {
		t.Errorf("got %v", err)
	}
}
