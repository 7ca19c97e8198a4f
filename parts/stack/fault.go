package stack

import (
	"fmt"

	"pinwright/parts/job"
)

// pinKey is where the job file speaks of a joint's pin: at the joint's own entry, else at the default.
func pinKey(j job.Job, joint string) string {
	own := "pins." + joint
	if j.At(own) == j.At("pins") {
		return "pins.default"
	}
	return own
}

// fault is an error with its place in the job file when the job came from one.
func fault(j job.Job, key, message, hint string) error {
	if j.At(key).File != "" {
		return j.Fault(key, message, hint)
	}
	if hint == "" {
		return fmt.Errorf("%s", message)
	}
	return fmt.Errorf("%s: %s", message, hint)
}
