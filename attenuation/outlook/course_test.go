package outlook_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
)

func courseOf(t *testing.T, words string, hours float64) outlook.Course {
	t.Helper()
	c, err := outlook.CourseOf(view(words), after(hours))
	if err != nil {
		t.Fatalf("%q: %v", words, err)
	}
	return c
}

// Readings stand at 20 °C on a 20/20 glass, so that what was typed is what counts.
func TestCourseTakesWhatCounts(t *testing.T) {
	c := courseOf(t, "12:1.045 24:1.040kept 30:1.030void 36:1.030 36:1.032 48:1.020gassy 60:1.015", 50)
	if c.Batch.OG < 47.99 || c.Batch.OG > 48.01 {
		t.Errorf("OG %v points, wanted 48", c.Batch.OG)
	}
	want := []struct{ hours, points float64 }{{12, 45}, {36, 31}, {48, 20}} // two of one minute make their mean
	if len(c.Batch.Readings) != len(want) {
		t.Fatalf("%d readings, wanted %d", len(c.Batch.Readings), len(want))
	}
	for k, w := range want {
		r := c.Batch.Readings[k]
		if math.Abs(r.Hours-w.hours) > 1e-9 || math.Abs(r.Points-w.points) > 0.05 {
			t.Errorf("reading %d: %.2f points at hour %.2f, wanted %g at %g", k, r.Points, r.Hours, w.points, w.hours)
		}
		if math.Abs(r.Division-1) > 1e-6 {
			t.Errorf("reading %d: division %v points, wanted 1, the last place typed", k, r.Division)
		}
	}
	// Half of the last place over √3 is 0.289 points; the thermometer adds a little.
	if u := c.Batch.Readings[0].U; u < 0.288 || u > 0.35 {
		t.Errorf("u %v points, wanted 0.29 and a little", u)
	}
	if plain, gassy := c.Batch.Readings[0].U, c.Batch.Readings[2].U; math.Abs(gassy-math.Hypot(plain, 1)) > 0.02 {
		t.Errorf("u %v not degassed, %v degassed; wanted a point beside it", gassy, plain)
	}
	if c.Last == nil || !c.Last.Source.TakenAt.Equal(after(48)) {
		t.Errorf("last reading %v, wanted that of hour 48", c.Last)
	}
	if text := notes(c); !strings.Contains(text, "1 reading kept as suspect left out") {
		t.Errorf("notes %q", text)
	}
}

func notes(c outlook.Course) string {
	var out []string
	for _, n := range c.Notes {
		out = append(out, n.Text)
	}
	return strings.Join(out, "\n")
}

// Two instruments do not share their errors: those that one has in common count.
func TestCommonErrorCountsBetweenInstruments(t *testing.T) {
	rec := batch("B1", "12:1.045 24:1.040 36:1.030")
	alone := mustCourse(t, journal.Derive(rec, twoInstruments())).Batch.Readings[2].U
	rec.Readings[2].Body.Instrument = "H1"
	both := mustCourse(t, journal.Derive(rec, twoInstruments())).Batch.Readings[2].U
	// A maximum error of 2 points is 2/√3 = 1.155 as a standard uncertainty.
	if both < 1.155 || alone > 0.4 {
		t.Errorf("u %v beside another instrument, %v alone; wanted 1.16 and more, and 0.3", both, alone)
	}
}

func mustCourse(t *testing.T, v journal.View) outlook.Course {
	t.Helper()
	c, err := outlook.CourseOf(v, after(100))
	if err != nil {
		t.Fatal(err)
	}
	return c
}

func twoInstruments() *journal.Book {
	return journal.NewBook([]*journal.InstrumentRecord{{Instrument: journal.Instrument{
		ID: "H1", Type: journal.Hydrometer, Scale: "sg", Basis: "20/20", Division: "0.001", Body: "glass", ReadAt: "bottom", MaxError: "0.002", Since: pitched,
	}}})
}

// 10 L of water in 100 L shift what was read before by the share that is left of the
// original gravity: points mix by volume, 100/110, nearly.
func TestWaterShiftsReadingsBefore(t *testing.T) {
	c := courseOf(t, "12:1.044 20:dilution 24:1.036", 48)
	share := c.Batch.OG / 48
	if math.Abs(share-100./110) > 0.004 {
		t.Errorf("OG %v after the water, %v of 48; wanted about 0.909 of it", c.Batch.OG, share)
	}
	if r := c.Batch.Readings; len(r) != 2 || math.Abs(r[0].Points-44*share) > 0.05 || math.Abs(r[1].Points-36) > 0.05 {
		t.Errorf("readings %+v, wanted 44 points shifted by %v, and 36", r, share)
	}
}

func TestReadingsOfAnotherCourseAreLeftOut(t *testing.T) {
	for _, c := range []struct {
		words string
		n     int
		note  string
	}{
		{"12:1.044 20:sugar 24:1.050 36:1.040", 2, "1 reading from before the sugar left out"},
		// A sample drawn at the moment of a deed came before it.
		{"12:1.044 24:sugar 24:1.044 36:1.040", 1, "2 readings from before the sugar left out"},
		{"12:1.044 20:dry-hop 24:1.036", 2, ""},
		{"12:1.044 20:racking 24:1.036", 2, ""},
		{"12:1.044 24:1.036 30:crash 36:1.030 48:1.030", 2, "2 readings after the cold crash left out"},
		{"12:1.044 24:1.036 30:priming 36:1.030", 2, "1 reading after priming left out"},
		{"12:1.044 24:1.036 60:sugar 60:crash 60:priming", 2, ""}, // still to come
	} {
		got := courseOf(t, c.words, 50)
		if len(got.Batch.Readings) != c.n || !strings.Contains(notes(got), c.note) || c.note == "" && len(got.Notes) > 0 {
			t.Errorf("%q: %d readings, notes %q; wanted %d and %q", c.words, len(got.Batch.Readings), notes(got), c.n, c.note)
		}
	}
}

