package exchange_test

import (
	"context"
	"errors"
	"fmt"
	"slices"
	"strings"
	"testing"
	"time"

	"gylebook/attenuation/journal/exchange"
)

func TestImportRefusesRows(t *testing.T) {
	const good = "B-1,2026-06-02T08:00:00Z,1.020,sg,20,,\n"
	for _, c := range []struct{ name, row, says string }{
		{"unknown batch", "B-11,2026-06-02T08:00:00Z,1.020,sg,20,,\n", "batch B-11 is not in the journal; nearest: B-1"},
		{"closed batch", "B-3,2026-06-02T08:00:00Z,1.020,sg,20,,\n", "batch B-3 is closed"},
		{"no batch", ",2026-06-02T08:00:00Z,1.020,sg,20,,\n", "neither batch_id nor vessel"},
		{"no time", "B-1,,1.020,sg,20,,\n", "taken_at: read"},
		{"a time of day alone", "B-1,08:00,1.020,sg,20,,\n", "wanted a date and a time"},
		{"a time to come", "B-1,2027-06-02T08:00:00Z,1.020,sg,20,,\n", "still to come"},
		{"no reading", "B-1,2026-06-02T08:00:00Z,,sg,20,,\n", "entered_text: read"},
		{"a doubtful reading", "B-1,2026-06-02T08:00:00Z,12.1,sg,20,,\n", "12.1"},
		{"unknown scale", "B-1,2026-06-02T08:00:00Z,1.020,cubits,20,,\n", "cubits"},
		{"no temperature", "B-1,2026-06-02T08:00:00Z,1.020,sg,,,\n", "sample_temp_c: read"},
		{"too hot", "B-1,2026-06-02T08:00:00Z,1.020,sg,68,,\n", "sample_temp_c: read"},
		{"unknown status", "B-1,2026-06-02T08:00:00Z,1.020,sg,20,perhaps,\n", `status: read "perhaps"`},
		{"void without a reason", "B-1,2026-06-02T08:00:00Z,1.020,sg,20,void,\n", "without a reason"},
		{"a cell too few", "B-1,2026-06-02T08:00:00Z,1.020,sg,20,\n", "6 fields, wanted 7"},
		{"a rise of 2 points", "B-1,2026-06-02T08:01:00Z,1.022,sg,20,,\n", "2.0 points over the reading before it"},
		{"over the original gravity", "B-1,2026-06-01T08:01:00Z,1.053,sg,20,,\n", "3.0 points over the original gravity 1.0500, and nothing was added; status suspect with a reason keeps it"},
		{"a fall in an hour", "B-1,2026-06-02T09:00:00Z,1.010,sg,20,,\n", "10.0 points under the reading before it (1.0200) after 1.0 h; status suspect"},
		{"far from another", "B-1,2026-06-02T08:00:30Z,1.0175,sg,20,,\n", "2.5 points from the other reading of this minute"},
		{"changed places", "B-1,2026-06-02T12:00:00Z,18,sg,1.012,,\n", "wanted the gravity first"},
		{"before pitching", "B-1,2026-05-31T08:00:00Z,1.050,sg,20,,\n", "wanted a time after pitching"},
		{"a reason too long", "B-1,2026-06-02T08:00:00Z,1.020,sg,20,void," + strings.Repeat("x", 1001) + "\n", "at most 1000"},
	} {
		t.Run(c.name, func(t *testing.T) {
			s := cellar(t)
			before := entries(t, s)
			report, err := take(s, head+good+c.row+good, exchange.Options{})
			if !errors.Is(err, exchange.ErrRefused) {
				t.Fatalf("%v, wanted ErrRefused", err)
			}
			if report.RefusedCount != 1 || report.Refused[0].Line != 3 || !strings.Contains(report.Refused[0].Reason, c.says) {
				t.Errorf("%+v, wanted line 3 with %q", report.Refused, c.says)
			}
			if !strings.Contains(err.Error(), "line 3: ") {
				t.Errorf("%q names no line 3", err)
			}
			if entries(t, s) != before {
				t.Error("something was written")
			}
		})
	}
}

