package journal

import (
	"strings"
	"testing"
	"time"

	"gylebook/gravity/method"
)

// judge puts a reading to b as it is now, 48 h after day0 unless told.
func judge(b *builder, r Reading, others ...*builder) ([]method.Note, *Hold) {
	s := Situation{Now: after(48), Target: b.rec, Book: NewBook([]*InstrumentRecord{glass("H1")})}
	for _, o := range others {
		s.Others = append(s.Others, o.rec)
	}
	return Judge(s, r)
}

func code(h *Hold) string {
	if h == nil {
		return ""
	}
	return h.Code
}

func TestJudge(t *testing.T) {
	pitched := after(-1)
	fermenting := func() *builder {
		b := brew("B4", "T4", "1.050", "100").read(0, "1.049", "20").read(24, "1.040", "20")
		b.rec.Batch.Pitched = &pitched
		return b
	}
	tests := []struct {
		name  string
		hours float64
		text  string
		temp  string
		edit  func(b *builder, r *Reading)
		code  string
		final bool
		note  string
		hint  string
	}{
		{name: "falls", hours: 48, text: "1.030", temp: "20"},
		{name: "falls fast, 25 points in a day", hours: 48, text: "1.015", temp: "20"},
		{name: "one point up", hours: 48, text: "1.041", temp: "20"},
		{
			name: "one point up, both warm", hours: 48, text: "1.041", temp: "30",
			edit: func(b *builder, _ *Reading) { b.rec.Readings[1].Body.Temp = celsius("30") },
		},
		{name: "two points up", hours: 48, text: "1.042", temp: "20", code: HoldRise, hint: "event B4 sugar"},
		{
			name: "up after sugar", hours: 48, text: "1.046", temp: "20",
			edit: func(b *builder, _ *Reading) { b.event(30, Event{What: Sugar, MassKg: "2"}) },
		},
		{
			name: "up after sugar without mass", hours: 48, text: "1.046", temp: "20",
			edit: func(b *builder, _ *Reading) { b.event(30, Event{What: Sugar}) },
		},
		{
			name: "water does not raise", hours: 48, text: "1.046", temp: "20", code: HoldRise,
			edit: func(b *builder, _ *Reading) { b.event(30, Event{What: Dilution, MassKg: "2"}) },
		},
		{
			name: "a void addition does not count", hours: 48, text: "1.046", temp: "20", code: HoldRise,
			edit: func(b *builder, _ *Reading) {
				b.event(30, Event{What: Sugar, MassKg: "2"})
				b.rec.Events[0].Void = true
			},
		},
		{
			name: "kept", hours: 48, text: "1.046", temp: "20", note: method.WithReason,
			edit: func(_ *builder, r *Reading) { r.Keep = "foam" },
		},
		{
			name: "over a suspect one", hours: 48, text: "1.046", temp: "20", code: HoldRise,
			edit: func(b *builder, _ *Reading) {
				b.read(26, "1.047", "20")
				b.rec.Readings[2].Body.Keep = "foam"
			},
		},
		{name: "late, between", hours: 12, text: "1.045", temp: "20"},
		{name: "late, under the one after it", hours: 12, text: "1.020", temp: "20", code: HoldRise},
		{name: "not against the original gravity", hours: -0.5, text: "1.050", temp: "20"},
		{name: "above the original gravity", hours: -0.5, text: "1.055", temp: "20", code: HoldAboveOG},
		{
			name: "first reading above the original gravity after priming", hours: -0.5, text: "1.0525", temp: "20",
			edit: func(b *builder, _ *Reading) { b.event(-0.7, Event{What: Priming, MassKg: "1"}) },
		},

		// 10 points under 1.040 in a minute; 43 points in 24 h are 3 + 40, and half a
		// point more is too much.
		{name: "a fall in a minute", hours: 24 + 1./60, text: "1.030", temp: "20", code: HoldFall},
		{name: "a fast day", hours: 48, text: "0.998", temp: "20"},
		{name: "faster than anything", hours: 47.4, text: "0.9955", temp: "20", code: HoldFall},
		{name: "a first reading far under the original gravity", hours: 1, text: "1.010", temp: "20", code: HoldFall, edit: func(b *builder, _ *Reading) { b.rec.Readings = nil }},
		{name: "another value of the minute, far off", hours: 24, text: "1.044", temp: "20", code: HoldSpread},
		{name: "swapped", hours: 48, text: "20", temp: "1.030", code: HoldSwapped, final: true, hint: "type 1.030 20"},

		{name: "future by a minute", hours: 48 + 1./60, text: "1.030", temp: "20"},
		{name: "future", hours: 48.1, text: "1.030", temp: "20", code: HoldFuture, final: true},
		{
			name: "future, kept", hours: 48.1, text: "1.030", temp: "20", code: HoldFuture, final: true,
			edit: func(_ *builder, r *Reading) { r.Keep = "no" },
		},
		{name: "before pitching", hours: -1.1, text: "1.050", temp: "20", code: HoldBeforePitch, final: true, hint: "batch og B4"},
		{
			name: "before the first reading only", hours: -1.1, text: "1.050", temp: "20",
			edit: func(b *builder, _ *Reading) { b.rec.Batch.Pitched = nil },
		},

		{name: "the same", hours: 24 + 0.5/60, text: "1.0400", temp: "20C", code: HoldDuplicate, hint: "void"},
		{
			name: "the same, kept", hours: 24, text: "1.040", temp: "20", code: HoldDuplicate,
			edit: func(_ *builder, r *Reading) { r.Keep = "sure" },
		},
		{
			name: "the same as a void one", hours: 24, text: "1.040", temp: "20",
			edit: func(b *builder, _ *Reading) { b.rec.Readings[1].Void = true },
		},
		{name: "again, other value", hours: 24, text: "1.041", temp: "20", note: NoteReplicate},
		{name: "again, other temperature", hours: 24, text: "1.040", temp: "21", note: NoteReplicate},

		{
			name: "with an instrument", hours: 48, text: "1.030", temp: "20",
			edit: func(_ *builder, r *Reading) { r.Instrument = "H1" },
		},
		{
			name: "below its range", hours: 48, text: "0.989", temp: "20", code: HoldOutOfRange, final: true,
			edit: func(_ *builder, r *Reading) { r.Instrument = "H1" },
		},
		{
			name: "at the end of its range", hours: 48, text: "0.990", temp: "20", code: "",
			edit: func(b *builder, r *Reading) { r.Instrument = "H1"; b.read(40, "0.995", "20") },
		},
		{
			name: "unknown instrument", hours: 48, text: "1.030", temp: "20", code: HoldInstrument, final: true, hint: "H1",
			edit: func(_ *builder, r *Reading) { r.Instrument = "H2" },
		},

		{name: "no liquid", hours: 48, text: "1.44sg", temp: "60C", code: HoldUncorrected, final: true},
		{name: "scale in doubt", hours: 48, text: "12.1", temp: "20", code: HoldIncomplete, final: true},
		{
			name: "closed", hours: 48, text: "1.030", temp: "20", code: HoldClosed, final: true,
			edit: func(b *builder, _ *Reading) { b.rec.Closed = &Numbered[Close]{Body: Close{At: after(40)}} },
		},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			b := fermenting()
			r := b.reading(tt.hours, tt.text, tt.temp)
			if tt.edit != nil {
				tt.edit(b, &r)
			}
			notes, h := judge(b, r)
			if code(h) != tt.code {
				t.Fatalf("held as %q (%v), want %q", code(h), h, tt.code)
			}
			if h != nil && (h.Final != tt.final || !strings.Contains(h.Hint(), tt.hint) || h.Error() == "" || h.Tip == "" || strings.HasSuffix(h.Text, ".")) {
				t.Errorf("got %+v", h)
			}
			if h == nil && tt.note != "" != hasNote(notes, tt.note) {
				t.Errorf("notes are %v, want %q", notes, tt.note)
			}
		})
	}
}

