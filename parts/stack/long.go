package stack

// LongError says that the bolt of a joint would have to be longer than any there is.
type LongError struct {
	Joint string
	err   error
}

func (e *LongError) Error() string { return e.err.Error() }

// Unwrap gives the error with its place in the job file.
func (e *LongError) Unwrap() error { return e.err }

// Long lists the joints of which an error of Build or Levels says that there is no bolt so long.
func Long(err error) []string {
	switch e := err.(type) {
	case *LongError:
		return []string{e.Joint}
	case interface{ Unwrap() []error }:
		var out []string
		for _, x := range e.Unwrap() {
			out = append(out, Long(x)...)
		}
		return out
	}
	return nil
}
