// Pinwright carries a solved planar linkage to cut-ready laser sheets and a hardware list.
package main

import (
	"context"
	"os"
	"os/signal"
	"syscall"
)

func main() {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	defer stop()
	context.AfterFunc(ctx, stop) // whoever interrupts a second time is not asked again
	os.Exit(run(ctx, os.Args[1:], terminal{
		out:     os.Stdout,
		err:     os.Stderr,
		outTTY:  isTerminal(os.Stdout),
		errTTY:  isTerminal(os.Stderr),
		noColor: os.Getenv("NO_COLOR") != "" || os.Getenv("TERM") == "dumb",
	}))
}