func TestJudgeInstrumentHistory(t *testing.T) {
	rec := glass("H1")
	rec.Instrument.Since = day0.AddDate(-2, 0, 0)
	brix := &InstrumentRecord{Instrument: Instrument{ID: "R1", Type: Refractometer, Scale: "brix", Since: day0}}
	b := brew("B4", "T4", "1.050", "").read(0, "1.049", "20")
	s := Situation{Now: after(48), Target: b.rec, Book: NewBook([]*InstrumentRecord{rec, brix})}
	r := b.reading(24, "1.030", "20")
	r.Instrument = "H1"
	if notes, h := Judge(s, r); h != nil || !hasNote(notes, NoteOverdue) {
		t.Errorf("overdue: %v, %v", notes, h)
	}
	rec.Retired = &Numbered[Retire]{Body: Retire{At: after(24), Reason: "broken"}}
	if _, h := Judge(s, r); code(h) != HoldRetired || !h.Final {
		t.Errorf("retired: %v", h)
	}
	r.TakenAt = after(23) // it was whole then
	if _, h := Judge(s, r); h != nil {
		t.Errorf("before it broke: %v", h)
	}
	r.Instrument = "R1"
	r.Gravity = Typed{"9.1", "brix"}
	if notes, h := Judge(s, r); h != nil || !hasNote(notes, method.Caution) {
		t.Errorf("refractometer: %v, %v", notes, h)
	}
	if _, h := Judge(Situation{Now: after(48)}, r); code(h) != HoldNoBatch {
		t.Errorf("no batch: %v", h)
	}
}

