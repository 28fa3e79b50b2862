package main

import (
	"context"
	"os"
	"os/signal"
	"syscall"
)

func main() {
	// A reader that leaves early (a pipe into head) is an ordinary end, seen as
	// an error of the write instead of a signal.
	signal.Ignore(syscall.SIGPIPE)
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt)
	defer stop()
	// A read that waits for input does not see ctx: the interrupt ends the program.
	context.AfterFunc(ctx, func() {
		if gentle.Load() {
			stop() // a second interrupt ends the program at once
			return
		}
		unfinished.remove()
		os.Exit(exitInterrupted)
	})
	os.Exit(run(ctx, os.Args[1:], os.Stdin, os.Stdout, os.Stderr))
}
