package main

import (
	"context"
	"slices"
	"strings"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
)

// foresight makes forecasts at one time from one journal. The history of a product
// and yeast is read once and kept in memory.
type foresight struct {
	ctx   context.Context
	r     journal.Reader
	book  *journal.Book
	at    time.Time
	drink outlook.Drink
	known map[kindred]outlook.History
}

// kindred are the batches that tell of each other.
type kindred struct{ product, yeast string }

func newForesight(ctx context.Context, r journal.Reader, at time.Time, drink outlook.Drink) (*foresight, error) {
	book, err := bookOf(ctx, r)
	if err != nil {
		return nil, err
	}
	f := foresightWith(ctx, r, book, at)
	f.drink = drink
	return f, nil
}

// foresightWith is newForesight with a book at hand, which has to hold uncertainties.
func foresightWith(ctx context.Context, r journal.Reader, book *journal.Book, at time.Time) *foresight {
	return &foresight{ctx: ctx, r: r, book: book, at: at, known: map[kindred]outlook.History{}}
}

// history is what the batches of the same product and yeast did that were closed
// before the time, and before the batch itself was.
func (f *foresight) history(rec *journal.Record) (outlook.History, error) {
	key := kindred{rec.Batch.Product, rec.Batch.Yeast}
	if rec.Closed != nil && rec.Closed.Body.At.Before(f.at) {
		return outlook.HistoryOf(f.ctx, f.r, f.book, key.product, key.yeast, rec.Closed.Body.At, f.drink)
	}
	if h, ok := f.known[key]; ok {
		return h, nil
	}
	h, err := outlook.HistoryOf(f.ctx, f.r, f.book, key.product, key.yeast, f.at, f.drink)
	if err == nil {
		f.known[key] = h
	}
	return h, err
}

// view derives a batch for a forecast.
func (f *foresight) view(rec *journal.Record) journal.View {
	thin, _ := outlook.Thin(rec)
	return journal.Derive(thin, f.book)
}

// expect is the hook of the check for a wrong tank. Without an answer that check
// follows a straight line.
func (f *foresight) expect(rec *journal.Record, at time.Time) (sg, sd float64, ok bool) {
	h, err := f.history(rec)
	if err != nil {
		return 0, 0, false
	}
	return outlook.Expect(f.view(rec), h, at)
}

// drinkFlag chooses what a forecast starts from.
func drinkFlag() cli.Flag {
	return &cli.StringFlag{Name: "drink", Usage: "`KIND` beer, cider, wine, mead: whose usual figures a forecast starts from while no batch has finished; beer unless given"}
}

// drinkOf reads --drink.
func drinkOf(c *cli.Context) (outlook.Drink, error) {
	text := c.String("drink")
	if text == "" {
		return outlook.Drink{}, nil
	}
	kind, err := curve.FindKind(text)
	if err != nil {
		return outlook.Drink{}, usageError("type beer, cider, wine or mead", "--drink: %v", err)
	}
	return outlook.Drink{Kind: kind, Named: true}, nil
}

// batchAt finds the batch of a forecast as it stood at a time: by its id, or the one
// that was in a vessel then.
func batchAt(ctx context.Context, r journal.Reader, name string, at time.Time, past bool) (*journal.Record, error) {
	rec, err := batchBy(ctx, r, name)
	if !past {
		return rec, err
	}
	if err != nil || !strings.EqualFold(rec.Batch.ID, name) {
		open, errOpen := openAt(ctx, r, at)
		if errOpen != nil {
			return nil, errOpen
		}
		if rec, err = byVessel(ctx, r, open, name); err != nil {
			return nil, dataError(hintOf(err), "no batch %.40q, and no vessel of that name with an open batch on %s", name, at.Format("2006-01-02 15:04"))
		}
		return rec, nil
	}
	if began := rec.Batch.Opened; began.After(at) {
		return nil, dataError("", "--at: batch %s was opened on %s, after %s", rec.Batch.ID, began.Format("2006-01-02 15:04"), at.Format("2006-01-02 15:04"))
	}
	return cutAt(rec, at), nil
}

// cutAt is a batch without what came after a time.
func cutAt(rec *journal.Record, at time.Time) *journal.Record {
	then := *rec
	if rec.Closed != nil && rec.Closed.Body.At.After(at) {
		then.Closed = nil
	}
	then.OGs = until(rec.OGs, at, func(o journal.OG) time.Time { return o.At })
	then.Limits = until(rec.Limits, at, func(l journal.Limit) time.Time { return l.At })
	then.Readings = until(rec.Readings, at, func(r journal.Reading) time.Time { return r.TakenAt })
	then.Events = until(rec.Events, at, func(e journal.Event) time.Time { return e.At })
	return &then
}

func until[B any](list []journal.Numbered[B], at time.Time, of func(B) time.Time) []journal.Numbered[B] {
	return slices.DeleteFunc(slices.Clone(list), func(n journal.Numbered[B]) bool { return of(n.Body).After(at) })
}
