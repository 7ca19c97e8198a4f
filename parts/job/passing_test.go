package job

import (
	"fmt"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"testing"
	"time"
)

const slimJob = `job: slim
units: {length: mm, angle: deg}
linkage:
  joints: {O: {ground: [0, 0]}, D: {ground: [80, 0]}, A: {near: [25, 0]}, B: {near: [60, 62]}}
  links:
    crank: {pins: [O, A], length: 25, drive: full-turn, plane: 2, bores: {O: %s, A: %s}}
    coupler: {pins: [A, B], length: 70, plane: 3}
    rocker: {pins: [D, B], length: 65, plane: 4}
frame: {plates: {back: {plane: 0}}}
pins:
  default: {bolt: M4, nut: %s}
  O: {shaft: 6, fit: running}
stock:
  clear3: {material: cast acrylic, thickness: 3, sheet: [300, 200], margin: 5, kerf: 0.18}
`

// A bore that its pin does not go through is refused; one that it is pressed or threaded into is not.
func TestBoresAgainstPins(t *testing.T) {
	cases := []struct{ atO, atA, nut, want string }{
		{"{d: 6, flat: 5.5}", "{round: 4}", "lock", ""},
		{"{round: 5.9}", "{hexagon: 7}", "lock", ""},
		{"{round: 6}", "{round: 3.3}", "none", ""}, // M4 is tapped into 3.3 mm
		{"{round: 5}", "{round: 4}", "lock", "bore O: the shaft of 6 mm does not go through 5 mm"},
		{"{d: 5, flat: 4.5}", "{round: 4}", "lock", "bore O: the shaft of 6 mm does not go through 5 mm"},
		{"{hub: {centre: 3, circle: 16, bolts: 4, hole: 3}}", "{round: 4}", "lock", "bore O: the shaft of 6 mm does not go through 3 mm"},
		{"{round: 6}", "{round: 3.3}", "lock", "bore A: bolt M4 of 4 mm does not go through 3.3 mm"},
		{"{round: 6}", "{hexagon: 3}", "lock", "bore A: bolt M4 of 4 mm does not go through 3 mm"},
		// The washer of M4 is 9 mm wide (ISO 7089).
		{"{round: 6}", "{round: 8}", "lock", ""},
		{"{round: 6}", "{round: 8.1}", "lock", "bore A: the washer of M4 is 9 mm wide and does not cover a bore of 8.1 mm"},
		{"{round: 6}", "{round: 2.9}", "none", "bore A: bolt M4 of 4 mm does not go through 2.9 mm"},
	}
	for _, c := range cases {
		_, err := Parse("slim.yaml", fmt.Appendf(nil, slimJob, c.atO, c.atA, c.nut), nil)
		switch {
		case c.want == "" && err != nil:
			t.Errorf("%+v: %v", c, err)
		case c.want != "" && (err == nil || !strings.Contains(err.Error(), c.want) || !strings.HasPrefix(err.Error(), "slim.yaml:6:")):
			t.Errorf("%+v: got %v", c, err)
		}
	}
}

// A table that is a device is refused and not waited for.
func TestTableIsNoPlainFile(t *testing.T) {
	if runtime.GOOS == "windows" {
		t.Skip("no device files by path here")
	}
	text := fmt.Sprintf(slimJob, "{round: 6}", "{round: 4}", "lock")
	text = strings.Replace(text, "  links:", "  table: /dev/zero\n  links:", 1)
	path := filepath.Join(t.TempDir(), "slim.yaml")
	if err := os.WriteFile(path, []byte(text), 0o600); err != nil {
		t.Fatal(err)
	}
	done := make(chan error, 1)
	go func() { _, err := Read(path); done <- err }()
	select {
	case err := <-done:
		if err == nil || !strings.Contains(err.Error(), "not a plain file") {
			t.Errorf("got %v", err)
		}
	case <-time.After(20 * time.Second):
		t.Fatal("the read does not come back")
	}
}
