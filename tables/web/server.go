package web

import (
	"cmp"
	"context"
	"errors"
	"fmt"
	"io"
	"log"
	"net"
	"net/http"
	"net/netip"
	"sync"
	"time"
)

// Limits bound what the outside may use up. A field that is 0 has the value of
// [DefaultLimits].
type Limits struct {
	Body       int64         // bytes of a form
	Sessions   int           // browsers at once
	Idle, Life time.Duration // of a session
	Tickets    int           // forms to confirm that a session may hold
	Ticket     time.Duration // how long one is good, and its outcome kept
	Header     time.Duration // to send the header of a request
	Read       time.Duration // to send a whole request
	Write      time.Duration // to answer and be read
	Keep       time.Duration // an idle connection
	Act        time.Duration // to store or void
	Stop       time.Duration // for requests in flight when the server stops
}

// DefaultLimits are those for a cellar.
var DefaultLimits = Limits{
	Body: 64 << 10, Sessions: 500, Idle: 12 * time.Hour, Life: 72 * time.Hour,
	Tickets: 32, Ticket: 30 * time.Minute,
	Header: 5 * time.Second, Read: 15 * time.Second, Write: time.Minute, Keep: time.Minute,
	Act: 30 * time.Second, Stop: 10 * time.Second,
}

func (l Limits) filled() Limits {
	d := DefaultLimits
	return Limits{
		Body: cmp.Or(l.Body, d.Body), Sessions: cmp.Or(l.Sessions, d.Sessions), Idle: cmp.Or(l.Idle, d.Idle), Life: cmp.Or(l.Life, d.Life),
		Tickets: cmp.Or(l.Tickets, d.Tickets), Ticket: cmp.Or(l.Ticket, d.Ticket),
		Header: cmp.Or(l.Header, d.Header), Read: cmp.Or(l.Read, d.Read), Write: cmp.Or(l.Write, d.Write), Keep: cmp.Or(l.Keep, d.Keep),
		Act: cmp.Or(l.Act, d.Act), Stop: cmp.Or(l.Stop, d.Stop),
	}
}

// Config is how a server stands in the world.
type Config struct {
	Listen     string           // HOST:PORT that it listens on
	Names      []string         // further names of the machine that a browser may use
	Passphrase *Hash            // asked at log-in; nil asks for none
	TLS        bool             // the listener speaks TLS
	Now        func() time.Time // the clock
	Rand       io.Reader        // of ids and tokens: crypto/rand.Reader
	Log        io.Writer        // one line a POST; nil is none
	Limits     Limits
}

// Server is an http.Handler. [Server.Serve] runs it with its timeouts.
type Server struct {
	desk     Desk
	cfg      Config
	hosts    hosts
	mux      *http.ServeMux
	sessions *sessions
	throttle *throttle
	hashing  chan struct{} // held while a passphrase is hashed, which takes memory

	logMu sync.Mutex
}

// New makes a server. A configuration that is open to others without a passphrase
// and TLS is an error, see [CheckListen].
func New(desk Desk, cfg Config) (*Server, error) {
	if desk == nil || cfg.Now == nil || cfg.Rand == nil {
		return nil, errors.New("a server wants a desk, a clock and a source of random bytes")
	}
	if err := CheckListen(cfg.Listen, cfg.Passphrase != nil, cfg.TLS); err != nil {
		return nil, err
	}
	if cfg.Passphrase != nil {
		if _, err := parseHash(string(*cfg.Passphrase)); err != nil {
			return nil, err
		}
	}
	names, err := newHosts(cfg.Listen, cfg.Names)
	if err != nil {
		return nil, err
	}
	if cfg.Log == nil {
		cfg.Log = io.Discard
	}
	cfg.Limits = cfg.Limits.filled()
	s := &Server{
		desk: desk, cfg: cfg, hosts: names, mux: http.NewServeMux(),
		sessions: newSessions(cfg),
		throttle: &throttle{now: cfg.Now, each: map[netip.Prefix]*bucket{}},
		hashing:  make(chan struct{}, 1),
	}
	s.routes()
	return s, nil
}

// Serve answers on l until ctx ends. Requests in flight then finish, for as long as
// Limits.Stop; what still runs after that is cut off, which is an error.
func (s *Server) Serve(ctx context.Context, l net.Listener) error {
	lim := s.cfg.Limits
	// Whoever is being answered when ctx ends is answered to the end.
	base, cut := context.WithCancel(context.WithoutCancel(ctx))
	defer cut()
	srv := &http.Server{
		Handler:           s,
		ReadHeaderTimeout: lim.Header, ReadTimeout: lim.Read, WriteTimeout: lim.Write, IdleTimeout: lim.Keep,
		MaxHeaderBytes: 16 << 10,
		BaseContext:    func(net.Listener) context.Context { return base },
		// What strangers send is no news, and every browser breaks off a handshake
		// with a certificate that it does not know yet.
		ErrorLog:                     log.New(io.Discard, "", 0),
		DisableGeneralOptionsHandler: true,
	}
	ended := make(chan error, 1)
	go func() { ended <- srv.Serve(l) }()
	select {
	case err := <-ended:
		return fmt.Errorf("serve: %w", err)
	case <-ctx.Done():
	}
	grace, done := context.WithTimeout(base, lim.Stop)
	defer done()
	if err := srv.Shutdown(grace); err != nil {
		cut()
		srv.Close()
		return fmt.Errorf("stop: requests were still running after %v: %w", lim.Stop, err)
	}
	return nil
}

// record writes one line about a request. No passphrase, token or cookie gets here.
func (s *Server) record(line string) {
	s.logMu.Lock()
	defer s.logMu.Unlock()
	// A log that cannot be written stops no reading from being stored.
	_, _ = io.WriteString(s.cfg.Log, s.cfg.Now().Format(time.RFC3339)+" "+line+"\n")
}
