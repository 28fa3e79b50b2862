package exchange_test

import (
	"reflect"
	"strings"
	"testing"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/exchange"
)

// A spreadsheet that takes the point for a mark between thousands makes 1048 of
// 1.048, and 1048,0 when the column has one decimal.
func TestSpreadsheetDamage(t *testing.T) {
	s := cellar(t)
	file := "\ufeffbatch_id;taken_at;entered_text;entered_scale;sample_temp_c;sg_20_20\r\n" +
		"B-1;2026-06-02T08:00:00+02:00;1048;sg;20,0;1048\r\n" +
		"B-1;2026-06-06T08:00:00+02:00;996,0;;20,0;\r\n" +
		"B-1;2026-06-04T08:00:00+02:00;1,0120;sg;20,0;1,012000\r\n" +
		"B-1;2026-06-01T08:00:00+02:00;49;sg;20,0;\r\n"
	report, err := take(s, file, exchange.Options{})
	if err != nil {
		t.Fatal(err, report.Refused)
	}
	want := []exchange.Repair{
		{Line: 2, Column: "entered_text", Read: "1048", As: "1.048"},
		{Line: 2, Column: "sg_20_20", Read: "1048", As: "1.048"},
		{Line: 3, Column: "entered_text", Read: "996,0", As: "0.996"},
	}
	if !reflect.DeepEqual(report.Repairs, want) || report.RepairCount != 3 {
		t.Errorf("%+v\nwanted\n%+v", report.Repairs, want)
	}
	rec, err := s.Batch(t.Context(), "B-1")
	if err != nil {
		t.Fatal(err)
	}
	var got []string
	for _, r := range rec.Readings {
		got = append(got, r.Body.Gravity.Text)
	}
	// 49 is points as typed, and no damage.
	if want := []string{"49", "1.048", "1.0120", "0.996"}; !reflect.DeepEqual(got, want) {
		t.Errorf("%q, wanted %q", got, want)
	}
	if d := report.Dialect; d.Comma != ';' || d.Decimal != ',' || !d.BOM || !d.CRLF {
		t.Errorf("%v", d)
	}
	// What is read at the reference temperature is not corrected, so 1.0120 is 1.012
	// and no difference is reported. The original gravity of B-1 is known, and the
	// fermenting model too leaves a reading at 20 °C alone.
	if report.DiffersCount != 0 {
		t.Errorf("%+v", report.Differences)
	}
}

// A number of plato or density is never thousandths.
func TestNoDamageOnOtherScales(t *testing.T) {
	s := cellar(t)
	report, err := take(s, "batch_id,taken_at,entered_text,entered_scale,sample_temp_c\nB-1,2026-06-02T08:00:00Z,1020,density,20\n", exchange.Options{})
	if err != nil || report.RepairCount != 0 {
		t.Fatalf("%+v, %v", report, err)
	}
	if got := only(t, s, "B-1").Body.Gravity; got != (journal.Typed{Text: "1020", Scale: "density"}) {
		t.Errorf("%+v", got)
	}
}

// A later row with the other decimal mark than the sample is refused by line.
func TestLateOtherMark(t *testing.T) {
	file := "batch_id;taken_at;entered_text;sample_temp_c\n" + strings.Repeat("B-1;2026-06-02T08:00:00Z;1,020;20\n", 9_000) + "B-1;2026-06-03T08:00:00Z;1.048;20\n"
	report, err := take(cellar(t), file, exchange.Options{})
	if err == nil || len(report.Refused) != 1 || report.Refused[0].Line != 9_002 || !strings.Contains(report.Refused[0].Reason, "decimal mark ','") {
		t.Errorf("%v, %+v", err, report.Refused)
	}
}

// Formula-like text comes through both ways, and never stands bare in the file.
func TestFormulaLikeText(t *testing.T) {
	for _, text := range texts {
		s := newJournals(t).empty()
		b := batch("B-1", "T1")
		b.Product = text
		r := reading("B-1", 5, "-1P", "plato", "20")
		r.Keep = text
		appendAll(t, s, b, r)
		file := readings(t, s, exchange.Standard)
		for _, risky := range []string{"=", "@", "+cold", "-HYPER", "-1P", "\t", "\r\r"} {
			if strings.Contains(file, ","+risky) || strings.Contains(file, `,"`+risky) {
				t.Errorf("%q stands bare in\n%s", risky, file)
			}
		}
		to := newJournals(t).empty()
		if _, err := take(to, file, exchange.Options{Create: true}); err != nil {
			t.Fatalf("%q: %v", text, err)
		}
		got := only(t, to, "B-1").Body
		if got.Keep != text || got.Gravity.Text != "-1P" {
			t.Errorf("%q came back as %q, the reading as %q", text, got.Keep, got.Gravity.Text)
		}
	}
}

