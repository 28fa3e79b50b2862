package season

import (
	"context"
	"iter"
	"runtime"
	"slices"

	"gylebook/attenuation/journal"
)

// ahead is how many batches are read before the first of them is handed on, so that
// the next are read while the figures of those before are made.
const ahead = 32

// Rows runs over the batches that pass f in the order of the journal, holding a few
// at a time. Only the readings that the figures use are corrected. It stops at the
// first error, which is that of the reader; the rows before it come first.
//
// The reader is used by the caller's goroutine alone, and so is book.OE; the book
// must not change until Rows is done.
func Rows(ctx context.Context, r journal.Reader, f journal.Filter, book *journal.Book) iter.Seq2[Row, error] {
	return func(yield func(Row, error) bool) {
		jobs := make(chan job)
		defer close(jobs)
		for range runtime.GOMAXPROCS(0) {
			go func() {
				for j := range jobs {
					j.done <- Of(j.rec, book)
				}
			}()
		}
		var queue []chan Row
		hand := func(keep int) bool {
			for len(queue) > keep {
				row := <-queue[0]
				queue = queue[1:]
				if !yield(row, nil) {
					return false
				}
			}
			return true
		}
		for rec, err := range r.Batches(ctx, f) {
			if err != nil {
				if hand(0) {
					yield(Row{}, err)
				}
				return
			}
			done := make(chan Row, 1)
			if book != nil && book.OE != nil && blended(rec) {
				done <- Of(rec, book) // book.OE may ask the reader
			} else {
				jobs <- job{rec, done}
			}
			queue = append(queue, done)
			if !hand(ahead) {
				return
			}
		}
		hand(0)
	}
}

type job struct {
	rec  *journal.Record
	done chan Row // takes one row without waiting
}

func blended(rec *journal.Record) bool {
	return slices.ContainsFunc(rec.Events, func(e journal.Numbered[journal.Event]) bool { return e.Body.What == journal.Blend })
}
