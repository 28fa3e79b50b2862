package exchange_test

import (
	"context"
	"encoding/csv"
	"fmt"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/exchange"
	"gylebook/gravity/asread"
)

func TestColumns(t *testing.T) {
	want := strings.Fields(`reading_id batch_id vessel taken_at time_quality elapsed_h entered_text entered_scale sample_temp_c
		degassed instrument_id meniscus_correction_sg instrument_correction_sg temperature_correction_sg sg_20_20
		sg_expanded_uncertainty_k2 apparent_extract_pct_mass original_extract_pct_mass real_extract_pct_mass
		apparent_attenuation_pct real_attenuation_pct abv_pct_20c abv_method yeast_generation status reason operator
		schema_version product pitched_at og_text batch_volume_l`)
	if got := exchange.Columns(); !slices.Equal(got, want) {
		t.Errorf("%v\nwanted\n%v", got, want)
	}
}

func TestProfiles(t *testing.T) {
	s := newJournals(t).empty()
	appendAll(t, s, batch("B-1", "T1"), og("B-1", "1.050", "sg"), reading("B-1", 24, "1.0480", "sg", "18.5"))
	for p, begins := range map[exchange.Profile]string{
		exchange.Standard:      "reading_id,batch_id,vessel,",
		exchange.SpreadsheetEU: "\ufeffreading_id;batch_id;vessel;",
		exchange.Tab:           "reading_id\tbatch_id\tvessel\t",
	} {
		got := readings(t, s, p)
		if !strings.HasPrefix(got, begins) {
			t.Errorf("%s begins %.60q, wanted %q", p, got, begins)
		}
		if strings.Count(got, "\r\n") != 2 || strings.Count(got, "\n") != 2 || !strings.HasSuffix(got, "\r\n") {
			t.Errorf("%s: line ends of %q, wanted two CR LF", p, got)
		}
		if again, err := exchange.ParseProfile(" " + strings.ToUpper(string(p))); err != nil || again != p {
			t.Errorf("ParseProfile(%s) = %s, %v", p, again, err)
		}
	}
	if _, err := exchange.ParseProfile("excel"); err == nil || !strings.Contains(err.Error(), "spreadsheet-eu") {
		t.Errorf("%v, wanted the known ones", err)
	}
	eu := strings.Split(readings(t, s, exchange.SpreadsheetEU), "\r\n")[1]
	for _, cell := range []string{";1,0480;sg;18,5;", ";24,00;", ";1,050;100"} {
		if !strings.Contains(eu, cell) {
			t.Errorf("%q lacks %q", eu, cell)
		}
	}
}

// row returns the cells of the only reading of s by column, read by the standard
// library's parser.
func row(t *testing.T, s journal.Store) map[string]string {
	t.Helper()
	records, err := csv.NewReader(strings.NewReader(readings(t, s, exchange.Standard))).ReadAll()
	if err != nil || len(records) != 2 {
		t.Fatalf("%d records, %v, wanted 2", len(records), err)
	}
	out := make(map[string]string)
	for i, name := range records[0] {
		out[name] = records[1][i]
	}
	return out
}

