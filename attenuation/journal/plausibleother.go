package journal

import (
	"fmt"
	"math"
	"slices"
	"time"

	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// How far a batch may be from where it is expected, in points (judged; that a
// fermentation runs by fits and starts is common practice, no source).
const (
	ownDoubt  = 1.0 // of any expected value
	restless  = 5.0 // a day, while it ferments or when it is not known whether it does
	quiet     = 1.0 // a day, past half of its original points and falling less than this
	shareRate = 1. / 3
)

// driest is the lowest SG that a line is followed to when the limit of attenuation
// is not known.
const driest gravity.SG = 0.990

// shortestLine is the least time between two readings that give a rate; nearer
// together their last digit makes it.
const shortestLine = time.Hour

// Expected returns where a batch is expected at a time, in SG 20/20, and the
// standard deviation of that. It follows the straight line through the last two
// values that count until then, never rising and not below the limit of
// attenuation; with one value, with two nearer than an hour, or with a change of
// the original extract between the two, it stays at the last. ok is false without
// a value, and when something was added since.
//
// The standard deviation is 1 point and, with every day since the last value, a
// third of the fall of the line or 5 points, whichever is more; 1 point instead of
// 5 once the batch is past half of its points and falls by less than 1 a day.
func Expected(v View, at time.Time) (sg, sd float64, ok bool) {
	var list []*Value
	for _, one := range v.Counting() {
		if !one.Source.TakenAt.After(at) {
			list = append(list, one)
		}
	}
	return v.expected(list, at)
}

func (v View) expected(list []*Value, at time.Time) (sg, sd float64, ok bool) {
	if len(list) == 0 {
		return 0, 0, false
	}
	last := list[len(list)-1]
	then := last.Source.TakenAt
	if v.changedBetween(then, at) || v.addedBetween(then, at) {
		return 0, 0, false
	}
	days := max(0, at.Sub(then).Hours()/24)
	rate, known := 0.0, false // points a day, falling
	if len(list) > 1 {
		before := list[len(list)-2]
		span := then.Sub(before.Source.TakenAt)
		if span >= shortestLine && !v.changedBetween(before.Source.TakenAt, then) {
			rate, known = max(0, 1000*float64(before.SG-last.SG)/(span.Hours()/24)), true
		}
	}
	drift := max(restless, shareRate*rate)
	if known && rate < quiet && last.OG > 1 && last.SG-1 < (last.OG-1)/2 {
		drift = quiet
	}
	sg = max(float64(last.SG)-rate*days/1000, float64(min(v.floor(), last.SG)))
	return sg, math.Hypot(ownDoubt, drift*days) / 1000, true
}

// floor is the SG that fermentation ends at, as far as it is known.
func (v View) floor() gravity.SG {
	if v.Limit == nil {
		return driest
	}
	sg, err := gravity.Fits.Default().Fn.SG(*v.Limit)
	if err != nil || gravity.CheckSG(sg) != nil {
		return driest
	}
	return sg
}

// When a reading fits another batch far better, in points.
const (
	fits        = 2.0 // from the other's expected gravity at most
	unfitting   = 3.0 // standard deviations from the target's own at least …
	leastMiss   = 5.0 // … and this many points …
	timesCloser = 3.0 // … and this many times as far as from the other's

	// A forecast costs far more than a straight line: batches whose line is further
	// off than this are not asked for one.
	inReach = 10.0
)

func (s Situation) foretold(rec *Record, at time.Time) (sg, sd float64, ok bool) {
	if s.Expect == nil {
		return 0, 0, false
	}
	return s.Expect(rec, at)
}

// closer looks for another open batch that the reading fits. Without a hold so far
// it makes one when another fits far better: the reading is within 2 points of what
// the other is expected at, and off its own batch's by more than 3 standard
// deviations, 5 points, and 3 times the distance to the other. A hold there is
// already names the other batch that is within 2 points and 3 times closer.
//
// The expected gravities are those of s.Expect where it has one. It is asked only
// about a reading that is 5 points off the straight line, or held already: most are
// not, and a forecast takes its time.
//
// So a fall that is fast but possible is accepted as long as no other batch is
// near, and a slow batch is not confused with its neighbour for a point or two.
func (s Situation) closer(view View, one, before *Value, hold *Hold) *Hold {
	at, x := one.Source.TakenAt, own(one, one)
	var list []*Value
	for _, v := range view.Counting() {
		if v.Number != one.Number && before != nil && !v.Source.TakenAt.After(before.Source.TakenAt) {
			list = append(list, v)
		}
	}
	expected, sd, known := view.expected(list, at)
	miss := 1000 * math.Abs(x-expected)
	if hold == nil && !(known && miss > leastMiss) {
		return nil
	}
	if sg, dev, ok := s.foretold(s.Target, at); known && ok {
		expected, sd = sg, dev
		miss = 1000 * math.Abs(x-expected)
	}
	if hold == nil && !(known && miss > max(leastMiss, unfitting*1000*sd)) {
		return nil
	}
	if !known {
		miss = math.Inf(1)
	}
	others := s.Others
	if s.Find != nil {
		others = slices.Concat(others, s.Find())
	}
	best, vessel, id, bestSG := fits, "", "", 0.0
	for _, rec := range others {
		if rec == nil || rec.Batch.ID == s.Target.Batch.ID || rec.Closed != nil {
			continue
		}
		other := derive(rec, s.Book, span{limited: true, last: 2, until: at})
		sg, _, ok := Expected(other, at)
		if !ok {
			continue
		}
		// A batch that has slowed down is still where it was read last.
		if last := other.Last(); last != nil && math.Abs(x-float64(last.SG)) < math.Abs(x-sg) {
			sg = float64(last.SG)
		}
		d := 1000 * math.Abs(x-sg)
		if d < inReach {
			if foretold, _, ok := s.foretold(rec, at); ok {
				d, sg = 1000*math.Abs(x-foretold), foretold
			}
		}
		if d*timesCloser <= miss && (d < best || d == best && (id == "" || rec.Batch.ID < id)) {
			best, vessel, id, bestSG = d, other.Vessel(), rec.Batch.ID, sg
		}
	}
	if id == "" {
		return hold
	}
	name := vessel
	if name == "" {
		name = id
	}
	question := fmt.Sprintf("closer to %s's expected %s: is this %s?", name, asread.Fixed(bestSG, 3, asread.HalfEven), name)
	if hold == nil {
		hold = &Hold{Code: HoldOther, Text: fmt.Sprintf("%s is %s points from the %s expected here", four(x), tenth(miss), four(expected))}
	}
	hold.Text += "; " + question
	hold.Tip = fmt.Sprintf("log it to %s if it is that one, or keep it as suspect: --keep REASON", name)
	hold.Closer, hold.Vessel = id, vessel
	return hold
}
