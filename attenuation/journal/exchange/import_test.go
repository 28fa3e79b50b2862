package exchange_test

import (
	"context"
	"errors"
	"io"
	"os"
	"reflect"
	"strings"
	"testing"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/exchange"
	"gylebook/tables/dialect"
)

const head = "batch_id,taken_at,entered_text,entered_scale,sample_temp_c,status,reason\n"

// cellar has two open batches, a closed one, and two instruments, one out of use.
func cellar(t *testing.T) journal.Store {
	t.Helper()
	s := newJournals(t).empty()
	appendAll(t, s,
		glass("H1", "sg", "0.001"), glass("H2", "plato", "0.1"), glass("H9", "sg", "0.001"),
		journal.Retire{Instrument: "H9", At: day0, Reason: "broken"},
		batch("B-1", "T1"), og("B-1", "1.050", "sg"), batch("B-2", "T2"), batch("B-3", "T3"),
		journal.Event{Batch: "B-2", At: day0.Add(time.Hour), What: journal.Move, Vessel: "T9"},
		journal.Close{Batch: "B-3", At: day0.Add(time.Hour)},
	)
	return s
}

func only(t *testing.T, s journal.Store, id string) journal.Numbered[journal.Reading] {
	t.Helper()
	rec, err := s.Batch(context.Background(), id)
	if err != nil {
		t.Fatal(err)
	}
	if len(rec.Readings) != 1 {
		t.Fatalf("%d readings in %s, wanted 1", len(rec.Readings), id)
	}
	return rec.Readings[0]
}

func TestImportTypedColumns(t *testing.T) {
	s := cellar(t)
	file := "note,Vessel,operator,taken_at,entered_text,sample_temp_c,instrument_id,degassed,time_quality,ph\n" +
		"\"'=two\nlines\",T9,jo,2026-06-02 18:30,10.50,18.0,H2,no,estimated,4.2\n"
	berlin, err := time.LoadLocation("Europe/Berlin")
	if err != nil {
		t.Fatal(err) // the go command brings the zones with it
	}
	report, err := take(s, file, exchange.Options{Location: berlin})
	if err != nil {
		t.Fatal(err)
	}
	got := only(t, s, "B-2").Body // T9 after its move
	want := journal.Reading{
		Batch: "B-2", Vessel: "T9", TakenAt: time.Date(2026, 6, 2, 18, 30, 0, 0, zone), Quality: journal.Estimated,
		Gravity: journal.Typed{Text: "10.50", Scale: "plato"}, // the instrument's
		Temp:    journal.TypedTemp{Text: "18.0", Unit: "C"}, Instrument: "H2", Gassy: true, Note: "=two\nlines\ntaken by jo",
	}
	if !got.TakenAt.Equal(want.TakenAt) {
		t.Errorf("taken at %v, wanted %v", got.TakenAt, want.TakenAt)
	}
	got.TakenAt = want.TakenAt
	if got != want {
		t.Errorf("%+v\nwanted\n%+v", got, want)
	}
	if len(report.Notes) != 1 || !strings.Contains(report.Notes[0], "ph") {
		t.Errorf("notes %q, wanted the column ph", report.Notes)
	}
	if report.First != entries(t, s) || report.Last != report.First {
		t.Errorf("entries %d to %d, wanted %d", report.First, report.Last, entries(t, s))
	}
	if table := readings(t, s, exchange.Standard); !strings.Contains(table, ",jo,1,") {
		t.Errorf("%s\nlacks the operator jo", table)
	}
}

