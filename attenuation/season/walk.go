package season

import (
	"math"
	"slices"
	"time"

	"gylebook/attenuation/journal"
)

// fell is LastFall of all readings of a batch, of which the view holds the newest.
func (w *walk) fell() (at time.Time, ok bool) {
	at, ok, certain := w.back(w.view.Record.Readings)
	if !certain {
		all := journal.Derive(w.view.Record, w.book)
		at, _, ok = LastFall(all.Counting())
	}
	return at, ok
}

// walk goes through the readings of a batch from the last one. A correction costs
// more than everything else a row needs, and most readings lie clearly on one side
// of what is asked: those are only estimated.
type walk struct {
	view     journal.View
	book     *journal.Book
	last     *journal.Value
	known    *texts
	estimate *estimate // nil when everything has to be corrected
}

// newWalk walks from the last reading of v, which has one.
func newWalk(v journal.View, book *journal.Book, known *texts) *walk {
	if book == nil {
		book = journal.NewBook(nil)
	}
	return &walk{view: v, book: book, last: v.Last(), known: known, estimate: estimateFrom(v.Last(), book, known)}
}

// point is the gravity of one reading.
type point struct {
	reading *journal.Reading
	sg      float64
	doubt   float64 // SG; 0 for a corrected value
}

// back returns what LastFall does. certain is false for what it does not handle:
// readings out of order and those that share a minute.
func (w *walk) back(readings []journal.Numbered[journal.Reading]) (at time.Time, ok, certain bool) {
	byTime := func(a, b journal.Numbered[journal.Reading]) int { return a.Body.TakenAt.Compare(b.Body.TakenAt) }
	if !slices.IsSortedFunc(readings, byTime) {
		return at, false, false
	}
	last := point{reading: &w.last.Source, sg: float64(w.last.SG)}
	lowest, newer := last, w.last.Source.TakenAt
	for k := len(readings) - 1; k >= 0; k-- {
		r := &readings[k]
		if r.Number == w.last.Number || r.Void || r.Body.Keep != "" || r.Body.TakenAt.After(w.last.Source.TakenAt) {
			continue
		}
		p, counts := w.point(&r.Body)
		if !counts {
			continue
		}
		if sameMinute(r.Body.TakenAt, newer) || k > 0 && sameMinute(r.Body.TakenAt, readings[k-1].Body.TakenAt) {
			return at, false, false
		}
		newer = r.Body.TakenAt
		if !ok {
			at, ok = last.reading.TakenAt, true
		}
		if p.sg < lowest.sg {
			lowest = p
		}
		if w.beyond(&p, &last) || w.beyond(&last, &p) || w.beyond(&p, &lowest) {
			return at, true, true
		}
		at = r.Body.TakenAt
	}
	return at, ok, true
}

func sameMinute(a, b time.Time) bool {
	return a.UTC().Truncate(time.Minute).Equal(b.UTC().Truncate(time.Minute))
}

// point estimates a reading, or corrects it where there is no estimate.
func (w *walk) point(r *journal.Reading) (p point, counts bool) {
	p.reading = r
	if p.sg, p.doubt, counts = w.estimate.of(w.view, r); counts {
		return p, true
	}
	return p, w.correct(&p)
}

// correct corrects a point unless it is already; false means that it cannot be.
func (w *walk) correct(p *point) bool {
	r := p.reading
	typed, temp, err := w.known.read(r)
	if err != nil {
		return false
	}
	h, _, err := w.book.Hydrometer(r.Instrument, r.TakenAt)
	if err != nil {
		return false
	}
	oe, _, _ := w.view.OEAt(r.TakenAt)
	res, _, err := journal.CorrectTyped(h, typed, temp, oe)
	if err != nil {
		return false
	}
	p.sg, p.doubt = float64(res.SG), 0
	return true
}

// sharpen makes a point surer: by the correction alone, else by all that goes with
// a corrected reading.
func (w *walk) sharpen(p *point) {
	if sg, ok := w.estimate.sharper(p.reading); ok && p.doubt > sharp {
		p.sg, p.doubt = sg, sharp
		return
	}
	if !w.correct(p) {
		p.doubt = 0 // what can be estimated can be corrected
	}
}

// beyond reports whether a is more than a point above b, and sharpens both until
// that is certain.
func (w *walk) beyond(a, b *point) bool {
	for {
		over := a.sg - b.sg - within
		if doubt := a.doubt + b.doubt; doubt == 0 || math.Abs(over) > doubt {
			return over > 0
		}
		for _, p := range []*point{a, b} {
			if p.doubt > 0 {
				w.sharpen(p)
			}
		}
	}
}
