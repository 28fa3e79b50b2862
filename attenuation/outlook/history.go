package outlook

import (
	"context"
	"iter"
	"runtime"
	"sync"
	"time"

	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
)

// Most is how many finished batches a history has. The newest are taken, so that a
// forecast does not cost more with the years.
const Most = 20

// History is what the finished batches of a product and yeast did.
type History struct {
	Product, Yeast string
	Kind           curve.Kind // whose cold start stands behind the batches
	Batches        []string   // that were used, the one that began last first
	Fitted         []curve.Fitted
	Left           []Left // that were not

	prior curve.Prior
}

// Left is a finished batch that no curve was laid through, and why.
type Left struct{ Batch, Why string }

// Finisher is the part of a journal.Reader that a history needs.
type Finisher interface {
	Finished(ctx context.Context, product, yeast string, before time.Time) iter.Seq2[*journal.Record, error]
}

// Drink chooses the figures that a forecast starts from when no batch has finished.
type Drink struct {
	Kind  curve.Kind
	Named bool // by the user; otherwise the history tells, and beer is taken without one
}

// dryStart is the apparent attenuation half way between the cold starts of beer and
// wine: a history that ends beyond it stands on that of wine.
const dryStart = 0.91

// HistoryOf reads the last batches of a product and yeast that were closed before a
// time and lays a curve through each that was read to its end. The reader and
// book.OE are used by the caller's goroutine alone. The error is that of the reader.
func HistoryOf(ctx context.Context, r Finisher, book *journal.Book, product, yeast string, before time.Time, drink Drink) (History, error) {
	h := History{Product: product, Yeast: yeast, Kind: drink.Kind}
	var records []*journal.Record
	for rec, err := range r.Finished(ctx, product, yeast, before) {
		if err != nil {
			return History{}, err
		}
		if records = append(records, rec); len(records) == Most {
			break
		}
	}
	ends := h.ends(records, book)
	if !drink.Named {
		h.Kind = kindOf(ends)
	}
	h.fit(ends)
	h.prior = curve.NewPrior(h.Kind, h.Fitted)
	return h, ctx.Err()
}

// Prior is what the history says of the next batch.
func (h History) Prior() curve.Prior {
	if h.prior.Tau == 0 { // not made by HistoryOf
		return curve.NewPrior(h.Kind, h.Fitted)
	}
	return h.prior
}

// kindOf is wine where most of the batches end dry, beer otherwise.
func kindOf(ends []ended) curve.Kind {
	dry := 0
	for _, e := range ends {
		if (e.course.OG-e.fg)/e.course.OG > dryStart {
			dry++
		}
	}
	if 2*dry > len(ends) {
		return curve.Wine
	}
	return curve.Beer
}

// fit lays the curves, several at a time, and keeps the order.
func (h *History) fit(ends []ended) {
	cold := curve.NewPrior(h.Kind, nil)
	fitted, errs := make([]curve.Fitted, len(ends)), make([]error, len(ends))
	Each(len(ends), func(k int) {
		fitted[k], errs[k] = curve.FitFinished(ends[k].course, ends[k].fg, endU, cold, cold.Options())
	})
	for k, e := range ends {
		if errs[k] != nil {
			h.Left = append(h.Left, Left{e.id, errs[k].Error()})
			continue
		}
		h.Batches = append(h.Batches, e.id)
		h.Fitted = append(h.Fitted, fitted[k])
	}
}

// Each calls do for 0 to n-1, on as many goroutines as there are processors, and
// returns when all are done.
func Each(n int, do func(k int)) {
	var wg sync.WaitGroup
	next := make(chan int)
	for range min(n, runtime.GOMAXPROCS(0)) {
		wg.Go(func() {
			for k := range next {
				do(k)
			}
		})
	}
	for k := range n {
		next <- k
	}
	close(next)
	wg.Wait()
}
