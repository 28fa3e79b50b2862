package cause

import (
	"fmt"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
)

// limitDoubt is the expanded uncertainty [% points] of a limit of attenuation:
// laboratories repeat it to 2.4 to 3.5 (Hagen & Schwarz 1999).
const limitDoubt = 3.5

// limit holds the batch's limit of attenuation against those of the peers, else
// against what the peers reached.
func (q *question) limit() Hypothesis {
	h := Hypothesis{Name: Limit, Cost: Day, Check: "forced ferment of the wort, a day or two, then batch limit " + q.Batch.Record.Batch.ID}
	if q.at.Course {
		h.Why, h.Check = "it bounds the end, and the batch ended as its peers did", ""
		return h
	}
	own, ok := limitOf(q.Batch, q.at.Value)
	if !ok {
		h.Why = "no limit of attenuation is entered"
		return h
	}
	short := own - q.at.Apparent
	h.Evidence = fmt.Sprintf("the batch stands %s points below its limit of %s %%", one(short), one(own))
	if short < 0 {
		h.Evidence = fmt.Sprintf("the batch stands %s points above its limit of %s %%: limit, original gravity or reading is off", one(-short), one(own))
	}
	var limits []float64
	for _, p := range q.peers {
		if l, ok := limitOf(p.view, p.view.Last()); ok {
			limits = append(limits, l)
		}
	}
	h.Check = "a second forced ferment beside one of another wort"
	if len(limits) >= fewest {
		median, sd := middle(limits)
		h.explained(own-median, quadrature(limitDoubt, medianDoubt(max(sd, 1), len(limits))))
		h.Evidence = sentences(h.Evidence, fmt.Sprintf("the median limit of %d peers is %s %%", len(limits), one(median)))
		return h
	}
	// Without limits of the peers: what they reached cannot be beyond this wort's
	// limit, so as much as it lies lower is the wort's.
	h.explained(min(own-q.at.Median, 0), quadrature(limitDoubt, q.at.U))
	h.Evidence = sentences(h.Evidence, lack(len(limits), fewest, "limit of a peer", "limits of peers")+": held against what the peers reached")
	return h
}

// limitOf is the limit of attenuation of a batch [%].
func limitOf(v journal.View, last *journal.Value) (float64, bool) {
	if v.Limit == nil || last == nil {
		return 0, false
	}
	oe := last.OE
	if oe <= 0 && v.OG != nil {
		oe = v.OG.Extract
	}
	if !(oe > 0) {
		return 0, false
	}
	l := 100 * float64((oe-*v.Limit)/oe)
	return l, finite(l)
}

// extract is that of a gravity.
func extract(sg gravity.SG) gravity.Plato { return gravity.Fits.Default().Fn.Extract(sg) }
