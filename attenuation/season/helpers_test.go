package season_test

import (
	"context"
	"fmt"
	"iter"
	"time"

	"gylebook/attenuation/journal"
)

// fake is a reader that knows batches and nothing else.
type fake struct {
	journal.Reader
	records []*journal.Record
	err     error // after the records
	given   int
}

func (f *fake) Batches(_ context.Context, filter journal.Filter) iter.Seq2[*journal.Record, error] {
	return func(yield func(*journal.Record, error) bool) {
		for _, r := range f.records {
			if filter.Product != "" && filter.Product != r.Batch.Product {
				continue
			}
			f.given++
			if !yield(r, nil) {
				return
			}
		}
		if f.err != nil {
			yield(nil, f.err)
		}
	}
}

var pitched = time.Date(2026, time.May, 4, 12, 0, 0, 0, time.UTC)

// sg is a gravity typed, at its day after pitching.
type sg struct {
	day  float64
	text string
}

// record is a batch read at 20 °C with an unnamed 20/20 instrument, for which
// nothing is corrected.
func record(id, og string, readings ...sg) *journal.Record {
	p := pitched
	rec := &journal.Record{Batch: journal.Batch{
		ID: id, Product: "Lane Bitter", Yeast: "house ale", Vessel: "T1", Volume: "100", Pitched: &p, Opened: p,
	}}
	if og != "" {
		rec.OGs = []journal.Numbered[journal.OG]{{Number: 2, Body: journal.OG{Batch: id, At: p, Gravity: journal.Typed{Text: og, Scale: "sg"}}}}
	}
	for n, r := range readings {
		rec.Readings = append(rec.Readings, journal.Numbered[journal.Reading]{Number: int64(10 + n), Body: journal.Reading{
			Batch: id, Vessel: "T1", TakenAt: p.Add(time.Duration(r.day * 24 * float64(time.Hour))), Quality: journal.Exact,
			Gravity: journal.Typed{Text: r.text, Scale: "sg"}, Temp: journal.TypedTemp{Text: "20", Unit: "C"},
		}})
	}
	return rec
}

func closed(rec *journal.Record) *journal.Record {
	rec.Closed = &journal.Numbered[journal.Close]{Number: 99, Body: journal.Close{Batch: rec.Batch.ID, At: pitched.AddDate(0, 1, 0)}}
	return rec
}

// many are closed batches of the same course with readings at temperatures that
// differ.
func many(batches, readings int) []*journal.Record {
	list := make([]*journal.Record, batches)
	for k := range list {
		var course []sg
		for n := range readings {
			fall := max(0, 34-4*n+k%3)
			course = append(course, sg{float64(n+1) / 2, fmt.Sprintf("1.%03d", 10+fall)})
		}
		rec := closed(record(fmt.Sprintf("B%05d", k), "1.048", course...))
		for n := range rec.Readings {
			rec.Readings[n].Body.Temp.Text = fmt.Sprint(16 + (k+3*n)%8)
		}
		list[k] = rec
	}
	return list
}
