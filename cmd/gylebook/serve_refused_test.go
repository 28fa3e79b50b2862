package main

import (
	"bufio"
	"fmt"
	"io"
	"net"
	"net/http"
	"net/url"
	"strings"
	"testing"
	"time"
)

// What did not come from a page of this server is refused, and nothing is stored.
func TestServeRefuses(t *testing.T) {
	t.Parallel()
	s := newServed(t).start()
	v := newVisitor(s.url, nil)
	before := len(s.exported())
	ticket := v.ticketFor(t, "LB-17", "1.013")
	store := "/batch/LB-17/store"
	host := func(name string) func(*http.Request) { return func(r *http.Request) { r.Host = name } }
	header := func(name, value string) func(*http.Request) {
		return func(r *http.Request) { r.Header.Set(name, value) }
	}
	for _, c := range []struct {
		what, method, path, body string
		change                   func(*http.Request)
		status                   int
	}{
		{"another host name", "GET", "/", "", host("cellar.example"), http.StatusMisdirectedRequest},
		{"another host name with the port", "POST", store, ticket.Encode(), host("rebound.example:8380"), http.StatusMisdirectedRequest},
		{"an address of another machine", "GET", "/batch/LB-17", "", host("192.0.2.7"), http.StatusMisdirectedRequest},
		{"a form of another site", "POST", store, ticket.Encode(), header("Origin", "https://elsewhere.example"), http.StatusForbidden},
		{"a form of a sandbox", "POST", store, ticket.Encode(), header("Origin", "null"), http.StatusForbidden},
		{"a form of another port", "POST", store, ticket.Encode(), header("Origin", "http://127.0.0.1:1"), http.StatusForbidden},
		{"another site, by what the browser says", "POST", store, ticket.Encode(), header("Sec-Fetch-Site", "cross-site"), http.StatusForbidden},
		{"no word of where it came from", "POST", store, ticket.Encode(), func(r *http.Request) { r.Header.Del("Origin"); r.Header.Del("Sec-Fetch-Site") }, http.StatusForbidden},
		{"a picture in another site", "GET", "/batch/LB-17/curve.svg", "", header("Sec-Fetch-Site", "cross-site"), http.StatusForbidden},
		{"a forged token", "POST", store, with(ticket, "token", strings.Repeat("A", 43)), nil, http.StatusForbidden},
		{"no token", "POST", store, with(ticket, "token", ""), nil, http.StatusForbidden},
		{"a forged ticket", "POST", store, with(ticket, "ticket", strings.Repeat("A", 43)), nil, http.StatusForbidden},
		{"the ticket of another batch", "POST", "/batch/LB-16/store", ticket.Encode(), nil, http.StatusForbidden},
		{"the ticket of another deed", "POST", "/batch/LB-17/undo", ticket.Encode(), nil, http.StatusForbidden},
		{"a body of JSON", "POST", store, "{}", header("Content-Type", "application/json"), http.StatusUnsupportedMediaType},
		{"a field twice", "POST", store, ticket.Encode() + "&ticket=x", nil, http.StatusBadRequest},
		{"another method", "DELETE", "/batch/LB-17", "", nil, http.StatusMethodNotAllowed},
		{"a store by a link", "GET", store + "?" + ticket.Encode(), "", nil, http.StatusMethodNotAllowed},
		{"a path upwards", "GET", "/static/../../../etc/passwd", "", nil, http.StatusNotFound},
		{"a path upwards, escaped", "GET", "/static/..%2f..%2f..%2fetc%2fpasswd", "", nil, http.StatusNotFound},
		{"a path upwards as a batch", "GET", "/batch/..%2f..%2fetc%2fpasswd", "", nil, http.StatusNotFound},
		{"a batch that is not there", "GET", "/batch/LB-99", "", nil, http.StatusNotFound},
		{"a picture that is not there", "GET", "/batch/LB-99/curve.svg", "", nil, http.StatusNotFound},
		{"a zero byte in a path", "GET", "/batch/LB-17%00", "", nil, http.StatusNotFound},
	} {
		got, err := v.ask(c.method, c.path, c.body, c.change)
		if err != nil {
			t.Errorf("%s: %v", c.what, err)
			continue
		}
		got.expect(t, c.what, c.status)
		tellsNothing(t, c.what, got, s.place)
	}
	stranger := newVisitor(s.url, nil)
	stranger.do(t, store, ticket).expect(t, "the form of somebody else", http.StatusForbidden)
	if after := len(s.exported()); after != before {
		t.Fatalf("%d entries were stored", after-before)
	}
	// All that has not spent the ticket: it is still good, once.
	v.do(t, store, ticket).expect(t, "the form itself", http.StatusSeeOther)
	v.do(t, store, ticket).expect(t, "the form again", http.StatusSeeOther)
	if after := len(s.exported()); after != before+1 {
		t.Errorf("%d entries were stored, wanted 1", after-before)
	}
}

