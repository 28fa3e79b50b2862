package exchange_test

import (
	"bytes"
	"context"
	"fmt"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"pgregory.net/rapid"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/exchange"
	"gylebook/attenuation/journal/sqlstore"
)

var (
	zone = time.FixedZone("", 2*60*60)
	day0 = time.Date(2026, 6, 1, 8, 0, 0, 0, zone)
	now  = time.Date(2026, 12, 1, 12, 0, 0, 0, time.UTC)
)

const by = "mara"

// journals makes empty journals in one folder.
type journals struct {
	t   testing.TB
	dir string
	n   int
}

func newJournals(t testing.TB) *journals { return &journals{t: t, dir: t.TempDir()} }

func (j *journals) empty() *sqlstore.Store {
	j.t.Helper()
	j.n++
	s, err := sqlstore.Create(context.Background(), filepath.Join(j.dir, fmt.Sprintf("%d.journal", j.n)))
	if err != nil {
		j.t.Fatal(err)
	}
	j.t.Cleanup(func() { _ = s.Close() })
	return s
}

type fataler interface {
	Helper()
	Fatal(args ...any)
	Fatalf(format string, args ...any)
}

func appendAll(t fataler, s journal.Store, bodies ...journal.Body) {
	t.Helper()
	_, err := s.Append(context.Background(), by, now, func(journal.Reader) ([]journal.Body, error) { return bodies, nil })
	if err != nil {
		t.Fatal(err)
	}
}

