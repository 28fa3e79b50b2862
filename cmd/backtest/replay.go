package main

import (
	"fmt"
	"io"
	"math"
	"text/tabwriter"

	"gylebook/attenuation/curve"
)

// replayRow is how a rule of the end did on courses read as they came.
type replayRow struct {
	Rule      string   `json:"rule"`
	Courses   int      `json:"courses"`
	Fired     *float64 `json:"fired"`     // share of the courses
	Premature *float64 `json:"premature"` // share of the calls with more than 2 points still to fall
	Delay     *float64 `json:"delay_h"`   // mean of the calls that were not, after 2 points above the end
	Middle    *float64 `json:"median_delay_h"`
}

// rules in the order of the table.
var rules = []struct {
	name  string
	fires func(curve.Evidence) bool
}{
	{"unchanged 48 h", func(e curve.Evidence) bool { return e.Unchanged }},
	{"curve alone", func(e curve.Evidence) bool { return e.LeftKnown && e.Left < 0.10 }},
	{"probably terminal", func(e curve.Evidence) bool { return e.State == curve.ProbablyTerminal || e.State == curve.Terminal }},
	{"terminal", func(e curve.Evidence) bool { return e.State == curve.Terminal }},
	{"stalled", func(e curve.Evidence) bool { return e.State == curve.Stalled }},
}

// replay reads every course from its third reading on and notes when each rule
// first fires.
func replay(cs []course, s settings) ([]replayRow, error) {
	courses := 0
	fired := make([]int, len(rules))
	premature := make([]int, len(rules))
	delays := make([][]float64, len(rules))
	for seed := s.seed; seed < s.seed+uint64(s.seeds); seed++ {
		all := finishedOf(cs, seed, s.u)
		for i, f := range all {
			past, ok := historyOf(all, i, s.history, seed)
			if !ok {
				continue
			}
			courses++
			calls, err := firstCalls(f, prior(f, past), s.u)
			if err != nil {
				return nil, err
			}
			for r, k := range calls {
				if k < 0 {
					continue
				}
				fired[r]++
				if f.points[k] > f.fg+nearEnd {
					premature[r]++
				} else {
					delays[r] = append(delays[r], math.Max(f.hours[k]-f.end, 0))
				}
			}
		}
	}
	rows := make([]replayRow, len(rules))
	for r, rule := range rules {
		rows[r] = replayRow{
			Rule: rule.name, Courses: courses, Fired: ratio(float64(fired[r]), courses),
			Premature: ratio(float64(premature[r]), fired[r]), Delay: mean(delays[r]), Middle: middle(delays[r]),
		}
	}
	return rows, nil
}

// firstCalls gives for every rule the reading at which it first fires, -1 where
// it never does.
func firstCalls(f finished, p curve.Prior, u float64) ([]int, error) {
	calls := make([]int, len(rules))
	for r := range calls {
		calls[r] = -1
	}
	for k := 2; k < len(f.hours); k++ {
		e, err := p.Evidence(f.batch(k+1, u), f.hours[k], curve.Watch{})
		if err != nil {
			return nil, fmt.Errorf("%s at reading %d: %w", f.name, k+1, err)
		}
		open := false
		for r, rule := range rules {
			if calls[r] < 0 && rule.fires(e) {
				calls[r] = k
			}
			open = open || calls[r] < 0 && rule.name != "stalled"
		}
		if !open || f.hours[k] > f.end+400 {
			break // nothing more to learn from a long plateau
		}
	}
	return calls, nil
}

func writeReplay(w io.Writer, rows []replayRow, asJSON bool) error {
	if asJSON {
		return writeJSON(w, rows)
	}
	t := tabwriter.NewWriter(w, 0, 0, 2, ' ', tabwriter.AlignRight)
	fmt.Fprintln(t, "rule\tcourses\tfired\tpremature\tmean delay h\tmedian delay h\t")
	for _, r := range rows {
		fmt.Fprintf(t, "%s\t%d\t%s\t%s\t%s\t%s\t\n", r.Rule, r.Courses,
			cell(r.Fired, 2), cell(r.Premature, 2), cell(r.Delay, 1), cell(r.Middle, 1))
	}
	return t.Flush()
}
