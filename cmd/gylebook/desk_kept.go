package main

import (
	"context"
	"maps"
	"sync"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
)

// Forecasts take long, and between two entries nothing changes but the hour: what
// was reckoned is kept until an entry comes that bears on it, or a minute has gone.
const keptFor = time.Minute

// mostFollowed is the number of new entries that are looked at one by one.
const mostFollowed = 64

// since tells which entries bear on what: a reading on its batch alone, anything else
// on everything, for an instrument, a void or a batch that ends reaches far.
type since struct {
	number int64 // the newest entry
	chain  string
	all    int64            // the newest that bears on everything
	each   map[string]int64 // and on one batch alone; never changed, made anew
}

// follow reads what has come since, up to the head given.
func (s *since) follow(ctx context.Context, r journal.Reader, number int64, chain string) error {
	if chain == s.chain || number < s.number { // another visitor was quicker
		return nil
	}
	next := since{number: number, chain: chain, all: s.all, each: s.each}
	if next.each == nil || number <= s.number || number-s.number > mostFollowed {
		next.all, next.each = number, map[string]int64{}
	} else {
		for k := s.number + 1; k <= number; k++ {
			e, err := r.Entry(ctx, k)
			if err != nil {
				return err
			}
			if body, ok := e.Body.(journal.Reading); ok {
				next.each = maps.Clone(next.each)
				next.each[body.Batch] = k
			} else {
				next.all = k
			}
		}
	}
	*s = next
	return nil
}

// bearing is the newest entry that bears on a batch.
func (s since) bearing(batch string) int64 { return max(s.all, s.each[batch]) }

// asOf says from what something was reckoned, and when.
type asOf struct {
	entry int64 // the newest that bore on it
	at    time.Time
}

// holds reports whether it would come out the same now.
func (a asOf) holds(entry int64, now time.Time) bool {
	return !a.at.IsZero() && a.entry == entry && !now.Before(a.at) && now.Sub(a.at) < keptFor
}

// ground is what the forecasts of all batches stand on: the instruments and the
// finished batches.
type ground struct {
	mu   sync.Mutex
	from asOf
	f    *foresight
}

// follow is the journal as it stands.
func (d *desk) follow(ctx context.Context) (since, error) {
	number, chain, err := d.store.Head(ctx)
	if err != nil {
		return since{}, err
	}
	d.mu.Lock()
	defer d.mu.Unlock()
	err = d.since.follow(ctx, d.store, number, chain)
	return d.since, err
}

// foresight is one for a batch, with its history read; all is the newest entry that
// bears on everything.
func (d *desk) foresight(rec *journal.Record, all int64, now time.Time) (*foresight, outlook.History, error) {
	g := &d.ground
	g.mu.Lock()
	defer g.mu.Unlock()
	if !g.from.holds(all, now) {
		// It outlives the request that asks for it first.
		f, err := newForesight(context.Background(), d.store, now, outlook.Drink{})
		if err != nil {
			return nil, outlook.History{}, err
		}
		g.f, g.from = f, asOf{all, now}
	}
	h, err := g.f.history(rec)
	own := *g.f
	own.known = map[kindred]outlook.History{{rec.Batch.Product, rec.Batch.Yeast}: h}
	return &own, h, err
}

// instruments are those of the journal, read anew when anything but a reading came.
func (d *desk) instruments(ctx context.Context) ([]*journal.InstrumentRecord, error) {
	now, err := d.follow(ctx)
	if err != nil {
		return nil, err
	}
	d.mu.Lock()
	defer d.mu.Unlock()
	if d.tools.list != nil && d.tools.all == now.all {
		return d.tools.list, nil
	}
	list, err := d.store.Instruments(ctx)
	if err != nil {
		return nil, err
	}
	d.tools.list, d.tools.all = list, now.all
	return list, nil
}
