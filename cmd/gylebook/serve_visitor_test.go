package main

import (
	"crypto/tls"
	"fmt"
	"html"
	"io"
	"net/http"
	"net/http/cookiejar"
	"net/url"
	"regexp"
	"strings"
	"testing"
	"time"
)

// visitor is a browser without eyes: it keeps cookies, sends what a form of the page
// holds, and says where the form came from.
type visitor struct {
	url    string
	client *http.Client
}

func newVisitor(url string, trust *tls.Config) *visitor {
	jar, err := cookiejar.New(nil)
	if err != nil {
		panic(err) // it has no options that could be wrong
	}
	return &visitor{url: url, client: &http.Client{
		Jar: jar, Timeout: time.Minute,
		Transport:     &http.Transport{TLSClientConfig: trust, MaxIdleConnsPerHost: 2},
		CheckRedirect: func(*http.Request, []*http.Request) error { return http.ErrUseLastResponse },
	}}
}

// shown is an answer.
type shown struct {
	status int
	header http.Header
	body   string
}

// hidden are the fields of a form that nobody types.
var hidden = regexp.MustCompile(`<input type="hidden" name="(\w+)" value="([^"]*)">`)

// form is what the form with this action would send, as it stands in the page.
func (s shown) form(action string) url.Values {
	v := url.Values{}
	_, rest, found := strings.Cut(s.body, `action="`+action+`"`)
	if !found {
		return v
	}
	rest, _, _ = strings.Cut(rest, "</form>")
	for _, m := range hidden.FindAllStringSubmatch(rest, -1) {
		v.Set(m[1], html.UnescapeString(m[2]))
	}
	return v
}

// say is what an answer says in its heading, or the start of it.
func (s shown) heading() string {
	_, rest, found := strings.Cut(s.body, "<h1>")
	if !found {
		return fmt.Sprintf("%.80q", s.body)
	}
	text, _, _ := strings.Cut(rest, "</h1>")
	return text
}

func (v *visitor) send(r *http.Request) (shown, error) {
	answer, err := v.client.Do(r)
	if err != nil {
		return shown{}, err
	}
	defer func() { _ = answer.Body.Close() }()
	body, err := io.ReadAll(answer.Body)
	return shown{answer.StatusCode, answer.Header, string(body)}, err
}

// ask makes a request as a browser would, save for what change does to it.
func (v *visitor) ask(method, path, body string, change func(*http.Request)) (shown, error) {
	r, err := http.NewRequest(method, v.url+path, strings.NewReader(body))
	if err != nil {
		return shown{}, err
	}
	if method == http.MethodPost {
		r.Header.Set("Content-Type", "application/x-www-form-urlencoded")
		r.Header.Set("Origin", v.url)
		r.Header.Set("Sec-Fetch-Site", "same-origin")
	}
	if change != nil {
		change(r)
	}
	return v.send(r)
}

func (v *visitor) get(path string) (shown, error) { return v.ask(http.MethodGet, path, "", nil) }

func (v *visitor) post(path string, form url.Values) (shown, error) {
	return v.ask(http.MethodPost, path, form.Encode(), nil)
}

// see is get and must post, for a test that has no use without an answer.
func (v *visitor) see(t *testing.T, path string) shown {
	t.Helper()
	s, err := v.get(path)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

func (v *visitor) do(t *testing.T, path string, form url.Values) shown {
	t.Helper()
	s, err := v.post(path, form)
	if err != nil {
		t.Fatal(err)
	}
	return s
}

// expect demands a status.
func (s shown) expect(t *testing.T, what string, status int) shown {
	t.Helper()
	if s.status != status {
		t.Errorf("%s: status %d, %s; wanted %d", what, s.status, s.heading(), status)
	}
	return s
}

// readBack types a reading into the page of a batch and returns the fields of the
// form that would store it.
func (v *visitor) readBack(batch, gravity, temp, taken string) (url.Values, shown, error) {
	page, err := v.get("/batch/" + batch)
	if err != nil {
		return nil, page, err
	}
	form := page.form("/batch/" + batch + "/reading")
	for name, value := range map[string]string{"gravity": gravity, "temp": temp, "taken": taken, "instrument": "H2", "operator": "nell"} {
		form.Set(name, value)
	}
	back, err := v.post("/batch/"+batch+"/reading", form)
	return back.form("/batch/" + batch + "/store"), back, err
}

// ticketFor is readBack for a reading that is not held.
func (v *visitor) ticketFor(t *testing.T, batch, gravity string) url.Values {
	t.Helper()
	form, back, err := v.readBack(batch, gravity, "18", "")
	if err != nil {
		t.Fatal(err)
	}
	back.expect(t, "reading back "+gravity, http.StatusOK)
	if form.Get("ticket") == "" || strings.Contains(back.body, `name="keep"`) {
		t.Fatalf("%s was not simply read back: %s\n%s", gravity, back.heading(), back.body)
	}
	return form
}
