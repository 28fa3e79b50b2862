package web

import (
	"bufio"
	"context"
	"crypto/rand"
	"crypto/tls"
	"crypto/x509"
	"io"
	"net"
	"net/http"
	"strings"
	"testing"
	"time"
)

// serving runs a server on a free port and returns its address, a way to stop it
// and what Serve returned.
func serving(t *testing.T, d Desk, change func(*Config), wrap func(net.Listener) net.Listener) (*Server, string, context.CancelFunc, chan error) {
	t.Helper()
	l, err := net.Listen("tcp", "127.0.0.1:0")
	if err != nil {
		t.Fatal(err)
	}
	s := newServer(t, d, func(c *Config) {
		c.Listen = l.Addr().String()
		if change != nil {
			change(c)
		}
	})
	ctx, stop := context.WithCancel(context.Background())
	t.Cleanup(stop)
	ended := make(chan error, 1)
	at := l.Addr().String()
	if wrap != nil {
		l = wrap(l)
	}
	go func() { ended <- s.Serve(ctx, l) }()
	return s, at, stop, ended
}

// A reading that is being stored when the server is stopped is stored, and whoever
// sent it is told.
func TestStopFinishesWhatIsStored(t *testing.T) {
	entered, release := make(chan struct{}), make(chan struct{})
	d := &fakeDesk{}
	s, at, stop, ended := serving(t, d, nil, nil)
	b := newBrowser(t, s)
	_, fields := b.reading("1.016")
	d.before = func(what string) {
		if what == "log" {
			close(entered)
			<-release
		}
	}
	r, err := http.NewRequest(http.MethodPost, "http://"+at+"/batch/B1/store", strings.NewReader(fields.Encode()))
	if err != nil {
		t.Fatal(err)
	}
	r.Header.Set("Origin", "http://"+at)
	r.Header.Set("Content-Type", "application/x-www-form-urlencoded")
	r.AddCookie(&http.Cookie{Name: "gylebook", Value: b.cookies["gylebook"]})
	status := make(chan int, 1)
	go func() {
		w, err := http.DefaultTransport.RoundTrip(r)
		if err != nil {
			status <- 0
			return
		}
		w.Body.Close()
		status <- w.StatusCode
	}()
	<-entered
	stop()
	select {
	case err := <-ended:
		t.Fatalf("the server ended while a reading was being stored: %v", err)
	default:
	}
	close(release)
	if got := <-status; got != 303 {
		t.Errorf("status %d, wanted 303", got)
	}
	if err := <-ended; err != nil {
		t.Errorf("ended with %v", err)
	}
	if d.count() != 1 {
		t.Errorf("stored %d times", d.count())
	}
}

// So is whoever only looks.
func TestStopFinishesWhatIsShown(t *testing.T) {
	entered, release := make(chan struct{}), make(chan struct{})
	d := &fakeDesk{before: func(string) {
		close(entered)
		<-release
	}}
	_, at, stop, ended := serving(t, d, nil, nil)
	status := make(chan int, 1)
	go func() {
		w, err := http.Get("http://" + at + "/")
		if err != nil {
			status <- 0
			return
		}
		w.Body.Close()
		status <- w.StatusCode
	}()
	<-entered
	stop()
	close(release)
	if got := <-status; got != 200 {
		t.Errorf("status %d, wanted 200", got)
	}
	if err := <-ended; err != nil {
		t.Errorf("ended with %v", err)
	}
}

// What does not end is cut off, and that is an error.
func TestStopIsBounded(t *testing.T) {
	entered := make(chan struct{})
	d := &fakeDesk{}
	_, at, stop, ended := serving(t, d, func(c *Config) { c.Limits.Stop = 10 * time.Millisecond }, nil)
	release := make(chan struct{})
	defer close(release)
	d.before = func(string) {
		close(entered)
		<-release
	}
	go func() {
		if w, err := http.Get("http://" + at + "/"); err == nil {
			w.Body.Close()
		}
	}()
	<-entered
	stop()
	if err := <-ended; err == nil || !strings.Contains(err.Error(), "still running") {
		t.Errorf("ended with %v", err)
	}
}

