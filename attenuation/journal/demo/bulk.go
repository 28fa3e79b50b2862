package demo

import (
	"context"
	"fmt"
	"math"
	"time"

	"gylebook/attenuation/journal"
)

const (
	bulkOpen  = 200 // newest batches that stay open
	bulkGroup = 4000
	bulkStay  = 20 // days from the first to the last reading
)

var bulkProducts = []struct{ product, yeast string }{
	{bitter, ale}, {porter, ale}, {harvest, cider}, {dry, cider}, {meadow, mead},
}

// Bulk fills an empty journal with this many batches of so many readings each, for
// measuring speed: one hydrometer, batches pitched evenly over 2026, the newest 200
// left open. It is the same every time. It returns journal.ErrNotEmpty for a
// journal that is not empty, and the errors of the store.
func Bulk(ctx context.Context, store journal.Store, batches, readings int) error {
	at := local(time.January, 2, 8, 0)
	if n, _, err := store.Head(ctx); err != nil {
		return err
	} else if n > 0 {
		return fmt.Errorf("%w: entry %d is the last", journal.ErrNotEmpty, n)
	}
	bodies := []journal.Body{instruments()[0].body}
	hydrometer := bodies[0].(journal.Instrument)
	hydrometer.Since = at
	bodies[0] = hydrometer
	// Everything is typed in from paper at the end of the year.
	entered := local(time.December, 31, 12, 0)
	flush := func() error {
		all := bodies
		bodies = nil
		entered = entered.Add(time.Second)
		_, err := store.Append(ctx, "ines", entered, func(journal.Reader) ([]journal.Body, error) { return all, nil })
		return err
	}
	for k := range batches {
		day := k * (360 - bulkStay) / max(1, batches)
		bodies = bulkBatch(bodies, k, at.AddDate(0, 0, day), readings, k >= batches-bulkOpen)
		if len(bodies) >= bulkGroup {
			if err := flush(); err != nil {
				return err
			}
		}
	}
	return flush()
}

// bulkBatch appends batch number k.
func bulkBatch(bodies []journal.Body, k int, pitched time.Time, readings int, open bool) []journal.Body {
	pitched = inCellar(pitched)
	p := bulkProducts[k%len(bulkProducts)]
	id := fmt.Sprintf("B%05d", k+1)
	b := journal.Batch{
		ID: id, Product: p.product, Yeast: p.yeast, Vessel: fmt.Sprintf("V%03d", k%bulkOpen+1), Volume: "1000",
		Generation: 1 + k/len(bulkProducts)%6, Pitched: &pitched, Opened: pitched,
	}
	og := 42 + k%7
	bodies = append(bodies, b, journal.OG{
		Batch: id, At: pitched, Instrument: brewery, Gravity: journal.Typed{Text: fmt.Sprintf("1.%03d", og), Scale: "sg"},
		Temp: journal.TypedTemp{Text: "20", Unit: "C"},
	})
	fg := 8 + k%4
	for n := range readings {
		share := float64(n+1) / float64(readings)
		fell := math.Round(float64(og-fg) / (1 + math.Exp(24*(share-0.3))))
		bodies = append(bodies, journal.Reading{
			Batch: id, Vessel: b.Vessel, Quality: journal.Exact, Instrument: brewery,
			TakenAt: inCellar(pitched.Add(time.Duration(float64(bulkStay*24*time.Hour) * share).Truncate(time.Minute))),
			Gravity: journal.Typed{Text: fmt.Sprintf("1.%03d", fg+int(fell)), Scale: "sg"},
			Temp:    journal.TypedTemp{Text: fmt.Sprint(17 + (k+n*n)%6), Unit: "C"},
		})
	}
	if !open {
		bodies = append(bodies, journal.Close{Batch: id, At: inCellar(pitched.Add(bulkStay*24*time.Hour + time.Hour))})
	}
	return bodies
}
