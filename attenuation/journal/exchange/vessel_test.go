package exchange_test

import (
	"strings"
	"testing"

	"gylebook/attenuation/journal/exchange"
)

// Of three batches made in one vessel the newest has it; the others are open
// without one, and the report says so. One that the journal's own batch is in stays
// with that.
func TestOneVesselTwoBatches(t *testing.T) {
	s := cellar(t)
	file := "batch_id,vessel,taken_at,entered_text,sample_temp_c,product\n" +
		"C-1,T4,2026-06-03T08:00:00Z,1.020,20,Porter\nC-3,t4,2026-08-03T08:00:00Z,1.020,20,Porter\n" +
		"C-2,T4,2026-07-03T08:00:00Z,1.020,20,Porter\nC-4,T1,2026-07-03T08:00:00Z,1.020,20,Porter\n"
	report, err := take(s, file, exchange.Options{Create: true})
	if err != nil {
		t.Fatal(err, report.Refused)
	}
	for id, want := range map[string]string{"C-1": "", "C-2": "", "C-3": "t4", "C-4": "", "B-1": "T1"} {
		rec, err := s.Batch(t.Context(), id)
		if err != nil || rec.Batch.Vessel != want || rec.Closed != nil {
			t.Errorf("%s in %q, %v, wanted %q and open", id, rec.Batch.Vessel, err, want)
		}
	}
	notes := strings.Join(report.Notes, "\n")
	for _, says := range []string{"2 batches are made without a vessel, for a newer one of the file has it: C-1 (T4), C-2 (T4)", "1 batch is made without a vessel, for an open one of the journal has it: C-4 (T1 holds B-1)"} {
		if !strings.Contains(notes, says) {
			t.Errorf("%s\nlacks %q", notes, says)
		}
	}
}
