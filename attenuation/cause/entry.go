package cause

import (
	"fmt"
	"math"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
)

// alike is how near [points] two readings of the same thing lie: both say so then,
// and a slip of one of them is not the cause.
const alike = 1.5

// fix is one reading put right, and what the attenuation would be then.
type fix struct {
	what     string
	apparent float64
}

// entry looks for a slip in the reading, or in the original gravity, that put
// right would bring the batch within the spread of its peers.
func (q *question) entry() Hypothesis {
	h := Hypothesis{Name: Entry, Cost: Minutes, Check: "hold the entries against what was written at the tank, and read the tank once more"}
	if q.at.Course {
		h.nothing()
		h.Check = ""
		h.Evidence = "two readings running lie off, so no single one makes it"
		return h
	}
	fixes, tried, why := q.lastFixes()
	more, triedOG, whyOG := q.ogFixes()
	fixes, tried = append(fixes, more...), tried+triedOG
	best := -1
	for k, f := range fixes {
		off := math.Abs(f.apparent - q.at.Median)
		if off <= q.at.Limit && off < math.Abs(q.at.Difference)/2 && (best < 0 || off < math.Abs(fixes[best].apparent-q.at.Median)) {
			best = k
		}
	}
	if best < 0 {
		h.nothing()
		h.Check = ""
		h.Evidence = sentences(why, whyOG)
		if tried > 0 {
			h.Evidence = sentences(h.Evidence, fmt.Sprintf("none of %s puts it within the range of the peers", counted(tried, "slip tried", "slips tried")))
		}
		return h
	}
	h.explained(q.at.Apparent-fixes[best].apparent, 2*q.at.own)
	h.Evidence = fmt.Sprintf("%s: %s %% instead of %s %%", fixes[best].what, one(fixes[best].apparent), one(q.at.Apparent))
	if len(fixes) > 1 {
		h.Notes = append(h.Notes, note("tried", fmt.Sprintf("the nearest of %d slips tried; some slip fits many a reading by chance", tried)))
	}
	return h
}

// lastFixes are the last reading with each slip taken back, those left out that
// would rise above the reading before.
func (q *question) lastFixes() (fixes []fix, tried int, why string) {
	last := q.at.Value
	before := q.before(last)
	if before != nil && math.Abs(points(before.SG, last.SG)) <= alike {
		return nil, 0, "the reading before the last says the same"
	}
	if last.Replicates > 1 {
		return nil, 0, "the last reading was repeated in the same minute"
	}
	h, _, err := q.Book.Hydrometer(last.Source.Instrument, last.Source.TakenAt)
	if err != nil {
		return nil, 0, "the last reading cannot be derived anew"
	}
	og := last.OG
	if og == 0 {
		og = q.Batch.OG.SG
	}
	add := func(what string, sg gravity.SG) {
		tried++
		if before != nil && points(sg, before.SG) > alike || points(sg, og) > alike {
			return
		}
		if a, ok := apparent(og, sg); ok {
			fixes = append(fixes, fix{what, a})
		}
	}
	typed := last.Source.Gravity.Text
	for _, s := range slips(last.Typed) {
		if res, _, err := journal.CorrectTyped(h, s.reading, last.Temp, last.OE); err == nil {
			add(fmt.Sprintf("last reading %q taken for %s, %s", typed, s.reads, s.why), res.SG)
		}
	}
	if temp, ok := otherUnit(last.Temp); ok {
		if res, _, err := journal.CorrectTyped(h, last.Typed, temp, last.OE); err == nil {
			add(fmt.Sprintf("temperature %q of the last reading taken for °%s", last.Source.Temp.Text, temp.Unit), res.SG)
		}
	}
	for _, t := range q.Tanks {
		if sg, hour, ok := swapped(t, last); ok {
			add(fmt.Sprintf("last reading swapped with that of %s at %s", t.Record.Batch.ID, hour), sg)
		}
	}
	return fixes, tried, ""
}

// before is the reading that counts before one.
func (q *question) before(one *journal.Value) *journal.Value {
	var before *journal.Value
	for _, other := range q.Batch.Counting() {
		if !other.Source.TakenAt.Before(one.Source.TakenAt) {
			break
		}
		before = other
	}
	return before
}

// ogMargin is how far [points] an original gravity may lie beyond those of the peers
// and still be meant for the product (judged).
const ogMargin = 4.0

// ogFixes are the original gravity with each slip of one of its readings taken
// back, those left out that no batch of the product had.
func (q *question) ogFixes() (fixes []fix, tried int, why string) {
	used := q.usedOGs()
	last := q.at.Value
	if len(used) > 1 && q.Batch.OG.Spread <= alike*point {
		return nil, 0, counted(len(used), "reading of the original gravity", "readings of the original gravity") + " agree"
	}
	lo, hi := q.peers[0].member.OG, q.peers[0].member.OG
	for _, p := range q.peers {
		lo, hi = min(lo, p.member.OG), max(hi, p.member.OG)
	}
	for _, o := range used {
		was, typed, err := q.ogOf(o.Body, nil)
		if err != nil {
			continue
		}
		for _, s := range slips(typed) {
			is, _, err := q.ogOf(o.Body, &s.reading)
			if err != nil {
				continue
			}
			tried++
			move := (is - was) / gravity.SG(len(used))
			og := q.Batch.OG.SG + move
			if last.OG > 0 {
				og = last.OG + move
			}
			if points(q.highest(), og) > alike || points(og, hi) > ogMargin || points(lo, og) > ogMargin {
				continue
			}
			if a, ok := apparent(og, last.SG); ok {
				fixes = append(fixes, fix{fmt.Sprintf("original gravity %q taken for %s, %s", o.Body.Gravity.Text, s.reads, s.why), a})
			}
		}
	}
	return fixes, tried, ""
}

func (q *question) highest() gravity.SG {
	highest := q.at.Value.SG
	for _, one := range q.Batch.Counting() {
		highest = max(highest, one.SG)
	}
	return highest
}
