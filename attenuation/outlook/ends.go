package outlook

import (
	"fmt"
	"slices"
	"time"

	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
	"gylebook/attenuation/season"
)

// ends finds the ends of finished batches, several at a time, and keeps the order.
func (h *History) ends(records []*journal.Record, book *journal.Book) []ended {
	found, whys := make([]ended, len(records)), make([]string, len(records))
	var apart []int
	for k, rec := range records {
		if slices.ContainsFunc(rec.Events, func(e journal.Numbered[journal.Event]) bool { return e.Body.What == journal.Blend }) {
			found[k], whys[k] = endOf(rec, book) // the book asks the reader about the other batch
		} else {
			apart = append(apart, k)
		}
	}
	Each(len(apart), func(i int) {
		k := apart[i]
		found[k], whys[k] = endOf(records[k], book)
	})
	var ends []ended
	for k, why := range whys {
		if why != "" {
			h.Left = append(h.Left, Left{records[k].Batch.ID, why})
		} else {
			ends = append(ends, found[k])
		}
	}
	return ends
}

// ended is a finished batch with its final gravity in points.
type ended struct {
	id     string
	course curve.Batch
	fg     float64
}

// How a batch shows that it was read to its end.
const (
	restHours = 20.0 // two readings so far apart …
	restN     = 2    // … or more, within a point of the last one
	endU      = 0.5  // standard uncertainty of that end, points
)

// endOf finds the end of a batch, or why it has none that could be learnt from.
func endOf(rec *journal.Record, book *journal.Book) (e ended, why string) {
	v := journal.Derive(rec, book)
	at := forever
	if rec.Closed != nil {
		at = rec.Closed.Body.At
	}
	if !v.Primed.IsZero() && v.Primed.Before(at) {
		at = v.Primed
	}
	c, err := CourseOf(v, at)
	if err != nil {
		if refused, ok := err.(*Refusal); ok {
			return e, refused.Why
		}
		return e, err.Error()
	}
	var list []*journal.Value
	for _, one := range v.Counting() {
		if !one.Source.TakenAt.After(at) {
			list = append(list, one)
		}
	}
	from, _, ok := season.LastFall(list)
	if !ok {
		return e, "fewer than 2 readings"
	}
	var run []float64
	for _, one := range list {
		if !one.Source.TakenAt.Before(from) {
			run = append(run, points(one.SG))
		}
	}
	if rest := list[len(list)-1].Source.TakenAt.Sub(from).Hours(); len(run) < restN || rest < restHours {
		return e, fmt.Sprintf("not read to its end: the last readings within a point cover %.0f h, wanted %.0f h", rest, restHours)
	}
	slices.Sort(run)
	return ended{rec.Batch.ID, c.Batch, (run[len(run)/2] + run[(len(run)-1)/2]) / 2}, ""
}

// forever is after every entry.
var forever = time.Date(9999, 12, 31, 0, 0, 0, 0, time.UTC)
