package main

import (
	"context"

	"gylebook/attenuation"
	"gylebook/attenuation/journal"
	"gylebook/gravity/asread"
)

// possibleEvent refuses what cannot have been done to a batch: before it was pitched,
// a blend with itself, more than was there.
func possibleEvent(ctx context.Context, r journal.Reader, rec *journal.Record, e journal.Event) error {
	if p := rec.Batch.Pitched; p != nil && e.At.Before(*p) {
		return dataError("what goes in before pitching is in the original gravity: gylebook batch og "+rec.Batch.ID,
			"--at: read %s, wanted a time after pitching at %s", minuteText(e.At), minuteText(*p))
	}
	switch e.What {
	case journal.Blend:
		if e.From == e.Batch {
			return dataError("name the other batch with --from", "blend: %s cannot be blended with itself", e.Batch)
		}
		from, err := r.Batch(ctx, e.From)
		if err != nil {
			return err
		}
		return enoughLeft(ctx, r, from, e)
	case journal.Racking:
		return enoughLeft(ctx, r, rec, e)
	}
	return nil
}

// enoughLeft refuses to take more out of a batch than is in it, as far as that is
// known.
func enoughLeft(ctx context.Context, r journal.Reader, rec *journal.Record, e journal.Event) error {
	book, err := bookOf(ctx, r)
	if err != nil {
		return err
	}
	left := journal.DeriveLast(rec, book, 0).AmountAt(e.At)
	if !left.Known() {
		return nil
	}
	taken := attenuation.Wort{Extract: left.Extract}
	if kg, err := asread.ParseNumber(e.MassKg); err == nil && e.What == journal.Blend {
		taken.MassKg = kg.Float()
	} else if litres, err := asread.ParseNumber(e.VolumeL); err == nil {
		taken = attenuation.FromVolume(litres.Float(), left.Extract, 20)
	}
	// All of it may be blended; what is lost leaves something.
	if over := taken.MassKg - left.MassKg; over > 1e-6*left.MassKg || e.What == journal.Racking && over >= 0 {
		return dataError("check the amount and its unit; gylebook batch volume "+rec.Batch.ID+" puts the volume right",
			"%s: %s L of %s, wanted no more than the %s L that are left", e.What, fixed(taken.Litres(), 1), rec.Batch.ID, fixed(left.Litres(), 1))
	}
	return nil
}