func TestDifferences(t *testing.T) {
	from := newJournals(t).empty()
	appendAll(t, from, glass("H1", "sg", "0.001"), batch("B-1", "T1"), og("B-1", "1.0500", "sg"))
	var list []journal.Body
	for i, text := range []string{"1.0480", "1.031", "1.0205", "1.012", "1.013"} {
		r := reading("B-1", 24*i, text, "sg", "26.5")
		r.Instrument = "H1"
		list = append(list, r)
	}
	again := reading("B-1", 96, "1.014", "sg", "26.5") // same minute: their mean is used
	appendAll(t, from, append(list, again)...)
	file := readings(t, from, exchange.SpreadsheetEU)
	report, err := take(newJournals(t).empty(), file, exchange.Options{Create: true})
	if err != nil || report.DiffersCount != 0 || report.Readings != 6 {
		t.Fatalf("%+v, %v: the same readings must give the same figures", report.Differences, err)
	}

	// One figure of line 4 moved by two of its last digits, one made unreadable.
	rows := strings.SplitAfter(file, "\r\n")
	cells := strings.Split(rows[3], ";")
	sg, abv := 14, 21
	was := cells[sg]
	last := was[len(was)-1]
	cells[sg] = was[:len(was)-1] + string(rune('0'+(int(last-'0')+5)%10))
	cells[abv] = "#N/A"
	rows[3] = strings.Join(cells, ";")
	report, err = take(newJournals(t).empty(), strings.Join(rows, ""), exchange.Options{Create: true, DryRun: true})
	if err != nil || report.DiffersCount != 2 {
		t.Fatalf("%+v, %v, wanted two differences", report.Differences, err)
	}
	point := func(s string) string { return strings.Replace(s, ",", ".", 1) }
	if d := report.Differences[0]; d != (exchange.Difference{Line: 4, Batch: "B-1", Column: "sg_20_20", File: point(cells[sg]), Ours: point(was)}) {
		t.Errorf("%+v, wanted %s for %s", d, was, cells[sg])
	}
	if d := report.Differences[1]; d.Line != 4 || d.Column != "abv_pct_20c" || d.File != "not a number" || d.Ours == "" {
		t.Errorf("%+v", d)
	}

	// A file with fewer decimals is compared with those: 1.03 for 1.0328… is one
	// digit off at most.
	cells[sg], cells[abv] = was[:len("1,03")], ""
	rows[3] = strings.Join(cells, ";")
	report, err = take(newJournals(t).empty(), strings.Join(rows, ""), exchange.Options{Create: true, DryRun: true})
	if err != nil || report.DiffersCount != 0 {
		t.Fatalf("%+v, %v", report.Differences, err)
	}
}

// Readings already in the journal and those of the file make one mean.
func TestDifferencesWithReplicatesInTheJournal(t *testing.T) {
	s := cellar(t)
	appendAll(t, s, reading("B-1", 24, "1.020", "sg", "20"))
	at := day0.Add(24 * time.Hour).Format(time.RFC3339)
	file := "batch_id,taken_at,entered_text,sample_temp_c,sg_20_20\nB-1," + at + ",1.022,20,1.0210\n"
	report, err := take(s, file, exchange.Options{})
	if err != nil || report.DiffersCount != 0 {
		t.Errorf("%+v, %v, wanted the mean of 1.020 and 1.022", report.Differences, err)
	}
}

// In an export of ours 1048 is what was typed, unless the derived figure of the row
// has lost its point too.
func TestOwnWholeNumbers(t *testing.T) {
	from := newJournals(t).empty()
	first := og("B-1", "1050", "sg")
	appendAll(t, from, batch("B-1", "T1"), first, reading("B-1", 24, "1048", "sg", "20"), reading("B-1", 96, "999", "sg", "20"))
	for _, p := range exchange.Profiles() {
		file := readings(t, from, p)
		to := newJournals(t).empty()
		report, err := take(to, file, exchange.Options{Create: true})
		if err != nil || report.RepairCount != 0 || report.DiffersCount != 0 {
			t.Fatalf("%s: %+v, %v", p, report, err)
		}
		rec, err := to.Batch(t.Context(), "B-1")
		if err != nil {
			t.Fatal(err)
		}
		if got := []string{rec.OGs[0].Body.Gravity.Text, rec.Readings[0].Body.Gravity.Text, rec.Readings[1].Body.Gravity.Text}; !reflect.DeepEqual(got, []string{"1050", "1048", "999"}) {
			t.Errorf("%s: %q", p, got)
		}
		if again := readings(t, to, p); figuresOnly(again) != figuresOnly(file) {
			t.Errorf("%s: %s\nfrom\n%s", p, again, file)
		}
		// A spreadsheet took the point of 1.048000 for a mark between thousands.
		report, err = take(newJournals(t).empty(), strings.NewReplacer("1,048000", "1048000", "1.048000", "1048000").Replace(file), exchange.Options{Create: true, DryRun: true})
		if err != nil || report.RepairCount != 1 || report.Repairs[0].As != "1.048" {
			t.Errorf("%s: %+v, %v", p, report.Repairs, err)
		}
	}
}

// figuresOnly drops the first column, the number of the entry.
func figuresOnly(table string) string {
	var out []string
	for _, line := range strings.Split(table, "\r\n") {
		out = append(out, strings.TrimLeft(line, "0123456789"))
	}
	return strings.Join(out, "\n")
}

// 64 °F is (64 − 32)/1.8 = 17.777… °C, 64.5 °F 18.0555… °C: two decimals more than
// were typed. What is cut off shows in no figure.
func TestFahrenheit(t *testing.T) {
	from := newJournals(t).empty()
	one, two := reading("B-1", 24, "1.0480", "sg", "64"), reading("B-1", 48, "1.0310", "sg", "64.5")
	one.Temp.Unit, two.Temp.Unit = "F", "F"
	first := og("B-1", "1.0500", "sg")
	first.Temp = journal.TypedTemp{Text: "64", Unit: "F"}
	appendAll(t, from, batch("B-1", "T1"), first, one, two)
	file := readings(t, from, exchange.Standard)
	for _, cell := range []string{",17.78,", ",18.056,", ",1.0500 at 17.78C,"} {
		if !strings.Contains(file, cell) {
			t.Errorf("%s\nlacks %s", file, cell)
		}
	}
	to := newJournals(t).empty()
	report, err := take(to, file, exchange.Options{Create: true})
	if err != nil || report.DiffersCount != 0 {
		t.Fatalf("%+v, %v", report.Differences, err)
	}
}
