package journal

import (
	"fmt"
	"math"
	"slices"
	"time"

	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// coverage95 makes a standard uncertainty of a difference into its 95 % limit.
const coverage95 = 1.96

// smallestRise is the rise [points] that is never doubted: a point on the scale.
const smallestRise = 1.0

// compare holds a reading against its neighbours in time, against the original
// gravity and against the other open batches. Replicates are not compared with
// each other.
func (s Situation) compare(view View, one *Value, replicates []int64) *Hold {
	before, after := neighbours(view, one, replicates)
	var hold *Hold
	if before != nil {
		hold = s.rise(view, before, one, one)
	}
	if hold == nil && after != nil {
		hold = s.rise(view, one, after, one)
	}
	if hold == nil {
		hold = s.aboveOG(view, one)
	}
	if hold == nil {
		hold = s.plunge(view, before, one)
	}
	if hold == nil && after != nil {
		hold = s.plunge(view, one, after)
	}
	if hold == nil {
		hold = spread(view, one, replicates)
	}
	return s.closer(view, one, before, hold)
}

// neighbours returns the values that count nearest to one before and after it.
func neighbours(view View, one *Value, replicates []int64) (before, after *Value) {
	for _, v := range view.Counting() {
		switch {
		case v.Number == one.Number || slices.Contains(replicates, v.Number):
		case v.Source.TakenAt.After(one.Source.TakenAt):
			if after == nil {
				after = v
			}
		default:
			before = v
		}
	}
	return before, after
}

// own is a value by itself, in the new reading's case without its replicates.
func own(v, one *Value) float64 {
	if v == one {
		return float64(v.Result.SG)
	}
	return float64(v.SG)
}

// rise holds b over a, two values in order of time of which one is the new reading,
// when it is higher by more than the larger of 1 point and 1.96 u of the difference
// with nothing added between. The rise is taken to a tenth of a point: the
// temperature correction stretches a step on the scale by a hundredth or so.
func (s Situation) rise(view View, a, b, one *Value) *Hold {
	points := asread.RoundDiff(own(b, one), own(a, one), 1000, 1, asread.HalfUp)
	limit := max(smallestRise, coverage95*s.uDifference(a, b))
	if points <= limit || view.addedBetween(a.Source.TakenAt, b.Source.TakenAt) {
		return nil
	}
	h := &Hold{Code: HoldRise, Tip: s.tip()}
	if b == one {
		h.Text = fmt.Sprintf("%s is %s points over the reading before it (%s, %s), and nothing was added since",
			four(own(one, one)), tenth(points), four(own(a, one)), clock(a.Source.TakenAt))
	} else {
		h.Text = fmt.Sprintf("%s is %s points under the reading after it (%s, %s), and nothing was added between",
			four(own(one, one)), tenth(points), four(own(b, one)), clock(b.Source.TakenAt))
	}
	return h
}

// A fall is doubted when it is more than fastestFall points in an hour and
// fallSlack points besides. Forty points in a day are a hot and strong start;
// readings of real courses (research data of beer and wine) stay under thirty
// (judged).
const (
	fastestFall = 40.0 / 24
	fallSlack   = 3.0
)

// plunge holds a fall from a to b that is faster than anything ferments, one of
// them the new reading. Without a reading before it a is nil and the fall is that
// from the original gravity since pitching.
func (s Situation) plunge(view View, a, b *Value) *Hold {
	from, since, what := float64(b.OG), view.Pitched, "the original gravity"
	if a != nil {
		from, since, what = float64(a.SG), a.Source.TakenAt, "the reading before it"
	} else if b.OE <= 0 || s.Target.Batch.Pitched == nil {
		return nil
	}
	hours := b.Source.TakenAt.Sub(since).Hours()
	// Most fall far less, and the events take their time. Rounding adds 0.05 at most.
	if 1000*(from-float64(b.SG)) < fallSlack+fastestFall*hours-0.1 {
		return nil
	}
	if hours < 0 || view.changedBetween(since, b.Source.TakenAt) || view.addedBetween(since, b.Source.TakenAt) {
		return nil
	}
	points := asread.RoundDiff(from, float64(b.SG), 1000, 1, asread.HalfUp)
	if points <= fallSlack+fastestFall*hours {
		return nil
	}
	return &Hold{Code: HoldFall, Tip: s.tip(), Text: fmt.Sprintf("%s is %s points under %s (%s) after %s",
		four(float64(b.SG)), tenth(points), what, four(from), lasting(hours))}
}

// spread holds a reading that lies more than 2 points from another one of the same
// minute: their mean would stand for neither.
func spread(view View, one *Value, replicates []int64) *Hold {
	for k := range view.Values {
		v := &view.Values[k]
		if !v.Counts() || !slices.Contains(replicates, v.Number) {
			continue
		}
		if hold := far(one, v, fmt.Sprintf("entry %d, ", v.Number)); hold != nil {
			hold.Tip = fmt.Sprintf("void %d --reason TEXT if that one was a slip, else read again", v.Number)
			return hold
		}
	}
	return nil
}

// farApart is how far [points] readings of one minute may be apart.
const farApart = 2.0

// far holds a reading that is too far from another of its minute; entry names that.
func far(one, other *Value, entry string) *Hold {
	d := math.Abs(asread.RoundDiff(own(one, one), float64(other.Result.SG), 1000, 1, asread.HalfUp))
	if d <= farApart {
		return nil
	}
	return &Hold{
		Code: HoldSpread, Tip: "void one of them",
		Text: fmt.Sprintf("%s is %s points from the other reading of this minute (%s%s)",
			four(own(one, one)), tenth(d), entry, four(float64(other.Result.SG))),
	}
}

func four(x float64) string  { return asread.Fixed(x, 4, asread.HalfEven) }
func tenth(x float64) string { return asread.Fixed(x, 1, asread.HalfEven) }

// lasting is a span of hours, below one in minutes.
func lasting(hours float64) string {
	if hours < 1 {
		return asread.Fixed(60*hours, 0, asread.HalfEven) + " min"
	}
	return tenth(hours) + " h"
}

func (s Situation) tip() string {
	return "is it the wrong tank, or an addition that is not logged (event " + s.Target.Batch.ID + " sugar …)? else keep it as suspect: --keep REASON"
}

// aboveOG holds a value over the effective original gravity by more than its own
// uncertainty (k = 2), at least 1 point, unless something was added that does not
// count toward it.
func (s Situation) aboveOG(view View, one *Value) *Hold {
	at := one.Source.TakenAt
	primed := !view.Primed.IsZero() && !view.Primed.After(at)
	if one.OE <= 0 || primed || view.addedBetween(at, at) {
		return nil
	}
	independent, common := s.doubt(one)
	points := asread.RoundDiff(own(one, one), float64(one.OG), 1000, 1, asread.HalfUp)
	if points <= max(smallestRise, 2*math.Hypot(independent, common)) {
		return nil
	}
	return &Hold{Code: HoldAboveOG, Tip: s.tip(), Text: fmt.Sprintf("%s is %s points over the original gravity %s, and nothing was added",
		four(own(one, one)), tenth(points), four(float64(one.OG)))}
}

// addedBetween reports whether an event that can raise the gravity lies from a to b.
func (v View) addedBetween(a, b time.Time) bool {
	return slices.ContainsFunc(v.Record.Events, func(e Numbered[Event]) bool {
		return !e.Void && slices.Contains([]string{Sugar, TopUp, Blend, Fruit, Priming}, e.Body.What) &&
			!e.Body.At.Before(a) && !e.Body.At.After(b)
	})
}

// uDifference returns the standard uncertainty [points] of the difference of two
// values. What one instrument puts into both falls out (GUM, JCGM 100:2008,
// equation 16 with r = +1); two instruments, or unnamed ones, share nothing.
func (s Situation) uDifference(a, b *Value) float64 {
	ia, ca := s.doubt(a)
	ib, cb := s.doubt(b)
	common := math.Hypot(ca, cb)
	if a.Source.Instrument != "" && a.Source.Instrument == b.Source.Instrument {
		common = ca - cb
	}
	return math.Sqrt(ia*ia + ib*ib + common*common)
}

// doubt returns the standard uncertainty [points] of a value in its two parts.
func (s Situation) doubt(v *Value) (independent, common float64) {
	h, _, err := s.Book.Hydrometer(v.Source.Instrument, v.Source.TakenAt)
	if err != nil {
		return 0, 0
	}
	if h.ID == "" {
		h.Scale = v.Typed.Scale
	}
	step := v.Typed.Step
	if h.Division > 0 {
		step = h.Division
	}
	f := h.Float()
	lo, errLo := f.MarkDensity(v.Result.Corrected - step)
	hi, errHi := f.MarkDensity(v.Result.Corrected + step)
	if errLo != nil || errHi != nil || !(step > 0) {
		return 0, 0
	}
	perUnit := 1000 * math.Abs(float64((hi-lo)/gravity.Kell(20))) / (2 * step)
	for _, p := range v.Result.Budget.Parts {
		if p.Common {
			common = math.Hypot(common, p.U*perUnit)
		} else {
			independent = math.Hypot(independent, p.U*perUnit)
		}
	}
	if v.Replicates > 1 {
		independent /= math.Sqrt(float64(v.Replicates))
	}
	return independent, common
}
