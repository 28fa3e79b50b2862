package cause

import (
	"fmt"
	"math"
	"slices"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
)

const (
	point      = 0.001 // SG
	pointFloor = 0.3   // points, the least spread of shifts: half a division, rectangular
)

// instrument computes what an error of the instrument would explain: that which a
// later check found, applied backwards; else the shift of other batches that were
// read with it, each against its own group. An error that the peers share with
// the batch cancels, and the shift shows that.
func (q *question) instrument() Hypothesis {
	h := Hypothesis{Name: Instrument, Cost: Minutes}
	last := q.at.Value
	id := last.Source.Instrument
	if id == "" {
		h.Why = "the reading names no instrument"
		h.Check = "check the instrument in water at 20 °C, and name it with the readings"
		return h
	}
	h.Check = "check " + id + " in water at 20 °C: instrument check " + id + " --water FOUND --temp 20C"
	rec := q.Book.Instruments[id]
	if rec == nil {
		h.Why = id + " is not in the journal"
		return h
	}
	since, next := calibrated(rec, last.Source.TakenAt)
	overdue := ""
	if last.Source.TakenAt.After(since.AddDate(1, 0, 0)) {
		overdue = fmt.Sprintf("%s was last checked on %s, more than a year before", id, day(since))
	}
	og, perPoint, ok := q.sensitivity(id, since, next)
	if !ok {
		h.Why, h.Evidence = "the attenuation cannot be derived anew", overdue
		return h
	}
	shift, u, n, products, shifts := q.shifts(id, since, next)
	others := ""
	if n > 0 {
		others = fmt.Sprintf("%s read with it under the same calibration, %d of them of another product, median %s points against their own groups",
			counted(n, "other finished batch", "other finished batches"), products, signed(-shift))
	}
	if !next.IsZero() {
		h.backwards(q, id, og, next, perPoint)
		h.Evidence = sentences(h.Evidence, others, overdue)
		return h
	}
	h.Evidence = sentences(others, overdue)
	if !shifts {
		h.Why = "no check since the reading, and " + lack(n, fewest, "other batch read with it", "other batches read with it")
		return h
	}
	h.explained(shift*perPoint, u*math.Abs(perPoint))
	return h
}

// backwards derives the batch anew with the correction of the next check.
func (h *Hypothesis) backwards(q *question, id string, og gravity.SG, next time.Time, perPoint float64) {
	last := q.at.Value
	was, _, errWas := q.Book.Hydrometer(id, last.Source.TakenAt)
	is, _, errIs := q.Book.Hydrometer(id, next)
	if errWas != nil || errIs != nil {
		h.Why = "the record of " + id + " cannot be read"
		return
	}
	res, _, err := journal.CorrectTyped(is, last.Typed, last.Temp, last.OE)
	if err != nil {
		h.Why = "the reading cannot be derived with the later check: " + err.Error()
		return
	}
	offset := res.SG - last.Result.SG
	before, ok := apparent(og, last.SG)
	after, okAfter := apparent(og+q.ogMoves(id, last.Source.TakenAt, next), last.SG+offset)
	if !ok || !okAfter {
		h.Why = "the reading cannot be derived with the later check"
		return
	}
	// Both calibrations are uncertain, k = 2, on the scale of the instrument.
	u := math.Hypot(largestU(was.Certificate), largestU(is.Certificate))
	if is.Scale.IsMass() {
		u *= sgPerPlato
	}
	h.explained(before-after, u/point*math.Abs(perPoint))
	h.Evidence = fmt.Sprintf("%s: the check of %s moves its readings by %s points; applied backwards the batch has %s %% instead of %s %%",
		id, day(next), signed(float64(offset)/point), one(after), one(before))
	h.Check = "read a sample with " + id + " and with a second, checked instrument"
	h.Notes = append(h.Notes, note("backwards", "the check tells of this reading only if "+id+" was off already when it was taken"))
}

// calibrated returns the last calibration up to a time, else when the instrument
// came into use, and the first one after it, zero when there is none.
func calibrated(rec *journal.InstrumentRecord, at time.Time) (since, next time.Time) {
	since = rec.Instrument.Since
	take := func(t time.Time) {
		if !t.After(at) && t.After(since) {
			since = t
		}
		if t.After(at) && (next.IsZero() || t.Before(next)) {
			next = t
		}
	}
	for _, c := range rec.Certificates {
		take(c.Body.At)
	}
	for _, c := range rec.Checks {
		take(c.Body.At)
	}
	return since, next
}

// sensitivity returns the original gravity in force, and by how many points of
// attenuation the batch looks higher for each point that the instrument reads low.
// What part of the original gravity was read with it counts too.
func (q *question) sensitivity(id string, since, next time.Time) (og gravity.SG, perPoint float64, ok bool) {
	last := q.at.Value
	if og = last.OG; og == 0 {
		og = q.Batch.OG.SG
	}
	part := 0.0
	for _, o := range q.usedOGs() {
		if o.Body.Instrument == id && within(o.Body.At, since, next) {
			part += 1 / float64(q.Batch.OG.N)
		}
	}
	is, ok := apparent(og, last.SG)
	was, okWas := apparent(og+gravity.SG(part*point), last.SG+point)
	return og, is - was, ok && okWas
}

// ogMoves is by how much the original gravity moves when those of its readings
// that the same calibration made are corrected by the next one.
func (q *question) ogMoves(id string, at, next time.Time) gravity.SG {
	since, _ := calibrated(q.Book.Instruments[id], at)
	sum := 0.0
	for _, o := range q.usedOGs() {
		if o.Body.Instrument != id || o.Body.Temp.Text == "" || !within(o.Body.At, since, next) {
			continue
		}
		was, okWas := q.ogWith(o.Body, o.Body.At)
		is, okIs := q.ogWith(o.Body, next)
		if okWas && okIs {
			sum += float64(is - was)
		}
	}
	return gravity.SG(sum / float64(q.Batch.OG.N))
}

// ogWith corrects a reading of the original gravity with its instrument as it was
// at a time.
func (q *question) ogWith(o journal.OG, at time.Time) (gravity.SG, bool) {
	h, _, err := q.Book.Hydrometer(o.Instrument, at)
	typed, errTyped := o.Gravity.Reading()
	temp, errTemp := o.Temp.Temperature()
	if err != nil || errTyped != nil || errTemp != nil {
		return 0, false
	}
	res, _, err := journal.CorrectTyped(h, typed, temp, 0)
	return res.SG, err == nil
}

func (q *question) usedOGs() []journal.Numbered[journal.OG] {
	var list []journal.Numbered[journal.OG]
	for _, o := range q.Batch.Record.OGs {
		if slices.Contains(q.Batch.OG.Numbers, o.Number) {
			list = append(list, o)
		}
	}
	return list
}

// within reports whether t lies in a calibration; a zero next is open.
func within(t, since, next time.Time) bool {
	return !t.Before(since) && (next.IsZero() || t.Before(next))
}
