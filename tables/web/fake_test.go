package web

import (
	"context"
	"crypto/rand"
	"io"
	"net/http"
	"net/http/httptest"
	"net/url"
	"strings"
	"sync"
	"testing"
	"time"

	"gylebook/tables"
)

// fakeDesk is an invented cellar that remembers what it was asked to write.
type fakeDesk struct {
	mu     sync.Mutex
	logged []Reading
	undone []string

	board Board
	last  string // the last entry of every batch
	held  string
	other *Choice
	taken string
	// fail is the error of every answer that has its name in it.
	fail   map[string]error
	before func(what string) // runs before an answer
}

func (d *fakeDesk) step(what string) error {
	if d.before != nil {
		d.before(what)
	}
	d.mu.Lock()
	defer d.mu.Unlock()
	return d.fail[what]
}

func answering(text string) Answer {
	return Answer{Ladders: []tables.Ladder{{Answer: []string{text}}}}
}

// A board that is asked for by nobody any more is an error, as a store makes it one.
func (d *fakeDesk) Board(ctx context.Context) (Board, error) {
	if err := d.step("board"); err != nil {
		return Board{}, err
	}
	return d.board, ctx.Err()
}

func (d *fakeDesk) Batch(_ context.Context, name, _ string) (Batch, error) {
	if name == "gone" {
		return Batch{}, &Refused{Status: http.StatusNotFound, Text: "no batch gone", Hint: "look at the board"}
	}
	return Batch{
		Batch: name, Vessel: "T4", Product: "Lane Bitter", Open: true, Answer: answering("stands at 1.0176"),
		Form:  Form{Instruments: []Choice{{"none", "none of the journal's"}, {"H1", "H1, SG"}}, Instrument: "H1"},
		Curve: "from 1.048 to 1.0176", CurveText: []string{"fell 30 points"}, LastEntry: d.last,
	}, d.step("batch")
}

func (d *fakeDesk) Judge(_ context.Context, r Reading) (Judged, error) {
	return Judged{Answer: answering("read as " + r.Gravity), Held: d.held, Hint: "is it the wrong tank?", Other: d.other, Taken: d.taken}, d.step("judge")
}

func (d *fakeDesk) Log(ctx context.Context, r Reading) (Answer, string, error) {
	if err := d.step("log"); err != nil {
		return Answer{}, "", err
	}
	if err := ctx.Err(); err != nil {
		return Answer{}, "", err
	}
	d.mu.Lock()
	defer d.mu.Unlock()
	d.logged = append(d.logged, r)
	return answering("fell 14.4 points"), "41", nil
}

func (d *fakeDesk) Undo(_ context.Context, entry, operator, reason string) (Answer, error) {
	if err := d.step("undo"); err != nil {
		return Answer{}, err
	}
	d.mu.Lock()
	defer d.mu.Unlock()
	d.undone = append(d.undone, entry+" "+operator+" "+reason)
	return answering("void: entry " + entry), nil
}

func (d *fakeDesk) Bench(_ context.Context, what string, v map[string]string) (Answer, error) {
	return answering(strings.TrimSpace(what + " of " + v["reading"] + v["value"] + v["og"] + " " + v["instrument"])), d.step("bench")
}

func (d *fakeDesk) BenchForm(context.Context) (Form, error) {
	return Form{Instruments: []Choice{{"H1", "H1, SG"}}, Instrument: "H1", Scales: []Choice{{"", "as typed"}, {"plato", "°P"}}}, d.step("form")
}

func (d *fakeDesk) Curve(_ context.Context, _, form string, phone bool) ([]byte, error) {
	if phone {
		form += " for a telephone"
	}
	return []byte(form), d.step("curve")
}

// count is how many readings were stored.
func (d *fakeDesk) count() int {
	d.mu.Lock()
	defer d.mu.Unlock()
	return len(d.logged)
}

// clock is a time that only a test moves.
type clock struct {
	mu sync.Mutex
	at time.Time
}

func newClock() *clock { return &clock{at: time.Date(2026, 11, 18, 12, 0, 0, 0, time.UTC)} }

func (c *clock) now() time.Time {
	c.mu.Lock()
	defer c.mu.Unlock()
	return c.at
}

