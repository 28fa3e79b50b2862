package cause

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"strings"
)

// Judge computes every cause and ranks them by how near what each would explain
// comes to the difference. Causes that explain no more than their own uncertainty,
// or the other way, have no rank; causes that the uncertainties cannot tell apart
// share one. It never fails: what cannot be judged says why.
func Judge(c Case) Report {
	if c.Batch.Record == nil {
		return Report{Why: "no batch", Verdict: "cannot be judged: no batch"}
	}
	q := ready(c)
	r := Report{}
	if r.Why = q.compare(); r.Why != "" {
		r.Hypotheses = q.unjudged(r.Why)
		r.Verdict = "cannot be judged: " + r.Why
		return r
	}
	r.Comparison = &q.at
	r.Hypotheses = []Hypothesis{q.instrument(), q.entry(), q.limit(), q.temperature(), q.pitch(), q.basis(), q.unfinished()}
	q.rank(r.Hypotheses)
	r.Verdict = q.verdict(r.Hypotheses)
	return r
}

// unjudged lists the causes without figures: the basis alone can be told without
// peers.
func (q *question) unjudged(why string) []Hypothesis {
	list := make([]Hypothesis, 0, 7)
	for _, name := range []string{Instrument, Entry, Limit, Temperature, Pitch, Unfinished} {
		list = append(list, Hypothesis{Name: name, Why: why})
	}
	basis := Hypothesis{Name: Basis, Why: why}
	if q.at.Entered {
		basis = q.basis()
		basis.Rank = 1
	}
	list = slices.Insert(list, 5, basis)
	slices.SortStableFunc(list, byRank)
	return list
}

// rank fills share and rank and sorts.
func (q *question) rank(list []Hypothesis) {
	d := q.at.Difference
	stands := q.at.StandsOut()
	for k := range list {
		h := &list[k]
		if h.Explains != nil && stands {
			share := *h.Explains / d
			h.Share = &share
		}
	}
	slices.SortStableFunc(list, func(a, b Hypothesis) int { return cmp.Compare(q.merit(b), q.merit(a)) })
	rank := 0
	var lead *Hypothesis
	for k := range list {
		h := &list[k]
		if q.merit(*h) <= 0 {
			break
		}
		if lead == nil || !q.alike(*lead, *h) {
			rank, lead = k+1, h
		}
		h.Rank = rank
	}
	slices.SortStableFunc(list, byRank)
}

// leastShare of the difference is what a cause must explain to have a rank (judged).
const leastShare = 0.1

// merit is 1 for a cause that explains the difference to the point, and less for
// one that explains too little or too much; 0 without a claim to a rank. A lost
// original extract comes before all: the difference itself rests on it.
func (q *question) merit(h Hypothesis) float64 {
	if h.Name == Basis && q.at.Entered {
		return 2
	}
	if !q.at.StandsOut() || h.Explains == nil || *h.Explains*q.at.Difference <= 0 {
		return 0
	}
	if h.U != nil && math.Abs(*h.Explains) <= *h.U {
		return 0
	}
	share := *h.Explains / q.at.Difference
	switch {
	case share < leastShare:
		return 0
	case share > 1:
		return 1 / share
	}
	return share
}

// alike reports whether the uncertainties cannot tell two causes apart.
func (q *question) alike(a, b Hypothesis) bool {
	if q.at.Entered && (a.Name == Basis || b.Name == Basis) {
		return false
	}
	u := 0.0
	for _, h := range []Hypothesis{a, b} {
		if h.U != nil {
			u = math.Hypot(u, *h.U)
		}
	}
	// Both against the difference: one that explains too much is as far off as one
	// that explains too little.
	off := func(h Hypothesis) float64 { return math.Abs(*h.Explains - q.at.Difference) }
	return math.Abs(off(a)-off(b)) <= u
}

// chance is the part of the limit up to which chance is mentioned.
const chance = 1.25

// byRank puts the ranked first, then those that cannot be judged.
func byRank(a, b Hypothesis) int {
	class := func(h Hypothesis) int {
		switch {
		case h.Rank > 0:
			return h.Rank
		case h.Explains == nil:
			return 100
		}
		return 200
	}
	return cmp.Compare(class(a), class(b))
}

// verdict says it in a sentence that claims no more than the figures.
func (q *question) verdict(list []Hypothesis) string {
	var first []Hypothesis
	for _, h := range list {
		if h.Rank == 1 {
			first = append(first, h)
		}
	}
	switch {
	case q.at.Entered:
		return "cannot be judged for certain: " + q.Batch.Last().Why + "; the original gravity as entered stands for it"
	case !q.at.StandsOut():
		return "nothing stands out"
	case len(first) == 0:
		text := "nothing that the journal holds would explain it"
		if !q.at.Course && math.Abs(q.at.Difference) < chance*q.at.Limit {
			text += "; one batch in twenty lies so far off by chance"
		}
		return text
	case len(first) > 1:
		names := make([]string, len(first))
		for k, h := range first {
			names[k] = h.Name
		}
		return "the data cannot tell apart: " + strings.Join(names, ", ")
	}
	h := first[0]
	size := signed(*h.Explains)
	if h.U != nil {
		size += " ± " + one(*h.U)
	}
	text := fmt.Sprintf("%s would explain %s of the %s points", h.Name, size, signed(q.at.Difference))
	if q.at.Course {
		text += ": behind on the way, not at the end"
		if q.at.Difference > 0 {
			text = strings.Replace(text, "behind", "ahead", 1)
		}
	}
	return text
}

// Checks returns the hypotheses whose check would tell something, the cheapest
// first, then by rank: those that have a rank and those that cannot be judged.
// Where nothing explains a difference the yeast is left, whose state no journal
// holds. When nothing stands out no check is called for.
func (r Report) Checks() []Hypothesis {
	if r.Comparison == nil || !r.Comparison.StandsOut() && !r.Comparison.Entered {
		return nil
	}
	ranked := slices.ContainsFunc(r.Hypotheses, func(h Hypothesis) bool { return h.Rank > 0 })
	var list []Hypothesis
	for _, h := range r.Hypotheses {
		if h.Check != "" && (h.Rank > 0 || h.Explains == nil || !ranked && h.Name == Pitch) {
			list = append(list, h)
		}
	}
	slices.SortStableFunc(list, func(a, b Hypothesis) int { return cmp.Compare(a.Cost, b.Cost) })
	return list
}
