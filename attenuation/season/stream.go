package season

import (
	"context"
	"iter"
	"runtime"
	"slices"

	"gylebook/attenuation/journal"
)

const (
	together = 8 // batches whose figures are made in one go
	// So many goes are read before the rows of the first of them are handed on, so that
	// the next are read while the figures of those before are made.
	ahead = 4
)

// Rows runs over the batches that pass f in the order of the journal, holding a few
// at a time. Only the readings that the figures use are corrected. It stops at the
// first error, which is that of the reader; the rows before it come first.
//
// The reader is used by the caller's goroutine alone, and so is book.OE; the book
// must not change until Rows is done.
func Rows(ctx context.Context, r journal.Reader, f journal.Filter, book *journal.Book) iter.Seq2[Row, error] {
	return func(yield func(Row, error) bool) {
		f.Lean = true
		jobs := make(chan *job)
		defer close(jobs)
		for range runtime.GOMAXPROCS(0) {
			go func() {
				known := newTexts()
				for j := range jobs {
					j.work(book, known)
				}
			}()
		}
		var queue []*job
		hand := func(keep int) bool {
			for len(queue) > keep {
				first := queue[0]
				queue = queue[1:]
				<-first.done
				for _, row := range first.rows {
					if !yield(row, nil) {
						return false
					}
				}
			}
			return true
		}
		next := newJob()
		send := func() {
			if len(next.records) > 0 {
				jobs <- next
				queue, next = append(queue, next), newJob()
			}
		}
		for rec, err := range r.Batches(ctx, f) {
			if err != nil {
				if send(); hand(0) {
					yield(Row{}, err)
				}
				return
			}
			if book != nil && book.OE != nil && blended(rec) {
				send()
				alone := newJob() // book.OE may ask the reader
				alone.records = append(alone.records, rec)
				alone.work(book, newTexts())
				queue = append(queue, alone)
			} else if next.records = append(next.records, rec); len(next.records) == together {
				send()
			}
			if !hand(ahead) {
				return
			}
		}
		send()
		hand(0)
	}
}

// job is the work on a few batches: to hand over each by itself costs a good part of
// what its figures cost.
type job struct {
	records []*journal.Record
	rows    []Row
	done    chan struct{} // closed when the rows are there
}

func newJob() *job { return &job{done: make(chan struct{})} }

func (j *job) work(book *journal.Book, known *texts) {
	for _, rec := range j.records {
		j.rows = append(j.rows, rowOf(rec, book, known))
	}
	close(j.done)
}

func blended(rec *journal.Record) bool {
	return slices.ContainsFunc(rec.Events, func(e journal.Numbered[journal.Event]) bool { return e.Body.What == journal.Blend })
}
