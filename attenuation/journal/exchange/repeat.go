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
// row before.
func (d *draft) repeats(t *target, rec *journal.Record) {
	seen := make(map[key]struct{}, len(rec.Readings)+len(t.rows))
	for _, n := range rec.Readings {
		if k, ok := keyOf(n.Body, n.Void); ok {
			seen[k] = struct{}{}
		}
	}
	for _, i := range t.rows {
		_, void := d.p.reasons[int(i)]
		k, ok := keyOf(d.p.rows[i].body.(journal.Reading), void)
		if _, repeat := seen[k]; ok && repeat {
			d.fate[i] = repeated
			continue
		}
		if ok {
			seen[k] = struct{}{}
		}
	}
}

func floorMinute(t time.Time) int64 {
	s := t.Unix()
	return (s - ((s%60)+60)%60) / 60
}
