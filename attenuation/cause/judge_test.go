package cause_test

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
	"pgregory.net/rapid"

	"gylebook/attenuation/cause"
	"gylebook/attenuation/journal"
)

// summary is a report without the parts that hold the journal.
func summary(r cause.Report) []string {
	list := []string{r.Verdict, beside(r)}
	for _, h := range r.Hypotheses {
		list = append(list, shown(h))
	}
	return list
}

func TestFewPeers(t *testing.T) {
	for n := range 3 {
		m := batch("B")
		m.end = 66
		r := cause.Judge(caseOf(t, m.record(t), usual(nil)[:n], nil))
		checkFinite(t, r)
		if r.Comparison != nil || !strings.HasPrefix(r.Verdict, "cannot be judged: ") || !strings.Contains(r.Why, "wanted 3") || len(firsts(r)) > 0 {
			t.Errorf("%d peers: %s", n, r.Verdict)
		}
	}
	m := batch("B")
	m.end = 66
	if r := cause.Judge(caseOf(t, m.record(t), usual(nil)[:3], nil)); r.Comparison == nil || r.Comparison.Peers != 3 {
		t.Errorf("3 peers: %s", r.Verdict)
	}
}

func TestCannotBeJudged(t *testing.T) {
	m := batch("B")
	tests := map[string]struct {
		edit func(rec *journal.Record)
		why  string
	}{
		"no original gravity": {func(rec *journal.Record) { rec.OGs = nil }, "original gravity not known"},
		"no reading":          {func(rec *journal.Record) { rec.Readings = nil }, "no reading that counts"},
		"void readings": {func(rec *journal.Record) {
			for k := range rec.Readings {
				rec.Readings[k].Void = true
			}
		}, "no reading that counts"},
	}
	for name, tt := range tests {
		rec := m.record(t)
		tt.edit(rec)
		r := cause.Judge(caseOf(t, rec, usual(nil), nil))
		checkFinite(t, r)
		if r.Why != tt.why || r.Comparison != nil || len(r.Checks()) > 0 {
			t.Errorf("%s: %q", name, r.Why)
		}
	}
	if r := cause.Judge(cause.Case{}); r.Verdict != "cannot be judged: no batch" {
		t.Errorf("no batch: %q", r.Verdict)
	}
}

// The batch itself and open batches are no peers.
func TestWhoIsAPeer(t *testing.T) {
	m := batch("B")
	rec := m.record(t)
	open := batch("O")
	open.open = true
	r := cause.Judge(caseOf(t, rec, append(usual(nil)[:4], m, open), nil))
	if r.Comparison == nil || r.Comparison.Peers != 4 {
		t.Errorf("%s%s, wanted 4 peers", r.Verdict, beside(r))
	}
}

// Two causes that would both explain it share the first rank: an instrument found
// 3 points low, and a limit that lies as much higher than those of the peers.
func TestEqualRank(t *testing.T) {
	m := batch("B")
	m.end, m.limit, m.instrument = 87, 88, "H2"
	book := journal.NewBook([]*journal.InstrumentRecord{glass("H2", "0.003")})
	r := cause.Judge(caseOf(t, m.record(t), usual(func(_ int, m *made) { m.limit = 81 }), book))
	checkFinite(t, r)
	first := firsts(r)
	slices.Sort(first)
	if diff := cmp.Diff([]string{cause.Instrument, cause.Limit}, first); diff != "" || !strings.HasPrefix(r.Verdict, "the data cannot tell apart: ") {
		t.Errorf("%s: %s", r.Verdict, diff)
	}
	// The cheaper check comes first.
	checks := r.Checks()
	if !slices.IsSortedFunc(checks, func(a, b cause.Hypothesis) int { return int(a.Cost - b.Cost) }) || checks[0].Name != cause.Instrument {
		t.Errorf("checks begin with %s", checks[0].Name)
	}
}

