package exchange_test

import (
	"context"
	"errors"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/exchange"
)

// What was restored from an export is the same to the byte, and verifies.
func TestLinesRoundTrip(t *testing.T) {
	js := newJournals(t)
	rapid.Check(t, func(t *rapid.T) {
		from := js.empty()
		defer from.Close()
		aJournal(t, from)
		first := lines(t, from)
		to := js.empty()
		defer to.Close()
		n, err := to.Restore(context.Background(), exchange.ReadLines(strings.NewReader(first)))
		if err != nil {
			t.Fatal(err)
		}
		if want := entries(t, from); n != want || int64(strings.Count(first, "\n")) != want {
			t.Fatalf("%d restored of %d", n, want)
		}
		if second := lines(t, to); second != first {
			t.Fatalf("second export\n%s\nwanted\n%s", second, first)
		}
		if n, err := journal.VerifyAll(context.Background(), to); err != nil || n != entries(t, from) {
			t.Fatalf("%d hold, %v", n, err)
		}
	})
}

func export(t *testing.T) string {
	s := newJournals(t).empty()
	appendAll(t, s, glass("H1", "sg", "0.001"), batch("B-1", "T1"), reading("B-1", 1, "1.0480", "sg", "18"))
	return lines(t, s)
}

func collect(file string) ([]journal.Entry, error) {
	var list []journal.Entry
	for e, err := range exchange.ReadLines(strings.NewReader(file)) {
		if err != nil {
			return list, err
		}
		list = append(list, e)
	}
	return list, nil
}

func TestReadLinesRefuses(t *testing.T) {
	good := export(t)
	third := strings.SplitAfter(good, "\n")[2]
	for _, c := range []struct{ name, line, says string }{
		{"unknown field of the entry", strings.Replace(third, `{"number"`, `{"colour":"red","number"`, 1), `unknown field "colour"`},
		{"unknown field of the body", strings.Replace(third, `"gassy"`, `"ph":4,"gassy"`, 1), `unknown field "body.ph"`},
		{"unknown field inside the body", strings.Replace(third, `"scale"`, `"basis":"x","scale"`, 1), `unknown field "body.gravity.basis"`},
		{"a name in other capitals", strings.Replace(third, `"gassy"`, `"Gassy"`, 1), `unknown field "body.Gassy"`},
		{"unknown kind", strings.Replace(third, `"kind":"reading"`, `"kind":"guess"`, 1), `unknown kind of entry "guess"`},
		{"no body", `{"number":1,"recorded_at":"2026-12-01T12:00:00.000Z","by":"m","kind":"reading"}` + "\n", "not an entry"},
		{"a list for a body", strings.Replace(third, `"body":{`, `"body":[],"x":{`, 1), "not an entry"},
		{"cut short", third[:40], "not an entry"},
		{"two on one line", strings.TrimSpace(third) + third, "not an entry"},
		{"not UTF-8", strings.Replace(third, "1.0480", "1.0\xff480", 1), "UTF-8"},
		{"too long", `{"by":"` + strings.Repeat("x", exchange.MaxLine) + "\"}\n", "longer than 1048576 bytes"},
	} {
		t.Run(c.name, func(t *testing.T) {
			list, err := collect(strings.TrimSuffix(good, third) + c.line)
			if err == nil || !strings.HasPrefix(err.Error(), "line 3: ") || !strings.Contains(err.Error(), c.says) {
				t.Errorf("%v, wanted line 3 with %q", err, c.says)
			}
			if len(list) != 2 {
				t.Errorf("%d entries before it, wanted 2", len(list))
			}
		})
	}
}

// Spacing is not content: another program may have written the line anew.
func TestReadLinesOtherSpacing(t *testing.T) {
	good := export(t)
	spaced := strings.ReplaceAll(strings.ReplaceAll(good, `":`, `": `), "\n", "\r\n\r\n")
	s := newJournals(t).empty()
	if _, err := s.Restore(context.Background(), exchange.ReadLines(strings.NewReader(spaced))); err != nil {
		t.Fatal(err)
	}
	if got := lines(t, s); got != good {
		t.Errorf("%s\nwanted\n%s", got, good)
	}
}

// A changed digit shows in the digest, and nothing is restored.
func TestRestoreTampered(t *testing.T) {
	bad := strings.Replace(export(t), "1.0480", "1.0460", 1)
	s := newJournals(t).empty()
	_, err := s.Restore(context.Background(), exchange.ReadLines(strings.NewReader(bad)))
	if !errors.Is(err, journal.ErrTampered) || !strings.Contains(err.Error(), "entry 3") {
		t.Errorf("%v, wanted ErrTampered with entry 3", err)
	}
	if n := entries(t, s); n != 0 {
		t.Errorf("%d entries kept", n)
	}
}

type full struct{}

func (full) Write([]byte) (int, error) { return 0, errFull }

var errFull = errors.New("no space")

func TestWritersReportTheError(t *testing.T) {
	s := newJournals(t).empty()
	appendAll(t, s, batch("B-1", "T1"), reading("B-1", 1, "1.048", "sg", "18"))
	if _, err := exchange.WriteLines(context.Background(), full{}, s); !errors.Is(err, errFull) {
		t.Errorf("lines: %v", err)
	}
	if err := exchange.WriteReadings(context.Background(), full{}, s, exchange.Standard, nil); !errors.Is(err, errFull) {
		t.Errorf("readings: %v", err)
	}
}

// What is read can be written and read again.
func FuzzReadLines(f *testing.F) {
	e, err := journal.Entry{Number: 1, RecordedAt: now, By: by, Body: reading("B-1", 1, "1.0480", "sg", "18")}.Seal("")
	if err != nil {
		f.Fatal(err)
	}
	line, err := e.MarshalJSON()
	if err != nil {
		f.Fatal(err)
	}
	f.Add(string(line))
	f.Add("{}\n\n[]")
	f.Add(strings.Replace(string(line), `"gassy"`, `"x":{"y":[1]},"gassy"`, 1))
	f.Fuzz(func(t *testing.T, file string) {
		list, err := collect(file)
		if err != nil && !strings.HasPrefix(err.Error(), "line ") {
			t.Errorf("%v names no line", err)
		}
		for _, e := range list {
			line, err := e.MarshalJSON()
			if err != nil {
				continue // a year that JSON has no form for
			}
			again, err := collect(string(line))
			if err != nil || len(again) != 1 {
				t.Fatalf("%s: %v", line, err)
			}
			if second, err := again[0].MarshalJSON(); err != nil || string(second) != string(line) {
				t.Errorf("%s, %v, wanted %s", second, err, line)
			}
		}
	})
}
