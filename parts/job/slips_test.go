package job

import (
	"errors"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"
)

// TestOneCharacterMissing takes every bracket, colon, comma, quote and space out of the demo, one at a
// time. What is then refused must be told in our own words, near the place.
func TestOneCharacterMissing(t *testing.T) {
	data, err := os.ReadFile(filepath.Join(jobsDir, "demo.yaml"))
	if err != nil {
		t.Fatal(err)
	}
	text := string(data)
	refused := 0
	for i := range text {
		if !strings.ContainsRune("[]{}:,\" ", rune(text[i])) {
			continue
		}
		_, err := Parse("demo.yaml", []byte(text[:i]+text[i+1:]), nil)
		if err == nil {
			continue // a space, mostly
		}
		refused++
		var all Errors
		if !errors.As(err, &all) {
			t.Fatal(err)
		}
		line := 1 + strings.Count(text[:i], "\n")
		near := false
		for _, e := range all {
			near = near || e.Line >= line-3 && e.Line <= line+3 || strings.Contains(e.Message, fmt.Sprintf("line %d ", line))
			if strings.Contains(e.Message, "not understood") {
				t.Errorf("without the %q on line %d:\n%v", text[i], line, e)
			}
		}
		if !near {
			t.Errorf("without the %q on line %d:\n%v", text[i], line, err)
		}
	}
	if refused < 100 {
		t.Errorf("%d slips refused only", refused)
	}
}
