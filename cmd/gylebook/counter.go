package main

import (
	"fmt"
	"os"
	"strings"
	"time"

	"golang.org/x/term"

	"gylebook/tables"
)

// counter tells on a terminal how far a long run is. It stands on one line of
// stderr, from the second second on, and takes itself away.
type counter struct {
	b     *bench
	what  string
	on    bool
	shown string
	next  time.Time
}

// counter starts a count; elsewhere than on a terminal it stays silent.
func (b *bench) counter(what string) *counter {
	f, ok := b.err.(*os.File)
	on := ok && !b.set.quiet && !b.set.plain && term.IsTerminal(int(f.Fd()))
	return &counter{b: b, what: what, on: on, next: time.Now().Add(time.Second)}
}

// to shows n, ten times a second at most.
func (c *counter) to(n int) {
	if !c.on || time.Now().Before(c.next) {
		return
	}
	c.shown = fmt.Sprintf("%d %s", n, c.what)
	fmt.Fprintf(c.b.err, "\r%s", c.shown)
	c.next = time.Now().Add(time.Second / 10)
}

// end clears the line.
func (c *counter) end() {
	if c.shown != "" {
		fmt.Fprintf(c.b.err, "\r%s\r", strings.Repeat(" ", tables.Width(c.shown)))
	}
}
