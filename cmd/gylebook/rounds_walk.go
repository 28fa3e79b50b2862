package main

import (
	"bufio"
	"context"
	"errors"
	"fmt"
	"io"
	"slices"
	"strings"

	"gylebook/attenuation/journal"
	"gylebook/tables"
)

// round is one walk over the open vessels.
type round struct {
	*bench
	ctx        context.Context
	store      journal.Store
	lines      *bufio.Reader
	instrument string
	gassy      bool
	stops      []*stop
	temp       string // the last one typed in this round
	done       []walked
	records    []tables.Record // for machines
}

// walked is one entry of this round and where it was typed.
type walked struct {
	entry int64
	stop  int    // at which it was typed
	batch string // that it went to
	text  string
}

// errQuit ends a round: the person typed q, or the input ended.
var errQuit = errors.New("end of the round")

// walk prompts at every stop. What was acknowledged is on disk, whatever ends it.
func (r *round) walk() error {
	r.lines = bufio.NewReaderSize(r.in, maxLine)
	at := 0
	for at < len(r.stops) {
		if err := r.ctx.Err(); err != nil {
			return err
		}
		next, err := r.visit(at)
		if errors.Is(err, errQuit) {
			return nil
		}
		if err != nil {
			return err
		}
		at = next
	}
	return nil
}

// visit prompts at one stop and returns the stop to go to.
func (r *round) visit(at int) (int, error) {
	here := r.stops[at]
	rec, err := r.store.Batch(r.ctx, here.batch)
	if err != nil {
		return at, err
	}
	if rec.Closed != nil {
		return at + 1, nil // by somebody else, since the round began
	}
	book, err := bookOf(r.ctx, r.store)
	if err != nil {
		return at, err
	}
	r.tick()
	line, err := r.ask(prompt(here, journal.DeriveLast(rec, book, 1), r.set.now, r.set.width))
	for err == nil {
		switch strings.ToLower(line) {
		case "":
			here.passed = true
			return at + 1, nil
		case "q":
			return at, errQuit
		case "?":
			r.say(roundsHelp)
			return at, nil
		case "u":
			return r.takeBack(at)
		}
		var then outcome
		if then, line, err = r.enter(at, line); err != nil || then == another {
			continue
		}
		if then == onward {
			here.passed = true
			return at + 1, nil
		}
		return at, nil
	}
	return at, err
}

// outcome is what comes after a line.
type outcome int

const (
	stay    outcome = iota // refused, forgotten, or logged to another vessel
	onward                 // on disk for this vessel
	another                // a hold was answered with another line
)

const roundsHelp = `  1.012 18   reading and temperature; 1.012 alone takes the last temperature
  Enter      skip this vessel
  u          take the last entry of this round back
  q          end the round`

// say puts lines on stderr.
func (r *round) say(text string) { fmt.Fprintln(r.err, text) }

// ask prompts on stderr and reads one line. The end of the input is errQuit.
func (r *round) ask(prompt string) (string, error) {
	fmt.Fprint(r.err, prompt)
	line, err := readLine(r.lines)
	if errors.Is(err, io.EOF) && len(line) == 0 {
		r.say("")
		return "", errQuit
	}
	if err != nil && !errors.Is(err, io.EOF) && !errors.Is(err, bufio.ErrBufferFull) {
		return "", fmt.Errorf("reading standard input: %w", err)
	}
	return strings.TrimSpace(string(line)), nil
}

// takeBack voids the last entry of this round and returns to where it was typed.
func (r *round) takeBack(at int) (int, error) {
	if len(r.done) == 0 {
		r.say("nothing of this round to take back")
		return at, nil
	}
	last := r.done[len(r.done)-1]
	r.tick()
	e, err := r.commitOne(r.ctx, r.store, journal.Void{Entry: last.entry, Reason: "taken back in rounds"})
	if err != nil {
		if writeFailed(err) {
			return at, err
		}
		say(r.err, "", err)
		return at, nil
	}
	r.done = r.done[:len(r.done)-1]
	for _, s := range r.stops {
		if s.batch == last.batch {
			s.read--
		}
	}
	if r.forMachines() {
		r.records = slices.DeleteFunc(r.records, func(rec tables.Record) bool { return rec.Get("entry") == int(last.entry) })
	} else if _, err := fmt.Fprintln(r.out, echoed(r.stops[last.stop].name()+"  taken back: "+last.text, e)); err != nil {
		return at, err
	}
	return last.stop, nil
}