// with is a form with one field in another way.
func with(form url.Values, name, value string) string {
	other := url.Values{}
	for k, list := range form {
		other[k] = list
	}
	other.Set(name, value)
	return other.Encode()
}

// tellsNothing demands the strict headers of an answer, and that it holds nothing of
// the computer.
func tellsNothing(t *testing.T, what string, got shown, place string) {
	t.Helper()
	for name, want := range map[string]string{"X-Content-Type-Options": "nosniff", "Content-Security-Policy": "default-src 'none'", "Cache-Control": "no-"} {
		if !strings.Contains(got.header.Get(name), want) {
			t.Errorf("%s: header %s is %q, wanted %q in it", what, name, got.header.Get(name), want)
		}
	}
	for _, secret := range []string{place, "root:", "goroutine", ".go:", "sqlite"} {
		if strings.Contains(got.body, secret) {
			t.Errorf("%s: the page says %q", what, secret)
		}
	}
}

// A body far beyond any form ends at the limit, sent at once or without its length.
func TestServeLargeBody(t *testing.T) {
	t.Parallel()
	s := newServed(t).start()
	address := strings.TrimPrefix(s.url, "http://")
	const size = 10 << 20
	for what, head := range map[string]string{
		"with its length": fmt.Sprintf("Content-Length: %d\r\n\r\n", size),
		"in chunks":       "Transfer-Encoding: chunked\r\n\r\n" + fmt.Sprintf("%x\r\n", size),
	} {
		c, err := net.Dial("tcp", address)
		if err != nil {
			t.Fatal(err)
		}
		defer func() { _ = c.Close() }()
		_ = c.SetDeadline(time.Now().Add(time.Minute))
		fmt.Fprintf(c, "POST /batch/LB-17/store HTTP/1.1\r\nHost: %s\r\nOrigin: %s\r\nContent-Type: application/x-www-form-urlencoded\r\n%s", address, s.url, head)
		go func() { _, _ = io.Copy(c, strings.NewReader("note="+strings.Repeat("x", size))) }()
		answer, err := http.ReadResponse(bufio.NewReader(c), nil)
		if err != nil {
			t.Errorf("10 MB %s: %v", what, err)
			continue
		}
		if answer.StatusCode != http.StatusRequestEntityTooLarge {
			t.Errorf("10 MB %s: status %d, wanted 413", what, answer.StatusCode)
		}
	}
	newVisitor(s.url, nil).see(t, "/").expect(t, "the board after it", http.StatusOK)
}

// Line ends that are typed into a path, a field or a header start no header.
func TestServeHeaderInjection(t *testing.T) {
	t.Parallel()
	s := newServed(t).start()
	v := newVisitor(s.url, nil)
	for _, path := range []string{
		"/batch/LB-17%0d%0aX-Planted:%20yes", "/batch/LB-17/curve.png?phone=1%0d%0aX-Planted:%20yes",
		"/bench?what=abv%0d%0aX-Planted:%20yes", "/static/tank.css%0d%0aX-Planted:%20yes",
	} {
		if got := v.see(t, path); got.header.Get("X-Planted") != "" {
			t.Errorf("%s planted a header", path)
		}
	}
	before := len(s.exported())
	page := v.see(t, "/batch/LB-17")
	form := page.form("/batch/LB-17/reading")
	for name, value := range map[string]string{
		"gravity": "1.013", "temp": "18", "instrument": "H2",
		"operator": "nell\r\nSet-Cookie: a=b", "note": "clear\r\nX-Planted: yes",
	} {
		form.Set(name, value)
	}
	back := v.do(t, "/batch/LB-17/reading", form)
	done := v.do(t, "/batch/LB-17/store", back.form("/batch/LB-17/store")).expect(t, "stored", http.StatusSeeOther)
	for _, got := range []shown{back, done, v.see(t, done.header.Get("Location"))} {
		if got.header.Get("X-Planted") != "" || strings.Contains(strings.Join(got.header.Values("Set-Cookie"), " "), "a=b") {
			t.Errorf("a field planted a header: %v", got.header)
		}
	}
	// On one line of the log, and in the journal as one line of text.
	if said := s.stderr(); strings.Contains(said, "\nSet-Cookie") || strings.Contains(said, "\nX-Planted") {
		t.Errorf("a field began a line of the log: %s", said)
	}
	all := s.exported()
	if len(all) != before+1 || strings.ContainsAny(all[before].By+fmt.Sprint(all[before].Body["note"]), "\r\n") {
		t.Errorf("stored %+v", all[before:])
	}
}
