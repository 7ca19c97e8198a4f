package job

import (
	"math"
	"os"
	"path/filepath"
	"reflect"
	"slices"
	"strings"
	"testing"

	"pinwright/parts/linkage"
)

const jobsDir = "../../testdata/jobs"

func mustRead(t testing.TB, name string) Job {
	t.Helper()
	j, err := Read(filepath.Join(jobsDir, name))
	if err != nil {
		t.Fatal(err)
	}
	return j
}

// lengthOf is the length of a pair as the job has it.
func lengthOf(t testing.TB, j Job, link, a, b string) float64 {
	t.Helper()
	for _, l := range j.Linkage.Links {
		if l.Name != link {
			continue
		}
		for _, s := range l.Lengths {
			if s.A == a && s.B == b || s.A == b && s.B == a {
				return s.MM
			}
		}
	}
	t.Fatalf("link %s has no length %s-%s", link, a, b)
	return 0
}

// TestJobFiles reads every job file of the repository: names exist, everything has what it needs.
func TestJobFiles(t *testing.T) {
	files, err := filepath.Glob(jobsDir + "/*.yaml")
	if err != nil || len(files) < 6 {
		t.Fatalf("%d job files, %v", len(files), err)
	}
	for _, file := range files {
		j, err := Read(file)
		if err != nil {
			t.Errorf("%v", err)
			continue
		}
		complete(t, j)
	}
	j, err := Parse("starter.yaml", Starter(), nil)
	if err != nil {
		t.Fatal(err)
	}
	complete(t, j)
}

// complete checks what Job promises: every name it mentions exists and every part has what it needs.
func complete(t *testing.T, j Job) {
	t.Helper()
	joints := map[string]linkage.Joint{}
	for _, joint := range j.Linkage.Joints {
		joints[joint.Name] = joint
	}
	stock := stockNames(j.Stock)
	if len(j.Links) != len(j.Linkage.Links) {
		t.Fatalf("%s: %d build rules for %d links", j.Name, len(j.Links), len(j.Linkage.Links))
	}
	on := map[string]int{}
	for i, l := range j.Linkage.Links {
		if j.Links[i].Name != l.Name || !slices.Contains(stock, j.Links[i].Stock) || j.Links[i].Shape == "" {
			t.Errorf("%s: link %s is built as %+v", j.Name, l.Name, j.Links[i])
		}
		if len(l.Lengths) < 2*len(l.Pins)-3 {
			t.Errorf("%s: link %s has %d lengths", j.Name, l.Name, len(l.Lengths))
		}
		for _, p := range l.Pins {
			if _, ok := joints[p]; !ok {
				t.Errorf("%s: link %s on no joint %s", j.Name, l.Name, p)
			}
			on[p]++
		}
	}
	var want []string
	for _, joint := range j.Linkage.Joints {
		rodEnd := slices.ContainsFunc(j.Pins, func(p Pin) bool { return p.Joint == joint.Name && p.Kind == RodEndPin })
		if on[joint.Name] > 1 || joint.Ground != nil || rodEnd && on[joint.Name] == 1 {
			want = append(want, joint.Name)
		}
	}
	var got []string
	for _, p := range j.Pins {
		got = append(got, p.Joint)
	}
	if !slices.Equal(got, want) {
		t.Errorf("%s: pins at %v, want %v", j.Name, got, want)
	}
	if len(j.Copies) == 0 || j.Linkage.Drive.Link == "" {
		t.Errorf("%s: copies %v, drive %v", j.Name, j.Copies, j.Linkage.Drive)
	}
}