func (c *clock) pass(d time.Duration) {
	c.mu.Lock()
	defer c.mu.Unlock()
	c.at = c.at.Add(d)
}

const testHost = "127.0.0.1:8080"

// newServer is a server on this machine alone, changed by what is given.
func newServer(t *testing.T, d Desk, change ...func(*Config)) *Server {
	t.Helper()
	cfg := Config{Listen: testHost, Now: newClock().now, Rand: rand.Reader, Log: io.Discard}
	for _, c := range change {
		c(&cfg)
	}
	s, err := New(d, cfg)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// browser keeps cookies as a browser does, and sends forms as one.
type browser struct {
	t       *testing.T
	s       *Server
	cookies map[string]string
	from    string // its address
}

func newBrowser(t *testing.T, s *Server) *browser {
	return &browser{t: t, s: s, cookies: map[string]string{}, from: "127.0.0.1:50000"}
}

func (b *browser) do(r *http.Request) *httptest.ResponseRecorder {
	b.t.Helper()
	if r.Host == "example.com" { // as httptest leaves it
		r.Host = testHost
	}
	r.RemoteAddr = b.from
	for name, value := range b.cookies {
		r.AddCookie(&http.Cookie{Name: name, Value: value})
	}
	w := httptest.NewRecorder()
	b.s.ServeHTTP(w, r)
	for _, c := range w.Result().Cookies() {
		if c.MaxAge < 0 {
			delete(b.cookies, c.Name)
		} else {
			b.cookies[c.Name] = c.Value
		}
	}
	return w
}

func (b *browser) get(path string) *httptest.ResponseRecorder {
	b.t.Helper()
	return b.do(httptest.NewRequest(http.MethodGet, path, nil))
}

// formRequest is a form as a page of this server sends it.
func (b *browser) formRequest(path string, fields url.Values) *http.Request {
	r := httptest.NewRequest(http.MethodPost, path, strings.NewReader(fields.Encode()))
	scheme := "http://"
	if b.s.cfg.TLS {
		scheme = "https://"
	}
	r.Header.Set("Origin", scheme+testHost)
	r.Header.Set("Content-Type", "application/x-www-form-urlencoded")
	return r
}

func (b *browser) post(path string, fields url.Values) *httptest.ResponseRecorder {
	b.t.Helper()
	return b.do(b.formRequest(path, fields))
}

// hidden is what the form with this action holds that nobody types.
func (b *browser) hidden(w *httptest.ResponseRecorder, action string) url.Values {
	b.t.Helper()
	for _, form := range all(parse(b.t, w.Body.String()), "form") {
		if attr(form, "action") != action {
			continue
		}
		fields := url.Values{}
		for _, in := range all(form, "input") {
			if attr(in, "type") == "hidden" {
				fields.Set(attr(in, "name"), attr(in, "value"))
			}
		}
		return fields
	}
	b.t.Fatalf("no form for %s in a page of status %d:\n%s", action, w.Code, w.Body)
	return nil
}

// reading reads one back on batch B1 and returns the page and the form to store it.
func (b *browser) reading(gravity string) (*httptest.ResponseRecorder, url.Values) {
	b.t.Helper()
	fields := b.hidden(b.get("/batch/B1"), "/batch/B1/reading")
	for name, value := range map[string]string{"gravity": gravity, "temp": "18", "operator": "ines", "instrument": "H1", "note": "hazy"} {
		fields.Set(name, value)
	}
	w := b.post("/batch/B1/reading", fields)
	if w.Code != http.StatusOK {
		b.t.Fatalf("reading: status %d, wanted 200:\n%s", w.Code, w.Body)
	}
	return w, b.hidden(w, "/batch/B1/store")
}

// wantStatus fails unless the answer has the status and, of the texts, all.
func wantStatus(t *testing.T, w *httptest.ResponseRecorder, status int, texts ...string) {
	t.Helper()
	if w.Code != status {
		t.Errorf("status %d, wanted %d:\n%s", w.Code, status, w.Body)
	}
	for _, text := range texts {
		if !strings.Contains(w.Body.String(), text) {
			t.Errorf("wanted %q in:\n%s", text, w.Body)
		}
	}
}