// An overdue check alone is said, and is no verdict.
func TestOverdue(t *testing.T) {
	m := batch("B")
	m.end, m.instrument = 66, "H2"
	h := glass("H2")
	h.Instrument.Since = pitched.AddDate(-2, 0, 0)
	h.Checks[0].Body.At = h.Instrument.Since
	r := cause.Judge(caseOf(t, m.record(t), usual(nil), journal.NewBook([]*journal.InstrumentRecord{h})))
	k := slices.IndexFunc(r.Hypotheses, func(h cause.Hypothesis) bool { return h.Name == cause.Instrument })
	if one := r.Hypotheses[k]; one.Explains != nil || one.Rank != 0 || !strings.Contains(one.Evidence, "last checked on 2024-05-04") || one.Cost != cause.Minutes {
		t.Errorf("%s", shown(one))
	}
}

// An offset in both gravities moves the attenuation less than one in the present
// gravity alone.
func TestOffsetInBothGravities(t *testing.T) {
	explains := func(og string) float64 {
		m := batch("B")
		m.instrument, m.low = "H2", 3
		rec := m.record(t)
		if og != "" {
			rec.OGs[0].Body = journal.OG{
				Batch: "B", At: pitched, Instrument: og, Gravity: journal.Typed{Text: "1.0450", Scale: "sg"},
				Temp: journal.TypedTemp{Text: "20", Unit: "C"},
			}
		}
		book := journal.NewBook([]*journal.InstrumentRecord{glass("H2", "0.003")})
		r := cause.Judge(caseOf(t, rec, usual(nil), book))
		for _, h := range r.Hypotheses {
			if h.Name == cause.Instrument && h.Explains != nil {
				return *h.Explains
			}
		}
		t.Fatal("not judged")
		return 0
	}
	alone, both := explains(""), explains("H2")
	// SG 1.0480 is 11.91 °P, 80 % of it leaves 2.38 °P, SG 1.0093. 3 points lower
	// they are 11.19 and 1.61 °P: 100·(11.91-1.61)/11.91 = 86.5 % with the present
	// gravity alone low, 100·(11.19-1.61)/11.19 = 85.6 % with both.
	if math.Abs(alone-6.5) > 0.15 || math.Abs(both-5.6) > 0.15 {
		t.Errorf("alone %.2f, both %.2f; wanted 6.5 and 5.6", alone, both)
	}
}

// Whatever the batches are, every figure is finite, and the order of the peers does
// not show.
func TestProperties(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		draw := func(id string) made {
			m := batch(id)
			m.og = fmt.Sprintf("1.%04d", rapid.IntRange(200, 1000).Draw(rt, "og"))
			m.end = rapid.Float64Range(20, 104).Draw(rt, "end")
			m.slow = rapid.Float64Range(0.3, 4).Draw(rt, "slow")
			m.late = rapid.Float64Range(0, 90).Draw(rt, "late")
			m.temp = rapid.Float64Range(5, 35).Draw(rt, "temp")
			m.generation = rapid.IntRange(0, 9).Draw(rt, "generation")
			m.until = rapid.SampledFrom(hours).Draw(rt, "until")
			m.open = rapid.Bool().Draw(rt, "open")
			m.instrument = rapid.SampledFrom([]string{"", "H1", "H2"}).Draw(rt, "instrument")
			if rapid.Bool().Draw(rt, "limited") {
				m.limit = rapid.Float64Range(20, 104).Draw(rt, "limit")
			}
			return m
		}
		target := draw("B").record(t)
		var peers []made
		for k := range rapid.IntRange(0, 6).Draw(rt, "peers") {
			peers = append(peers, draw(fmt.Sprintf("P%d", k)))
		}
		book := journal.NewBook([]*journal.InstrumentRecord{glass("H1"), glass("H2", "0.003")})
		c := caseOf(t, target, peers, book)
		r := cause.Judge(c)
		checkFinite(t, r)
		slices.Reverse(c.Peers)
		slices.Reverse(c.Others)
		if diff := cmp.Diff(summary(r), summary(cause.Judge(c))); diff != "" {
			rt.Fatal(diff)
		}
		if t.Failed() {
			rt.FailNow()
		}
	})
}
