package main

import (
	"encoding/json"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/spf13/cobra"
)

// Exit statuses and where words go: an error is on standard error alone, without colours where there is no terminal.
func TestStatuses(t *testing.T) {
	tmp := t.TempDir()
	file := written(t, "a-file", "x")
	broken := written(t, "broken.yaml", "job: x\nunknown: 1\n")
	out := filepath.Join(tmp, "out")
	for _, c := range []struct {
		args   []string
		status int
		says   string
	}{
		{[]string{"cut", jobs + "demo.yaml"}, statusUsage, "-o DIR"},
		{[]string{"cut", jobs + "demo.yaml", "-o"}, statusUsage, "needs an argument"},
		{[]string{"cut", jobs + "demo.yaml", "-o", out, "--effort", "0"}, statusUsage, "an effort of 0 is none: give 1 or more"},
		{[]string{"cut", jobs + "demo.yaml", "-o", out, "--effort", "much"}, statusUsage, "much"},
		{[]string{"cut"}, statusUsage, "pinwright cut JOB -o DIR"},
		{[]string{"cut", "a.yaml", "b.yaml", "-o", out}, statusUsage, "2"},
		{[]string{"check"}, statusUsage, "pinwright check JOB"},
		{[]string{"proof"}, statusUsage, "pinwright proof DIR"},
		{[]string{"new", "a", "b"}, statusUsage, "2"},
		{[]string{"slice"}, statusUsage, "unknown command"},
		{[]string{"check", "--nonsense", "x"}, statusUsage, "unknown flag: --nonsense"},
		{[]string{"cut", filepath.Join(tmp, "none.yaml"), "-o", out}, statusSystem, "none.yaml"},
		{[]string{"check", tmp}, statusSystem, filepath.Base(tmp)},
		{[]string{"cut", jobs + "watt-table.yaml", "-o", file}, statusSystem, "a-file"},
		{[]string{"cut", jobs + "watt-table.yaml", "-o", filepath.Join(file, "below")}, statusSystem, "a-file"},
		{[]string{"cut", broken, "-o", out}, statusRefused, "broken.yaml:2:1"},
		{[]string{"check", broken}, statusRefused, "unknown"},
		{[]string{"check", broken, "--json"}, statusRefused, "unknown"},
		{[]string{"proof", filepath.Join(tmp, "nowhere")}, statusSystem, "nowhere"},
		{[]string{"proof", file}, statusSystem, "a-file is not a folder"},
		{[]string{"proof", tmp}, statusSystem, "there is no manifest.json here"},
		{[]string{"new", broken}, statusSystem, "broken.yaml exists already"},
		{[]string{"new", filepath.Join(tmp, "no", "where.yaml")}, statusSystem, "where.yaml"},
	} {
		said, errs, status := shell(c.args...)
		if status != c.status || !strings.Contains(errs, c.says) {
			t.Errorf("%v: status %d, want %d; %q should say %q", c.args, status, c.status, errs, c.says)
		}
		if said != "" {
			t.Errorf("%v: prints %q besides its error", c.args, said)
		}
		if !strings.HasPrefix(errs, "pinwright: ") || strings.Contains(errs, "\x1b") {
			t.Errorf("%v: says %q", c.args, errs)
		}
	}
	absent(t, out)
	if text, err := os.ReadFile(broken); err != nil || string(text) != "job: x\nunknown: 1\n" {
		t.Errorf("new has written over a file (%v)", err)
	}
}

// A job that may not be read and a directory that may not be written to are problems of files, not of the job.
func TestPermissions(t *testing.T) {
	if os.Geteuid() == 0 {
		t.Skip("the superuser may read and write everything: this check is left out")
	}
	file := written(t, "job.yaml", "job: x\n")
	if err := os.Chmod(file, 0); err != nil {
		t.Fatal(err)
	}
	if out, errs, status := shell("check", file); status != statusSystem || out != "" {
		t.Errorf("status %d, prints %q, says %q", status, out, errs)
	}
	dir := t.TempDir()
	if err := os.Chmod(dir, 0o500); err != nil {
		t.Fatal(err)
	}
	if out, errs, status := shell("cut", jobs+"watt-table.yaml", "-o", filepath.Join(dir, "out")); status != statusSystem || out != "" {
		t.Errorf("status %d, prints %q, says %q", status, out, errs)
	}
}

// Colours are for terminals that want them.
func TestColour(t *testing.T) {
	for _, c := range []struct {
		what    string
		to      terminal
		escapes bool
	}{
		{"a terminal", terminal{errTTY: true}, true},
		{"NO_COLOR", terminal{errTTY: true, noColor: true}, false},
		{"a file", terminal{}, false},
	} {
		var o, e strings.Builder
		c.to.out, c.to.err = &o, &e
		run(t.Context(), []string{"check", "none.yaml"}, c.to)
		if got := strings.Contains(e.String(), "\x1b"); got != c.escapes || o.Len() > 0 {
			t.Errorf("%s: escapes %v: %q", c.what, got, e.String())
		}
	}
}