// A coarse glass cannot tell a rise of 2 points: half of 0.005 over √3 each is
// 1.44 points, √2 times that 2.04, and 1.96 times that 4.0.
func TestRiseWithinTheUncertainty(t *testing.T) {
	rec := glass("H1")
	rec.Instrument.Division = "0.005"
	b := brew("B4", "T4", "1.050", "").read(0, "1.040", "20")
	b.rec.Readings[0].Body.Instrument = "H1"
	s := Situation{Now: after(48), Target: b.rec, Book: NewBook([]*InstrumentRecord{rec})}
	for text, want := range map[string]string{"1.042": "", "1.0435": "", "1.045": HoldRise} {
		r := b.reading(24, text, "20")
		r.Instrument = "H1"
		if _, h := Judge(s, r); code(h) != want {
			t.Errorf("%s: %v", text, h)
		}
	}
}

func TestAnotherBatchFitsBetter(t *testing.T) {
	t4 := func() *builder { return brew("B4", "T4", "1.050", "").read(0, "1.048", "20").read(24, "1.040", "20") }
	// T6 falls by 4 a day and was at 1.016: 1.012 is expected.
	t6 := func() *builder { return brew("B6", "T6", "1.048", "").read(0, "1.020", "20").read(24, "1.016", "20") }
	tests := []struct {
		name, text string
		target     *builder
		others     []*builder
		code       string
		closer     string
	}{
		{"typed for the wrong tank", "1.012", t4(), []*builder{t6()}, HoldOther, "B6"},
		{"nobody else is near", "1.012", t4(), []*builder{brew("B6", "T6", "1.048", "").read(24, "1.030", "20")}, "", ""},
		{"nobody else at all", "1.015", t4(), nil, "", ""},
		{"a single reading, a day ago", "1.012", brew("B4", "T4", "1.050", "").read(24, "1.040", "20"), []*builder{t6()}, HoldOther, "B6"},
		{"three days without a reading", "1.012", brew("B4", "T4", "1.050", "").read(-24, "1.040", "20"), []*builder{t6()}, "", ""},
		{"a usual fall near another", "1.028", t4(), []*builder{brew("B6", "T6", "1.048", "").read(24, "1.028", "20")}, "", ""},
		{"the other way, a rise", "1.032", t6(), []*builder{t4()}, HoldRise, "B4"},
		{"a rise that fits nobody", "1.025", t6(), []*builder{t4()}, HoldRise, ""},
		// Finished, 1.0 a day at most: 8 points off are not its own.
		{
			"finished", "1.012", brew("B4", "T4", "1.050", "").read(0, "1.020", "20").read(24, "1.020", "20"),
			[]*builder{t6()},
			HoldOther, "B6",
		},
		{
			"the nearer of two", "1.012", t4(),
			[]*builder{brew("B7", "T7", "1.048", "").read(24, "1.0135", "20"), t6()},
			HoldOther, "B6",
		},
	}
	for _, tt := range tests {
		t.Run(tt.name, func(t *testing.T) {
			r := tt.target.reading(48, tt.text, "20")
			_, h := judge(tt.target, r, append(tt.others, tt.target)...)
			if code(h) != tt.code {
				t.Fatalf("held as %q (%v), want %q", code(h), h, tt.code)
			}
			if h == nil {
				return
			}
			if h.Closer != tt.closer || h.Final {
				t.Errorf("got %+v", h)
			}
			r.Keep = "read twice"
			if notes, h := judge(tt.target, r, tt.others...); h != nil || !hasNote(notes, method.WithReason) {
				t.Errorf("kept: %v, %v", notes, h)
			}
		})
	}
	r := t4().reading(48, "1.012", "20")
	_, h := judge(t4(), r, t6())
	if h == nil || h.Vessel != "T6" || !strings.Contains(h.Text, "closer to T6's expected 1.012: is this T6?") {
		t.Errorf("got %v", h)
	}
}

