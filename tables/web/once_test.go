package web

import (
	"context"
	"errors"
	"net/http"
	"net/http/httptest"
	"net/url"
	"strings"
	"sync"
	"testing"
	"time"
)

func TestStore(t *testing.T) {
	d := &fakeDesk{taken: "2026-11-18 12:00"}
	b := newBrowser(t, newServer(t, d))
	page, fields := b.reading("1.016")
	wantStatus(t, page, 200, "read as 1.016", "Store it")
	if d.count() != 0 {
		t.Fatal("stored before it was confirmed")
	}
	w := b.post("/batch/B1/store", fields)
	wantStatus(t, w, 303)
	after := w.Header().Get("Location")
	wantStatus(t, b.get(after), 200, "stored as #41", "fell 14.4 points", "stands at 1.0176")
	// The time is the one that it was read back with.
	want := Reading{Batch: "B1", Gravity: "1.016", Temp: "18", Taken: "2026-11-18 12:00", Instrument: "H1", Note: "hazy", Operator: "ines"}
	if d.count() != 1 || d.logged[0] != want {
		t.Errorf("stored %+v, wanted %+v", d.logged, want)
	}
	// A message cannot be made up by a link.
	if w := b.get("/batch/B1?done=x"); strings.Contains(w.Body.String(), "stored as") {
		t.Errorf("a message that nothing stands behind: %s", w.Body)
	}
	if w := newBrowser(t, b.s).get(after); strings.Contains(w.Body.String(), "stored as") {
		t.Errorf("another browser sees the message: %s", w.Body)
	}
}

// What is confirmed is what was read back, whatever else the form holds.
func TestStoreWhatWasShown(t *testing.T) {
	d := &fakeDesk{}
	b := newBrowser(t, newServer(t, d))
	_, fields := b.reading("1.016")
	fields.Set("gravity", "1.099")
	fields.Set("operator", "somebody else")
	wantStatus(t, b.post("/batch/B1/store", fields), 303)
	if d.logged[0].Gravity != "1.016" || d.logged[0].Operator != "ines" {
		t.Errorf("stored %+v", d.logged[0])
	}
}

func TestReplay(t *testing.T) {
	d := &fakeDesk{}
	clock := newClock()
	b := newBrowser(t, newServer(t, d, func(c *Config) { c.Now = clock.now }))
	_, fields := b.reading("1.016")
	first := b.post("/batch/B1/store", fields)
	clock.pass(29 * time.Minute)
	again := b.post("/batch/B1/store", fields)
	if again.Code != 303 || again.Header().Get("Location") != first.Header().Get("Location") {
		t.Errorf("sent again: %d to %q, wanted what the first did, %q", again.Code, again.Header().Get("Location"), first.Header().Get("Location"))
	}
	wantStatus(t, b.get(again.Header().Get("Location")), 200, "stored as #41")
	clock.pass(2 * time.Minute)
	wantStatus(t, b.post("/batch/B1/store", fields), 403)
	if d.count() != 1 {
		t.Errorf("stored %d times", d.count())
	}
}

// A double tap is two requests at once.
func TestReplayAtOnce(t *testing.T) {
	d := &fakeDesk{}
	b := newBrowser(t, newServer(t, d))
	_, fields := b.reading("1.016")
	codes := make([]int, 8)
	var wait, begun sync.WaitGroup
	begun.Add(len(codes))
	d.before = func(what string) {
		if what == "log" {
			begun.Wait() // the others come while the first is being stored
		}
	}
	for i := range codes {
		r := b.formRequest("/batch/B1/store", fields)
		r.Host = testHost
		r.AddCookie(&http.Cookie{Name: "gylebook", Value: b.cookies["gylebook"]})
		wait.Go(func() {
			w := httptest.NewRecorder()
			begun.Done()
			b.s.ServeHTTP(w, r)
			codes[i] = w.Code
		})
	}
	wait.Wait()
	for _, code := range codes {
		if code != 303 {
			t.Errorf("statuses %v, wanted 303 for each", codes)
		}
	}
	if d.count() != 1 {
		t.Errorf("stored %d times", d.count())
	}
}

// Whoever has sent a form and gone away has sent it.
func TestStoreForNobody(t *testing.T) {
	d := &fakeDesk{}
	b := newBrowser(t, newServer(t, d))
	_, fields := b.reading("1.016")
	ctx, gone := context.WithCancel(context.Background())
	gone()
	b.do(b.formRequest("/batch/B1/store", fields).WithContext(ctx))
	if d.count() != 1 {
		t.Errorf("stored %d times", d.count())
	}
	wantStatus(t, b.post("/batch/B1/store", fields), 303)
}

