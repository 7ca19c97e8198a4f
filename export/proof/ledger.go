package proof

import "math"

// mostFindings is how many findings of one check are listed; an edit that spoils everything would
// otherwise bury its cause.
const mostFindings = 25

// ledger gathers the results of the checks while they run.
type ledger struct{ checks map[string]*Result }

func newLedger() *ledger {
	l := &ledger{checks: map[string]*Result{}}
	for _, name := range checkNames {
		l.checks[name] = &Result{Name: name, OK: true, Findings: []Finding{}}
	}
	return l
}

// count says that n things were looked at.
func (l *ledger) count(check string, n int) { l.checks[check].Compared += n }

// fail enters a finding.
func (l *ledger) fail(check string, f Finding) {
	c := l.checks[check]
	c.OK = false
	if len(c.Findings) == mostFindings {
		c.Left++
		return
	}
	c.Findings = append(c.Findings, f)
}

// resolution is the step to which figures are kept, mm: finer differences are rounding, and would make
// the report differ from machine to machine.
const resolution = 1e-9

func rounded(v float64) float64 { return math.Round(v/resolution) * resolution }

// error enters a deviation and keeps it if it is the largest, of like ones the first.
func (l *ledger) error(check string, value, limit float64, where string) {
	c := l.checks[check]
	if c.Figure == nil || rounded(value) > c.Figure.Value {
		c.Figure = &Figure{largest, "allowed", rounded(value), limit, where}
	}
}

// gap enters a distance with its least, and keeps it if it is the tightest against its own least, of
// like ones the first.
func (l *ledger) gap(check string, value, limit float64, where string) {
	c := l.checks[check]
	if c.Figure == nil || rounded(value)-limit < c.Figure.Value-c.Figure.Limit-resolution/2 {
		c.Figure = &Figure{"least", "wanted", rounded(value), limit, where}
	}
}

// results returns the checks in the order of the report, and whether all are good.
func (l *ledger) results() ([]Result, bool) {
	all := make([]Result, 0, len(checkNames))
	ok := true
	for _, name := range checkNames {
		all = append(all, *l.checks[name])
		ok = ok && l.checks[name].OK
	}
	return all, ok
}