func TestExpected(t *testing.T) {
	limit := Numbered[Limit]{Body: Limit{At: day0, Gravity: sg("1.014")}}
	tests := []struct {
		name   string
		b      *builder
		hours  float64
		sg, sd float64 // SG, points
		none   bool
	}{
		{name: "nothing", b: brew("B", "", "1.050", ""), hours: 48, none: true},
		{name: "before the first", b: brew("B", "", "1.050", "").read(24, "1.040", "20"), hours: 12, none: true},
		// One value: it stays, √(1² + 5²) after a day.
		{name: "one", b: brew("B", "", "1.050", "").read(24, "1.040", "20"), hours: 48, sg: 1.040, sd: 5.099},
		// 8 a day: 1.032 after another.
		{name: "line", b: brew("B", "", "1.050", "").read(0, "1.048", "20").read(24, "1.040", "20"), hours: 48, sg: 1.032, sd: 5.099},
		// 18 a day: a third is 6.
		{name: "fast line", b: brew("B", "", "1.060", "").read(0, "1.058", "20").read(24, "1.040", "20"), hours: 48, sg: 1.022, sd: 6.083},
		{name: "at the last", b: brew("B", "", "1.050", "").read(0, "1.048", "20").read(24, "1.040", "20"), hours: 24, sg: 1.040, sd: 1},
		{name: "between", b: brew("B", "", "1.050", "").read(0, "1.048", "20").read(24, "1.040", "20"), hours: 12, sg: 1.048, sd: 2.693}, // √(1 + 2.5²)
		{name: "never rising", b: brew("B", "", "1.050", "").read(0, "1.039", "20").read(24, "1.040", "20"), hours: 48, sg: 1.040, sd: 5.099},
		// Past half of 50 points, nothing a day: √2.
		{name: "finished", b: brew("B", "", "1.050", "").read(0, "1.012", "20").read(24, "1.012", "20"), hours: 48, sg: 1.012, sd: 1.414},
		{name: "not below the driest", b: brew("B", "", "1.050", "").read(0, "1.030", "20").read(24, "1.010", "20"), hours: 72, sg: 0.990, sd: 13.37}, // √(1 + (2 · 20/3)²)
		{name: "minutes apart", b: brew("B", "", "1.050", "").read(0, "1.041", "20").read(0.5, "1.040", "20"), hours: 24.5, sg: 1.040, sd: 5.099},
		{name: "across sugar", b: brew("B", "", "1.050", "100").read(0, "1.048", "20").event(5, Event{What: Sugar, MassKg: "1"}).read(24, "1.040", "20"), hours: 48, sg: 1.040, sd: 5.099},
		{name: "after sugar", b: brew("B", "", "1.050", "100").read(0, "1.048", "20").read(24, "1.040", "20").event(30, Event{What: Sugar, MassKg: "1"}), hours: 48, none: true},
		{name: "a suspect one does not count", b: suspectLast(brew("B", "", "1.050", "").read(24, "1.040", "20").read(30, "1.010", "20")), hours: 48, sg: 1.040, sd: 5.099},
	}
	low := brew("B", "", "1.050", "").read(0, "1.030", "20").read(24, "1.020", "20")
	low.rec.Limits = append(low.rec.Limits, limit)
	tests = append(tests, struct {
		name   string
		b      *builder
		hours  float64
		sg, sd float64
		none   bool
	}{name: "not below the limit", b: low, hours: 48, sg: 1.014, sd: 5.099})
	for _, tt := range tests {
		got, sd, ok := Expected(Derive(tt.b.rec, nil), after(tt.hours))
		if ok == tt.none {
			t.Errorf("%s: %v %v", tt.name, got, ok)
			continue
		}
		near(t, tt.name, got, tt.sg, 2e-6)
		near(t, tt.name+", sd", 1000*sd, tt.sd, 0.005)
	}
}

func suspectLast(b *builder) *builder {
	b.rec.Readings[len(b.rec.Readings)-1].Body.Keep = "foam"
	return b
}

// A batch that is logged for weeks is compared with its neighbours in time alone,
// as it would be with all of it at hand.
func TestNearby(t *testing.T) {
	b := brew("B1", "T1", "1.050", "")
	for k := range 40 {
		b.read(float64(k), "1.040", "20")
	}
	b.read(20.001, "1.0401", "20")
	b.rec.Readings[19].Void = true
	got := nearby(b.rec.Readings, after(20).Add(30*time.Second))
	// 14, 15, 16, 17, 18 and twice 20 (in one minute), then 21 and 22.
	if len(got) != 9 || !got[0].Body.TakenAt.Equal(after(14)) || !got[8].Body.TakenAt.Equal(after(22)) {
		t.Errorf("%d from %v to %v", len(got), got[0].Body.TakenAt, got[len(got)-1].Body.TakenAt)
	}
	if len(nearby(nil, day0)) != 0 {
		t.Error("something of nothing")
	}
}
