package main

import (
	"encoding/json"
	"fmt"
	"os"
	"strings"
	"testing"
)

// The list in the terminal has every line of hardware.csv, with its joints when asked.
func TestList(t *testing.T) {
	out, errs, status := shell("list", jobs+"demo.yaml", "--where-used")
	if status != statusFine || errs != "" {
		t.Fatalf("status %d: %s", status, errs)
	}
	data, _, status := shell("list", jobs+"demo.yaml", "--json")
	var lines []listed
	if err := json.Unmarshal([]byte(data), &lines); err != nil || status != statusFine || len(lines) < 8 {
		t.Fatalf("%d lines, status %d (%v)", len(lines), status, err)
	}
	rows := strings.Split(out, "\n")
	for i, l := range lines {
		row := rows[i+1]
		if !strings.HasPrefix(row, fmt.Sprint(l.Buy)) || !strings.Contains(row, l.Item) || !strings.Contains(row, strings.Join(l.WhereUsed, " ")) || len(l.WhereUsed) == 0 {
			t.Errorf("%q is not the row of %+v", row, l)
		}
	}
	plain, _, _ := shell("list", jobs+"demo.yaml")
	if strings.Contains(plain, "where used") || !strings.Contains(plain, "g in all") {
		t.Errorf("%s", plain)
	}
}

// Tubes are told with their cuts: every spacer of the list that is to be bought, no other.
func TestListTubes(t *testing.T) {
	text, err := os.ReadFile(jobs + "demo.yaml")
	if err != nil {
		t.Fatal(err)
	}
	file := written(t, "tubes.yaml", string(text)+"\nspacers: {tube: 100, saw: 1.5}\n")
	out, errs, status := shell("list", file)
	if status != statusFine {
		t.Fatalf("%s", errs)
	}
	if !strings.Contains(out, "tube for 5 mm") || !strings.Contains(out, "of 100 mm, saw cut 1.5 mm") || !strings.Contains(out, "mm left") {
		t.Errorf("%s", out)
	}
}

func TestCutWords(t *testing.T) {
	if got, want := cutWords([]float64{12.7, 12.7, 8, 3.25}), "2 x 12.7, 1 x 8, 1 x 3.25"; got != want {
		t.Errorf("%q, want %q", got, want)
	}
}
