package stack

import (
	"fmt"

	"pinwright/parts/job"
)

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
