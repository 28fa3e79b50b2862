package cause

import (
	"fmt"
	"math"

	"gylebook/attenuation/journal"
)

// restful is the fall [points a day] below which a batch is taken to stand: the
// resolution of two readings a day apart (half a division each, rectangular) hides
// less.
const restful = 1.0

// unfinished computes what the batch has still to go: what its peers gained from
// the same hours on or, where they stood by then, from the same pace on.
func (q *question) unfinished() Hypothesis {
	h := Hypothesis{Name: Unfinished, Cost: Day, Check: "read it again tomorrow with the same instrument"}
	list := q.Batch.Counting()
	if q.at.Course {
		h.nothing()
		h.Check, h.Evidence = "", "it ended as its peers did"
		return h
	}
	if len(list) < 2 {
		h.Why = "one reading tells of no fall"
	}
	fall, moving := q.lastFall(list)
	rest, sd := middle(q.rests())
	young := q.Batch.Open() && q.at.Hours > 0 && q.at.Hours < rest+sd && rest > 0
	if !moving && !young {
		if h.Why != "" {
			return h
		}
		h.nothing()
		h.Check = ""
		h.Evidence = fmt.Sprintf("its last fall is %s points a day: it stands", one(fall))
		return h
	}
	if q.at.Hours <= 0 {
		h.Why = "the time of pitching is not known"
		return h
	}
	values := q.peersAt(q.at.Hours)
	if len(values) < fewest {
		h.Why = lack(len(values), fewest, "peer with a course", "peers with a course")
		return h
	}
	h.Why = ""
	then, spread := middle(values)
	gain, how := then-q.at.Median, fmt.Sprintf("the peers stood at %s %% after the same %s h", one(then), asHours(q.at.Hours))
	if moving {
		h.Evidence = fmt.Sprintf("its last fall is %s points a day", one(fall))
		if left, n := q.leftAtPace(fall); gain > -courseFloor && n >= fewest && -left < gain {
			gain, how = -left, fmt.Sprintf("%d peers that fell so fast for the last time had %s points to go", n, one(left))
		}
	}
	h.explained(min(gain, 0), quadrature(2*q.at.own, medianDoubt(max(spread, courseFloor), len(values))))
	h.Evidence = sentences(h.Evidence, how)
	return h
}

// lastFall is the fall [points a day] to the reading in question, and whether that
// is more than standing still.
func (q *question) lastFall(list []*journal.Value) (perDay float64, moving bool) {
	if len(list) < 2 {
		return 0, false
	}
	perDay, ok := q.Batch.Fall24h()
	if !ok {
		return 0, false
	}
	fell := points(list[len(list)-2].SG, list[len(list)-1].SG)
	return perDay, perDay > restful && fell > restful
}

// rests are the hours of the peers to their last fall.
func (q *question) rests() []float64 {
	var list []float64
	for _, p := range q.peers {
		if p.course.rest > 0 {
			list = append(list, p.course.rest)
		}
	}
	return list
}

// leftAtPace is the median attenuation that peers gained after they fell this fast
// for the last time.
func (q *question) leftAtPace(perDay float64) (left float64, n int) {
	var list []float64
	for _, p := range q.peers {
		values := p.view.Counting()
		for k := len(values) - 1; k > 0; k-- {
			a, b := values[k-1], values[k]
			days := b.Source.TakenAt.Sub(a.Source.TakenAt).Hours() / 24
			if b.Attenuation != nil && days > 0 && a.OE == b.OE && points(a.SG, b.SG)/days >= perDay {
				list = append(list, p.member.Apparent-b.Attenuation.Apparent)
				break
			}
		}
	}
	median, _ := middle(list)
	return math.Max(median, 0), len(list)
}
