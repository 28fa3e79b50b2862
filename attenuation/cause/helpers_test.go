package cause_test

import (
	"fmt"
	"math"
	"testing"

	"gylebook/attenuation/cause"
	"gylebook/attenuation/journal"
)

func without(views []journal.View, id string) []journal.View {
	var list []journal.View
	for _, v := range views {
		if v.Record.Batch.ID != id {
			list = append(list, v)
		}
	}
	return list
}

// firsts are the names at rank 1.
func firsts(r cause.Report) []string {
	var list []string
	for _, h := range r.Hypotheses {
		if h.Rank == 1 {
			list = append(list, h.Name)
		}
	}
	return list
}

func beside(r cause.Report) string {
	if r.Comparison == nil {
		return ""
	}
	c := r.Comparison
	return fmt.Sprintf("; %.1f at %.0f h, %d peers %.1f, off by %.1f ± %.1f, limit %.1f", c.Apparent, c.Hours, c.Peers, c.Median, c.Difference, c.U, c.Limit)
}

func shown(h cause.Hypothesis) string {
	explains := h.Why
	if h.Explains != nil {
		explains = fmt.Sprintf("%+.2f", *h.Explains)
	}
	if h.U != nil {
		explains += fmt.Sprintf(" ± %.2f", *h.U)
	}
	return fmt.Sprintf("%d %s: %s; %s", h.Rank, h.Name, explains, h.Evidence)
}

// checkFinite demands that no figure is NaN or infinite and that every hypothesis
// either explains or says why not.
func checkFinite(t testing.TB, r cause.Report) {
	t.Helper()
	fine := func(p *float64) bool { return p == nil || !math.IsNaN(*p) && !math.IsInf(*p, 0) }
	if c := r.Comparison; c != nil {
		for _, x := range []float64{c.Apparent, c.Hours, c.Median, c.Difference, c.U, c.Limit} {
			if !fine(&x) {
				t.Errorf("comparison %+v", *c)
			}
		}
	}
	if len(r.Hypotheses) != 7 {
		t.Errorf("%d hypotheses, wanted 7", len(r.Hypotheses))
	}
	for _, h := range r.Hypotheses {
		if !fine(h.Explains) || !fine(h.U) || !fine(h.Share) {
			t.Errorf("%s: %+v", h.Name, h)
		}
		if (h.Explains == nil) != (h.Why != "") {
			t.Errorf("%s: explains %v, why %q", h.Name, h.Explains, h.Why)
		}
		if h.U != nil && *h.U < 0 {
			t.Errorf("%s: uncertainty %v", h.Name, *h.U)
		}
	}
}
