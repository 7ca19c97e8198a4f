package main

import (
	"io"
	"os"

	"github.com/schollz/progressbar/v3"
	"golang.org/x/term"
)

// terminal is where a command writes: results to out, everything said along the way to err.
type terminal struct {
	out, err       io.Writer
	outTTY, errTTY bool
	noColor        bool // NO_COLOR is set (https://no-color.org) or the terminal is dumb
}

func isTerminal(f *os.File) bool { return term.IsTerminal(int(f.Fd())) }

// paint wraps s in an SGR colour or style when err is a terminal that wants it.
func (t terminal) paint(code, s string, tty bool) string {
	if t.noColor || !tty {
		return s
	}
	return "\x1b[" + code + "m" + s + "\x1b[0m"
}

// progress shows how far a long piece of work has come, on a terminal; elsewhere it is silent.
func (t terminal) progress(what string, quiet bool) func(done, all int) {
	if quiet || !t.errTTY {
		return func(int, int) {}
	}
	var bar *progressbar.ProgressBar
	return func(done, all int) {
		if bar == nil {
			bar = progressbar.NewOptions(all,
				progressbar.OptionSetWriter(t.err),
				progressbar.OptionSetDescription(what),
				progressbar.OptionEnableColorCodes(!t.noColor),
				progressbar.OptionClearOnFinish(),
				progressbar.OptionShowCount())
		}
		// A bar that cannot be drawn is no reason to stop the work.
		_ = bar.Set(done)
		if done >= all {
			_ = bar.Finish()
		}
	}
}
