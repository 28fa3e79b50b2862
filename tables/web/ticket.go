package web

import (
	"errors"
	"slices"
	"sync"
	"time"
)

// ticket is the right to do one thing once: store one reading, void one entry. It
// holds what was shown when it was given out, so that what is done is what was read.
type ticket struct {
	id      string
	issued  time.Time
	purpose string // "store" or "undo"
	batch   string
	reading Reading // to store
	entry   string  // to void

	mu   sync.Mutex // held while it is done: a second one waits
	done *outcome
}

// outcome is what was done with a ticket, kept for whoever sends it again.
type outcome struct {
	message string
	answer  Answer
	err     error // it failed, and nobody knows how far it came
}

// errTicket says that a ticket is not, or no longer, among those given out.
var errTicket = errors.New("unknown ticket")

// once does what a ticket is for, unless that was done before: then it gives the
// outcome of that. A *Refused has changed nothing, so the ticket stays good. Any
// other error, and a panic, spends it.
func (t *ticket) once(do func() (outcome, error)) (outcome, error) {
	t.mu.Lock()
	defer t.mu.Unlock()
	if t.done != nil {
		return *t.done, t.done.err
	}
	t.done = &outcome{err: errors.New("the first attempt did not come to an end")}
	out, err := do()
	var refused *Refused
	if errors.As(err, &refused) {
		t.done = nil
		return outcome{}, err
	}
	out.err = err
	t.done = &out
	return out, err
}

// result is what was done with the ticket, false if nothing was or it failed.
func (t *ticket) result() (outcome, bool) {
	t.mu.Lock()
	defer t.mu.Unlock()
	if t.done == nil || t.done.err != nil {
		return outcome{}, false
	}
	return *t.done, true
}

// tickets are those of one session, the oldest first. The lock of the session
// guards them.
type tickets struct {
	limits Limits
	list   []*ticket
}

// issue gives out a ticket. A session holds so many and no more: the oldest goes,
// and what it was for has to be read back again.
func (s *session) issue(t *ticket) {
	s.mu.Lock()
	defer s.mu.Unlock()
	if n := len(s.tickets.list) - s.tickets.limits.Tickets + 1; n > 0 {
		s.tickets.list = slices.Delete(s.tickets.list, 0, n)
	}
	s.tickets.list = append(s.tickets.list, t)
}

// ticket finds one that is for this purpose and batch.
func (s *session) ticket(id, purpose, batch string, now time.Time) (*ticket, error) {
	s.mu.Lock()
	defer s.mu.Unlock()
	s.tickets.list = slices.DeleteFunc(s.tickets.list, func(t *ticket) bool { return now.Sub(t.issued) > s.tickets.limits.Ticket })
	for _, t := range s.tickets.list {
		if t.id == id && (purpose == "" || t.purpose == purpose) && t.batch == batch {
			return t, nil
		}
	}
	return nil, errTicket
}