func TestTokens(t *testing.T) {
	d := &fakeDesk{last: "40"}
	s := newServer(t, d)
	b, other := newBrowser(t, s), newBrowser(t, s)
	_, good := b.reading("1.016")
	_, foreign := other.reading("1.020")
	undo := b.hidden(b.get("/batch/B1/undo"), "/batch/B1/undo")
	change := func(name, value string) url.Values {
		fields := url.Values{}
		for k, v := range good {
			fields[k] = v
		}
		fields.Set(name, value)
		return fields
	}
	for _, c := range []struct {
		name, path string
		fields     url.Values
	}{
		{"no token", "/batch/B1/store", url.Values{"ticket": good["ticket"]}},
		{"forged token", "/batch/B1/store", change("token", strings.Repeat("A", 43))},
		{"token of another browser", "/batch/B1/store", change("token", foreign.Get("token"))},
		{"no ticket", "/batch/B1/store", url.Values{"token": good["token"]}},
		{"forged ticket", "/batch/B1/store", change("ticket", strings.Repeat("A", 43))},
		{"ticket of another browser", "/batch/B1/store", change("ticket", foreign.Get("ticket"))},
		{"ticket of an undo", "/batch/B1/store", change("ticket", undo.Get("ticket"))},
		{"ticket of another batch", "/batch/B2/store", good},
		{"ticket of a store", "/batch/B1/undo", good},
		{"reading without token", "/batch/B1/reading", url.Values{"gravity": {"1.016"}, "temp": {"18"}, "operator": {"ines"}}},
	} {
		wantStatus(t, b.post(c.path, c.fields), 403, "no longer good")
	}
	// Without the cookie the form is worth nothing.
	wantStatus(t, newBrowser(t, s).post("/batch/B1/store", good), 403)
	if d.count() != 0 || len(d.undone) != 0 {
		t.Errorf("stored %v, undone %v", d.logged, d.undone)
	}
	wantStatus(t, b.post("/batch/B1/store", good), 303)
}

// A refusal has written nothing, so the form may be sent again; after any other
// failure nobody knows, and it may not.
func TestStoreThatFails(t *testing.T) {
	d := &fakeDesk{fail: map[string]error{"log": &Refused{Status: 503, Text: "the journal is busy", Hint: "try again"}}}
	b := newBrowser(t, newServer(t, d))
	_, fields := b.reading("1.016")
	w := b.post("/batch/B1/store", fields)
	wantStatus(t, w, 503, "the journal is busy", "try again", "read as 1.016")
	d.fail = nil
	wantStatus(t, b.post("/batch/B1/store", fields), 303)
	if d.count() != 1 {
		t.Fatalf("stored %d times", d.count())
	}
	for _, fail := range []func(string){nil, func(what string) {
		if what == "log" {
			panic("in the desk")
		}
	}} {
		_, fields = b.reading("1.017")
		if d.before = fail; fail == nil {
			d.fail = map[string]error{"log": errors.New("disk /secret/place is on fire")}
		}
		for range 2 {
			w = b.post("/batch/B1/store", fields)
			wantStatus(t, w, 500, "something failed here")
			if strings.Contains(w.Body.String(), "secret") || strings.Contains(w.Body.String(), "in the desk") {
				t.Errorf("the inside is shown: %s", w.Body)
			}
			d.fail, d.before = nil, nil
		}
	}
	if d.count() != 1 {
		t.Errorf("stored %d times, wanted no more after a failure", d.count())
	}
}

func TestHeld(t *testing.T) {
	d := &fakeDesk{held: "6.0 points over the reading before it", other: &Choice{"B 2/x", "T6 B 2/x"}}
	b := newBrowser(t, newServer(t, d))
	page, fields := b.reading("1.024")
	wantStatus(t, page, 200, "6.0 points over", "is it the wrong tank?", "It was T6 B 2/x", `name="keep"`)
	// The vessel that is proposed gets the same reading, to be read back.
	d.held = ""
	proposed := b.hidden(page, "/batch/B%202%2Fx/reading")
	wantStatus(t, b.post("/batch/B%202%2Fx/reading", proposed), 200, "read as 1.024", `action="/batch/B%202%2Fx/store"`)
	// Without a reason it is refused, and asked again.
	d.held = "6.0 points over the reading before it"
	d.fail = map[string]error{"log": &Refused{Status: 409, Text: "held: 6.0 points over"}}
	w := b.post("/batch/B1/store", fields)
	wantStatus(t, w, 409, `href="#keep"`, `id="keep-wrong"`)
	d.fail = nil
	fields = b.hidden(w, "/batch/B1/store")
	fields.Set("keep", "sample was warm")
	wantStatus(t, b.post("/batch/B1/store", fields), 303)
	if d.count() != 1 || d.logged[0].Keep != "sample was warm" {
		t.Errorf("stored %+v", d.logged)
	}
}

func TestUndo(t *testing.T) {
	d := &fakeDesk{}
	b := newBrowser(t, newServer(t, d))
	wantStatus(t, b.get("/batch/B1/undo"), 409, "nothing here to undo")
	d.last = "40"
	wantStatus(t, b.get("/batch/B1"), 200, `href="/batch/B1/undo"`, "Undo #40")
	fields := b.hidden(b.get("/batch/B1/undo"), "/batch/B1/undo")
	d.last = "41" // meanwhile
	wantStatus(t, b.post("/batch/B1/undo", fields), 422, "name: read nothing", `href="#operator"`)
	fields.Set("operator", "ines")
	fields.Set("reason", "wrong tank")
	w := b.post("/batch/B1/undo", fields)
	wantStatus(t, w, 303)
	wantStatus(t, b.post("/batch/B1/undo", fields), 303)
	wantStatus(t, b.get(w.Header().Get("Location")), 200, "voided #40")
	if len(d.undone) != 1 || d.undone[0] != "40 ines wrong tank" {
		t.Errorf("undone %q, wanted the entry that was shown, once", d.undone)
	}
}

// A session holds so many tickets; the oldest goes, and stores nothing.
func TestTicketsAreBounded(t *testing.T) {
	d := &fakeDesk{}
	b := newBrowser(t, newServer(t, d, func(c *Config) { c.Limits.Tickets = 3 }))
	_, oldest := b.reading("1.010")
	for range 2 {
		b.reading("1.011")
	}
	_, newest := b.reading("1.012")
	wantStatus(t, b.post("/batch/B1/store", oldest), 403)
	wantStatus(t, b.post("/batch/B1/store", newest), 303)
	if d.count() != 1 {
		t.Errorf("stored %d times", d.count())
	}
}
