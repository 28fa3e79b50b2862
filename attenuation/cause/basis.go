package cause

import (
	"fmt"
	"math"
	"slices"

	"gylebook/attenuation"
	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// basis looks at the original extract that the attenuation is counted from: lost
// by an addition that lacks something, or raised by one that nobody entered.
func (q *question) basis() Hypothesis {
	id := q.Batch.Record.Batch.ID
	h := Hypothesis{Name: Basis, Cost: Minutes, Check: "what went into the tank is on its slate or the stock list; event " + id + " enters it"}
	if k := slices.IndexFunc(q.Batch.Basis, func(s journal.BasisStep) bool { return s.Broken }); k >= 0 {
		h.broken(q, q.Batch.Basis[k])
		return h
	}
	rise, at, day := q.rise()
	if at == nil {
		h.nothing()
		h.Check = ""
		h.Evidence = "the gravity never rises without an entry"
		if len(q.Batch.Basis) > 0 {
			h.Evidence = "every addition is entered with what it needs; " + h.Evidence
		}
		return h
	}
	last := q.at.Value
	with, ok := apparent(last.OG+gravity.SG(rise*point), last.SG)
	if !ok {
		h.Why = "the attenuation cannot be derived anew"
		return h
	}
	h.explained(q.at.Apparent-with, 2*q.at.own)
	h.Evidence = fmt.Sprintf("the gravity rises by %s points on %s and no addition is entered; with as much more original gravity it is at %s %%", one(rise), day, one(with))
	return h
}

// broken says what the lost addition would have to be. Its size is not known, so
// what it explains has no uncertainty.
func (h *Hypothesis) broken(q *question, s journal.BasisStep) {
	h.Evidence = fmt.Sprintf("%s (entry %d): no attenuation stands until it is closed", s.Why, s.Number)
	h.Check = fmt.Sprintf("find what was added; void %d and enter it anew with its mass or volume and gravity", s.Number)
	h.Why = "how much was added is not known"
	if q.at.Peers < fewest || !q.at.StandsOut() {
		return
	}
	now := q.Batch.OG.Extract
	left := 1 - q.at.Median/100
	if math.Abs(left) < 0.005 {
		return // at about 100 % any original extract gives the same
	}
	wanted := extract(q.at.Value.SG) / gravity.Plato(left)
	change := float64(wanted/now) - 1
	if !finite(change) || change < -mostChange || change > mostChange {
		return
	}
	d := q.at.Difference
	h.Why, h.Explains = "", &d
	h.Evidence = sentences(h.Evidence, fmt.Sprintf("an original extract of %s instead of %s °P would explain all of it", one(float64(wanted)), one(float64(now))))
	if w, ok := addedSugar(q.Batch, now, wanted); ok {
		h.Evidence = sentences(h.Evidence, fmt.Sprintf("that is about %s kg of sugar", one(w)))
	}
}

// mostChange is the share of the original extract that an addition may move
// (judged).
const mostChange = 0.35

// addedSugar is the mass [kg] of pure sugar that lifts the extract of the batch.
func addedSugar(v journal.View, from, to gravity.Plato) (float64, bool) {
	litres, ok := litresOf(v)
	if !ok || !(to > from) {
		return 0, false
	}
	kg := massOf(litres, from) * float64((to-from)/(100-to))
	return kg, finite(kg)
}

// rise is the largest rise of the gravity [points] between two readings with the
// same instrument and no entry that would explain it.
func (q *question) rise() (rise float64, at *journal.Value, date string) {
	list := q.Batch.Counting()
	for k := 1; k < len(list); k++ {
		a, b := list[k-1], list[k]
		if b.Source.TakenAt.After(q.at.Value.Source.TakenAt) || a.Source.Instrument != b.Source.Instrument || a.OE != b.OE ||
			a.Result.Instrument() != b.Result.Instrument() || q.eventBetween(a, b) {
			continue
		}
		if r := points(b.SG, a.SG); r > max(alike, rise) {
			rise, at, date = r, b, day(b.Source.TakenAt)
		}
	}
	// A single reading that stands out is a slip rather than an addition: the ones
	// after it must stay up, or fall as a fermentation does.
	if at != nil && !q.staysUp(at) {
		return 0, nil, ""
	}
	return rise, at, date
}

// staysUp reports whether the reading after a rise lies above where the peers'
// pace would have brought the reading before it, by half of what an addition that
// ferments along with the rest would have left. The last reading has none after it
// and cannot tell.
func (q *question) staysUp(at *journal.Value) bool {
	list := q.Batch.Counting()
	k := slices.Index(list, at)
	if k < 1 || k+1 >= len(list) {
		return false
	}
	a, next := list[k-1], list[k+1]
	from, okFrom := q.Batch.Elapsed(a.Source.TakenAt)
	to, okTo := q.Batch.Elapsed(next.Source.TakenAt)
	move, ok := q.peersMove(from, to)
	high, okHigh := apparent(a.OG, a.SG)
	low, okLow := apparent(a.OG, a.SG+point)
	if !ok || !okFrom || !okTo || !okHigh || !okLow || !(high > low) || next.Attenuation == nil {
		return false
	}
	above := points(next.SG, a.SG) + max(move, 0)/(high-low)
	left := points(at.SG, a.SG) * max(1-next.Attenuation.Apparent/100, 0)
	return above >= max(alike/2, left/2)
}

func (q *question) eventBetween(a, b *journal.Value) bool {
	return slices.ContainsFunc(q.Batch.Record.Events, func(e journal.Numbered[journal.Event]) bool {
		at := e.Body.At
		return !e.Void && !at.Before(a.Source.TakenAt) && !at.After(b.Source.TakenAt)
	})
}

// litresOf is the volume of the batch as pitched.
func litresOf(v journal.View) (float64, bool) {
	n, err := asread.ParseNumber(v.Record.Volume())
	return n.Float(), err == nil && n.Float() > 0
}

// massOf is the mass [kg] of litres at 20 °C.
func massOf(litres float64, extract gravity.Plato) float64 {
	return attenuation.FromVolume(litres, extract, 20).MassKg
}
