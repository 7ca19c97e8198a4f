package main

import (
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// A mounting hole under the path of the crank's pin has no room for a screw head on the side of the
// links, which is said; the demo's holes have.
func TestMountHeads(t *testing.T) {
	text, err := os.ReadFile(filepath.Join(jobs, "demo.yaml"))
	if err != nil {
		t.Fatal(err)
	}
	if out := fine(t, "check", filepath.Join(jobs, "demo.yaml")); strings.Contains(out, "finds no room") {
		t.Errorf("the demo's heads have room:\n%s", out)
	}
	moved := strings.Replace(string(text), "holes: [[8, 44],", "holes: [[14, 14],", 1)
	if moved == string(text) {
		t.Fatal("the demo has changed: say anew where its mounting holes are")
	}
	out := fine(t, "check", written(t, "under.yaml", moved))
	if !strings.Contains(out, "mount 1 of back: the head of M4 finds no room") || strings.Contains(out, "mount 2") {
		t.Errorf("got\n%s", out)
	}
}