// What is held is kept with a reason, and not compared with what comes after it.
func TestImportKeepsSuspects(t *testing.T) {
	s := cellar(t)
	file := head + "B-1,2026-06-01T08:01:00Z,1.053,sg,20,suspect,foam\n" + "B-1,2026-06-02T08:00:00Z,1.020,sg,20,,\n" +
		"B-1,2026-06-02T09:00:00Z,1.010,sg,20,suspect,read twice\n" + "B-1,2026-06-02T10:00:00Z,1.020,sg,20,,\n"
	report, err := take(s, file, exchange.Options{})
	if err != nil || report.Readings != 4 {
		t.Fatalf("%+v, %v", report, err)
	}
	rec, err := s.Batch(context.Background(), "B-1")
	if err != nil {
		t.Fatal(err)
	}
	var kept []string
	for _, r := range rec.Readings {
		kept = append(kept, r.Body.Keep)
	}
	if want := []string{"foam", "", "read twice", ""}; !slices.Equal(kept, want) {
		t.Errorf("kept for %q, wanted %q", kept, want)
	}
}

// One bad row in ten thousand: that row is named and nothing is written.
func TestOneBadRowInTenThousand(t *testing.T) {
	s := cellar(t)
	before := entries(t, s)
	var b strings.Builder
	b.WriteString(head)
	for i := range 10_000 {
		text := "1.020"
		if i == 7_654 {
			text = "1.48"
		}
		fmt.Fprintf(&b, "B-1,%s,%s,sg,20,,\n", day0.Add(24*time.Hour+time.Duration(i)*time.Minute).Format(time.RFC3339), text)
	}
	report, err := take(s, b.String(), exchange.Options{})
	// The header is line 1, so row 7654 counted from 0 is line 7656.
	if !errors.Is(err, exchange.ErrRefused) || report.RefusedCount != 1 || report.Refused[0].Line != 7656 || !strings.Contains(report.Refused[0].Reason, `1.48`) {
		t.Fatalf("%v, %+v", err, report.Refused)
	}
	if report.Rows != 10_000 || entries(t, s) != before {
		t.Errorf("%d rows read, %d entries, wanted 10000 and %d", report.Rows, entries(t, s), before)
	}
	report, err = take(s, strings.Replace(b.String(), "1.48", "1.020", 1), exchange.Options{})
	if err != nil || report.Readings != 10_000 || entries(t, s) != before+10_000 {
		t.Fatalf("put right: %+v, %v", report, err)
	}
}

func TestRefusalsAreCounted(t *testing.T) {
	file := head + strings.Repeat("B-0,2026-06-02T08:00:00Z,1.020,sg,20,,\n", 70) + "B-1,2026-06-02T08:00:00Z,x,sg,20,,\n"
	report, err := take(cellar(t), file, exchange.Options{})
	want := []exchange.Refusal{{Line: 2, Reason: report.Refused[0].Reason, Rows: 70}, {Line: 72, Reason: report.Refused[1].Reason, Rows: 1}}
	if !errors.Is(err, exchange.ErrRefused) || report.RefusedCount != 71 || !report.Lacks || !slices.Equal(report.Refused, want) {
		t.Fatalf("%v, %+v, wanted 70 rows as one reason", err, report.Refused)
	}
	file = head
	for i := range exchange.MaxListed + 20 {
		file += fmt.Sprintf("B-1,2026-06-02T08:00:00Z,x%d,sg,20,,\n", i)
	}
	report, err = take(cellar(t), file, exchange.Options{})
	if !errors.Is(err, exchange.ErrRefused) || report.RefusedCount != exchange.MaxListed+20 || len(report.Refused) != exchange.MaxListed {
		t.Fatalf("%v, %d listed", err, len(report.Refused))
	}
	// Line 72 was found first, when the file was read; the journal refused lines 2 to 71.
	for i, r := range report.Refused {
		if r.Line != i+2 {
			t.Fatalf("refusal %d is of line %d, wanted the first lines in order", i, r.Line)
		}
	}
}
