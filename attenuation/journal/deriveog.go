package journal

import (
	"slices"
	"time"

	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
)

// OriginalGravity is the mean of the readings of it that are not void.
type OriginalGravity struct {
	SG      gravity.SG    // 20/20
	Extract gravity.Plato // % mass
	N       int
	Spread  float64 // largest less smallest, SG
	Numbers []int64 // the entries that are in it, in order of time
}

// original derives the original gravity. A reading that cannot be used is noted
// and left out.
func (v *View) original(book *Book) {
	var og OriginalGravity
	var sgs []float64
	for _, e := range ordered(v.Record.OGs, func(o OG) time.Time { return o.At }) {
		if e.Void {
			continue
		}
		sg, extract, notes, err := e.Body.corrected(book)
		if err != nil {
			v.note(NoteUnused, "original gravity (entry %d) not used: %v", e.Number, err)
			continue
		}
		v.Notes = append(v.Notes, notes...)
		sgs = append(sgs, float64(sg))
		og.Extract = extract
		og.Numbers = append(og.Numbers, e.Number)
	}
	og.N = len(sgs)
	if og.N == 0 {
		return
	}
	og.SG = gravity.SG(mean(sgs))
	og.Spread = slices.Max(sgs) - slices.Min(sgs)
	if og.N > 1 {
		og.Extract = gravity.Fits.Default().Fn.Extract(og.SG)
	}
	v.OG = &og
}

// corrected returns one reading of the original gravity, corrected as a sucrose
// solution; as typed, on the pair of its instrument, when it has no temperature.
func (o OG) corrected(book *Book) (gravity.SG, gravity.Plato, []method.Note, error) {
	if o.Temp.Text == "" {
		pair := gravity.Pair2020
		if o.Instrument != "" {
			rec, err := book.find(o.Instrument)
			if err != nil {
				return 0, 0, nil, err
			}
			if pair, err = asread.ParsePair(rec.Instrument.Basis); err != nil {
				return 0, 0, nil, err
			}
		}
		f, err := o.Gravity.figures(pair)
		return f.SG, f.Extract, nil, err
	}
	typed, err := o.Gravity.Reading()
	if err != nil {
		return 0, 0, nil, err
	}
	temp, err := o.Temp.Temperature()
	if err != nil {
		return 0, 0, nil, err
	}
	h, notes, err := book.Hydrometer(o.Instrument, o.At)
	if err != nil {
		return 0, 0, nil, err
	}
	res, more, err := correctTyped(h, typed, temp, 0, book.Plain)
	return res.SG, res.Extract, slices.Concat(notes, more), err
}
