package job

import _ "embed"

//go:embed starter.yaml
var starter string

// Starter is a job file with comments to begin from; it reads without error.
func Starter() []byte { return []byte(starter) }
