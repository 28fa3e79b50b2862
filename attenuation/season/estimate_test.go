package season

import (
	"fmt"
	"math"
	"testing"
	"time"

	"gylebook/attenuation/journal"
)

// The doubt of an estimate covers what it is off, in every liquid it is used for:
// each estimate is compared with the correction itself.
func TestDoubtOfAnEstimate(t *testing.T) {
	at := time.Date(2026, time.May, 10, 8, 0, 0, 0, time.UTC)
	instruments := []*journal.InstrumentRecord{
		{Instrument: journal.Instrument{ID: "G", Type: journal.Hydrometer, Scale: "sg", Basis: "20/20", Division: "0.001", Body: "glass", ReadAt: "bottom"}},
		{Instrument: journal.Instrument{ID: "F", Type: journal.Hydrometer, Scale: "sg", Basis: "60/60F", Division: "0.001", Body: "polycarbonate", ReadAt: "bottom"}},
		{Instrument: journal.Instrument{ID: "P", Type: journal.Hydrometer, Scale: "plato", Basis: "20/20", Division: "0.1", Body: "glass", ReadAt: "bottom"}},
	}
	book := journal.NewBook(instruments)
	worst, compared := 0.0, 0
	for _, in := range instruments {
		id, scale := in.Instrument.ID, in.Instrument.Scale
		text := func(points float64) string {
			if scale == "plato" {
				return fmt.Sprintf("%.2fP", points/4)
			}
			return fmt.Sprintf("%.4f", 1+points/1000)
		}
		reading := func(points, temp float64) journal.Numbered[journal.Reading] {
			return journal.Numbered[journal.Reading]{Number: 5, Body: journal.Reading{
				Batch: "B", TakenAt: at, Instrument: id, Gravity: journal.Typed{Text: text(points), Scale: scale},
				Temp: journal.TypedTemp{Text: fmt.Sprintf("%.1fC", temp), Unit: "C"},
			}}
		}
		for _, og := range []float64{0, 20, 48, 80, 125} {
			rec := &journal.Record{}
			if og > 0 {
				rec.OGs = []journal.Numbered[journal.OG]{{Number: 1, Body: journal.OG{
					Batch: "B", At: at, Gravity: journal.Typed{Text: fmt.Sprintf("%.4f", 1+og/1000), Scale: "sg"},
				}}}
			}
			for fg := -10.0; fg < max(og, 30); fg += 5 {
				for t0 := 6.0; t0 <= 34; t0 += 7 {
					rec.Readings = []journal.Numbered[journal.Reading]{reading(fg, t0)}
					v := journal.Derive(rec, book)
					last := v.Last()
					if last == nil {
						continue
					}
					e := estimateFrom(last, book, newTexts())
					if e == nil {
						t.Fatalf("%s at %v °C: no estimate", id, t0)
					}
					w := walk{view: v, book: book, last: last, known: newTexts()}
					for _, dr := range []float64{-3, 0, 1, 2, 15, 40} {
						for _, dt := range []float64{-6, -3, 0, 2, 6} {
							r := reading(fg+dr, t0+dt)
							sg, doubt, ok := e.of(v, &r.Body)
							exact := point{reading: &r.Body}
							if !ok || !w.correct(&exact) {
								continue
							}
							if sharper, ok := e.sharper(&r.Body); ok && math.Abs(sharper-exact.sg) > sharp {
								t.Errorf("%s OG %v FG %v at %v °C, %+v points %+v °C: sharpened to %.10f, corrected %.10f", id, og, fg, t0, dr, dt, sharper, exact.sg)
							}
							compared++
							off := math.Abs(sg - exact.sg)
							worst = max(worst, off/doubt)
							if off > doubt {
								t.Errorf("%s OG %v FG %v at %v °C, %+v points %+v °C: off by %.3f points, doubt %.3f", id, og, fg, t0, dr, dt, 1000*off, 1000*doubt)
							}
						}
					}
				}
			}
		}
	}
	if compared < 10000 {
		t.Errorf("%d compared", compared)
	}
	t.Logf("%d estimates, the worst off by %.2f of its doubt", compared, worst)
}