// The figures of the table are those of the view, rounded.
func TestFiguresAreTheViews(t *testing.T) {
	s := newJournals(t).empty()
	r := reading("B-1", 24, "8.1", "plato", "28")
	r.Instrument = "H2"
	appendAll(t, s, glass("H2", "plato", "0.1"), batch("B-1", "T1"), og("B-1", "12.10P", "plato"), r)
	got := row(t, s)
	rec, err := s.Batch(context.Background(), "B-1")
	if err != nil {
		t.Fatal(err)
	}
	list, err := s.Instruments(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	v := journal.Derive(rec, journal.NewBook(list)).Values[0]
	for name, want := range map[string]string{
		"sg_20_20":                  fmt.Sprintf("%.6f", float64(v.SG)),
		"apparent_extract_pct_mass": fmt.Sprintf("%.4f", float64(v.Extract)),
		"original_extract_pct_mass": "12.1000", // as typed, in % mass
		"real_extract_pct_mass":     fmt.Sprintf("%.4f", float64(v.Attenuation.RE)),
		"apparent_attenuation_pct":  fmt.Sprintf("%.3f", v.Attenuation.Apparent),
		"real_attenuation_pct":      fmt.Sprintf("%.3f", v.Attenuation.Real),
		"abv_pct_20c":               fmt.Sprintf("%.3f", float64(v.Alcohol.ABV)),
		"abv_method":                "balling", "yeast_generation": "2", "status": "ok", "operator": by, "schema_version": "1",
		"og_text": "12.10P", "entered_text": "8.1", "entered_scale": "plato", "elapsed_h": "24.00", "taken_at": "2026-06-02T08:00:00+02:00",
		"pitched_at": "2026-06-01T08:00:00+02:00", "batch_volume_l": "100", "degassed": "yes", "meniscus_correction_sg": "0.000000",
	} {
		if got[name] != want {
			t.Errorf("%s %q, wanted %q", name, got[name], want)
		}
	}
	// A saccharometer's correction is in °P; near 8 °P one is 0.0040 to 0.0041 SG
	// (gravity of 8 °P 1.0318, of 9 °P 1.0359 in the sucrose tables).
	sg, err := asread.ParseNumber(got["temperature_correction_sg"])
	if err != nil {
		t.Fatal(err)
	}
	if slope := sg.Float() / v.Result.Temperature; slope < 0.0039 || slope > 0.0042 {
		t.Errorf("%g SG for %g °P is %g a degree, wanted about 0.0041", sg.Float(), v.Result.Temperature, slope)
	}
}

func TestWithoutOriginalGravity(t *testing.T) {
	s := newJournals(t).empty()
	appendAll(t, s, batch("B-1", "T1"), reading("B-1", 24, "1.012", "sg", "20"))
	got := row(t, s)
	if got["sg_20_20"] != "1.012000" { // nothing is corrected at the reference
		t.Errorf("sg_20_20 %q", got["sg_20_20"])
	}
	if got["abv_pct_20c"] != "" || got["abv_method"] != "" || got["og_text"] != "" || !strings.Contains(got["reason"], "original gravity") {
		t.Errorf("%v, wanted no alcohol and the reason", got)
	}
}

// digits is a typed text without its way of writing: marks, signs and trailing unit
// of temperature. 1048 and 1.048 are the same reading on specific gravity.
func digits(s string) string {
	return strings.Map(func(r rune) rune {
		if r >= '0' && r <= '9' {
			return r
		}
		return -1
	}, s)
}

// The typed columns come back with every digit in each profile, and importing the
// table once more changes nothing.
func TestTableRoundTrip(t *testing.T) {
	js := newJournals(t)
	rapid.Check(t, func(t *rapid.T) {
		p := rapid.SampledFrom(exchange.Profiles()).Draw(t, "profile")
		from, to := js.empty(), js.empty()
		defer from.Close()
		defer to.Close()
		aJournal(t, from)
		file := readings(t, from, p)
		report, err := take(to, file, exchange.Options{Create: true})
		if err != nil {
			t.Fatalf("%v\n%s", err, file)
		}
		want, got := allReadings(t, from), allReadings(t, to)
		if report.Readings+report.Repeats != len(want) {
			t.Fatalf("%d readings and %d repeats of %d", report.Readings, report.Repeats, len(want))
		}
		if report.Repeats == 0 && !slices.Equal(got, want) {
			t.Fatalf("got\n%v\nwanted\n%v\nfrom\n%s", strings.Join(got, "\n"), strings.Join(want, "\n"), file)
		}
		before := entries(t, to)
		report, err = take(to, file, exchange.Options{Create: true})
		if err != nil || report.Readings != 0 || entries(t, to) != before {
			t.Fatalf("again: %+v, %v", report, err)
		}
	})
}

// allReadings writes down what was typed of every reading.
func allReadings(t fataler, s journal.Store) []string {
	var out []string
	for rec, err := range s.Batches(context.Background(), journal.Filter{}) {
		if err != nil {
			t.Fatal(err)
		}
		b := rec.Batch
		for _, n := range rec.Readings {
			r := n.Body
			if n.Void {
				r.Keep = "" // the table has one reason, and that is of the void
			}
			out = append(out, fmt.Sprintf("%q %q %s %s|%q %s %s %s %s %s %v %q %q void %v %q",
				b.ID, strings.TrimSpace(b.Product), b.Volume, b.Pitched.Format("0102 15:04-07"),
				r.Vessel, r.TakenAt.Format("0102 15:04-07"), digits(r.Gravity.Text), r.Gravity.Scale, digits(r.Temp.Text), r.Quality, r.Gassy,
				r.Instrument, r.Keep, n.Void, n.VoidReason))
		}
	}
	slices.Sort(out)
	return out
}

// An instrument that showed 0.998 in water is low by 0.002; at its reference
// temperature nothing else is corrected, and 1.010 is 1.012.
func TestCorrectionsStandApart(t *testing.T) {
	s := newJournals(t).empty()
	r := reading("B-1", 24, "1.010", "sg", "20")
	r.Instrument = "H1"
	appendAll(t, s, glass("H1", "sg", "0.001"), journal.Check{
		Instrument: "H1", At: day0, Liquid: journal.InWater, Found: journal.Typed{Text: "0.998", Scale: "sg"},
		Expected: journal.Typed{Text: "1.000", Scale: "sg"}, Temp: journal.TypedTemp{Text: "20", Unit: "C"}, Correction: "0.002",
	}, batch("B-1", "T1"), r)
	got := row(t, s)
	for name, want := range map[string]string{
		"meniscus_correction_sg": "0.000000", "instrument_correction_sg": "0.002000", "temperature_correction_sg": "0.000000", "sg_20_20": "1.012000",
	} {
		if got[name] != want {
			t.Errorf("%s %q, wanted %q", name, got[name], want)
		}
	}
}