// The lengths of the published linkages: Jansen's eleven numbers, Chebyshev's proportions; of the
// others as the files say.
func TestPublishedLengths(t *testing.T) {
	for _, c := range []struct {
		file, link, a, b string
		want, tolerance  float64
	}{
		{"jansen.yaml", "crank", "O", "X", 15, 0},
		{"jansen.yaml", "upper", "X", "C", 50, 0},
		{"jansen.yaml", "lower", "X", "D", 61.9, 0},
		{"jansen.yaml", "hip", "B", "C", 41.5, 0},
		{"jansen.yaml", "hip", "B", "E", 40.1, 0},
		{"jansen.yaml", "hip", "C", "E", 55.8, 0},
		{"jansen.yaml", "rocker", "B", "D", 39.3, 0},
		{"jansen.yaml", "tie", "E", "F", 39.4, 0},
		{"jansen.yaml", "foot", "D", "F", 36.7, 0},
		{"jansen.yaml", "foot", "F", "toe", 65.7, 0},
		{"jansen.yaml", "foot", "D", "toe", 49, 0},
		{"chebyshev.yaml", "crank", "O", "A", 20, 0},
		{"chebyshev.yaml", "coupler", "A", "P", 100, 0},
		{"chebyshev.yaml", "rocker", "C", "B", 50, 0},
		{"watt-table.yaml", "coupler", "P", "B", 15, 0},
		{"watt-table.yaml", "right-arm", "D", "B", 60, 0},
		// Recovered from coordinates with four places: the mean of 37 rows is better than one.
		{"fourbar-cycle.yaml", "crank", "O", "A", 40, 5e-5},
		{"fourbar-cycle.yaml", "coupler", "A", "B", 120, 5e-5},
		{"fourbar-cycle.yaml", "coupler", "A", "P", 60, 5e-5},
		{"fourbar-cycle.yaml", "rocker", "D", "B", 80, 5e-5},
	} {
		if got := lengthOf(t, mustRead(t, c.file), c.link, c.a, c.b); math.Abs(got-c.want) > c.tolerance {
			t.Errorf("%s: %s-%s is %v, want %v", c.file, c.a, c.b, got, c.want)
		}
	}
}

// TestDefaults fixes what a job says that does not say it.
func TestDefaults(t *testing.T) {
	j := mustRead(t, "chebyshev.yaml")
	if got := j.Copies; len(got) != 1 || got[0] != (Copy{}) {
		t.Errorf("copies: %+v", got)
	}
	if s := j.Stock[0]; s.Quantity != 1 || s.Grain != NoGrain || s.ByShop || s.Measured != 2.9 {
		t.Errorf("stock: %+v", s)
	}
	if s := mustRead(t, "watt-table.yaml").Stock[0]; s.Measured != s.Thickness || s.Web != s.Thickness {
		t.Errorf("stock: %+v", s)
	}
	if p := j.Pins[1]; !reflect.DeepEqual(p, Pin{Joint: "C", Kind: BoltPin, Bolt: "M4", Fit: "medium", Head: "socket", Nut: "lock", Washer: "normal"}) {
		t.Errorf("pin: %+v", p)
	}
	shapes := map[string]Shape{}
	for _, l := range mustRead(t, "watt-table.yaml").Links {
		shapes[l.Name] = l.Shape
	}
	if shapes["left-arm"] != CrankArm || shapes["coupler"] != Bar || shapes["right-arm"] != Bar {
		t.Errorf("shapes: %v", shapes)
	}
	demo := mustRead(t, "demo.yaml")
	if got := demo.Frame.Plates[0].Pivots; !slices.Equal(got, []string{"O", "C"}) {
		t.Errorf("pivots: %v", got)
	}
	var names []string
	for _, c := range demo.Copies {
		names = append(names, c.Name)
	}
	if !slices.Equal(names, []string{"left-1", "left-2", "right-1", "right-2"}) || demo.Copies[1].Phase != math.Pi {
		t.Errorf("copies: %v", demo.Copies)
	}
}

// TestNamesOfYAML: words that YAML readers take for truth values, nothing or numbers are names here.
func TestNamesOfYAML(t *testing.T) {
	text := `job: 0123
units: {length: mm, angle: deg}
linkage:
  joints:
    y: {ground: [0, 0]}
    no: {ground: [80, 0]}
    on: {near: [25, 0]}
    null: {near: [59, 61]}
  links:
    1: {pins: [y, on], length: 25, drive: full-turn, plane: 1}
    off: {pins: [on, null], length: 70, plane: 2}
    007: {pins: [no, null], length: 65, plane: 3}
pins:
  default: {bolt: M4}
  y: {shaft: 6}
  no: {bearing: 624, in: [007]}
stock:
  3: {material: cast acrylic, thickness: 3, sheet: [600, 400], margin: 5, kerf: 0.18}
`
	j, err := Parse("names.yaml", []byte(text), nil)
	if err != nil {
		t.Fatal(err)
	}
	if j.Name != "0123" || j.Links[2].Name != "007" || j.Linkage.Joints[3].Name != "null" || j.Pins[1].Seats[0] != "007" || j.Links[0].Stock != "3" {
		t.Errorf("%+v", j)
	}
}

// TestLineEnds: the same job with any line ends and a byte order mark is the same job.
func TestLineEnds(t *testing.T) {
	want := mustRead(t, "chebyshev.yaml")
	data, err := os.ReadFile(filepath.Join(jobsDir, "chebyshev.yaml"))
	if err != nil {
		t.Fatal(err)
	}
	for _, text := range []string{
		"\ufeff" + string(data),
		strings.ReplaceAll(string(data), "\n", "\r\n"),
		strings.ReplaceAll(string(data), "\n", "\r"),
	} {
		got, err := Parse("chebyshev.yaml", []byte(text), nil)
		if err != nil {
			t.Fatal(err)
		}
		same(t, got, want)
	}
}

