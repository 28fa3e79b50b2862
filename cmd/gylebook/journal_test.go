package main

import (
	"context"
	"encoding/json"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
)

// journalRun runs the program on one journal and returns the records it prints.
type journalRun struct {
	t     *testing.T
	place string
}

func newJournalRun(t *testing.T) journalRun {
	t.Helper()
	t.Setenv("SOURCE_DATE_EPOCH", "1795000000") // 2026-11-18T11:06:40Z
	return journalRun{t, filepath.Join(t.TempDir(), "journal.db")}
}

// do runs one command, which has to succeed.
func (r journalRun) do(args ...string) []map[string]any {
	r.t.Helper()
	var stdout, stderr strings.Builder
	args = append(args, "--json", "--journal", r.place, "--operator", "anna")
	if code := run(context.Background(), args, strings.NewReader(""), &stdout, &stderr); code != exitOK {
		r.t.Fatalf("%q: exit code %d: %s", args, code, stderr.String())
	}
	var d struct{ Records []map[string]any }
	if err := json.Unmarshal([]byte(stdout.String()), &d); err != nil {
		r.t.Fatalf("%q: %v", args, err)
	}
	return d.Records
}

// same demands equal figures of two records, to the last digit.
func (r journalRun) same(what string, got, want map[string]any, names ...string) {
	r.t.Helper()
	for _, n := range names {
		x, isNumber := got[n].(float64)
		if y, ok := want[n].(float64); !isNumber || !ok || x != y {
			r.t.Errorf("%s, %s: %v, wanted %v", what, n, got[n], want[n])
		}
	}
}

// What batch show derives is what correct and attenuation give for the same
// reading, instrument and original gravity.
func TestBatchShowAgrees(t *testing.T) {
	r := newJournalRun(t)
	r.do("instrument", "add", "H1", "--division", "0.001", "--range", "0.990-1.060", "--since", "2026-10-01 08:00 +02:00")
	r.do("instrument", "check", "H1", "--water", "0.998", "--temp", "20C", "--at", "2026-10-01 09:00 +02:00")
	r.do("batch", "open", "B26-014", "--vessel", "T4", "--product", "Lane Bitter", "--og", "1.048", "--pitched", "2026-10-01 18:00 +02:00")
	for day, typed := range []string{"1.041 23.5", "1.030 24", "1.0175 68F", "1.012 18", "1010 16C"} {
		fields := strings.Fields(typed)
		r.do("log", "T4", fields[0], fields[1], "--taken", "2026-10-0"+strconv.Itoa(day+2)+" 09:00 +02:00")
	}
	show := r.do("batch", "show", "B26-014")[0]
	readings, ok := show["readings"].([]any)
	if !ok || len(readings) != 5 {
		t.Fatalf("readings %v, wanted 5", show["readings"])
	}
	for _, x := range readings {
		one, _ := x.(map[string]any)
		input, _ := one["input"].(string)
		temp, _ := one["sample_temp_c"].(float64)
		corrected := r.do("correct", input, "--temp", shortest(temp)+"C", "--instrument", "H1", "--og", "1.048")[0]
		r.same(input+" against correct", one, corrected,
			"sample_temp_c", "meniscus_correction", "instrument_correction", "temperature_correction", "corrected", "sg_20_20", "expanded_uncertainty_k2")
		if corrected["instrument_id"] != "H1" {
			t.Errorf("%s: instrument_id %v, wanted H1", input, corrected["instrument_id"])
		}
		sg, _ := one["sg_20_20"].(float64)
		att := r.do("attenuation", "1.048", shortest(sg)+"sg")[0]
		r.same(input+" against attenuation", one, att,
			"original_extract_pct_mass", "apparent_extract_pct_mass", "real_extract_pct_mass", "apparent_attenuation_pct", "real_attenuation_pct", "rdf_pct", "abv_pct_20c")
	}
	last, _ := readings[4].(map[string]any)
	r.same("the batch against its last reading", show, last, "sg_20_20", "apparent_attenuation_pct", "real_attenuation_pct", "abv_pct_20c")
}

func shortest(x float64) string { return strconv.FormatFloat(x, 'f', -1, 64) }

// What people typed cannot steer a terminal, wherever it is shown.
func TestJournalTextIsClean(t *testing.T) {
	r := newJournalRun(t)
	const red = "\x1b[31mred\x07\u202e"
	r.do("instrument", "add", "H1", "--division", "0.001", "--note", red, "--since", "2026-10-01 08:00 +02:00")
	r.do("batch", "open", "B1", "--vessel", "T1", "--product", red, "--yeast", red, "--og", "1.050", "--note", red, "--pitched", "2026-11-10 12:00 +01:00")
	r.do("event", "B1", "racking", "--note", red)
	for _, line := range [][]string{
		{"log", "B1", "1.020", "20C", "--note", red, "--taken", "2026-11-12 12:00 +01:00"},
		{"log", "B1", "1.030", "20C", "--keep", red},
		{"batch", "show", "B1"},
		{"batch", "show", "B1", "--plain"},
		{"batch", "list"},
		{"void", "2", "--reason", red},
		{"undo"},
		{"instrument", "show", "H1"},
		{"instrument", "retire", "H1", "--reason", red},
		{"log", "B1", "1.019", "20C", "--instrument", "H1"},
		{"event", "B1", red},
		{"batch", "show", red},
	} {
		var stdout, stderr strings.Builder
		args := append([]string{"--journal", r.place, "--operator", "anna"}, line...)
		run(context.Background(), args, strings.NewReader(""), &stdout, &stderr)
		if shown := stdout.String() + stderr.String(); shown == "" || strings.ContainsAny(shown, "\x1b\x07\u202e") {
			t.Errorf("%q shows %q", line, shown)
		}
	}
}

// A season and its batches tell the same figures, whichever command is asked.
func TestSeasonAgreesWithBatchShow(t *testing.T) {
	r := newJournalRun(t)
	demo := journalRun{t, r.place + ".demo"}
	r.do("journal", "demo", demo.place)
	rows := demo.do("season")
	if len(rows) < 30 {
		t.Fatalf("%d batches, wanted 30 or more", len(rows))
	}
	compared := 0
	for _, row := range rows {
		id, _ := row["batch_id"].(string)
		show := demo.do("batch", "show", id)[0]
		for name, want := range row {
			got, both := show[name]
			if !both || name == "readings" { // a count here, the readings themselves there
				continue
			}
			compared++
			if got != want {
				t.Errorf("%s, %s: batch show has %v, season %v", id, name, got, want)
			}
		}
	}
	if compared < 15*len(rows) {
		t.Errorf("%d figures of %d batches compared, wanted 15 a batch", compared, len(rows))
	}
}
