package main

import (
	"path/filepath"
	"testing"
)

// BenchmarkCutDemo is the whole way of the demo, files on the disk included.
func BenchmarkCutDemo(b *testing.B) {
	dir := filepath.Join(b.TempDir(), "out")
	b.ReportAllocs()
	for b.Loop() {
		fine(b, "cut", jobs+"demo.yaml", "-o", dir, "-q")
	}
}

// BenchmarkCheckJansen is an eight-bar leg, its gaps included.
func BenchmarkCheckJansen(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		fine(b, "check", jobs+"jansen.yaml")
	}
}

// BenchmarkProofDemo reads the files of the demo back.
func BenchmarkProofDemo(b *testing.B) {
	dir := filepath.Join(b.TempDir(), "out")
	fine(b, "cut", jobs+"demo.yaml", "-o", dir, "-q")
	b.ReportAllocs()
	for b.Loop() {
		fine(b, "proof", dir)
	}
}
