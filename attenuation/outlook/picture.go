package outlook

import (
	"context"
	"math"
	"time"

	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
)

// ExpandedPoints is the expanded uncertainty (k = 2) of a corrected value in points,
// 0 where its scale does not tell.
func ExpandedPoints(one *journal.Value) float64 {
	return one.Result.Budget.Expanded * perScale(one)
}

// Shown is the gravity, SG 20/20, that a reading at so many hours after pitching
// should show, before the last reading too: the course as the curve sees it. ok is
// false without a curve.
func (f Forecast) Shown(hours float64) (i curve.Interval, ok bool) {
	if !f.Curve.Curve {
		return curve.Interval{}, false
	}
	return asSG(f.Curve.GravityAt(hours))
}

// Envelope is what the last finished batches of a product and yeast showed, by hours
// after pitching.
type Envelope struct {
	Hours, Low, High []float64 // h; SG 20/20
	Batches          []string  // the newest first
}

// leastEnveloped is how many batches an envelope needs at a time.
const leastEnveloped = 3

// EnvelopeOf lays the lowest and the highest of the last n finished batches of a
// product and yeast over the hours given, which rise. Between readings a batch is
// taken to fall evenly; before its first reading that counts and after its last it
// tells nothing, save that a batch stands at its original gravity when it is pitched.
// Hours with fewer than three batches are left out. The error is that of the reader.
func EnvelopeOf(ctx context.Context, r Finisher, book *journal.Book, product, yeast string, before time.Time, n int, hours []float64) (Envelope, error) {
	var e Envelope
	var courses [][2][]float64
	for rec, err := range r.Finished(ctx, product, yeast, before) {
		if err != nil {
			return Envelope{}, err
		}
		if x, y := fallOf(rec, book); len(x) > 1 {
			courses = append(courses, [2][]float64{x, y})
			e.Batches = append(e.Batches, rec.Batch.ID)
		}
		if len(courses) == n {
			break
		}
	}
	for _, h := range hours {
		lo, hi, count := math.Inf(1), math.Inf(-1), 0
		for _, c := range courses {
			if y, ok := between(c[0], c[1], h); ok {
				lo, hi, count = math.Min(lo, y), math.Max(hi, y), count+1
			}
		}
		if count >= leastEnveloped {
			e.Hours, e.Low, e.High = append(e.Hours, h), append(e.Low, lo), append(e.High, hi)
		}
	}
	return e, nil
}

// fallOf is a finished batch as hours after pitching and SG 20/20.
func fallOf(rec *journal.Record, book *journal.Book) (x, y []float64) {
	v := journal.Derive(rec, book)
	if v.Pitched.IsZero() || v.OG == nil {
		return nil, nil
	}
	x, y = []float64{0}, []float64{float64(v.OG.SG)}
	for _, one := range v.Counting() {
		h := one.Source.TakenAt.Sub(v.Pitched).Hours()
		if h > x[len(x)-1] {
			x, y = append(x, h), append(y, float64(one.SG))
		}
	}
	return x, y
}

// between is y at h on the line through the points; ok is false outside of them.
func between(x, y []float64, h float64) (float64, bool) {
	for k := 1; k < len(x); k++ {
		if h >= x[k-1] && h <= x[k] {
			part := (h - x[k-1]) / (x[k] - x[k-1])
			return y[k-1] + part*(y[k]-y[k-1]), true
		}
	}
	return 0, false
}
