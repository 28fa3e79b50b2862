package cause_test

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"gylebook/attenuation/cause"
	"gylebook/attenuation/journal"
)

// Exactly one cause is planted; it has to come first, alone, and explain the
// difference within its own uncertainty.
func TestPlanted(t *testing.T) {
	h1, fine := glass("H1"), glass("H1", "0.000")
	last := func(rec *journal.Record) *journal.Reading { return &rec.Readings[len(rec.Readings)-1].Body }
	event := func(rec *journal.Record, hours float64, e journal.Event) {
		e.Batch, e.At = rec.Batch.ID, after(hours)
		rec.Events = append(rec.Events, journal.Numbered[journal.Event]{Number: 70, Body: e})
	}
	tests := []struct {
		name   string
		want   string // "" for no rank at all
		low    bool
		course bool
		target func(m *made)
		edit   func(rec *journal.Record)
		peers  func(k int, m *made)
		case_  func(c *cause.Case)
		book   []*journal.InstrumentRecord
		says   string
	}{
		{name: "nothing", says: "nothing stands out"},
		{name: "nothing, read with a sound instrument", target: func(m *made) { m.instrument = "H1" }, book: []*journal.InstrumentRecord{fine}, says: "nothing stands out"},
		{name: "stuck", low: true, target: func(m *made) { m.end = 66 }, says: "nothing that the journal holds"},
		{
			name: "stuck, read with an instrument that was found sound", low: true,
			target: func(m *made) { m.end, m.instrument = 66, "H1" }, book: []*journal.InstrumentRecord{fine}, says: "nothing that the journal holds",
		},
		{
			name: "instrument, a later check found it", want: cause.Instrument,
			target: func(m *made) { m.instrument, m.low = "H2", 3 }, book: []*journal.InstrumentRecord{h1, glass("H2", "0.003")},
			says: "instrument offset would explain",
		},
		{
			name: "instrument, reading high", want: cause.Instrument, low: true,
			target: func(m *made) { m.instrument, m.low = "H2", -3 }, book: []*journal.InstrumentRecord{h1, glass("H2", "-0.003")},
		},
		{
			name: "instrument, other batches are shifted alike", want: cause.Instrument,
			target: func(m *made) { m.instrument, m.low = "H2", 3 }, book: []*journal.InstrumentRecord{h1, glass("H2")},
			case_: func(c *cause.Case) {
				for k := range 12 {
					m := batch(fmt.Sprintf("N%d", k))
					m.end = 76 + 0.2*float64(k%3)
					if k%3 == 0 {
						m.instrument, m.low = "H2", 3
					}
					rec := m.record(t)
					rec.Batch.Product = "Night Porter"
					other, ok := cause.MemberOf(journal.Derive(rec, c.Book))
					if !ok {
						t.Fatal("no end")
					}
					c.Others = append(c.Others, other)
				}
			},
		},
		{
			name: "entry, a main mark", want: cause.Entry, low: true,
			edit: func(rec *journal.Record) { last(rec).Gravity.Text = "1.0198" },
		},
		{
			name: "entry, °P for points", want: cause.Entry, low: true,
			edit: func(rec *journal.Record) { last(rec).Gravity = journal.Typed{Text: "9.8", Scale: "plato"} },
			says: "entry error",
		},
		{
			// 4.4 °C, typed as 40 °C.
			name: "entry, temperature unit", want: cause.Entry, low: true,
			edit: func(rec *journal.Record) {
				r := mark(t, batch("B").sg(t, 80), 40.0/9, journal.Derive(rec, nil).OG.Extract)
				last(rec).Gravity.Text, last(rec).Temp = fmt.Sprintf("%.4f", r), journal.TypedTemp{Text: "40C", Unit: "C"}
			},
		},
		{
			name: "entry, tanks swapped", want: cause.Entry, low: true,
			edit: func(rec *journal.Record) { last(rec).Gravity.Text = "1.0251" },
			case_: func(c *cause.Case) {
				m := batch("X1")
				m.open = true
				rec := m.record(t)
				rec.Readings = rec.Readings[8:]
				for k, text := range []string{"1.0320", "1.0270", "1.0098"} {
					rec.Readings[k].Body.Gravity.Text = text
				}
				c.Tanks = append(c.Tanks, journal.Derive(rec, c.Book))
			},
		},
		{
			name: "entry, original gravity", want: cause.Entry,
			edit: func(rec *journal.Record) { rec.OGs[0].Body.Gravity.Text = "1.0580" },
		},
		{
			name: "limit", want: cause.Limit, low: true,
			target: func(m *made) { m.end, m.limit = 70, 71 }, peers: func(_ int, m *made) { m.limit = 81 },
		},
		{
			// 2 to the power of 0.85 is 1.80.
			name: "temperature", want: cause.Temperature, low: true, course: true,
			target: func(m *made) { m.temp, m.slow = 11.5, 1.80 }, says: "behind on the way, not at the end",
		},
		{
			name: "temperature, warm", want: cause.Temperature, course: true,
			target: func(m *made) { m.temp, m.slow = 30, 0.5 }, says: "ahead on the way",
		},
		{
			// One point a generation: the peers' mean is generation 5, the batch's 14.
			name: "generation", want: cause.Pitch, low: true,
			target: func(m *made) { m.generation, m.end = 14, 80-14+5 },
			peers:  func(k int, m *made) { m.generation, m.end = k+1, m.end-float64(k+1)+5 },
		},
		{
			name: "late start", want: cause.Pitch, low: true, course: true,
			target: func(m *made) { m.late = 36 },
		},
		{
			name: "addition without mass", want: cause.Basis, low: true,
			target: func(m *made) { m.end = 75 }, edit: func(rec *journal.Record) { event(rec, 60, journal.Event{What: journal.Sugar}) },
			says: "cannot be judged for certain: sugar added without mass",
		},
		{
			// 10 points of sugar at 37 h; 1.0480 stands where 1.0580 is meant.
			name: "addition not entered", want: cause.Basis, low: true,
			target: func(m *made) { m.og = "1.0580" },
			edit: func(rec *journal.Record) {
				before := batch("B")
				rec.OGs[0].Body.Gravity.Text = before.og
				for k, h := range hours[:3] {
					rec.Readings[k].Body.Gravity.Text = fmt.Sprintf("%.4f", float64(before.sg(t, before.apparent(h))))
				}
				rec.Readings[3].Body.Gravity.Text = fmt.Sprintf("%.4f", float64(before.sg(t, before.apparent(36)))+0.010)
				rec.Readings[3].Body.TakenAt = after(37)
			},
		},
		{
			name: "not finished", want: cause.Unfinished, low: true,
			target: func(m *made) { m.open, m.until = true, 48 },
		},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			m := batch("B")
			if tt.target != nil {
				tt.target(&m)
			}
			rec := m.record(t)
			if tt.edit != nil {
				tt.edit(rec)
			}
			c := caseOf(t, rec, usual(tt.peers), journal.NewBook(tt.book))
			if tt.case_ != nil {
				tt.case_(&c)
			}
			r := cause.Judge(c)
			checkFinite(t, r)
			var want []string
			if tt.want != "" {
				want = []string{tt.want}
			}
			if first := firsts(r); !slices.Equal(first, want) || !strings.Contains(r.Verdict, tt.says) {
				t.Errorf("first is %q, %s%s", first, r.Verdict, beside(r))
			}
			if t.Failed() {
				for _, h := range r.Hypotheses {
					t.Log(shown(h))
				}
			}
			if r.Comparison == nil {
				t.Fatal(r.Why)
			}
			if tt.want == "" {
				return
			}
			if got := r.Comparison; got.Difference < 0 != tt.low || got.Course != tt.course {
				t.Errorf("difference %v, course %v", got.Difference, got.Course)
			}
			// What is planted is the whole of it: within its own doubt and the peers'.
			if h := r.Hypotheses[0]; h.Explains != nil && h.U != nil && math.Abs(*h.Explains-r.Comparison.Difference) > *h.U+r.Comparison.U {
				t.Errorf("explains %v ± %v of %v", *h.Explains, *h.U, r.Comparison.Difference)
			}
			if checks := r.Checks(); len(checks) == 0 || !slices.ContainsFunc(checks, func(h cause.Hypothesis) bool { return h.Name == tt.want }) {
				t.Errorf("the checks are %v, wanted that of %s among them", checks, tt.want)
			}
		})
	}
}