// Progress is shown on a terminal only, on standard error only, and can be switched off.
func TestProgress(t *testing.T) {
	for _, c := range []struct {
		what  string
		to    terminal
		args  []string
		shown bool
	}{
		{"a terminal", terminal{errTTY: true, noColor: true}, nil, true},
		{"a terminal, quiet", terminal{errTTY: true, noColor: true}, []string{"--quiet"}, false},
		{"a terminal, for machines", terminal{errTTY: true, noColor: true}, []string{"--json"}, false},
		{"a file", terminal{}, nil, false},
	} {
		var o, e strings.Builder
		c.to.out, c.to.err = &o, &e
		args := append([]string{"cut", jobs + "watt-table.yaml", "-o", filepath.Join(t.TempDir(), "out"), "--effort", "3"}, c.args...)
		if status := run(t.Context(), args, c.to); status != statusFine {
			t.Fatalf("%s: status %d: %s", c.what, status, e.String())
		}
		if got := e.Len() > 0; got != c.shown || strings.Contains(o.String(), "\r") {
			t.Errorf("%s: progress %v: %q", c.what, got, e.String())
		}
		if c.to.noColor && strings.Contains(e.String(), "\x1b[3") {
			t.Errorf("%s: colours although NO_COLOR is set: %q", c.what, e.String())
		}
	}
}

// For machines: one JSON value on standard output and nothing else, also when the answer is no.
func TestJSON(t *testing.T) {
	dir := filepath.Join(t.TempDir(), "out")
	edited := filepath.Join(t.TempDir(), "edited")
	fine(t, "cut", jobs+"watt-table.yaml", "-o", edited, "-q")
	edit(t, filepath.Join(edited, "sheet-clear3-1.dxf"))
	for _, c := range []struct {
		args   []string
		status int
		ok     bool
	}{
		{[]string{"check", jobs + "demo.yaml", "--json"}, statusFine, true},
		{[]string{"check", written(t, "near-miss.yaml", nearMiss(20.4)), "--json"}, statusRefused, false},
		{[]string{"cut", jobs + "demo.yaml", "-o", dir, "--json"}, statusFine, true},
		{[]string{"proof", dir, "--json"}, statusFine, true},
		{[]string{"proof", edited, "--json"}, statusRefused, false},
	} {
		out, errs, status := shell(c.args...)
		if status != c.status || (errs == "") != c.ok {
			t.Errorf("%v: status %d, says %q", c.args, status, errs)
		}
		var answer struct{ OK *bool }
		if err := json.Unmarshal([]byte(out), &answer); err != nil || answer.OK == nil || *answer.OK != c.ok {
			t.Errorf("%v: %v in\n%s", c.args, err, out)
		}
	}
}

// Every command explains itself with an example.
func TestHelp(t *testing.T) {
	var commands func(c *cobra.Command, path []string)
	seen := 0
	commands = func(c *cobra.Command, path []string) {
		seen++
		out := fine(t, append(path, "--help")...)
		for _, want := range []string{"Examples:\n  pinwright ", "Usage:", "--help"} {
			if !strings.Contains(out, want) {
				t.Errorf("help of %v has no %q:\n%s", path, want, out)
			}
		}
		for _, line := range strings.Split(out, "\n") {
			if len(line) > 120 {
				t.Errorf("help of %v has a line of %d characters: %s", path, len(line), line)
			}
		}
		for _, below := range c.Commands() {
			commands(below, append(path[:len(path):len(path)], below.Name()))
		}
	}
	commands(rootCommand(terminal{}), nil)
	if seen < 5 {
		t.Errorf("only %d commands", seen)
	}
	if out := fine(t); !strings.Contains(out, "pinwright cut arm.yaml -o out") {
		t.Errorf("without a command there is no help:\n%s", out)
	}
	if out := fine(t, "--version"); out != "pinwright "+version+"\n" {
		t.Errorf("the version is said as %q", out)
	}
}

func TestCompletion(t *testing.T) {
	for _, sh := range []string{"bash", "zsh", "fish", "powershell"} {
		if out := fine(t, "completion", sh); !strings.Contains(out, "pinwright") || len(out) < 1000 {
			t.Errorf("completion for %s has %d bytes", sh, len(out))
		}
	}
	if out, _, status := shell("__complete", "c"); status != statusFine || !strings.Contains(out, "check\t") || !strings.Contains(out, "cut\t") {
		t.Errorf("status %d, c is completed to %q", status, out)
	}
}

// The starter goes the whole way as it is, and is never written over a file.
func TestNew(t *testing.T) {
	tmp := t.TempDir()
	file := filepath.Join(tmp, "arm.yaml")
	if out, errs, status := shell("new", file); status != statusFine || out != "" || !strings.Contains(errs, "wrote") {
		t.Fatalf("status %d, prints %q, says %q", status, out, errs)
	}
	text, err := os.ReadFile(file)
	if err != nil {
		t.Fatal(err)
	}
	if fine(t, "new") != string(text) {
		t.Error("the starter differs between a file and standard output")
	}
	if out, errs, status := shell("new", file); status != statusSystem || out != "" || !strings.Contains(errs, "give another name") {
		t.Errorf("written over: status %d, prints %q, says %q", status, out, errs)
	}
	fine(t, "check", file)
	fine(t, "cut", file, "-o", filepath.Join(tmp, "out"))
	fine(t, "proof", filepath.Join(tmp, "out"))
	var schema map[string]any
	if err := json.Unmarshal([]byte(fine(t, "new", "--schema")), &schema); err != nil || schema["$schema"] == nil {
		t.Errorf("the schema is no JSON Schema: %v", err)
	}
}

// Every broken job file of the reader is refused by the program too, on standard error alone.
func TestBrokenJobs(t *testing.T) {
	files, err := filepath.Glob("../../parts/job/testdata/broken/*.yaml")
	if err != nil || len(files) < 60 {
		t.Fatalf("%d files, %v", len(files), err)
	}
	for _, f := range files {
		out, errs, status := shell("check", f)
		if status != statusRefused || errs == "" || out != "" {
			t.Errorf("%s: status %d, prints %q and says %q", f, status, out, errs)
		}
	}
}
