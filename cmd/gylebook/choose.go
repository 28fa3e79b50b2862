package main

import (
	"context"
	"slices"
	"strings"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/gravity/method"
)

// instrumentBy finds an instrument that is registered.
func instrumentBy(ctx context.Context, r journal.Reader, id string) (*journal.InstrumentRecord, error) {
	all, err := r.Instruments(ctx)
	if err != nil {
		return nil, err
	}
	ids := make([]string, len(all))
	for k, rec := range all {
		if rec.Instrument.ID == id {
			return rec, nil
		}
		ids[k] = rec.Instrument.ID
	}
	hint := "gylebook instrument add registers it"
	if near := journal.Nearest(id, ids, 3); len(near) > 0 {
		hint = "known are " + strings.Join(near, ", ")
	}
	return nil, dataError(hint, "no instrument %.40q", id)
}

// noInstrument says on the command line that a reading was taken with none of the
// journal's instruments.
const noInstrument = "none"

// instrumentFor chooses the instrument of a reading: the one named, else the only
// hydrometer in use, else the last of this operator, else the one that the batch or
// vessel was read with last, else none (nil), which is said. batch may be "".
func (b *bench) instrumentFor(ctx context.Context, r journal.Reader, name, batch string) (*journal.InstrumentRecord, error) {
	if name == noInstrument {
		return nil, nil
	}
	if name != "" {
		return instrumentBy(ctx, r, name)
	}
	list, err := r.Instruments(ctx)
	if err != nil {
		return nil, err
	}
	var use []*journal.InstrumentRecord
	for _, rec := range list {
		if rec.Retired == nil && rec.Instrument.Type == journal.Hydrometer {
			use = append(use, rec)
		}
	}
	if len(use) == 1 {
		return use[0], nil
	}
	last, err := r.LastInstrumentBy(ctx, b.by())
	if err == nil && last == "" && len(use) > 1 && batch != "" {
		last, err = lastInstrumentOf(ctx, r, batch)
	}
	if err != nil {
		return nil, err
	}
	if k := slices.IndexFunc(use, func(rec *journal.InstrumentRecord) bool { return rec.Instrument.ID == last }); k >= 0 {
		return use[k], nil
	}
	if len(use) > 1 {
		ids := make([]string, len(use))
		for k, rec := range use {
			ids[k] = rec.Instrument.ID
		}
		b.notes = append(b.notes, method.Note{Code: method.Assumed, Text: "read with no instrument of the journal; in use are " +
			strings.Join(ids, ", ") + ": name one with --instrument"})
	}
	return nil, nil
}

// lastInstrumentOf is the instrument of the newest reading that counts of an open
// batch or vessel; "" when there is none. A name that is not open is left to others.
func lastInstrumentOf(ctx context.Context, r journal.Reader, name string) (string, error) {
	// A few, since the newest may be void.
	open, err := r.OpenLast(ctx, 5)
	if err != nil {
		return "", err
	}
	for _, rec := range open {
		if !strings.EqualFold(rec.Batch.ID, name) && !strings.EqualFold(vesselOf(rec), name) {
			continue
		}
		for k := len(rec.Readings) - 1; k >= 0; k-- {
			if one := rec.Readings[k]; !one.Void {
				return one.Body.Instrument, nil
			}
		}
	}
	return "", nil
}

// inUseAt refuses an instrument that was out of use at a time.
func inUseAt(rec *journal.InstrumentRecord, at time.Time) error {
	if rec == nil || rec.Retired == nil || at.Before(rec.Retired.Body.At) {
		return nil
	}
	return dataError("name another with --instrument; a reading from before that has its own --at",
		"instrument %s was taken out of use on %s: %s", rec.Instrument.ID, day(rec.Retired.Body.At), rec.Retired.Body.Reason)
}

// idOf is the id of an instrument that may be none.
func idOf(rec *journal.InstrumentRecord) string {
	if rec == nil {
		return ""
	}
	return rec.Instrument.ID
}

// readWith reads a gravity with an instrument: a bare number is on its scale.
func (b *bench) readWith(rec *journal.InstrumentRecord, text string) (journal.Typed, error) {
	was := b.set.scale
	defer func() { b.set.scale = was }()
	if rec != nil {
		b.set.scale = scaleOf(rec.Instrument)
	}
	r, err := b.reading(text)
	return typedAs(r), err
}

// readTemp reads a temperature as the journal keeps it.
func (b *bench) readTemp(text string) (journal.TypedTemp, error) {
	t, err := b.temperature(text)
	return journal.TypedTemp{Text: t.Input, Unit: t.Unit}, err
}