func TestAt(t *testing.T) {
	j := mustRead(t, "watt-table.yaml")
	file, table := filepath.Join(jobsDir, "watt-table.yaml"), filepath.Join(jobsDir, "watt-table.csv")
	for path, want := range map[string]Position{
		"":                                    {file, 3, 1},
		"job":                                 {file, 3, 6},
		"linkage.links.coupler.foot.radius":   {file, 16, 47},
		"linkage.links.coupler.width":         {file, 16, 14},
		"linkage.links.right-arm.plane":       {file, 17, 24},
		"linkage.joints.O.ground.0":           {file, 8, 18},
		"linkage.links.coupler.lengths.A-P":   {table, 5, 13},
		"linkage.links.coupler.lengths.P-A":   {table, 5, 13},
		"stock.clear3.kerf":                   {file, 24, 86},
		"nothing.of.this":                     {file, 3, 1},
		"linkage.links.nobody.width":          {file, 14, 3},
		"frame.plates.back.pivots.0":          {file, 20, 18},
		"linkage.links.coupler.foot.at.far.x": {file, 16, 36},
	} {
		if got := j.At(path); got != want {
			t.Errorf("At(%q) = %v, want %v", path, got, want)
		}
	}
	e := j.Fault("linkage.links.coupler.lengths.A-P", "too short", "make it longer")
	want := table + ":5:13: too short\n  coupler,A,P,15\n              ^\n  make it longer"
	if e.Error() != want {
		t.Errorf("got\n%s\nwant\n%s", e.Error(), want)
	}
	jansen := mustRead(t, "jansen.yaml")
	if got, want := jansen.At("copies.right"), jansen.At("copies.1"); got != want || got.Line == 1 {
		t.Errorf("copy at %v, want %v", got, want)
	}
	if got := (Job{}).At("job"); got != (Position{}) {
		t.Errorf("zero job: %v", got)
	}
}

func TestErrorsAreCapped(t *testing.T) {
	var b strings.Builder
	b.WriteString("job: many\nlinkage:\n  joints:\n")
	for range 70 {
		b.WriteString("    A: {far: 1}\n")
	}
	_, err := Parse("many.yaml", []byte(b.String()), nil)
	text := err.Error()
	if n := strings.Count(text, "\nmany.yaml:"); n != mostShown-1 {
		t.Errorf("%d errors written", n)
	}
	if !strings.Contains(text, "\n\nand ") || !strings.HasSuffix(text, " more") {
		t.Errorf("no count of the rest: %s", text[len(text)-60:])
	}
}

func TestReadMissing(t *testing.T) {
	if _, err := Read("testdata/nowhere.yaml"); !os.IsNotExist(unwrapAll(err)) {
		t.Errorf("got %v", err)
	}
	if _, err := Read("testdata"); err == nil {
		t.Error("a folder was read")
	}
}

func unwrapAll(err error) error {
	for {
		u, ok := err.(interface{ Unwrap() error })
		if !ok {
			return err
		}
		if _, path := err.(*os.PathError); path {
			return err
		}
		err = u.Unwrap()
	}
}

func TestHugeFile(t *testing.T) {
	_, err := Parse("huge.yaml", make([]byte, mostJobBytes+1), nil)
	if err == nil || !strings.Contains(err.Error(), "huge.yaml:1:1: the file has 1048577 bytes") {
		t.Errorf("got %v", err)
	}
}

func BenchmarkReadDemo(b *testing.B) {
	data, err := os.ReadFile(filepath.Join(jobsDir, "demo.yaml"))
	if err != nil {
		b.Fatal(err)
	}
	for b.Loop() {
		if _, err := Parse("demo.yaml", data, nil); err != nil {
			b.Fatal(err)
		}
	}
}

// The grain follows the material when the job does not say.
func TestUsualGrain(t *testing.T) {
	for material, want := range map[string]Grain{"cast acrylic": NoGrain, "birch plywood": HalfTurn} {
		text := strings.ReplaceAll(string(Starter()), "material: cast acrylic", "material: "+material)
		text = strings.ReplaceAll(text, "    grain: none ", "    # ")
		j, err := Parse("job.yaml", []byte(text), nil)
		if err != nil {
			t.Fatal(err)
		}
		for _, s := range j.Stock {
			if s.Grain != want {
				t.Errorf("%s: grain %s, want %s", material, s.Grain, want)
			}
		}
	}
}
