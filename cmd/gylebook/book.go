package main

import (
	"context"
	"errors"
	"slices"
	"strings"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
)

// bookOf is what figures are derived with: the instruments, and for blends the
// original extract of other batches.
func bookOf(ctx context.Context, r journal.Reader) (*journal.Book, error) {
	list, err := r.Instruments(ctx)
	if err != nil {
		return nil, err
	}
	book := journal.NewBook(list)
	book.OE = otherExtract(ctx, r, list, nil)
	return book, nil
}

// otherExtract tells the original extract of a batch that was blended into
// another. Those on the way are left out: two batches blended into each other have
// none.
func otherExtract(ctx context.Context, r journal.Reader, list []*journal.InstrumentRecord, way []string) func(string) (gravity.Plato, bool) {
	return func(id string) (gravity.Plato, bool) {
		if slices.Contains(way, id) {
			return 0, false
		}
		rec, err := r.Batch(ctx, id)
		if err != nil {
			return 0, false
		}
		book := journal.NewBook(list)
		book.OE = otherExtract(ctx, r, list, append(slices.Clone(way), id))
		oe, _, why := journal.DeriveLast(rec, book, 0).OEAt(forever)
		return oe, why == "" && oe > 0
	}
}

// forever is after every event.
var forever = time.Date(9999, 12, 31, 0, 0, 0, 0, time.UTC)

// batchBy finds a batch by its id, or an open one by its vessel; capitals do not count
// where nothing else has the name. An unknown one is refused with the three names that
// are most alike.
func batchBy(ctx context.Context, r journal.Reader, name string) (*journal.Record, error) {
	rec, err := r.Batch(ctx, name)
	if err == nil && rec.Closed == nil || err != nil && !errors.Is(err, journal.ErrNotFound) {
		return rec, err
	}
	open, err := r.OpenPlaces(ctx)
	if err != nil {
		return nil, err
	}
	if rec, err = openBy(ctx, r, open, name); err != nil {
		return nil, err
	}
	return r.Batch(ctx, rec.Batch.ID)
}

// openBy is batchBy with the open batches at hand; a closed one is found too.
func openBy(ctx context.Context, r journal.Reader, open []*journal.Record, name string) (*journal.Record, error) {
	for _, rec := range open {
		if rec.Batch.ID == name {
			return rec, nil
		}
	}
	if k := slices.IndexFunc(open, func(rec *journal.Record) bool { return vesselOf(rec) == name }); k >= 0 && name != "" {
		return open[k], nil
	}
	if closed, err := r.Batch(ctx, name); err == nil {
		return closed, nil
	}
	return looselyBy(ctx, r, open, name)
}

// byVessel finds a batch of these by its vessel; capitals do not count unless two
// vessels differ by them alone.
func byVessel(ctx context.Context, r journal.Reader, open []*journal.Record, name string) (*journal.Record, error) {
	var alike []*journal.Record
	for _, rec := range open {
		vessel := vesselOf(rec)
		if vessel != "" && vessel == name {
			return rec, nil
		}
		if strings.EqualFold(vessel, name) {
			alike = append(alike, rec)
		}
	}
	if len(alike) == 1 {
		return alike[0], nil
	}
	return nil, unknownName(ctx, r, open, name)
}

// vesselOf is where a batch is, after its moves.
func vesselOf(rec *journal.Record) string { return journal.View{Record: rec}.Vessel() }
