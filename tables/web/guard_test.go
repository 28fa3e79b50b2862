package web

import (
	"net"
	"net/http"
	"net/http/httptest"
	"net/url"
	"strings"
	"testing"
)

// A page of another site that has its own name resolved to this machine is told
// from ours by the name.
func TestHostNames(t *testing.T) {
	open := newServer(t, &fakeDesk{}, func(c *Config) { c.Names = []string{"Cellar.example"} })
	for host, want := range map[string]int{
		"127.0.0.1:8080": 200, "localhost:8080": 200, "LOCALHOST": 200, "[::1]:8080": 200, "[::1]": 200,
		"cellar.example": 200, "cellar.example:8380": 200, "127.0.0.1:9000": 200,
		"rebound.example:8080": 421, "192.0.2.7:8080": 421, "127.0.0.1.rebound.example": 421, "": 421,
		"localhost.": 421, "localhost@rebound.example": 421, "cellar.example:80:80": 421, "[::1": 421,
		"localhost:x": 421, "::ffff:127.0.0.1": 200, "cellar.example.rebound.example": 421, "127.1": 421,
	} {
		r := httptest.NewRequest(http.MethodGet, "/", nil)
		r.Host = host
		w := httptest.NewRecorder()
		open.ServeHTTP(w, r)
		if w.Code != want {
			t.Errorf("host %q: status %d, wanted %d", host, w.Code, want)
		}
		if want == 421 && (w.Header().Get("Set-Cookie") != "" || strings.Contains(w.Body.String(), "href")) {
			t.Errorf("host %q: got a cookie or a link: %s", host, w.Body)
		}
	}
}

// A server on every address answers to the one that the connection came to.
func TestHostOfEveryAddress(t *testing.T) {
	h, err := newHosts("0.0.0.0:8380", []string{"cellar.example"})
	if err != nil {
		t.Fatal(err)
	}
	at := &net.TCPAddr{IP: net.ParseIP("192.0.2.7"), Port: 8380}
	for host, want := range map[string]bool{
		"192.0.2.7:8380": true, "cellar.example:8380": true, "192.0.2.8:8380": false, "0.0.0.0:8380": false, "localhost:8380": false, "rebound.example": false,
	} {
		if got := h.allow(host, at); got != want {
			t.Errorf("host %q: %v, wanted %v", host, got, want)
		}
	}
	if h.allow("192.0.2.7:8380", nil) {
		t.Error("an address was allowed that no connection came to")
	}
	if _, err := newHosts("127.0.0.1:80", []string{"a b"}); err == nil {
		t.Error("a name with a space was taken")
	}
}

func TestOrigin(t *testing.T) {
	d := &fakeDesk{}
	s := newServer(t, d)
	b := newBrowser(t, s)
	for _, c := range []struct {
		name, origin, site string
		want               int
	}{
		{"another site", "https://rebound.example", "", 403},
		{"another port", "http://127.0.0.1:9999", "", 403},
		{"another scheme", "https://127.0.0.1:8080", "", 403},
		{"no origin that can be told", "null", "", 403},
		{"neither header", "", "", 403},
		{"the browser says another site", "http://127.0.0.1:8080", "cross-site", 403},
		{"the browser says another port", "http://127.0.0.1:8080", "same-site", 403},
		{"typed into the address", "", "none", 403},
		{"ours", "http://127.0.0.1:8080", "same-origin", 303},
	} {
		_, fields := b.reading("1.016")
		r := b.formRequest("/batch/B1/store", fields)
		r.Header.Del("Origin")
		if c.origin != "" {
			r.Header.Set("Origin", c.origin)
		}
		if c.site != "" {
			r.Header.Set("Sec-Fetch-Site", c.site)
		}
		if w := b.do(r); w.Code != c.want {
			t.Errorf("%s: status %d, wanted %d", c.name, w.Code, c.want)
		}
	}
	if d.count() != 1 {
		t.Errorf("%d readings stored, wanted the one of ours", d.count())
	}
}