// A form that never comes to its end does not hold the server.
func TestSlowBody(t *testing.T) {
	_, at, _, _ := serving(t, &fakeDesk{}, func(c *Config) { c.Limits.Read = 50 * time.Millisecond }, nil)
	conn, err := net.Dial("tcp", at)
	if err != nil {
		t.Fatal(err)
	}
	defer conn.Close()
	io.WriteString(conn, "POST /batch/B1/store HTTP/1.1\r\nHost: "+at+"\r\nOrigin: http://"+at+"\r\nContent-Type: application/x-www-form-urlencoded\r\nContent-Length: 100\r\n\r\ntoken=")
	w, err := http.ReadResponse(bufio.NewReader(conn), nil)
	if err != nil {
		t.Fatal(err)
	}
	defer w.Body.Close()
	if w.StatusCode != http.StatusRequestTimeout {
		t.Errorf("status %d, wanted 408", w.StatusCode)
	}
}

// Nor does a header.
func TestSlowHeader(t *testing.T) {
	_, at, _, _ := serving(t, &fakeDesk{}, func(c *Config) { c.Limits.Header = 50 * time.Millisecond }, nil)
	conn, err := net.Dial("tcp", at)
	if err != nil {
		t.Fatal(err)
	}
	defer conn.Close()
	io.WriteString(conn, "GET / HTTP/1.1\r\nHost: "+at+"\r\n")
	answer, err := io.ReadAll(conn) // until the server closes
	if err != nil || strings.Contains(string(answer), "200 OK") {
		t.Errorf("%q, %v", answer, err)
	}
}

func TestOverTLS(t *testing.T) {
	certPEM, keyPEM, _, err := NewCertificate([]string{"127.0.0.1"}, time.Now(), rand.Reader)
	if err != nil {
		t.Fatal(err)
	}
	cfg, _, err := ServerTLS(certPEM, keyPEM)
	if err != nil {
		t.Fatal(err)
	}
	_, at, _, _ := serving(t, &fakeDesk{}, func(c *Config) { c.TLS = true }, func(l net.Listener) net.Listener { return tls.NewListener(l, cfg) })
	roots := x509.NewCertPool()
	roots.AppendCertsFromPEM(certPEM)
	client := http.Client{Transport: &http.Transport{TLSClientConfig: &tls.Config{RootCAs: roots}, ForceAttemptHTTP2: true}}
	defer client.CloseIdleConnections()
	w, err := client.Get("https://" + at + "/")
	if err != nil {
		t.Fatal(err)
	}
	defer w.Body.Close()
	if w.StatusCode != 200 || w.ProtoMajor != 2 || !strings.HasPrefix(w.Header.Get("Set-Cookie"), "__Host-gylebook=") {
		t.Errorf("status %d over %s, cookie %q", w.StatusCode, w.Proto, w.Header.Get("Set-Cookie"))
	}
	if w.Header.Get("Strict-Transport-Security") != "" {
		t.Error("HSTS would bar the browser from a certificate made here")
	}
}

// OPTIONS * and a host that is not ours come through the real server too.
func TestRawRequests(t *testing.T) {
	_, at, _, _ := serving(t, &fakeDesk{}, nil, nil)
	for request, want := range map[string]int{
		"OPTIONS * HTTP/1.1\r\nHost: " + at + "\r\n\r\n":                         404,
		"GET http://rebound.example/ HTTP/1.1\r\nHost: " + at + "\r\n\r\n":       421,
		"GET / HTTP/1.1\r\nHost: rebound.example\r\n\r\n":                        421,
		"GET /../../etc/passwd HTTP/1.1\r\nHost: " + at + "\r\n\r\n":             404,
		"GET / HTTP/1.1\r\nHost: " + at + "\r\nHost: rebound.example\r\n\r\n":    400,
		"GET / HTTP/1.1\r\nHost: " + at + "\r\nX: " + strings.Repeat("x", 1<<16): 431,
	} {
		conn, err := net.Dial("tcp", at)
		if err != nil {
			t.Fatal(err)
		}
		io.WriteString(conn, request)
		w, err := http.ReadResponse(bufio.NewReader(conn), nil)
		if err != nil {
			t.Fatalf("%.40q: %v", request, err)
		}
		w.Body.Close()
		conn.Close()
		if w.StatusCode != want {
			t.Errorf("%.60q: status %d, wanted %d", request, w.StatusCode, want)
		}
	}
}
