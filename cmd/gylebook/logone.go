package main

import (
	"context"
	"errors"
	"math"
	"slices"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/gravity/method"
)

// toLog is a reading as it was typed, before it is known which batch and which
// instrument it belongs to.
type toLog struct {
	name          string // vessel or batch
	reading, temp string
	at            time.Time
	quality       string // journal.Exact or journal.Estimated
	instrument    string // "" chooses one
	gassy         bool
	keep, note    string
	before        *journal.Event // what was added before it and is to be logged with it; nil is nothing
}

// logged is a reading that is on disk, with its batch as it stands after it.
type logged struct {
	entry  journal.Entry
	view   journal.View
	value  *journal.Value // the reading, corrected
	notes  []method.Note
	repeat bool // the same reading was there already: nothing was written
}

// typedReading reads what was typed. It chooses the instrument, whose scale is that
// of a bare number, and asks about a doubtful value where a person sits. The batch
// is left open.
func (b *bench) typedReading(ctx context.Context, s journal.Reader, in toLog) (journal.Reading, error) {
	inst, err := b.instrumentFor(ctx, s, in.instrument)
	if err != nil {
		return journal.Reading{}, err
	}
	typed, err := b.readWith(inst, in.reading)
	if err != nil {
		return journal.Reading{}, err
	}
	temp, err := b.readTemp(in.temp)
	return journal.Reading{
		TakenAt: in.at, Quality: in.quality, Gravity: typed, Temp: temp, Instrument: idOf(inst),
		Gassy: in.gassy, Keep: in.keep, Note: in.note,
	}, err
}

// logOne writes one reading; see logTyped.
func (b *bench) logOne(ctx context.Context, s journal.Store, in toLog) (logged, error) {
	r, err := b.typedReading(ctx, s, in)
	if err != nil {
		return logged{}, err
	}
	return b.logTyped(ctx, s, in.name, r, in.before)
}

// logTyped writes one reading of the vessel or batch with this name, judged against
// what the journal holds at that moment, and with it what was added before. A
// reading that is held is a *journal.Hold, and nothing is written.
func (b *bench) logTyped(ctx context.Context, s journal.Store, name string, r journal.Reading, before *journal.Event) (logged, error) {
	var done logged
	entries, err := b.commit(ctx, s, func(view journal.Reader) ([]journal.Body, error) {
		at, err := situationOf(ctx, view, name, b.set.now)
		if err != nil {
			return nil, err
		}
		r.Batch, r.Vessel = at.Target.Batch.ID, vesselOf(at.Target)
		var bodies []journal.Body
		if before != nil {
			added := *before
			added.Batch = r.Batch
			bodies = append(bodies, added)
			target := *at.Target
			target.Events = append(slices.Clone(target.Events), journal.Numbered[journal.Event]{Number: math.MaxInt64, Body: added})
			at.Target = &target
		}
		var hold *journal.Hold
		if done.notes, hold = journal.Judge(at, r); hold != nil {
			return nil, hold
		}
		return append(bodies, r), nil
	})
	var hold *journal.Hold
	if errors.As(err, &hold) && hold.Code == journal.HoldDuplicate {
		done.repeat = true
		done.notes = append(done.notes, method.Note{Code: hold.Code, Text: hold.Text})
	} else if err != nil {
		return done, err
	} else {
		done.entry = entries[len(entries)-1]
	}
	if err := done.derive(ctx, s, r.Batch); err != nil {
		return done, err
	}
	return done, nil
}

// situationOf is what a reading of the vessel or batch with this name is judged
// against.
func situationOf(ctx context.Context, view journal.Reader, name string, now time.Time) (journal.Situation, error) {
	open, err := view.Open(ctx)
	if err != nil {
		return journal.Situation{}, err
	}
	rec, err := openBy(ctx, view, open, name)
	if err != nil {
		return journal.Situation{}, err
	}
	book, err := bookOf(ctx, view)
	if err != nil {
		return journal.Situation{}, err
	}
	others := slices.DeleteFunc(open, func(o *journal.Record) bool { return o.Batch.ID == rec.Batch.ID })
	return journal.Situation{Now: now, Target: rec, Book: book, Others: others}, nil
}

// derive fills the view after the entry. The newest two readings do for the fall,
// unless the reading is older than these.
func (l *logged) derive(ctx context.Context, s journal.Reader, batch string) error {
	rec, err := s.Batch(ctx, batch)
	if err != nil {
		return err
	}
	book, err := bookOf(ctx, s)
	if err != nil {
		return err
	}
	if l.view = journal.DeriveLast(rec, book, 2); !l.find() {
		l.view = journal.Derive(rec, book)
		l.find()
	}
	return nil
}

// find looks for the entry's value in the view.
func (l *logged) find() bool {
	k := slices.IndexFunc(l.view.Values, func(v journal.Value) bool { return v.Number == l.entry.Number })
	if k >= 0 {
		l.value = &l.view.Values[k]
	}
	return k >= 0
}