func TestImportInstruments(t *testing.T) {
	const header = "batch_id,taken_at,entered_text,sample_temp_c,instrument_id\n"
	for name, c := range map[string]struct{ row, says string }{
		"retired": {"B-1,2026-06-02T08:00:00Z,1.020,20,H9\n", "instrument H9 is out of use"},
		"unknown": {"B-1,2026-06-02T08:00:00Z,1.020,20,H7\n", "instrument H7 is not in the journal"},
	} {
		report, err := take(cellar(t), header+c.row, exchange.Options{})
		if !errors.Is(err, exchange.ErrRefused) || len(report.Refused) != 1 || !strings.Contains(report.Refused[0].Reason, c.says) {
			t.Errorf("%s: %v, %+v, wanted %q", name, err, report.Refused, c.says)
		}
	}
	// Three of four were typed to 0.001: that is its division.
	s := cellar(t)
	_, err := take(s, header+
		"B-1,2026-06-02T08:00:00Z,1.020,20,H7\nB-1,2026-06-01T08:00:00Z,1.0475,20,H7\nB-1,2026-06-03T08:00:00Z,1.012,20,H7\nB-1,2026-06-04T08:00:00Z,1.010,20,H7\n",
		exchange.Options{Create: true})
	if err != nil {
		t.Fatal(err)
	}
	list, err := s.Instruments(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	for _, rec := range list {
		i := rec.Instrument
		if i.ID != "H7" {
			continue
		}
		if i.Scale != "sg" || i.Basis != "20/20" || i.Body != "glass" || i.Division != "0.001" || !i.Since.Equal(day0.Add(2*time.Hour)) {
			t.Errorf("%+v", i)
		}
		return
	}
	t.Error("H7 was not made")
}

// Two scales on one new instrument: nothing says which is its own.
func TestImportInstrumentOfTwoScales(t *testing.T) {
	file := "batch_id,taken_at,entered_text,entered_scale,sample_temp_c,instrument_id\n" +
		"B-1,2026-06-02T08:00:00Z,1.020,sg,20,H7\nB-1,2026-06-03T08:00:00Z,4.1,plato,20,H7\n"
	report, err := take(cellar(t), file, exchange.Options{Create: true})
	if !errors.Is(err, exchange.ErrRefused) || report.RefusedCount != 2 || !strings.Contains(report.Refused[0].Reason, "more than one scale") {
		t.Errorf("%v, %+v", err, report.Refused)
	}
}

func TestImportMakesBatches(t *testing.T) {
	s := newJournals(t).empty()
	file := "batch_id,vessel,taken_at,entered_text,sample_temp_c,product,pitched_at,og_text,batch_volume_l,yeast_generation\n" +
		"B-7,T4,2026-06-03T08:00:00+02:00,1.020,20,Porter,2026-06-01T08:00:00+02:00,1.0480; 12.1P at 18.5C with H5,1250.5,3\n" +
		"B-7,T4,2026-06-04T08:00:00+02:00,1.015,20,Porter,,,,\n"
	report, err := take(s, file, exchange.Options{Create: true})
	if err != nil {
		t.Fatal(err, report.Refused)
	}
	rec, err := s.Batch(context.Background(), "B-7")
	if err != nil {
		t.Fatal(err)
	}
	b := rec.Batch
	if b.Product != "Porter" || b.Vessel != "T4" || b.Volume != "1250.5" || b.Generation != 3 || !b.Pitched.Equal(day0) || !b.Opened.Equal(day0) {
		t.Errorf("%+v", b)
	}
	if len(rec.OGs) != 2 {
		t.Fatalf("%d original gravities, wanted 2", len(rec.OGs))
	}
	if g := rec.OGs[0].Body; g.Gravity != (journal.Typed{Text: "1.0480", Scale: "sg"}) || g.Temp.Text != "" {
		t.Errorf("%+v", g)
	}
	if g := rec.OGs[1].Body; g.Gravity != (journal.Typed{Text: "12.1P", Scale: "plato"}) || g.Temp.Text != "18.5C" || g.Instrument != "H5" {
		t.Errorf("%+v", g)
	}
	if !reflect.DeepEqual(report.Batches, []string{"B-7"}) || !reflect.DeepEqual(report.Instruments, []string{"H5"}) {
		t.Errorf("made %v and %v", report.Batches, report.Instruments)
	}

	conflict := strings.Replace(file, "1.015,20,Porter", "1.015,20,Stout", 1)
	report, err = take(newJournals(t).empty(), conflict, exchange.Options{Create: true})
	if !errors.Is(err, exchange.ErrRefused) || report.Refused[0].Line != 3 || !strings.Contains(report.Refused[0].Reason, "Porter") {
		t.Errorf("%v, wanted line 3 with both products", err)
	}
	report, err = take(newJournals(t).empty(), strings.ReplaceAll(file, "Porter", ""), exchange.Options{Create: true})
	if !errors.Is(err, exchange.ErrRefused) || report.RefusedCount != 2 || !strings.Contains(report.Refused[0].Reason, "product is missing") {
		t.Errorf("%v, wanted both rows refused for want of a product", err)
	}
}

func TestDryRunWritesNothing(t *testing.T) {
	s := cellar(t)
	before := lines(t, s)
	file := "batch_id,taken_at,entered_text,sample_temp_c,product\nB-1,2026-06-02T08:00:00Z,1.020,20,\nB-8,2026-06-02T08:00:00Z,1.020,20,Mild\n"
	report, err := take(s, file, exchange.Options{DryRun: true, Create: true})
	if err != nil || report.Readings != 2 || len(report.Batches) != 1 || report.First != 0 {
		t.Fatalf("%+v, %v", report, err)
	}
	if lines(t, s) != before {
		t.Error("something was written")
	}
}

func TestRepeats(t *testing.T) {
	s := cellar(t)
	file := head + "B-1,2026-06-02T08:00:05Z,1.020,sg,20,,\nB-1,2026-06-02T08:00:55Z,1.0200,sg,20,,\n" + // same minute and value
		"B-1,2026-06-02T08:00:00Z,1.021,sg,20,,\nB-1,2026-06-02T08:01:00Z,1.020,sg,20,,\nB-1,2026-06-02T08:00:00Z,1.020,sg,20,void,slip\n"
	report, err := take(s, file, exchange.Options{})
	if err != nil || report.Readings != 4 || report.Repeats != 1 || report.Voids != 1 {
		t.Fatalf("%+v, %v", report, err)
	}
	report, err = take(s, file, exchange.Options{})
	if err != nil || report.Readings != 0 || report.Repeats != 5 {
		t.Fatalf("again: %+v, %v", report, err)
	}
	rec, err := s.Batch(context.Background(), "B-1")
	if err != nil {
		t.Fatal(err)
	}
	voids := 0
	for _, r := range rec.Readings {
		if r.Void {
			voids++
			if r.VoidReason != "slip" || r.Body.Gravity.Text != "1.020" {
				t.Errorf("%+v", r)
			}
		}
	}
	if voids != 1 {
		t.Errorf("%d void readings, wanted 1", voids)
	}
}

func TestWholeFileRefused(t *testing.T) {
	s := cellar(t)
	for _, c := range []struct {
		name, file string
		is         error
		says       string
	}{
		{"missing columns", "vessel,taken_at,ph\nT1,2026-06-02T08:00:00Z,4\n", exchange.ErrHeader, "missing entered_text, sample_temp_c; line 1 has vessel, taken_at, ph"},
		{"neither batch nor vessel", "taken_at,entered_text,sample_temp_c\n", exchange.ErrHeader, "batch_id or vessel"},
		{"a column twice", "batch_id,Batch_ID,taken_at,entered_text,sample_temp_c\n", exchange.ErrHeader, "batch_id stands twice"},
		{"mixed marks", "batch_id;taken_at;entered_text;sample_temp_c\nB-1;2026-06-02T08:00:00Z;1.020;18,5\n", dialect.ErrMixed, "1.020"},
		{"mixed separators", "batch_id,taken_at,entered_text,sample_temp_c\nB-1;2026-06-02T08:00:00Z;1.020;18\n", dialect.ErrMixed, "semicolon"},
		{"empty", "", dialect.ErrEmpty, "header"},
	} {
		_, err := take(s, c.file, exchange.Options{})
		if !errors.Is(err, c.is) || !strings.Contains(err.Error(), c.says) {
			t.Errorf("%s: %v, wanted %q", c.name, err, c.says)
		}
	}
	if _, err := take(s, "PK\x03\x04\x00\x00", exchange.Options{}); err == nil || !strings.Contains(err.Error(), "NUL") {
		t.Errorf("a spreadsheet's own file: %v", err)
	}
	if _, err := take(s, "batch_id,taken_at,entered_text,sample_temp_c,schema_version\nB-1,2026-06-02T08:00:00Z,1.020,18,2\n", exchange.Options{}); err == nil || !strings.Contains(err.Error(), "newer version") {
		t.Errorf("a newer table: %v", err)
	}
}

func TestCancelled(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	s := cellar(t)
	before := entries(t, s)
	_, err := exchange.Import(ctx, s, by, now, strings.NewReader(head+"B-1,2026-06-02T08:00:00Z,1.020,sg,20,,\n"), exchange.Options{})
	if !errors.Is(err, context.Canceled) || entries(t, s) != before {
		t.Errorf("%v, %d entries", err, entries(t, s)-before)
	}
}

func TestFailingFile(t *testing.T) {
	s := cellar(t)
	before := entries(t, s)
	file := io.MultiReader(strings.NewReader(head+strings.Repeat("B-1,2026-06-02T08:00:00Z,1.020,sg,20,,\n", 20_000)), bad{})
	if _, err := exchange.Import(context.Background(), s, by, now, file, exchange.Options{}); !errors.Is(err, os.ErrClosed) || entries(t, s) != before {
		t.Errorf("%v, %d entries", err, entries(t, s)-before)
	}
}

type bad struct{}

func (bad) Read([]byte) (int, error) { return 0, os.ErrClosed }
