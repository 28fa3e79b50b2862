package season

import (
	"math"
	"time"

	"gylebook/attenuation/journal"
)

// within is one point of SG 20/20. Half a millionth is forgiven, so that two marks
// a point apart count as that.
const within = 0.001 + 5e-7

// LastFall returns when a batch had come to rest, from its readings in order of
// time: the first reading of the run up to the last one in which every reading is
// within 1 point of the last value and none is followed by one more than 1 point
// lower. It is the first reading after the last fall, so the fall itself was over
// by then; a batch that still falls, or is open, has it at its newest readings, for
// the time being.
//
// ok is false with fewer than two readings, which tell of no fall. whole says that
// the run reaches back to the first reading given, so that an earlier one might
// still belong to it.
func LastFall(list []*journal.Value) (at time.Time, whole, ok bool) {
	if len(list) < 2 {
		return time.Time{}, true, false
	}
	last := list[len(list)-1]
	lowest := last.SG
	at = last.Source.TakenAt
	for k := len(list) - 2; k >= 0; k-- {
		one := list[k]
		lowest = min(lowest, one.SG)
		if math.Abs(float64(one.SG-last.SG)) > within || float64(one.SG-lowest) > within {
			return at, false, true
		}
		at = one.Source.TakenAt
	}
	return at, true, true
}
