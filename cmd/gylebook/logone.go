package main

import (
	"cmp"
	"context"
	"errors"
	"maps"
	"math"
	"slices"
	"strings"
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
	dry           bool           // judge only, write nothing
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
	inst, err := b.instrumentFor(ctx, s, in.instrument, in.name)
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
	return b.logTyped(ctx, s, in.name, r, in.before, in.dry)
}

// unwritten is the number of an entry that was judged and not written: after all
// that are.
const unwritten = math.MaxInt64

// logTyped writes one reading of the vessel or batch with this name, judged against
// what the journal holds at that moment, and with it what was added before. A
// reading that is held is a *journal.Hold, and nothing is written. With dry nothing
// ever is, and the entry has the number unwritten.
func (b *bench) logTyped(ctx context.Context, s journal.Store, name string, r journal.Reading, before *journal.Event, dry bool) (logged, error) {
	var done logged
	var at journal.Situation
	draft := func(view journal.Reader) ([]journal.Body, error) {
		var err error
		if at, err = situationOf(ctx, view, name, b.set.now); err != nil {
			return nil, err
		}
		var errFind error
		at.Find = func() (open []*journal.Record) {
			open, errFind = view.Open(ctx)
			return open
		}
		at.Expect = foresightWith(ctx, view, at.Book, r.TakenAt).expect
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
		done.notes, hold = journal.Judge(at, r)
		if errFind != nil {
			return nil, errFind
		}
		if hold != nil {
			return nil, hold
		}
		if r.Keep != "" && !slices.ContainsFunc(done.notes, func(n method.Note) bool { return n.Code == method.WithReason }) {
			done.notes = append(done.notes, method.Note{Code: method.WithReason, Text: "nothing about it is doubted: it counts, and the reason is kept as its note"})
			r.Note, r.Keep = strings.TrimPrefix(r.Note+"; "+r.Keep, "; "), ""
		}
		return append(bodies, r), r.Check()
	}
	var entries []journal.Entry
	var err error
	if dry {
		_, err = draft(s)
		entries = []journal.Entry{{Number: unwritten, RecordedAt: b.set.now, By: b.by(), Body: r}}
	} else {
		entries, err = b.commit(ctx, s, draft)
	}
	var hold *journal.Hold
	if errors.As(err, &hold) && hold.Code == journal.HoldDuplicate {
		done.repeat = true
		done.notes = append(done.notes, method.Note{Code: hold.Code, Text: hold.Text})
	} else if err != nil {
		return done, err
	} else {
		done.entry = entries[len(entries)-1]
	}
	// The view that the book asked about blends is over.
	at.Book.OE = otherExtract(ctx, s, slices.Collect(maps.Values(at.Book.Instruments)), nil)
	done.derive(at, entries)
	return done, nil
}

// situationOf is what a reading of the vessel or batch with this name is judged
// against, without the other open batches.
func situationOf(ctx context.Context, view journal.Reader, name string, now time.Time) (journal.Situation, error) {
	open, err := view.OpenPlaces(ctx)
	if err != nil {
		return journal.Situation{}, err
	}
	rec, err := openBy(ctx, view, open, name)
	if err != nil {
		return journal.Situation{}, err
	}
	if rec, err = view.Batch(ctx, rec.Batch.ID); err != nil { // with all its readings
		return journal.Situation{}, err
	}
	book, err := bookOf(ctx, view)
	if err != nil {
		return journal.Situation{}, err
	}
	return journal.Situation{Now: now, Target: rec, Book: book}, nil
}

// derive fills the view after the entries, which the batch as it was judged does
// not hold yet. The newest two readings do for the fall, unless the reading is older
// than these.
func (l *logged) derive(at journal.Situation, entries []journal.Entry) {
	rec := *at.Target
	for _, e := range entries {
		switch body := e.Body.(type) {
		case journal.Reading:
			rec.Readings = inOrder(append(slices.Clone(rec.Readings), numbered(e, body)), func(r journal.Reading) time.Time { return r.TakenAt })
		case journal.Event:
			// In the place of the one that stood for it.
			rec.Events = slices.DeleteFunc(slices.Clone(rec.Events), func(n journal.Numbered[journal.Event]) bool { return n.Number == math.MaxInt64 })
			rec.Events = inOrder(append(rec.Events, numbered(e, body)), func(e journal.Event) time.Time { return e.At })
		}
	}
	if l.view = journal.DeriveLast(&rec, at.Book, 2); !l.find() {
		l.view = journal.Derive(&rec, at.Book)
		l.find()
	}
}

// inOrder sorts entries by their own time, then by number, as a record holds them.
func inOrder[B journal.Body](list []journal.Numbered[B], at func(B) time.Time) []journal.Numbered[B] {
	slices.SortFunc(list, func(a, b journal.Numbered[B]) int {
		return cmp.Or(at(a.Body).Compare(at(b.Body)), cmp.Compare(a.Number, b.Number))
	})
	return list
}

func numbered[B journal.Body](e journal.Entry, body B) journal.Numbered[B] {
	return journal.Numbered[B]{Number: e.Number, RecordedAt: e.RecordedAt, By: e.By, Body: body}
}

// find looks for the entry's value in the view.
func (l *logged) find() bool {
	k := slices.IndexFunc(l.view.Values, func(v journal.Value) bool { return v.Number == l.entry.Number })
	if k >= 0 {
		l.value = &l.view.Values[k]
	}
	return k >= 0
}
