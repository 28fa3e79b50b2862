package cause

import (
	"cmp"
	"math"
	"slices"

	"gonum.org/v1/gonum/stat/distuv"

	"gylebook/attenuation"
	"gylebook/attenuation/journal"
	"gylebook/attenuation/season"
	"gylebook/gravity"
)

const (
	fewest = 3 // peers below which nothing is judged

	// The median of a normal sample has π/2 times the variance of its mean.
	medianVariance = math.Pi / 2
	madToSD        = 1.4826 // of a normal distribution

	// courseWide widens the limit along the course, where many readings are looked
	// at, and courseFloor is the least spread there [% points]: a few hours from
	// pitching to the first cells at work make it (judged).
	courseWide  = 1.5
	courseFloor = 3.0

	resolution = 0.0005 / 1.7320508075688772 // SG, half a division, rectangular
)

// question is a case made ready: the peers in the order of their ids, so that
// sums do not depend on the order they came in.
type question struct {
	Case
	at    Comparison
	own   course
	peers []peer
}

// peer is a finished batch of the same product and yeast.
type peer struct {
	view   journal.View
	member Member
	course course
}

func ready(c Case) question {
	if c.Book == nil {
		c.Book = journal.NewBook(nil)
	}
	q := question{Case: c, own: courseOf(c.Batch)}
	for _, v := range c.Peers {
		m, ok := MemberOf(v)
		if ok && m.Batch != c.Batch.Record.Batch.ID {
			q.peers = append(q.peers, peer{v, m, courseOf(v)})
		}
	}
	slices.SortStableFunc(q.peers, func(a, b peer) int { return cmp.Compare(a.member.Batch, b.member.Batch) })
	q.Others = slices.Clone(c.Others)
	slices.SortStableFunc(q.Others, func(a, b Member) int { return cmp.Compare(a.Batch, b.Batch) })
	return q
}

// compare fills the comparison, or says why there is none.
func (q *question) compare() string {
	last := q.Batch.Last()
	switch {
	case q.Batch.OG == nil:
		return "original gravity not known"
	case last == nil:
		return "no reading that counts"
	}
	one := Comparison{Value: last, Peers: len(q.peers)}
	og := last.OG
	if last.Attenuation != nil {
		one.Apparent = last.Attenuation.Apparent
	} else {
		og, one.Entered = q.Batch.OG.SG, true
		a, ok := apparent(og, last.SG)
		if !ok {
			return cmp.Or(last.Why, "no attenuation can be given")
		}
		one.Apparent = a
	}
	one.Hours, _ = q.Batch.Elapsed(last.Source.TakenAt)
	one.own = ownDoubt(og, last)
	q.at = one
	if len(q.peers) < fewest {
		return lack(len(q.peers), fewest, "finished batch of this product and yeast", "finished batches of this product and yeast")
	}
	q.at.beside(q.ends(), one.own)
	if !q.at.StandsOut() && !one.Entered {
		q.alongCourse()
	}
	return ""
}

// beside compares with values of the peers; their spread is at least floor.
func (c *Comparison) beside(values []float64, floor float64) {
	n := float64(len(values))
	c.Median, c.spread = middle(values)
	c.spread = max(c.spread, floor)
	c.Difference = c.Apparent - c.Median
	t := student(len(values) - 1)
	c.U = max(2, t) * math.Sqrt(c.own*c.own+medianVariance*c.spread*c.spread/n)
	c.Limit = t * c.spread * math.Sqrt(1+medianVariance/n)
}

func (q *question) ends() []float64 {
	list := make([]float64, len(q.peers))
	for i, p := range q.peers {
		list[i] = p.member.Apparent
	}
	return list
}

// alongCourse looks for the widest difference at the same hours after pitching. It
// must show at two readings running, so that no single one makes it.
func (q *question) alongCourse() {
	var before, widest *Comparison
	for _, one := range q.Batch.Counting() {
		h, ok := q.Batch.Elapsed(one.Source.TakenAt)
		if !ok || h <= 0 || one.Attenuation == nil {
			continue
		}
		c := &Comparison{
			Value: one, Hours: h, Apparent: one.Attenuation.Apparent, Peers: len(q.peers), Course: true,
			own: ownDoubt(one.OG, one),
		}
		values := q.peersAt(h)
		if len(values) < fewest {
			continue
		}
		c.Peers = len(values)
		c.beside(values, max(c.own, courseFloor))
		c.Limit *= courseWide
		if before != nil && c.StandsOut() && before.StandsOut() && c.Difference*before.Difference > 0 {
			for _, x := range []*Comparison{before, c} {
				if widest == nil || math.Abs(x.Difference) > math.Abs(widest.Difference) {
					widest = x
				}
			}
		}
		before = c
	}
	if widest != nil {
		q.at = *widest
	}
}

// ownDoubt is the standard uncertainty [% points] that the resolution of both
// gravities leaves in the attenuation. The instrument's own error is left out: it is
// one of the causes.
func ownDoubt(og gravity.SG, one *journal.Value) float64 {
	u := attenuation.ReadingU{Independent: resolution}
	a, err := attenuation.PropagateAttenuation(og, one.SG, gravity.Fits.Default(), u, u)
	if err != nil || !finite(a.Apparent.Standard) {
		return 0
	}
	return a.Apparent.Standard
}

// sgPerPlato serves for uncertainties alone; it is 0.0039 to 0.0041 from 0 to 15 °P.
const sgPerPlato = 0.004

// middle returns the median of values and their robust standard deviation, that
// of a normal distribution with the same median absolute deviation.
func middle(values []float64) (median, sd float64) {
	median = season.SpreadOf(values).Median
	off := make([]float64, len(values))
	for i, x := range values {
		off[i] = math.Abs(x - median)
	}
	return median, madToSD * season.SpreadOf(off).Median
}

// student is the factor of a two-sided 95 % interval with so many degrees of
// freedom.
func student(free int) float64 {
	return distuv.StudentsT{Mu: 0, Sigma: 1, Nu: float64(max(free, 1))}.Quantile(0.975)
}

// medianDoubt is the expanded uncertainty of a median of n values.
func medianDoubt(sd float64, n int) float64 {
	return max(2, student(n-1)) * sd * math.Sqrt(medianVariance/float64(n))
}

func finite(xs ...float64) bool {
	return !slices.ContainsFunc(xs, func(x float64) bool { return math.IsNaN(x) || math.IsInf(x, 0) })
}
