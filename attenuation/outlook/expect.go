package outlook

import (
	"math"
	"slices"
	"time"

	"gylebook/attenuation/journal"
)

const (
	normal90 = 1.644854 // half of a 5 to 95 % interval of the normal distribution
	leastSD  = 0.001    // SG, of any expected value
)

// Expect returns where a batch is expected at a time, in SG 20/20, and the standard
// deviation of that, by the forecast from its readings until then. ok is false where
// there is no curve, and when something was added since the last reading.
func Expect(v journal.View, h History, at time.Time) (sg, sd float64, ok bool) {
	f, err := Of(v, h, at)
	if err != nil || f.Course.Last == nil {
		return 0, 0, false
	}
	last := f.Course.Last.Source.TakenAt
	restarted := slices.ContainsFunc(v.Record.Events, func(e journal.Numbered[journal.Event]) bool {
		return !e.Void && slices.Contains(restarts, e.Body.What) && !e.Body.At.Before(last) && e.Body.At.Before(at)
	})
	i, ok := f.Next(at)
	if !ok || restarted {
		return 0, 0, false
	}
	return i.Median, math.Max((i.Hi-i.Lo)/(2*normal90), leastSD), true
}