func TestWatchPeriod(t *testing.T) {
	for _, what := range []string{journal.DryHop, journal.Sugar, journal.Dilution} {
		c := courseOf(t, "12:1.044 20:"+what+" 24:1.036", 48)
		if c.Added != what || !c.Since.Equal(after(20)) || c.Watch.From < 20 || c.Watch.From > 20.001 {
			t.Errorf("%s: watch period of %q since %v from hour %v, wanted hour 20", what, c.Added, c.Since, c.Watch.From)
		}
	}
	if c := courseOf(t, "20:dry-hop 30:dry-hop 40:move", 48); !c.Since.Equal(after(30)) {
		t.Errorf("since %v, wanted the later of two", c.Since)
	}
	for _, words := range []string{"20:racking 30:move", "60:dry-hop", "0:dry-hop"} {
		if c := courseOf(t, words, 48); c.Added != "" || c.Watch.From != 0 {
			t.Errorf("%q: watch period of %q from hour %v, wanted none", words, c.Added, c.Watch.From)
		}
	}
}

// The forced ferment of the wort is not that of the wort with sugar in it.
func TestLimitBeforeAnAddition(t *testing.T) {
	if c := courseOf(t, "10:limit1.0080 20:sugar", 48); c.Watch.LimitKnown {
		t.Errorf("limit %v is used after the sugar", c.Watch.Limit)
	}
	for _, words := range []string{"10:limit1.0080", "20:sugar 30:limit1.0080", "10:limit1.0080 20:dry-hop"} {
		if c := courseOf(t, words, 48); !c.Watch.LimitKnown || math.Abs(c.Watch.Limit-8) > 0.01 {
			t.Errorf("%q: limit %v, %v; wanted 8 points", words, c.Watch.Limit, c.Watch.LimitKnown)
		}
	}
}

func TestRefusals(t *testing.T) {
	noOG := batch("B1", "12:1.044 24:1.036")
	noOG.OGs = nil
	water := batch("B1", "12:1.000")
	water.OGs[0].Body.Gravity = sg("1.0004")
	for _, c := range []struct {
		rec       *journal.Record
		want      error
		why, hint string
	}{
		{noOG, outlook.ErrNoOG, "original gravity not known", "batch og B1"},
		{water, outlook.ErrNoOG, "wanted 1.001 to 1.250", "batch show B1"},
		{batch("B1", "12:1.044 20:sugar? 24:1.046"), outlook.ErrBasis, "sugar added without mass", "void 3 --reason"},
	} {
		_, err := outlook.Of(journal.Derive(c.rec, nil), outlook.History{}, after(48))
		var refused *outlook.Refusal
		if !errors.Is(err, c.want) || !errors.As(err, &refused) {
			t.Errorf("error %v, wanted %v", err, c.want)
			continue
		}
		if !strings.Contains(refused.Why, c.why) || !strings.Contains(refused.Hint(), c.hint) || !strings.HasPrefix(err.Error(), "no forecast for B1: ") {
			t.Errorf("%q with hint %q, wanted %q and %q", err, refused.Hint(), c.why, c.hint)
		}
	}
	// What comes later breaks nothing now.
	if _, err := outlook.Of(view("12:1.044 60:sugar?"), outlook.History{}, after(48)); err != nil {
		t.Errorf("sugar still to come: %v", err)
	}
}

// A logger's readings are thinned: the first and the newest ones stay.
func TestThin(t *testing.T) {
	rec := batch("B1", "")
	for n := range 10000 {
		r := journal.Numbered[journal.Reading]{Number: int64(n + 2), Void: n%10 == 5}
		r.Body = journal.Reading{Batch: "B1", TakenAt: pitched.Add(minutes(n + 1)), Gravity: sg("1.040"), Temp: journal.TypedTemp{Text: "20", Unit: "C"}}
		rec.Readings = append(rec.Readings, r)
	}
	thin, left := outlook.Thin(rec)
	n := len(thin.Readings)
	if n > 240 || n < 200 || n+left != 9000 {
		t.Fatalf("%d readings and %d left out, wanted at most 240 of 9000", n, left)
	}
	if thin.Readings[0].Number != 2 || thin.Readings[n-1].Number != 10001 || thin.Readings[n-72].Number < 9900 {
		t.Errorf("first %d, last %d, 72nd last %d", thin.Readings[0].Number, thin.Readings[n-1].Number, thin.Readings[n-72].Number)
	}
	for k := 1; k < n; k++ {
		if thin.Readings[k].Number <= thin.Readings[k-1].Number {
			t.Fatalf("readings %d and %d out of order", k-1, k)
		}
	}
	if len(rec.Readings) != 10000 {
		t.Error("the record itself was changed")
	}
	small := batch("B1", "12:1.044void 24:1.036")
	if thin, left := outlook.Thin(small); thin != small || left != 0 {
		t.Error("a small record is not returned as it is")
	}
}