// A link on another site opens nothing by itself: no cookie came with it, and a new
// session would end the old one. The page offers the way from here.
func TestLinkFromAnotherSite(t *testing.T) {
	b := newBrowser(t, newServer(t, &fakeDesk{}))
	b.get("/")
	before := b.cookies["gylebook"]
	r := httptest.NewRequest(http.MethodGet, "/batch/B1?gravity=1.016", nil)
	r.Header.Set("Sec-Fetch-Site", "cross-site")
	r.Header.Set("Sec-Fetch-Mode", "navigate")
	w := b.do(r)
	wantStatus(t, w, 403, `href="/batch/B1?gravity=1.016"`)
	if b.cookies["gylebook"] != before {
		t.Error("the session changed")
	}
	r = httptest.NewRequest(http.MethodGet, "//rebound.example/x", nil)
	r.URL = &url.URL{Path: "//rebound.example/x"}
	r.Header.Set("Sec-Fetch-Site", "cross-site")
	r.Header.Set("Sec-Fetch-Mode", "navigate")
	if w := b.do(r); strings.Contains(w.Body.String(), "href=\"//") {
		t.Errorf("a link to another host: %s", w.Body)
	}
}

func TestMethodsAndPaths(t *testing.T) {
	b := newBrowser(t, newServer(t, &fakeDesk{}))
	for _, c := range []struct {
		method, path string
		want         int
		allow        string
	}{
		{"GET", "/", 200, ""},
		{"HEAD", "/", 200, ""},
		{"HEAD", "/batch/B1", 200, ""},
		{"OPTIONS", "/", 405, "GET, HEAD"},
		{"PUT", "/batch/B1", 405, "GET, HEAD"},
		{"DELETE", "/batch/B1/store", 405, "POST"},
		{"GET", "/batch/B1/store", 405, "POST"},
		{"TRACE", "/bench", 405, "GET, HEAD"},
		{"OPTIONS", "*", 404, ""},
		{"GET", "/login", 404, ""},
		{"GET", "/favicon.ico", 404, ""},
		{"GET", "/batch", 404, ""},
		{"GET", "/batch/", 404, ""},
		{"GET", "/static/../server.go", 404, ""},
		{"GET", "/static/%2e%2e/server.go", 404, ""},
		{"GET", "/static/..%2fserver.go", 404, ""},
		{"GET", "/static/tank.css/", 404, ""},
		{"GET", "/static/", 404, ""},
		{"GET", "/static/nothing", 404, ""},
		{"GET", "/batch/..%2f..%2fetc%2fpasswd", 404, ""},
		{"GET", "/batch/a%00b", 404, ""},
		{"GET", "/batch/a%0d%0ab", 404, ""},
		{"GET", "/batch/%ff", 404, ""},
		{"GET", "/batch/gone", 404, ""},
		{"GET", "/batch/Caf%C3%A9%20%231%2F2", 200, ""},
		{"GET", "/static/tank.js", 200, ""},
		{"GET", "/static/tank.css", 200, ""},
		{"GET", "/static/tank.svg", 200, ""},
	} {
		r := httptest.NewRequest(c.method, "/", nil)
		if c.path != "*" {
			r = httptest.NewRequest(c.method, c.path, nil)
		} else {
			r.URL, r.RequestURI = &url.URL{Path: "*"}, "*"
		}
		w := b.do(r)
		if w.Code != c.want || w.Header().Get("Allow") != c.allow {
			t.Errorf("%s %s: status %d, Allow %q, wanted %d, %q", c.method, c.path, w.Code, w.Header().Get("Allow"), c.want, c.allow)
		}
		checkHeaders(t, c.method+" "+c.path, w)
	}
}

