package exchange

import (
	"time"

	"gylebook/attenuation/journal"
)

// key is what makes a row a repeat of another of its batch. Void readings are
// repeats of void ones only.
type key struct {
	minute int64
	value  float64
	scale  int8
	void   bool
}

func keyOf(r journal.Reading, void bool) (key, bool) {
	g, err := r.Gravity.Reading()
	if err != nil {
		return key{}, false
	}
	return key{floorMinute(r.TakenAt), g.Value, int8(g.Scale), void}, true
}

// repeats finds the rows of a batch that are there already, in the journal or in a
// row with an earlier time. Rows are asked about in the order of their time, so that
// only what was read in one minute is in memory.
type repeats struct {
	here   []numbered // of the journal, in time, from the minute on
	minute int64
	seen   map[key]struct{}
}

// found reports whether a row is a repeat.
func (q *repeats) found(row *planned) bool {
	if m := floorMinute(row.reading.TakenAt); q.seen == nil || m != q.minute {
		if q.seen == nil {
			q.seen = make(map[key]struct{})
		}
		clear(q.seen)
		q.minute = m
		for len(q.here) > 0 && floorMinute(q.here[0].Body.TakenAt) <= m {
			if k, ok := keyOf(q.here[0].Body, q.here[0].Void); ok && k.minute == m {
				q.seen[k] = struct{}{}
			}
			q.here = q.here[1:]
		}
	}
	k, ok := keyOf(row.reading, row.void)
	if !ok {
		return false
	}
	_, repeat := q.seen[k]
	q.seen[k] = struct{}{}
	return repeat
}

func floorMinute(t time.Time) int64 {
	s := t.Unix()
	return (s - ((s%60)+60)%60) / 60
}
