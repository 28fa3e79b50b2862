package main

import (
	"math"
	"slices"

	"gylebook/attenuation/curve"

	"gonum.org/v1/gonum/stat"
)

// guess is a forecast of one method. A method without an interval has none.
type guess struct {
	fg, hours float64
	fgIn      *curve.Interval
	hoursIn   *curve.Interval
	draws     []float64 // of the final gravity
}

// row is the score of one method after k readings.
type row struct {
	Method    string   `json:"method"`
	K         int      `json:"k"` // 0: the mean over all k
	N         int      `json:"n"`
	FGMAE     *float64 `json:"fg_mae_points"`
	FGCover   *float64 `json:"fg_coverage90"`
	CRPS      *float64 `json:"fg_crps"`
	TimeMAE   *float64 `json:"time_mae_h"`
	TimeCover *float64 `json:"time_coverage90"`
}

// tally sums the scores of one method and k.
type tally struct {
	n, fgWith, timeWith           int
	fg, hours, crps, fgIn, timeIn float64
}

func (t *tally) add(g guess, want truth) {
	t.n++
	t.fg += math.Abs(g.fg - want.fg)
	t.hours += math.Abs(g.hours - want.end)
	draws := g.draws
	if len(draws) == 0 {
		draws = []float64{g.fg}
	}
	t.crps += curve.Score(draws, want.fg)
	if g.fgIn != nil {
		t.fgWith++
		t.fgIn += within(*g.fgIn, want.fg)
	}
	if g.hoursIn != nil {
		t.timeWith++
		t.timeIn += within(*g.hoursIn, want.end)
	}
}

func within(i curve.Interval, x float64) float64 {
	if x >= i.Lo && x <= i.Hi {
		return 1
	}
	return 0
}

func (t tally) row(method string, k int) row {
	return row{
		method, k, t.n,
		ratio(t.fg, t.n), ratio(t.fgIn, t.fgWith), ratio(t.crps, t.n), ratio(t.hours, t.n), ratio(t.timeIn, t.timeWith),
	}
}

func ratio(sum float64, n int) *float64 {
	if n == 0 {
		return nil
	}
	x := sum / float64(n)
	return &x
}

// methods in the order of the table.
var methods = []string{"ours", "last", "history-mean", "logistic-ls"}

// settings of a run.
type settings struct {
	ks      []int
	history int
	seed    uint64
	seeds   int
	u       float64
}

// finished is a course with its truth, thinned, and the fit that it gives to
// the history of others.
type finished struct {
	course
	truth
	fit curve.Fitted
}

// finishedOf keeps the courses that have an end.
func finishedOf(cs []course, seed uint64, u float64) []finished {
	var out []finished
	for _, c := range cs {
		c = c.thinned(seed)
		t, ok := c.truth()
		if !ok {
			continue
		}
		f := finished{course: c, truth: t}
		cold := curve.NewPrior(c.kind, nil)
		fit, err := curve.FitFinished(f.batch(len(f.hours), u), t.fg, u, cold, cold.Options())
		if err != nil {
			continue // fewer than three readings left
		}
		f.fit = fit
		out = append(out, f)
	}
	return out
}

// historyOf draws other finished courses of the class; nil, false where there
// are fewer than wanted, since a score with less history is another score.
func historyOf(all []finished, i, want int, seed uint64) ([]finished, bool) {
	var others []finished
	for j, o := range all {
		if j != i && o.class == all[i].class {
			others = append(others, o)
		}
	}
	if len(others) < want {
		return nil, false
	}
	all[i].rng(seed+1<<32).Shuffle(len(others), func(a, b int) { others[a], others[b] = others[b], others[a] })
	return others[:want], true
}

// scores runs every method on every course: it sees the first k readings and is
// scored if the course was then more than 2 points above its end.
func scores(cs []course, s settings) ([]row, error) {
	tallies := make(map[string]map[int]*tally)
	for _, m := range methods {
		tallies[m] = make(map[int]*tally)
		for _, k := range s.ks {
			tallies[m][k] = &tally{}
		}
	}
	for seed := s.seed; seed < s.seed+uint64(s.seeds); seed++ {
		all := finishedOf(cs, seed, s.u)
		for i, f := range all {
			past, ok := historyOf(all, i, s.history, seed)
			if !ok {
				continue
			}
			for _, k := range s.ks {
				if k > len(f.hours) || f.points[k-1] <= f.fg+nearEnd {
					continue
				}
				for _, m := range methods {
					g, err := guessBy(m, f, past, k, s.u)
					if err != nil {
						return nil, err
					}
					tallies[m][k].add(g, f.truth)
				}
			}
		}
	}
	var rows []row
	for _, m := range methods {
		var each []row
		for _, k := range s.ks {
			each = append(each, tallies[m][k].row(m, k))
		}
		rows = append(rows, each...)
		rows = append(rows, meanOf(m, each))
	}
	return rows, nil
}

// meanOf is the plain mean over k; its k is 0.
func meanOf(method string, each []row) row {
	m := row{Method: method}
	over := func(of func(row) *float64) *float64 {
		var xs []float64
		for _, r := range each {
			if x := of(r); x != nil {
				xs = append(xs, *x)
			}
		}
		return mean(xs)
	}
	for _, r := range each {
		m.N += r.N
	}
	m.FGMAE = over(func(r row) *float64 { return r.FGMAE })
	m.FGCover = over(func(r row) *float64 { return r.FGCover })
	m.CRPS = over(func(r row) *float64 { return r.CRPS })
	m.TimeMAE = over(func(r row) *float64 { return r.TimeMAE })
	m.TimeCover = over(func(r row) *float64 { return r.TimeCover })
	return m
}

// prior of a course with its history.
func prior(f finished, past []finished) curve.Prior {
	fits := make([]curve.Fitted, 0, len(past))
	for _, p := range past {
		fits = append(fits, p.fit)
	}
	return curve.NewPrior(f.kind, slices.Clip(fits))
}

// mean is nil for nothing.
func mean(xs []float64) *float64 {
	if len(xs) == 0 {
		return nil
	}
	x := stat.Mean(xs, nil)
	return &x
}

// middle is the median, nil for nothing.
func middle(xs []float64) *float64 {
	if len(xs) == 0 {
		return nil
	}
	sorted := slices.Sorted(slices.Values(xs))
	x := stat.Quantile(0.5, stat.Empirical, sorted, nil)
	return &x
}
