package journal

import "testing"

// The other batches are asked for only when a reading does not fit its own, and
// then they say what they say when they are at hand.
func TestJudgeFindsOthers(t *testing.T) {
	own := brew("B4", "T4", "1.050", "100").read(0, "1.049", "20").read(24, "1.040", "20")
	other := brew("B6", "T6", "1.048", "100").read(0, "1.014", "20").read(24, "1.013", "20")
	for _, c := range []struct {
		text  string
		asked int
	}{
		{"1.037", 0},
		{"1.012", 1}, // falls too far for its own, as expected for T6
		{"1.046", 1}, // rises
	} {
		r := own.reading(48, c.text, "20")
		asked := 0
		s := Situation{Now: after(48), Target: own.rec, Find: func() []*Record {
			asked++
			return []*Record{own.rec, other.rec}
		}}
		_, got := Judge(s, r)
		_, want := Judge(Situation{Now: after(48), Target: own.rec, Others: []*Record{other.rec}}, r)
		if asked != c.asked {
			t.Errorf("%s: asked %d times, wanted %d", c.text, asked, c.asked)
		}
		if code(got) != code(want) || got != nil && *got != *want {
			t.Errorf("%s: %+v, wanted %+v as with the others at hand", c.text, got, want)
		}
	}
}
