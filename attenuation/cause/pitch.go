package cause

import (
	"fmt"
	"math"

	"gonum.org/v1/gonum/stat"
)

// firstFall is the apparent attenuation [%] that counts as the first fall: 2 points
// of an original gravity of 40.
const firstFall = 5.0

// part is one of the two sides of a cause.
type part struct {
	points, u float64
	says      string
	known     bool
}

// significant reports whether the part explains something of a difference, in its
// direction and beyond its uncertainty.
func (p part) significant(difference float64) bool {
	return p.known && p.points*difference > 0 && math.Abs(p.points) > p.u
}

// pitch computes what the generation of the yeast would explain, by the slope over
// the peers, and what a late start would. The larger one stands for the cause.
func (q *question) pitch() Hypothesis {
	h := Hypothesis{Name: Pitch, Cost: Day, Check: "count and stain the yeast of the crop, and look at the amount pitched"}
	generation, lag := q.generation(), q.lag()
	h.Evidence = sentences(generation.says, lag.says)
	if !generation.known && !lag.known {
		h.Why, h.Evidence = h.Evidence, ""
		return h
	}
	chosen := generation
	switch d := q.at.Difference; {
	case !generation.known,
		lag.significant(d) && !(generation.significant(d) && math.Abs(generation.points) >= math.Abs(lag.points)):
		chosen = lag
	}
	h.explained(chosen.points, chosen.u)
	return h
}

// generation follows the slope of attenuation on generation over the peers.
func (q *question) generation() part {
	own := q.Batch.Record.Batch.Generation
	if own == 0 {
		return part{says: "the generation of its yeast is not known"}
	}
	var xs, ys []float64
	different := make(map[float64]bool)
	for _, p := range q.peers {
		y, ok := p.member.Apparent, true
		if q.at.Course {
			y, ok = p.course.at(q.at.Hours)
		}
		if g := float64(p.view.Record.Batch.Generation); g > 0 && ok {
			xs, ys = append(xs, g), append(ys, y)
			different[g] = true
		}
	}
	if len(xs) < fewest || len(different) < 2 {
		return part{says: fmt.Sprintf("generation %d; no verdict, %s in %s", own,
			counted(len(xs), "peer with a generation", "peers with a generation"), counted(len(different), "generation", "generations"))}
	}
	a, b := stat.LinearRegression(xs, ys, nil, false)
	meanX, varX := stat.MeanVariance(xs, nil)
	rest := 0.0
	for i, x := range xs {
		e := ys[i] - a - b*x
		rest += e * e
	}
	n := len(xs)
	// The slope cannot be surer than the readings of the peers are.
	sd := max(math.Sqrt(rest/float64(n-2)), q.at.own)
	uSlope := max(2, student(n-2)) * sd / math.Sqrt(varX*float64(n-1))
	away := float64(own) - meanX
	return part{
		points: b * away, u: uSlope * math.Abs(away), known: finite(b, uSlope),
		says: fmt.Sprintf("generation %d, the peers' slope is %s ± %s points a generation (n %d)", own, signed(b), one(uSlope), n),
	}
}

// lag holds the hours to the first fall against those of the peers, beyond what
// the temperature makes.
func (q *question) lag() part {
	own, between, ok := q.own.crossing(firstFall)
	if !ok || q.at.Hours <= 0 || q.Batch.Pitched.IsZero() {
		return part{says: "the time to the first fall is not known"}
	}
	var list []float64
	for _, p := range q.peers {
		if h, _, ok := p.course.crossing(firstFall); ok {
			list = append(list, h)
		}
	}
	if len(list) < fewest {
		return part{says: lack(len(list), fewest, "peer with a first fall", "peers with a first fall")}
	}
	median, sd := middle(list)
	usual := median
	if mine, peers, _, why := q.warmth(); why == "" {
		usual *= math.Pow(q10, (peers-mine)/10)
	}
	// Where between two readings it fell is not known: rectangular, k = 2.
	u := quadrature(between/math.Sqrt(3), medianDoubt(sd, len(list)))
	late := own - usual
	e, ok := q.peersMove(q.at.Hours, q.at.Hours-late)
	a, okA := q.peersMove(q.at.Hours, q.at.Hours-late-u)
	b, okB := q.peersMove(q.at.Hours, q.at.Hours-late+u)
	return part{
		points: e, u: quadrature(q.at.own, max(math.Abs(a-e), math.Abs(b-e))), known: ok && okA && okB,
		says: fmt.Sprintf("first fall after %s h, at its temperature %s h are usual", asHours(own), asHours(usual)),
	}
}
