package proof

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

// error enters a deviation and keeps it if it is the largest.
func (l *ledger) error(check string, value, limit float64, where string) {
	c := l.checks[check]
	if c.Figure == nil || value > c.Figure.Value {
		c.Figure = &Figure{"largest error", value, limit, where}
	}
}

// gap enters a distance with its least, and keeps it if it is the tightest against its own least.
func (l *ledger) gap(check string, value, limit float64, where string) {
	c := l.checks[check]
	if c.Figure == nil || value-limit < c.Figure.Value-c.Figure.Limit {
		c.Figure = &Figure{"least", value, limit, where}
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
