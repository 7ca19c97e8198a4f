package sample

import (
	"os"
	"os/exec"
	"testing"
)

// Oracle runs an outside program and returns what it prints. Where the program is missing the test is
// skipped, or fails if PINWRIGHT_ORACLES=require says that it must be there.
func Oracle(t testing.TB, name string, args ...string) []byte {
	t.Helper()
	path, err := exec.LookPath(name)
	if err != nil {
		if os.Getenv("PINWRIGHT_ORACLES") == "require" {
			t.Fatalf("%s is not installed, and PINWRIGHT_ORACLES=require", name)
		}
		t.Skipf("%s is not installed: this check is left out", name)
	}
	cmd := exec.Command(path, args...)
	cmd.Stderr = os.Stderr
	out, err := cmd.Output()
	if err != nil {
		t.Fatalf("%s %v: %v", name, args, err)
	}
	return out
}