func entries(t fataler, s journal.Store) int64 {
	t.Helper()
	n, _, err := s.Head(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	return n
}

func readings(t fataler, s journal.Store, p exchange.Profile) string {
	t.Helper()
	var b bytes.Buffer
	if err := exchange.WriteReadings(context.Background(), &b, s, p, nil); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

func lines(t fataler, s journal.Store) string {
	t.Helper()
	var b bytes.Buffer
	if _, err := exchange.WriteLines(context.Background(), &b, s); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

func take(s journal.Store, file string, opt exchange.Options) (exchange.Report, error) {
	return exchange.Import(context.Background(), s, by, now, strings.NewReader(file), opt)
}

func glass(id, scale, division string) journal.Instrument {
	return journal.Instrument{
		ID: id, Type: journal.Hydrometer, Scale: scale, Basis: "20/20", Division: division, Body: "glass", ReadAt: "bottom", Since: day0,
	}
}

func batch(id, vessel string) journal.Batch {
	pitched := day0
	return journal.Batch{ID: id, Product: "Harbour Stout", Vessel: vessel, Volume: "100", Generation: 2, Pitched: &pitched, Opened: day0}
}

func og(batch, text, scale string) journal.OG {
	return journal.OG{Batch: batch, At: day0, Gravity: journal.Typed{Text: text, Scale: scale}}
}

func reading(batch string, hours int, text, scale, temp string) journal.Reading {
	return journal.Reading{
		Batch: batch, TakenAt: day0.Add(time.Duration(hours) * time.Hour), Quality: journal.Exact,
		Gravity: journal.Typed{Text: text, Scale: scale}, Temp: journal.TypedTemp{Text: temp, Unit: "C"},
	}
}

// typed is what people type, by scale.
var typed = map[string][]string{
	"sg":     {"1.048", "1.0480", "1,012", "0.996", "48pt", "+1.020", "1.010sg", "12.1P"},
	"plato":  {"12.1", "12.10", "-1P", "\u22121", "0.5", "3,25"},
	"points": {"48", "12.5", "-2"},
}

// texts are what a note or a reason may be, spreadsheets' traps first.
var texts = []string{
	"=1+1", "+cold", "-HYPERLINK", "@x", "\ttab", "\rreturn", "'=quoted", "two\nlines", "a;b,c", `say "so"`, " spaces ", "-0.5", "Öl, 5 °C", "plain",
}

// aJournal draws a journal with instruments, batches, readings, voids and events.
func aJournal(t *rapid.T, s journal.Store) {
	scales := []string{"sg", "plato", "points"}
	appendAll(t, s,
		glass("H1", "sg", "0.001"), glass("H2", "plato", "0.1"), glass("H3", "points", "1"),
		journal.Check{
			Instrument: "H1", At: day0, Liquid: journal.InWater, Found: journal.Typed{Text: "0.998", Scale: "sg"},
			Expected: journal.Typed{Text: "1.000", Scale: "sg"}, Temp: journal.TypedTemp{Text: "20", Unit: "C"}, Correction: "0.002",
		})
	head := entries(t, s)
	var bodies []journal.Body
	var voidable []int64
	for b := range rapid.IntRange(1, 3).Draw(t, "batches") {
		id := fmt.Sprintf("B-%d", b+1)
		body := batch(id, fmt.Sprintf("T%d", b+1))
		body.Product = rapid.SampledFrom(texts).Draw(t, "product")
		bodies = append(bodies, body)
		if rapid.Bool().Draw(t, "og") {
			g := og(id, rapid.SampledFrom([]string{"1.050", "1.0500", "1048", "12.1P"}).Draw(t, "og text"), "sg")
			if rapid.Bool().Draw(t, "og temp") {
				g.Temp, g.Instrument = journal.TypedTemp{Text: "24.5", Unit: "C"}, rapid.SampledFrom([]string{"", "H1"}).Draw(t, "og instrument")
			}
			bodies = append(bodies, g)
		}
		fall := 0
		for range rapid.IntRange(0, 6).Draw(t, "readings") {
			k := rapid.IntRange(0, 2).Draw(t, "scale")
			r := reading(id, 1, rapid.SampledFrom(typed[scales[k]]).Draw(t, "text"), scales[k], "")
			r.TakenAt = day0.Add(time.Duration(rapid.IntRange(0, 20_000).Draw(t, "minutes")) * time.Minute)
			r.Temp = journal.TypedTemp{Text: rapid.SampledFrom([]string{"18", "18.0", "20,5", "40C"}).Draw(t, "temp"), Unit: "C"}
			r.Vessel, r.Gassy = body.Vessel, rapid.Bool().Draw(t, "gassy")
			if rapid.Bool().Draw(t, "named") {
				r.Instrument = fmt.Sprintf("H%d", k+1)
			}
			if rapid.Bool().Draw(t, "estimated") {
				r.Quality = journal.Estimated
			}
			// What may rise over a reading before it is kept, or it would not come in:
			// falling values at one temperature, one a day.
			falling := rapid.Bool().Draw(t, "falling")
			if falling {
				fall++
				r.Gravity = journal.Typed{Text: []string{"1048", "1.0380", "1,028", "18", "1.0080", "999"}[fall-1], Scale: "sg"}
				r.TakenAt = day0.Add(time.Duration(fall) * 24 * time.Hour)
				r.Instrument, r.Temp.Text = "", "18.0"
			}
			if !falling || rapid.IntRange(0, 3).Draw(t, "keep") == 0 {
				r.Keep = rapid.SampledFrom(texts).Draw(t, "reason")
			}
			bodies = append(bodies, r)
			voidable = append(voidable, head+int64(len(bodies)))
		}
		if rapid.Bool().Draw(t, "event") {
			bodies = append(bodies, journal.Event{Batch: id, At: day0.Add(time.Hour), What: journal.Sugar, MassKg: "2", Note: rapid.SampledFrom(texts).Draw(t, "note")})
		}
	}
	for _, n := range voidable {
		if rapid.IntRange(0, 4).Draw(t, "void") == 0 {
			bodies = append(bodies, journal.Void{Entry: n, Reason: rapid.SampledFrom(texts).Draw(t, "void reason")})
		}
	}
	appendAll(t, s, bodies...)
}
