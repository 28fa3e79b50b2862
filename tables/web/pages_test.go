package web

import (
	"net/http"
	"net/http/httptest"
	"net/url"
	"strings"
	"testing"

	"gylebook/tables"
)

// nasty is what a name must not be able to do.
const nasty = `"><script>alert(1)</script><img src=x onerror=alert(1)>'`

// everyPage is every page, as a browser sees it.
func everyPage(t *testing.T) map[string]*httptest.ResponseRecorder {
	t.Helper()
	d := &fakeDesk{
		last: "40", held: "too high",
		board: Board{
			Title: "2 open; 1 late",
			Vessels: []Vessel{
				{Name: "T4", Batch: "B1", Product: nasty, Symbol: "!", Word: "no reading 51 h", Attend: true, Why: "late"},
				{Batch: "B 2/" + nasty, Word: "falling", Gravity: "1.0382", Day: "1", Hours: "16", Fall: "7.0", Apparent: "9", Next: "1.03"},
			},
			Notes: []tables.Note{{Code: "caution", Text: nasty}},
		},
	}
	b := newBrowser(t, newServer(t, d))
	pages := map[string]*httptest.ResponseRecorder{
		"board": b.get("/"), "batch": b.get("/batch/B1"), "bench": b.get("/bench"), "undo": b.get("/batch/B1/undo"),
		"bench, answered": b.get("/bench?what=correct&reading=1.050&temp=28"), "bench, not read": b.get("/bench?what=abv&og=1.048"),
		"not found": b.get("/nowhere"), "batch with what was typed": b.get("/batch/B1?gravity=" + url.QueryEscape(nasty) + "&note=x"),
	}
	pages["held"], _ = b.reading("1.024")
	d.held = ""
	pages["read back"], _ = b.reading(nasty)
	_, fields := b.reading("1.016")
	pages["stored"] = b.get(b.post("/batch/B1/store", fields).Header().Get("Location"))
	fields.Set("temp", "18")
	pages["not read"] = b.post("/batch/B1/reading", fields)
	pages["refused"] = newBrowser(t, b.s).post("/batch/B1/store", fields)
	d.last = ""
	pages["nothing to undo"] = b.get("/batch/B1/undo")
	d.board = Board{}
	pages["empty board"] = b.get("/")
	r := httptest.NewRequest(http.MethodGet, "/", nil)
	r.Host = "rebound.example"
	pages["wrong host"] = b.do(r)
	in := newBrowser(t, newServer(t, d, withPassphrase(t)))
	pages["log-in"] = in.get("/login")
	pages["not logged in"] = in.login(nasty, "x", "/")
	return pages
}

func TestMarkup(t *testing.T) {
	titles := map[string]string{}
	for name, w := range everyPage(t) {
		checkHeaders(t, name, w)
		if kind := w.Header().Get("Content-Type"); kind != "text/html; charset=utf-8" {
			t.Errorf("%s: type %q", name, kind)
		}
		root := parse(t, w.Body.String())
		for _, fault := range faults(root) {
			t.Errorf("%s: %s", name, fault)
		}
		if n := len(all(root, "script")); n > 1 {
			t.Errorf("%s: %d scripts", name, n)
		}
		for _, img := range all(root, "img") {
			if attr(img, "src") == "x" {
				t.Errorf("%s: a name became a picture", name)
			}
		}
		found := false
		for _, meta := range all(root, "meta") {
			found = found || attr(meta, "name") == "viewport" && attr(meta, "content") == "width=device-width, initial-scale=1"
		}
		if !found {
			t.Errorf("%s: no viewport", name)
		}
		title := textOf(all(root, "title")[0])
		if other, taken := titles[title]; taken && name != "batch with what was typed" && other != "batch with what was typed" {
			t.Errorf("%s and %s have the same title %q", name, other, title)
		}
		titles[title] = name
	}
}

// What a keyboard on glass and a screen reader need.
func TestReadingForm(t *testing.T) {
	b := newBrowser(t, newServer(t, &fakeDesk{}))
	root := parse(t, b.get("/batch/B1").Body.String())
	inputs := map[string]map[string]string{}
	for _, n := range append(all(root, "input"), all(root, "select")...) {
		as := map[string]string{}
		for _, a := range n.Attr {
			as[a.Key] = a.Val
		}
		inputs[attr(n, "name")] = as
	}
	for _, name := range []string{"gravity", "temp"} {
		if in := inputs[name]; in["inputmode"] != "decimal" || in["autocomplete"] != "off" || in["type"] != "text" {
			t.Errorf("%s: %v", name, in)
		}
	}
	for _, name := range []string{"gravity", "temp", "taken", "instrument", "note", "operator", "token"} {
		if inputs[name] == nil {
			t.Errorf("no field %s", name)
		}
	}
	for _, option := range all(root, "option") {
		if _, selected := attribute(option, "selected"); selected != (attr(option, "value") == "H1") {
			t.Errorf("option %s selected: %v", attr(option, "value"), selected)
		}
	}
	// None of the instruments stays none when the form comes back.
	root = parse(t, b.get("/batch/B1?gravity=1.016&instrument=none").Body.String())
	for _, option := range all(root, "option") {
		if _, selected := attribute(option, "selected"); selected != (attr(option, "value") == "none") {
			t.Errorf("came back: option %s selected: %v", attr(option, "value"), selected)
		}
	}
	live := false
	for _, n := range all(root, "div") {
		live = live || attr(n, "id") == "readback" && attr(n, "aria-live") == "polite"
	}
	if !live {
		t.Error("no live region")
	}
	if alt := attr(all(root, "img")[0], "alt"); alt != "from 1.048 to 1.0176" {
		t.Errorf("alt %q", alt)
	}
}

