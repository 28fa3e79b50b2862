package cause

import (
	"fmt"
	"math"
)

const (
	// A fermentation takes about twice as long 10 °C colder, between 1.6 and 2.5
	// times (common practice, no source).
	q10, q10Least, q10Most = 2.0, 1.6, 2.5

	proxyDoubt = 1.5 // °C, standard uncertainty of a mean of samples as that of the tank (judged)
)

// temperature computes what the pace of a colder or warmer tank would explain: the
// peers' course, read at the hours that the batch's would be at their temperature.
// It slows, it does not stop, so at the end it explains next to nothing.
func (q *question) temperature() Hypothesis {
	h := Hypothesis{Name: Temperature, Cost: Day, Check: "log the temperature of the tank for a day, beside that of the samples"}
	own, peers, u, why := q.warmth()
	if why != "" {
		h.Why = why
		return h
	}
	colder := peers - own
	effect := func(colder, base float64) (float64, bool) {
		return q.peersMove(q.at.Hours, q.at.Hours/math.Pow(base, colder/10))
	}
	e, ok := effect(colder, q10)
	if !ok || q.at.Hours <= 0 {
		h.Why = "too few peers with a time of pitching"
		return h
	}
	spread := func(colderA, baseA, colderB, baseB float64) float64 {
		a, _ := effect(colderA, baseA)
		b, _ := effect(colderB, baseB)
		return max(math.Abs(a-e), math.Abs(b-e))
	}
	h.explained(e, quadrature(q.at.own, spread(colder-u, q10, colder+u, q10), spread(colder, q10Least, colder, q10Most)))
	h.Evidence = fmt.Sprintf("samples, a proxy for the tank, of %s °C while it fell, those of the peers %s °C; about %s times as long to the same attenuation, slower and not stuck",
		one(own), one(peers), ratio(math.Pow(q10, colder/10)))
	return h
}

// warmth returns the mean sample temperature of the batch and the median of the
// peers', with the expanded uncertainty of the difference.
func (q *question) warmth() (own, peers, u float64, why string) {
	var list []float64
	for _, p := range q.peers {
		if p.course.temps > 0 {
			list = append(list, p.course.temp)
		}
	}
	if q.own.temps == 0 {
		return 0, 0, 0, "no sample temperature while it fell"
	}
	if len(list) < fewest {
		return 0, 0, 0, lack(len(list), fewest, "peer with sample temperatures", "peers with sample temperatures")
	}
	median, sd := middle(list)
	return q.own.temp, median, quadrature(2*proxyDoubt, medianDoubt(sd, len(list))), ""
}
