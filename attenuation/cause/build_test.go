package cause_test

import (
	"fmt"
	"math"
	"testing"
	"time"

	"gylebook/attenuation/cause"
	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/tempcorr"
)

var pitched = time.Date(2026, time.May, 4, 12, 0, 0, 0, time.UTC)

func after(hours float64) time.Time {
	return pitched.Add(time.Duration(hours * float64(time.Hour)))
}

// made is a batch made up: a logistic course of its attenuation, read without
// error.
type made struct {
	id         string
	og         string  // SG as typed
	end        float64 // % apparent
	slow, late float64 // times as long; hours
	temp       float64 // °C of tank and samples
	generation int
	instrument string
	low        float64 // points that the instrument reads low
	until      float64 // hours
	limit      float64 // % apparent; 0 for none
	open       bool
}

func batch(id string) made {
	return made{id: id, og: "1.0480", end: 80, slow: 1, temp: 20, generation: 2, until: 240}
}

var hours = []float64{12, 24, 36, 48, 60, 72, 96, 120, 168, 216, 240}

// apparent is the course: half of the way at 44 h.
func (m made) apparent(h float64) float64 {
	logistic := func(h float64) float64 { return 1 / (1 + math.Exp((44-h)/9)) }
	h = (h - m.late) / m.slow
	return m.end * max(0, logistic(h)-logistic(0)) / (1 - logistic(0))
}

// sg is the gravity at an attenuation.
func (m made) sg(t testing.TB, apparent float64) gravity.SG {
	t.Helper()
	var og float64
	if _, err := fmt.Sscan(m.og, &og); err != nil {
		t.Fatal(err)
	}
	fit := gravity.Fits.Default().Fn
	sg, err := fit.SG(fit.Extract(gravity.SG(og)) * gravity.Plato(1-apparent/100))
	if err != nil {
		t.Fatal(err)
	}
	return sg
}

// mark is what a glass instrument shows in a fermenting liquid: the reading that
// its correction leads back to sg.
func mark(t testing.TB, sg gravity.SG, temp float64, oe gravity.Plato) float64 {
	t.Helper()
	r := float64(sg)
	h := tempcorr.New(gravity.ScaleSG, gravity.Pair2020, tempcorr.Bodies[0])
	for range 20 {
		res, err := tempcorr.Correct(h, tempcorr.Observation{Reading: r, Step: 0.0001, T: gravity.Celsius(temp), OE: oe, Plain: true})
		if err != nil {
			t.Fatal(err)
		}
		r += float64(sg - res.SG)
	}
	return r
}

func (m made) record(t testing.TB) *journal.Record {
	t.Helper()
	p := pitched
	rec := &journal.Record{Batch: journal.Batch{
		ID: m.id, Product: "Lane Bitter", Yeast: "house ale", Vessel: "T1", Volume: "1000", Generation: m.generation,
		Pitched: &p, Opened: p,
	}}
	rec.OGs = []journal.Numbered[journal.OG]{{Number: 2, Body: journal.OG{Batch: m.id, At: p, Gravity: journal.Typed{Text: m.og, Scale: "sg"}}}}
	for n, h := range hours {
		if h > m.until {
			break
		}
		var og float64
		if _, err := fmt.Sscan(m.og, &og); err != nil {
			t.Fatal(err)
		}
		r := mark(t, m.sg(t, m.apparent(h)), m.temp, gravity.Fits.Default().Fn.Extract(gravity.SG(og))) - m.low/1000
		rec.Readings = append(rec.Readings, journal.Numbered[journal.Reading]{Number: int64(10 + n), Body: journal.Reading{
			Batch: m.id, Vessel: "T1", TakenAt: after(h), Quality: journal.Exact, Instrument: m.instrument,
			Gravity: journal.Typed{Text: asread.Fixed(r, 4, asread.HalfEven), Scale: "sg"},
			Temp:    journal.TypedTemp{Text: asread.Fixed(m.temp, 1, asread.HalfEven), Unit: "C"},
		}})
	}
	if m.limit > 0 {
		rec.Limits = []journal.Numbered[journal.Limit]{{Number: 80, Body: journal.Limit{
			Batch: m.id, At: after(100), Gravity: journal.Typed{Text: asread.Fixed(float64(m.sg(t, m.limit)), 4, asread.HalfEven), Scale: "sg"},
		}}}
	}
	if !m.open {
		rec.Closed = &journal.Numbered[journal.Close]{Number: 99, Body: journal.Close{Batch: m.id, At: after(300)}}
	}
	return rec
}

// usual are nine healthy peers; edit changes each, and may be nil.
func usual(edit func(k int, m *made)) []made {
	var list []made
	for k, off := range []float64{-0.6, 0.4, 0, 0.6, -0.3, 0.2, -0.1, 0.5, -0.5} {
		m := batch(fmt.Sprintf("P%d", k))
		m.end += off
		m.generation = 1 + k%4
		if edit != nil {
			edit(k, &m)
		}
		list = append(list, m)
	}
	return list
}

// glass is a registered hydrometer, checked when it came into use; later are
// corrections found after the batches.
func glass(id string, later ...string) *journal.InstrumentRecord {
	since := pitched.AddDate(0, -1, 0)
	rec := &journal.InstrumentRecord{Instrument: journal.Instrument{
		ID: id, Type: journal.Hydrometer, Scale: "sg", Basis: "20/20", Division: "0.001", Body: "glass", ReadAt: "bottom", Since: since,
	}}
	check := func(at time.Time, correction string) {
		rec.Checks = append(rec.Checks, journal.Numbered[journal.Check]{Number: int64(len(rec.Checks) + 1), Body: journal.Check{
			Instrument: id, At: at, Liquid: journal.InWater, Found: journal.Typed{Text: "1.000", Scale: "sg"},
			Expected: journal.Typed{Text: "1.000", Scale: "sg"}, Temp: journal.TypedTemp{Text: "20", Unit: "C"}, Correction: correction,
		}})
	}
	check(since, "0.000")
	for k, c := range later {
		check(pitched.AddDate(0, k+1, 0), c)
	}
	return rec
}

// caseOf derives what is judged.
func caseOf(t testing.TB, target *journal.Record, peers []made, book *journal.Book) cause.Case {
	t.Helper()
	c := cause.Case{Batch: journal.Derive(target, book), Book: book}
	for _, p := range peers {
		v := journal.Derive(p.record(t), book)
		c.Peers = append(c.Peers, v)
		if m, ok := cause.MemberOf(v); ok {
			c.Others = append(c.Others, m)
		}
	}
	return c
}
