package main

import (
	"context"
	"errors"
	"net/http"
	"os"
	"strings"
	"sync"
	"syscall"
	"testing"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/sqlstore"
)

// With the journal gone nothing is stored, and the page says so. Put back, the same
// form stores.
func TestServeJournalGone(t *testing.T) {
	t.Parallel()
	s := newServed(t).start()
	v := newVisitor(s.url, nil)
	before := len(s.exported())
	ticket := v.ticketFor(t, "LB-17", "1.013")
	beside := s.place + ".away"
	if err := os.Rename(s.place, beside); err != nil {
		t.Fatal(err)
	}
	for what, got := range map[string]shown{
		"the board":       v.see(t, "/"),
		"a batch":         v.see(t, "/batch/LB-17"),
		"its picture":     v.see(t, "/batch/LB-17/curve.svg"),
		"a store":         v.do(t, "/batch/LB-17/store", ticket),
		"the same, again": v.do(t, "/batch/LB-17/store", ticket),
	} {
		got.expect(t, what+" without the journal", http.StatusServiceUnavailable)
		if !strings.Contains(got.body, "the journal is not where it was") {
			t.Errorf("%s says %s: %s", what, got.heading(), got.body)
		}
		tellsNothing(t, what, got, s.place)
	}
	if err := os.Rename(beside, s.place); err != nil {
		t.Fatal(err)
	}
	if n := len(s.exported()); n != before {
		t.Fatalf("%d entries were stored while it was gone", n-before)
	}
	v.do(t, "/batch/LB-17/store", ticket).expect(t, "the form with the journal back", http.StatusSeeOther)
	if n := len(s.exported()); n != before+1 {
		t.Errorf("%d entries were stored, wanted 1", n-before)
	}
}

// hold takes the journal's only write transaction, as another program would, until
// it is let go.
func (s *served) hold() (letGo func()) {
	s.t.Helper()
	other, err := sqlstore.Open(s.t.Context(), s.place)
	if err != nil {
		s.t.Fatal(err)
	}
	held, free, ended := make(chan struct{}), make(chan struct{}), make(chan error, 1)
	given := errors.New("nothing to write")
	go func() {
		_, err := other.Append(context.Background(), "other", time.Now(), func(journal.Reader) ([]journal.Body, error) {
			close(held)
			<-free
			return nil, given
		})
		ended <- err
	}()
	select {
	case <-held:
	case err := <-ended:
		s.t.Fatal(err)
	}
	letGo = sync.OnceFunc(func() {
		close(free)
		if err := <-ended; !errors.Is(err, given) {
			s.t.Error(err)
		}
		_ = other.Close()
	})
	s.t.Cleanup(letGo)
	return letGo
}

// While another program writes for longer than anybody waits, pages are shown and a
// store is refused; the form stays good.
func TestServeJournalHeld(t *testing.T) {
	t.Parallel()
	s := newServed(t).start()
	v := newVisitor(s.url, nil)
	before := len(s.exported())
	ticket := v.ticketFor(t, "LB-17", "1.013")
	letGo := s.hold()
	v.see(t, "/").expect(t, "the board", http.StatusOK)
	v.see(t, "/batch/LB-16").expect(t, "a batch", http.StatusOK)
	v.ticketFor(t, "LB-16", "1.009")
	got := v.do(t, "/batch/LB-17/store", ticket).expect(t, "a store", http.StatusServiceUnavailable)
	if !strings.Contains(got.body, journal.ErrBusy.Error()) || !strings.Contains(got.body, "nothing was written") {
		t.Errorf("the page says %s: %s", got.heading(), got.body)
	}
	tellsNothing(t, "a store", got, s.place)
	letGo()
	if n := len(s.exported()); n != before {
		t.Fatalf("%d entries were stored meanwhile", n-before)
	}
	v.do(t, "/batch/LB-17/store", ticket).expect(t, "the form after it", http.StatusSeeOther)
	if n := len(s.exported()); n != before+1 {
		t.Errorf("%d entries were stored, wanted 1", n-before)
	}
}

// A request to end in the middle of a store: it is answered, it is on disk, and only
// then the program ends.
func TestServeEndsAfterStore(t *testing.T) {
	t.Parallel()
	for _, c := range []struct {
		signal os.Signal
		code   int
	}{{syscall.SIGTERM, exitOK}, {syscall.SIGINT, exitInterrupted}} {
		t.Run(c.signal.String(), func(t *testing.T) {
			t.Parallel()
			s := newServed(t).start()
			v := newVisitor(s.url, nil)
			before := len(s.exported())
			ticket := v.ticketFor(t, "LB-17", "1.013")
			letGo := s.hold()
			stored := make(chan error, 1)
			go func() {
				got, err := v.post("/batch/LB-17/store", ticket)
				if err == nil && got.status != http.StatusSeeOther {
					err = errors.New(got.heading())
				}
				stored <- err
			}()
			time.Sleep(time.Second) // it has begun, and waits for the writer
			if err := s.cmd.Process.Signal(c.signal); err != nil {
				t.Fatal(err)
			}
			time.Sleep(500 * time.Millisecond)
			letGo()
			if err := <-stored; err != nil {
				t.Errorf("the store was answered with %v", err)
			}
			if code := s.wait(); code != c.code {
				t.Errorf("exit code %d, wanted %d: %s", code, c.code, s.stderr())
			}
			if n := len(s.exported()); n != before+1 {
				t.Errorf("%d entries were stored, wanted 1", n-before)
			}
			verifyProcess(t, s.place)
			if _, err := v.get("/"); err == nil {
				t.Error("it still answers")
			}
		})
	}
}

// A port that somebody else listens on.
func TestServePortInUse(t *testing.T) {
	t.Parallel()
	s := newServed(t).start()
	_, code, said := s.try("", "serve", "--listen", strings.TrimPrefix(s.url, "http://"))
	if code != exitFailed || !strings.Contains(said, "hint:") || !strings.Contains(said, "--listen") {
		t.Errorf("exit code %d, wanted %d with a hint: %s", code, exitFailed, said)
	}
}

// One form sent many times at once stores once, and every answer leads to it.
func TestServeSameTicketAtOnce(t *testing.T) {
	t.Parallel()
	s := newServed(t).start()
	v := newVisitor(s.url, nil)
	before := len(s.exported())
	ticket := v.ticketFor(t, "LB-17", "1.013")
	const times = 12
	var places [times]string
	atOnce(times, times, func(p int) {
		got, err := v.post("/batch/LB-17/store", ticket)
		if err != nil || got.status != http.StatusSeeOther {
			t.Errorf("status %d, %v; wanted 303", got.status, err)
		}
		places[p] = got.header.Get("Location")
	})
	for _, at := range places {
		if at != places[0] {
			t.Errorf("one answer leads to %q, another to %q", places[0], at)
		}
	}
	if page := v.see(t, places[0]); !strings.Contains(page.body, "stored as #") {
		t.Errorf("the page does not say that it was stored: %s", page.heading())
	}
	if n := len(s.exported()); n != before+1 {
		t.Errorf("%d entries were stored, wanted 1", n-before)
	}
}
