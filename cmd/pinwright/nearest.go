package main

import (
	"strings"

	"pinwright/parts/assembly"
)

// nearest leaves the smallest of the gaps between any two things, in their order. A pin with its head, nut,
// washers and spacers is one thing: whoever makes room for one of these makes room for all.
func nearest(gaps []assembly.Gap) []assembly.Gap {
	told := map[[2]string]bool{}
	var out []assembly.Gap
	for _, g := range gaps {
		key := [2]string{thing(g.A), thing(g.B)}
		if key[0] > key[1] {
			key[0], key[1] = key[1], key[0]
		}
		if !told[key] {
			out = append(out, g)
			told[key] = true
		}
	}
	return out
}

// thing is the pin of a body that is on one ("washer of A"), else the body itself.
func thing(body string) string {
	if _, joint, ok := strings.Cut(body, " of "); ok {
		return "pin " + joint
	}
	return body
}
