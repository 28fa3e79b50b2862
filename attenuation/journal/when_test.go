package journal

import (
	"errors"
	"strings"
	"testing"
	"time"
	_ "time/tzdata"

	"pgregory.net/rapid"
)

func zone(t testing.TB, name string) *time.Location {
	t.Helper()
	loc, err := time.LoadLocation(name)
	if err != nil {
		t.Fatal(err)
	}
	return loc
}

func TestParseTime(t *testing.T) {
	berlin := zone(t, "Europe/Berlin")
	now := time.Date(2026, 10, 24, 16, 0, 0, 0, time.UTC) // 18:00 in Berlin
	for text, want := range map[string]string{
		"2026-10-24 12:00":              "2026-10-24T12:00:00+02:00",
		"2026-10-24T12:00":              "2026-10-24T12:00:00+02:00",
		" 2026-10-24  12:00:30 ":        "2026-10-24T12:00:30+02:00",
		"24.10.2026 12:00":              "2026-10-24T12:00:00+02:00",
		"1.2.2026 9:05":                 "2026-02-01T09:05:00+01:00", // the day first
		"2026-10-24T12:00:00Z":          "2026-10-24T12:00:00Z",
		"2026-10-24T12:00:00+05:30":     "2026-10-24T12:00:00+05:30",
		"2026-10-24T12:00:00.250+02:00": "2026-10-24T12:00:00.25+02:00",
		"12:00":                         "2026-10-24T12:00:00+02:00",
		"23:59":                         "2026-10-24T23:59:00+02:00", // today, still to come
		"today 07:30":                   "2026-10-24T07:30:00+02:00",
		"yesterday 18:30":               "2026-10-23T18:30:00+02:00",
		"now":                           "2026-10-24T18:00:00+02:00",
		// The night in which the clocks go back, 3:00 to 2:00.
		"2026-10-25 01:59":        "2026-10-25T01:59:00+02:00",
		"2026-10-25 03:00":        "2026-10-25T03:00:00+01:00",
		"2026-10-25 02:30 +02:00": "2026-10-25T02:30:00+02:00",
		"2026-10-25 02:30+01:00":  "2026-10-25T02:30:00+01:00",
		// The night in which they go forward, 2:00 to 3:00.
		"2026-03-29 01:59": "2026-03-29T01:59:00+01:00",
		"2026-03-29 03:00": "2026-03-29T03:00:00+02:00",
	} {
		got, err := ParseTime(text, berlin, now)
		if err != nil || got.Format(time.RFC3339Nano) != want {
			t.Errorf("%q: %s, %v; want %s", text, got.Format(time.RFC3339Nano), err, want)
		}
	}
}

func TestParseTimeRefuses(t *testing.T) {
	berlin := zone(t, "Europe/Berlin")
	now := time.Date(2026, 10, 24, 16, 0, 0, 0, time.UTC)
	for text, wants := range map[string]string{
		"2026-10-25 02:30":          "2026-10-25 02:30 happens twice: add +02:00 or +01:00",
		"2026-10-25 02:00":          "2026-10-25 02:00 happens twice: add +02:00 or +01:00",
		"2026-03-29 02:30":          "2026-03-29 02:30 does not exist",
		"2026-03-29 02:00":          "2026-03-29 02:00 does not exist",
		"2026-10-24":                "type 2026-10-24 12:00",
		"yesterday":                 "type yesterday 12:00",
		"10/24/2026 12:00":          timeAdvice,
		"2026-02-30 12:00":          timeAdvice,
		"25:00":                     timeAdvice,
		"2026-10-24 12:00 +2":       timeAdvice,
		"2026-10-24 12:00 +99:99":   timeAdvice,
		"0000-01-01 12:00":          timeAdvice,
		"tomorrow 12:00":            timeAdvice,
		"":                          timeAdvice,
		"-01:00":                    timeAdvice,
		strings.Repeat("1", 100):    timeAdvice,
		"2026-10-24 12:00\x00":      timeAdvice,
		"2026-10-24 12:00 12:00":    timeAdvice,
		"2026-10-24 12:00:00 PM":    timeAdvice,
		"24.10.26 12:00":            timeAdvice,
		"2026-10-24 12:00 Europe/X": timeAdvice,
	} {
		got, err := ParseTime(text, berlin, now)
		var e *TimeError
		if !errors.As(err, &e) {
			t.Errorf("%q: %v, %v; want a *TimeError", text, got, err)
			continue
		}
		if !strings.Contains(e.Hint(), wants) || !strings.HasPrefix(e.Error(), "read ") || !strings.Contains(e.Error(), ", wanted ") {
			t.Errorf("%q: %q, hint %q; want %q", text, e, e.Hint(), wants)
		}
	}
}

// The night of 24 to 25 October 2026 has 25 hours in Berlin.
func TestElapsedThroughTheChangeOfClocks(t *testing.T) {
	berlin := zone(t, "Europe/Berlin")
	a, err := ParseTime("2026-10-24 12:00", berlin, day0)
	if err != nil {
		t.Fatal(err)
	}
	b, err := ParseTime("2026-10-25 12:00", berlin, day0)
	if err != nil {
		t.Fatal(err)
	}
	v := Derive(&Record{Batch: Batch{Pitched: &a}}, nil)
	if h, ok := v.Elapsed(b); !ok || h != 25 {
		t.Errorf("%v h, %v; want 25", h, ok)
	}
	// 12.5 points in 25 h are 12 a day.
	one := brew("B1", "T1", "1.050", "")
	for _, r := range []struct {
		at   time.Time
		text string
	}{{a, "1.0400"}, {b, "1.0275"}} {
		x := one.reading(0, r.text, "20")
		x.TakenAt = r.at
		one.add(x)
	}
	fall, ok := Derive(one.rec, nil).Fall24h()
	if near(t, "fall", fall, 12, 1e-9); !ok {
		t.Error("no fall")
	}
}

// What is read is what the clock on the wall showed, in every zone.
func TestParseTimeKeepsTheWallClock(t *testing.T) {
	zones := []*time.Location{time.UTC, zone(t, "Europe/Berlin"), zone(t, "America/St_Johns"), zone(t, "Australia/Lord_Howe"), zone(t, "Pacific/Apia")}
	rapid.Check(t, func(t *rapid.T) {
		loc := rapid.SampledFrom(zones).Draw(t, "zone")
		at := time.Unix(rapid.Int64Range(0, 4e9).Draw(t, "s"), 0).In(loc)
		text := at.Format("2006-01-02 15:04:05")
		got, err := ParseTime(text, loc, day0)
		if err == nil && got.Format("2006-01-02 15:04:05") != text {
			t.Fatalf("%s in %s is %s", text, loc, got)
		}
		// With its offset every moment can be typed.
		got, err = ParseTime(at.Format("2006-01-02 15:04:05 -07:00"), loc, day0)
		if _, o := at.Zone(); o%60 == 0 && (err != nil || !got.Equal(at)) {
			t.Fatalf("%s is %s, %v", at, got, err)
		}
	})
}

func FuzzParseTime(f *testing.F) {
	for _, s := range []string{"12:00", "2026-10-25 02:30", "24.10.2026 12:00", "now", "yesterday 18:30", "2026-10-24T12:00:00Z", ""} {
		f.Add(s)
	}
	berlin := zone(f, "Europe/Berlin")
	f.Fuzz(func(t *testing.T, text string) {
		at, err := ParseTime(text, berlin, day0)
		if err == nil && checkTime("time", at) != nil {
			t.Errorf("%q is %v", text, at)
		}
	})
}
