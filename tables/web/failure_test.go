package web

import (
	"bytes"
	"context"
	"errors"
	"strings"
	"testing"
)

func TestDeskErrors(t *testing.T) {
	for _, c := range []struct {
		name string
		err  error
		want int
		text string
	}{
		{"not found", &Refused{Status: 404, Text: "no such batch", Hint: "look at the board"}, 404, "no such batch"},
		{"busy", &Refused{Status: 503, Text: "the journal is busy"}, 503, "the journal is busy"},
		{"changed", &Refused{Status: 409, Text: "it is closed"}, 409, "it is closed"},
		{"no status", &Refused{Text: "refused"}, 422, "refused"},
		{"wrapped", errors.Join(errors.New("inside"), &Refused{Status: 404, Text: "no such batch"}), 404, "no such batch"},
		{"a status that is none", &Refused{Status: 7, Text: "odd"}, 500, "odd"},
		{"any other", errors.New("open /secret/place: denied"), 500, "something failed here"},
		{"time", context.DeadlineExceeded, 500, "something failed here"},
	} {
		for what, path := range map[string]string{
			"board": "/", "batch": "/batch/B1", "bench": "/bench?what=abv&og=1&fg=1", "form": "/bench", "curve": "/batch/B1/curve.svg", "judge": "/batch/B1/readback?gravity=1&temp=1",
		} {
			b := newBrowser(t, newServer(t, &fakeDesk{fail: map[string]error{what: c.err}}))
			w := b.get(path)
			if w.Code != c.want || !strings.Contains(w.Body.String(), c.text) || strings.Contains(w.Body.String(), "secret") || strings.Contains(w.Body.String(), "inside") {
				t.Errorf("%s, %s: status %d, wanted %d with %q:\n%s", c.name, path, w.Code, c.want, c.text, w.Body)
			}
			checkHeaders(t, c.name+path, w)
		}
	}
}

func TestPanic(t *testing.T) {
	var log bytes.Buffer
	d := &fakeDesk{before: func(string) { panic("in the\ndesk at /secret/place") }}
	b := newBrowser(t, newServer(t, d, func(c *Config) { c.Log = &log }))
	w := b.get("/batch/B1")
	wantStatus(t, w, 500, "something failed here")
	checkHeaders(t, "panic", w)
	if strings.Contains(w.Body.String(), "secret") || strings.Contains(w.Body.String(), "goroutine") {
		t.Errorf("the inside is shown:\n%s", w.Body)
	}
	if lines := strings.Count(log.String(), "\n"); lines != 1 || !strings.Contains(log.String(), "panic GET /batch/B1: ") {
		t.Errorf("%d lines in the log, wanted one:\n%s", lines, &log)
	}
	d.before = nil
	wantStatus(t, b.get("/batch/B1"), 200)
}

// What is in a path makes no line of its own in the log.
func TestLogLines(t *testing.T) {
	var log bytes.Buffer
	b := newBrowser(t, newServer(t, &fakeDesk{}, func(c *Config) { c.Log = &log }))
	b.get("/")
	b.post("/batch/a%0aPOST%20forged/store", nil)
	b.reading("1.016")
	if got := strings.Count(log.String(), "\n"); got != 2 || strings.Contains(log.String(), "\nPOST forged") {
		t.Errorf("log of two forms:\n%s", &log)
	}
}
