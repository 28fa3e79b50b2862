package main

import (
	"context"
	"errors"
	"slices"

	"gylebook/attenuation/journal"
)

// afterVoids refuses voids that would leave two open batches in one vessel: of a
// close, or of a move out of a vessel that holds another by now.
func afterVoids(ctx context.Context, r journal.Reader, voids []journal.Body) error {
	open, err := r.OpenLast(ctx, 0)
	if err != nil {
		return err
	}
	var changed []*journal.Record
	for _, body := range voids {
		v, ok := body.(journal.Void)
		if !ok {
			continue
		}
		e, err := r.Entry(ctx, v.Entry)
		if errors.Is(err, journal.ErrNotFound) {
			continue // refused when it is written
		}
		if err != nil {
			return err
		}
		switch x := e.Body.(type) {
		case journal.Batch:
			gone := func(rec *journal.Record) bool { return rec.Batch.ID == x.ID }
			open, changed = slices.DeleteFunc(open, gone), slices.DeleteFunc(changed, gone)
		case journal.Close:
			rec, err := r.Batch(ctx, x.Batch)
			if errors.Is(err, journal.ErrNotFound) {
				continue // the batch is void
			}
			if err != nil {
				return err
			}
			open, changed = append(open, rec), append(changed, rec)
		case journal.Event:
			if x.Vessel == "" {
				continue
			}
			k := slices.IndexFunc(open, func(rec *journal.Record) bool { return rec.Batch.ID == x.Batch })
			if k < 0 {
				continue // closed
			}
			for n := range open[k].Events {
				open[k].Events[n].Void = open[k].Events[n].Void || open[k].Events[n].Number == v.Entry
			}
			changed = append(changed, open[k])
		}
	}
	for _, rec := range changed {
		if err := namesFree(open, rec.Batch.ID, vesselOf(rec)); err != nil {
			return err
		}
	}
	return nil
}