func TestBodies(t *testing.T) {
	d := &fakeDesk{}
	b := newBrowser(t, newServer(t, d))
	_, fields := b.reading("1.016")
	for _, c := range []struct {
		name, kind, body string
		want             int
	}{
		{"10 MB", "application/x-www-form-urlencoded", strings.Repeat("a", 10<<20), 413},
		{"one byte more than the limit", "application/x-www-form-urlencoded", strings.Repeat("a", 64<<10+1), 413},
		{"JSON", "application/json", `{}`, 415},
		{"text, as a form of another site may send", "text/plain", fields.Encode(), 415},
		{"files", "multipart/form-data; boundary=x", "--x--", 415},
		{"no type", "", fields.Encode(), 415},
		{"a field twice", "application/x-www-form-urlencoded", fields.Encode() + "&token=x", 400},
		{"a semicolon", "application/x-www-form-urlencoded", "a;b", 400},
		{"a broken escape", "application/x-www-form-urlencoded", "a=%zz", 400},
		{"a control character", "application/x-www-form-urlencoded", fields.Encode() + "&keep=%1b%5b2J", 400},
		{"text that reads backwards", "application/x-www-form-urlencoded", fields.Encode() + "&keep=%e2%80%ae", 400},
		{"no UTF-8", "application/x-www-form-urlencoded", fields.Encode() + "&keep=%ff", 400},
		{"many fields", "application/x-www-form-urlencoded", fields.Encode() + "&" + strings.Join(strings.Split("abcdefghijklmnopqrstuvwxyz", ""), "=&"), 400},
	} {
		for _, lengthKnown := range []bool{true, false} {
			r := b.formRequest("/batch/B1/store", nil)
			r2 := httptest.NewRequest(http.MethodPost, "/batch/B1/store", strings.NewReader(c.body))
			r2.Header = r.Header
			r2.Header.Set("Content-Type", c.kind)
			if !lengthKnown {
				r2.ContentLength = -1
			}
			w := b.do(r2)
			if w.Code != c.want {
				t.Errorf("%s: status %d, wanted %d", c.name, w.Code, c.want)
			}
			checkHeaders(t, c.name, w)
		}
	}
	if d.count() != 0 {
		t.Errorf("%d readings stored", d.count())
	}
	// The same ticket is still good.
	wantStatus(t, b.post("/batch/B1/store", fields), 303)
}

// checkHeaders wants the headers that every answer has.
func checkHeaders(t *testing.T, name string, w *httptest.ResponseRecorder) {
	t.Helper()
	h := w.Header()
	csp := h.Get("Content-Security-Policy")
	for _, part := range []string{"default-src 'none'", "base-uri 'none'", "frame-ancestors 'none'", "form-action "} {
		if !strings.Contains(csp, part) {
			t.Errorf("%s: policy %q, wanted %s in it", name, csp, part)
		}
	}
	if strings.Contains(csp, "script-src") && !strings.Contains(csp, "script-src 'self';") {
		t.Errorf("%s: policy %q lets other scripts run", name, csp)
	}
	for key, want := range map[string]string{
		"X-Content-Type-Options": "nosniff", "X-Frame-Options": "DENY", "Referrer-Policy": "same-origin",
		"Cross-Origin-Opener-Policy": "same-origin", "Cross-Origin-Resource-Policy": "same-origin",
	} {
		if h.Get(key) != want {
			t.Errorf("%s: %s is %q, wanted %q", name, key, h.Get(key), want)
		}
	}
	if cache := h.Get("Cache-Control"); cache != "no-store" && h.Get("ETag") == "" {
		t.Errorf("%s: Cache-Control %q, wanted no-store", name, cache)
	}
}

// What was typed stands in no header as it was typed.
func TestHeaderInjection(t *testing.T) {
	s := newServer(t, &fakeDesk{})
	b := newBrowser(t, s)
	for _, path := range []string{"/batch/a%0d%0aSet-Cookie:%20x=y", "/batch/x?done=%0d%0aSet-Cookie:%20x=y", "/%0d%0aSet-Cookie:x=y", "/bench?what=%0d%0aX: y"} {
		r := httptest.NewRequest(http.MethodGet, strings.ReplaceAll(path, " ", "%20"), nil)
		w := b.do(r)
		for key, values := range w.Header() {
			for _, value := range values {
				if strings.ContainsAny(key+value, "\r\n") || key == "X" || strings.Contains(value, "x=y") {
					t.Errorf("%s: header %s: %q", path, key, value)
				}
			}
		}
	}
}
