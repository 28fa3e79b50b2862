package journal

import (
	"strings"
	"testing"
	"time"
)

// The target falls from 1.040 to 1.031 in a day; the other stands at 1.012. A reading
// of 1.012 a day later is 19 points off the first one's line (of 1.022 that is 10).
func TestJudgeByForecast(t *testing.T) {
	t4 := func() *builder { return brew("B4", "T4", "1.050", "").read(0, "1.040", "20").read(24, "1.031", "20") }
	t6 := func() *builder { return brew("B6", "T6", "1.048", "").read(0, "1.0125", "20").read(24, "1.0120", "20") }
	type answer struct {
		sg, sd float64
		ok     bool
	}
	for _, tt := range []struct {
		name   string
		text   string
		expect map[string]answer
		code   string
		asked  int
	}{
		// By the line 10 points off with 5.1 to the standard deviation, by the forecast 10
		// off with 2: more than 3 of them.
		{"the forecast is sure", "1.012", map[string]answer{"B4": {1.022, 0.002, true}}, HoldOther, 2},
		{"the forecast has no answer", "1.012", map[string]answer{}, "", 1},
		{"the forecast meant it", "1.012", map[string]answer{"B4": {1.013, 0.002, true}}, "", 1},
		{"the other is not there by its forecast", "1.012", map[string]answer{"B4": {1.022, 0.002, true}, "B6": {1.006, 0.001, true}}, "", 2},
		// Within 5 points of the line nobody is asked.
		{"near its line", "1.020", map[string]answer{"B4": {1.040, 0.001, true}}, "", 0},
	} {
		asked := 0
		target, other := t4(), t6()
		s := Situation{Now: after(48), Target: target.rec, Book: NewBook([]*InstrumentRecord{glass("H1")}), Others: []*Record{other.rec}}
		s.Expect = func(rec *Record, at time.Time) (sg, sd float64, ok bool) {
			asked++
			if !at.Equal(after(48)) {
				t.Errorf("%s: asked about %v", tt.name, at)
			}
			a := tt.expect[rec.Batch.ID]
			return a.sg, a.sd, a.ok
		}
		_, hold := Judge(s, target.reading(48, tt.text, "20"))
		if code(hold) != tt.code || asked != tt.asked {
			t.Errorf("%s: held as %q (%v) after asking %d times, wanted %q after %d", tt.name, code(hold), hold, asked, tt.code, tt.asked)
		}
		if hold != nil && !strings.Contains(hold.Text, "from the 1.0220 expected here; closer to T6's expected 1.01") {
			t.Errorf("%s: %q", tt.name, hold.Text)
		}
	}
}
