package curve

import (
	"math"
	"testing"

	"gylebook/attenuation"
	"gylebook/gravity/method"
)

// sixPast are finished batches that ended at 22 % of the original gravity.
func sixPast() []Fitted {
	return []Fitted{aCourse(0.77), aCourse(0.78), aCourse(0.79), aCourse(0.78), aCourse(0.775), aCourse(0.785)}
}

// ended is one of them, read to its end at 11 points.
func ended() Batch {
	return Batch{OG: 50, UOG: 0.5, Readings: readingsOf(0, 50, 24, 44, 48, 28, 72, 16, 96, 12, 120, 11, 144, 11, 168, 11)}
}

func TestStates(t *testing.T) {
	cut := func(n int) Batch { b := ended(); b.Readings = b.Readings[:n]; return b }
	stuck := Batch{OG: 50, UOG: 0.5, Readings: readingsOf(0, 50, 24, 44, 48, 28, 72, 24, 96, 24, 120, 24, 144, 24)}
	slow := Batch{OG: 50, UOG: 0.5, Readings: readingsOf(0, 50, 24, 49, 48, 47.5, 96, 43, 144, 38, 168, 36)}
	for _, c := range []struct {
		name  string
		batch Batch
		watch Watch
		want  State
	}{
		{"at its end for days", ended(), Watch{}, Terminal},
		{"falling", cut(4), Watch{}, Moving},
		{"just pitched", cut(1), Watch{}, Moving},
		{"stands still too high", stuck, Watch{}, Stalled},
		{"slow", slow, Watch{}, Sluggish},
		{"hops a day ago", ended(), Watch{From: 140}, Moving},
		{"hops long ago", ended(), Watch{From: 100}, Terminal},
		{"slow yeast without a forced ferment", ended(), Watch{Slow: true}, ProbablyTerminal},
		{"slow yeast at its limit", ended(), Watch{Slow: true, Limit: 10, LimitKnown: true}, Terminal},
		{"slow yeast above its limit", ended(), Watch{Slow: true, Limit: 4, LimitKnown: true}, Stalled},
		{"cooled while falling", ended(), Watch{Crash: 80}, Moving},
	} {
		e, err := NewPrior(Beer, sixPast()).Evidence(c.batch, 1000, c.watch)
		if err != nil {
			t.Errorf("%s: %v", c.name, err)
			continue
		}
		if e.State != c.want {
			t.Errorf("%s: %s (left %.2f, flat %.0f h), wanted %s", c.name, e.State, e.Left, e.FlatHours, c.want)
		}
	}
}

func TestProbablyTerminalBeforeTheRule(t *testing.T) {
	b := ended()
	b.Readings = b.Readings[:7] // at 11 for 24 h, within a point for 48
	b.Readings[4].Points = 13
	e, err := NewPrior(Beer, sixPast()).Evidence(b, 1000, Watch{})
	if err != nil {
		t.Fatal(err)
	}
	if e.State != ProbablyTerminal || e.Unchanged {
		t.Errorf("%s, unchanged %v, left %.2f: wanted probably terminal", e.State, e.Unchanged, e.Left)
	}
	if at, ok := NewPrior(Beer, sixPast()).Since(b, 1000, Watch{}); !ok || at < 96 || at > 144 {
		t.Errorf("since hour %g, %v, wanted one of the last readings", at, ok)
	}
	b.Readings = b.Readings[:4]
	if at, ok := NewPrior(Beer, sixPast()).Since(b, 1000, Watch{}); ok {
		t.Errorf("since hour %g while it falls", at)
	}
}

func TestUnchangedNeedsPointAndTwoDays(t *testing.T) {
	for _, c := range []struct {
		readings []Reading
		want     bool
	}{
		{readingsOf(0, 50, 100, 12, 148, 11), true},    // 1 point, 48 h
		{readingsOf(0, 50, 100, 12, 147.9, 12), false}, // short of 48 h
		{readingsOf(0, 50, 100, 12.1, 148, 11), false}, // more than a point
		{readingsOf(0, 50, 100, 12, 124, 14, 148, 12), false},
	} {
		e, err := NewPrior(Beer, nil).Evidence(Batch{OG: 50, Readings: c.readings}, 1000, Watch{})
		if err != nil {
			t.Fatal(err)
		}
		if e.Unchanged != c.want {
			t.Errorf("%v: unchanged %v, wanted %v", c.readings, e.Unchanged, c.want)
		}
	}
}

func TestEvidenceStates(t *testing.T) {
	e, err := NewPrior(Beer, sixPast()).Evidence(ended(), 1000, Watch{Crash: 150, Limit: 10, LimitKnown: true})
	if err != nil {
		t.Fatal(err)
	}
	if !says(e.Notes, method.Interpreted, "after the cold crash") {
		t.Errorf("notes %v do not name the reading after the crash", e.Notes)
	}
	if !e.AboveLimitKnown || e.AboveLimit != 1 {
		t.Errorf("%g above the limit, wanted 11-10 = 1", e.AboveLimit)
	}
	gpl, volumes := attenuation.CO2ToCome(e.Undetected)
	if !e.UndetectedKnown || !(e.Undetected > 0 && e.Undetected < 5) || e.CO2GPL != gpl || e.CO2Volumes != volumes {
		t.Errorf("%g points undetected, %g g/L, %g volumes", e.Undetected, e.CO2GPL, e.CO2Volumes)
	}
	if !e.SlopeKnown || math.IsNaN(e.Slope.NotExcluded) || e.Slope.N != e.FlatN {
		t.Errorf("slope %+v of %d flat readings", e.Slope, e.FlatN)
	}
}
