package main

import (
	"context"
	"errors"
	"strings"

	"gylebook/attenuation/journal"
	"gylebook/gravity/asread"
)

// enter takes one line of values at a stop.
func (r *round) enter(at int, line string) (then outcome, next string, err error) {
	fields := asread.Fields(line)
	remembered := ""
	switch {
	case len(fields) == 1 && r.temp != "":
		fields = append(fields, r.temp)
		remembered = " as before"
	case len(fields) == 1:
		r.say("type the temperature too: " + clip(fields[0], 12) + " 18")
		return stay, "", nil
	case len(fields) != 2:
		r.say("type reading and temperature: 1.012 18; ? explains")
		return stay, "", nil
	}
	name := r.stops[at].batch
	reading, err := r.typed(name, fields[0], fields[1])
	if err != nil {
		return stay, "", r.refuse(err)
	}
	for {
		done, err := r.log(name, reading)
		var hold *journal.Hold
		if err == nil {
			then = stay
			if done.view.Record.Batch.ID == r.stops[at].batch {
				then = onward
			}
			return then, "", r.accept(at, done, fields, remembered)
		}
		if !errors.As(err, &hold) || hold.Final {
			return stay, "", r.refuse(err)
		}
		answer, err := r.answer(hold)
		if err != nil {
			return stay, "", err
		}
		switch verb, reason, _ := strings.Cut(answer, " "); {
		case answer == "":
			r.say("forgotten")
			return stay, "", nil
		case verb == "k":
			if reading.Keep, err = r.reason(reason); err != nil || reading.Keep == "" {
				return stay, "", err
			}
		case verb == "t" && hold.Closer != "":
			name = hold.Closer
		default:
			return another, answer, nil
		}
	}
}

// refuse shows why a line was not taken; an error of the journal, or of the run,
// ends the round.
func (r *round) refuse(err error) error {
	r.bench.notes = nil
	if writeFailed(err) {
		return err
	}
	say(r.err, "", err)
	return nil
}

// writeFailed tells a journal that cannot be written from a line that is refused.
func writeFailed(err error) bool {
	code := journalCode(err)
	return code == exitFailed || code == exitCannotWrite || errors.Is(err, context.Canceled)
}

// accept remembers what is on disk.
func (r *round) accept(at int, done logged, typed []string, remembered string) error {
	r.temp = typed[1]
	if done.repeat {
		// It is there, by whomever.
		if s := r.stopOf(done); s != nil {
			s.read = max(s.read, 1)
		}
		return nil
	}
	r.done = append(r.done, walked{
		entry: done.entry.Number, stop: at, batch: done.view.Record.Batch.ID, text: strings.Join(typed, " "),
	})
	return r.keep(done, remembered)
}