// An error stands above the form with a link to its field, and at the field.
func TestErrorInForm(t *testing.T) {
	d := &fakeDesk{fail: map[string]error{"judge": &Refused{Text: `read "12.1"`, Hint: "type 12.1P", Field: "temp"}}}
	b := newBrowser(t, newServer(t, d))
	fields := b.hidden(b.get("/batch/B1"), "/batch/B1/reading")
	for name, value := range map[string]string{"gravity": "12.1", "temp": "18", "operator": "ines", "note": "kept"} {
		fields.Set(name, value)
	}
	w := b.post("/batch/B1/reading", fields)
	wantStatus(t, w, 422, `role="alert"`, `<a href="#temp">read &#34;12.1&#34;</a>`, "type 12.1P", `value="12.1"`, `value="kept"`, `aria-invalid="true" aria-describedby="temp-wrong"`, `id="temp-wrong"`)
	if faults := faults(parse(t, w.Body.String())); len(faults) > 0 {
		t.Error(faults)
	}
	delete(fields, "gravity")
	wantStatus(t, b.post("/batch/B1/reading", fields), 422, `href="#gravity"`, "gravity: read nothing")
}

func TestReadbackFragment(t *testing.T) {
	d := &fakeDesk{}
	b := newBrowser(t, newServer(t, d))
	w := b.get("/batch/B1/readback?gravity=" + url.QueryEscape(nasty) + "&temp=18")
	wantStatus(t, w, 200, "read as &#34;&gt;&lt;script&gt;")
	if strings.Contains(w.Body.String(), "<html") || strings.Contains(w.Body.String(), "<script") || w.Header().Get("Set-Cookie") != "" {
		t.Errorf("a piece of a page, wanted nothing else: %s", w.Body)
	}
	d.fail = map[string]error{"judge": &Refused{Text: "read x", Hint: "type y"}}
	wantStatus(t, b.get("/batch/B1/readback?gravity=1&temp=18"), 422, "read x", "type y")
	w = b.get("/batch/B1/readback?gravity=&temp=18")
	if wantStatus(t, w, 200); strings.TrimSpace(w.Body.String()) != "" {
		t.Errorf("half a reading: %s", w.Body)
	}
	if d.count() != 0 {
		t.Error("stored")
	}
}

func TestCurveAndAssets(t *testing.T) {
	b := newBrowser(t, newServer(t, &fakeDesk{}))
	for path, want := range map[string]string{
		"/batch/B1/curve.svg": "image/svg+xml svg", "/batch/B1/curve.png": "image/png png", "/batch/B1/curve.svg?phone=1": "image/svg+xml svg for a telephone",
	} {
		w := b.get(path)
		if got := w.Header().Get("Content-Type") + " " + w.Body.String(); got != want {
			t.Errorf("%s: %q, wanted %q", path, got, want)
		}
		if !strings.Contains(w.Header().Get("Content-Security-Policy"), "sandbox") {
			t.Errorf("%s: a picture that may run script", path)
		}
	}
	w := b.get("/static/tank.css")
	wantStatus(t, w, 200, "prefers-color-scheme: dark", "prefers-reduced-motion", "@media print", "min-height: 3rem", ":focus-visible")
	if strings.Contains(w.Body.String(), "url(") || strings.Contains(w.Body.String(), "@import") {
		t.Error("the stylesheet fetches something")
	}
	r := httptest.NewRequest(http.MethodGet, "/static/tank.css", nil)
	r.Header.Set("If-None-Match", w.Header().Get("ETag"))
	if again := b.do(r); again.Code != 304 || again.Body.Len() > 0 {
		t.Errorf("asked again: status %d", again.Code)
	}
}

func TestBench(t *testing.T) {
	d := &fakeDesk{}
	b := newBrowser(t, newServer(t, d))
	for path, want := range map[string]string{
		"/bench?what=correct&reading=1.050&temp=28": "correct of 1.050 H1", "/bench?what=correct&reading=1.050&temp=28&instrument=H2": "correct of 1.050 H2", "/bench?what=convert&value=12P&from=": "convert of 12P", "/bench?what=abv&og=1.048&fg=1.010": "abv of 1.048",
	} {
		wantStatus(t, b.get(path), 200, want)
	}
	wantStatus(t, b.get("/bench?what=correct&reading=1.050"), 422, `href="#correct-temp"`, `id="correct-temp-wrong"`, `value="1.050"`)
	wantStatus(t, b.get("/bench?what=brew"), 404)
	wantStatus(t, b.get("/bench?value="+strings.Repeat("x", maxText+1)), 400)
	d.fail = map[string]error{"bench": &Refused{Text: "read 12.1", Field: "value"}}
	wantStatus(t, b.get("/bench?what=convert&value=12.1"), 422, `href="#convert-value"`)
}
