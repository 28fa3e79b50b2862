package main

import (
	"bufio"
	"encoding/json"
	"errors"
	"io"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"slices"
	"strings"
	"sync"
	"testing"
	"time"
)

// serveEpoch is when the cellar of the demo looks at its pages, five hours after its
// last round: 2026-11-27T12:00:00Z.
const serveEpoch = "1795780800"

// passphrase is that of the tests.
const passphrase = "amber lantern under the stairs"

// served is a `gylebook serve` that runs as a process of its own.
type served struct {
	t     *testing.T
	place string // of the journal
	env   []string
	url   string // scheme, address and port
	cmd   *exec.Cmd

	mu   sync.Mutex
	said strings.Builder // on stderr
	read chan struct{}   // closed when stderr has ended
}

// cellarEnv is the environment of processes about one journal, with nothing of the
// caller's that the program reads.
func cellarEnv(place, config string) []string {
	env := slices.DeleteFunc(os.Environ(), func(e string) bool {
		return strings.HasPrefix(e, "GYLEBOOK_") || strings.HasPrefix(e, "TZ=") || strings.HasPrefix(e, "XDG_")
	})
	return append(env, "TZ=UTC", "LANG=C.UTF-8", "COLUMNS=80", "SOURCE_DATE_EPOCH="+serveEpoch,
		"GYLEBOOK_JOURNAL="+place, "XDG_CONFIG_HOME="+config)
}

// newServed is a demo journal in a folder of its own that nobody serves yet.
func newServed(t *testing.T) *served {
	t.Helper()
	folder := t.TempDir()
	s := &served{t: t, place: filepath.Join(folder, "journal.db")}
	s.env = cellarEnv(s.place, filepath.Join(folder, "config"))
	s.run("journal", "demo", s.place)
	return s
}

// run runs a command on the same journal and returns what it printed.
func (s *served) run(args ...string) string {
	s.t.Helper()
	out, code, said := s.try("", args...)
	if code != exitOK {
		s.t.Fatalf("gylebook %q: exit code %d: %s", args, code, said)
	}
	return out
}

func (s *served) try(stdin string, args ...string) (out string, code int, said string) {
	s.t.Helper()
	cmd := exec.Command("gylebook", args...)
	cmd.Env, cmd.Stdin = s.env, strings.NewReader(stdin)
	var errors strings.Builder
	cmd.Stderr = &errors
	printed, err := cmd.Output()
	if err != nil && cmd.ProcessState == nil {
		s.t.Fatal(err)
	}
	return string(printed), cmd.ProcessState.ExitCode(), errors.String()
}

var servesAt = regexp.MustCompile(`gylebook serves (https?://\S+), `)

// start serves the journal at a free port until the test ends.
func (s *served) start(args ...string) *served {
	s.t.Helper()
	s.cmd = exec.Command("gylebook", append([]string{"serve", "--listen", "127.0.0.1:0"}, args...)...)
	s.cmd.Env = s.env
	stderr, err := s.cmd.StderrPipe()
	if err != nil {
		s.t.Fatal(err)
	}
	if err := s.cmd.Start(); err != nil {
		s.t.Fatal(err)
	}
	s.t.Cleanup(func() {
		if s.cmd.ProcessState == nil {
			_ = s.cmd.Process.Kill()
			<-s.read
			_ = s.cmd.Wait()
		}
		if s.t.Failed() {
			s.t.Logf("gylebook serve said:\n%s", s.stderr())
		}
	})
	at := make(chan string, 1)
	s.read = make(chan struct{})
	go s.listen(stderr, at)
	select {
	case s.url = <-at:
	case <-s.read:
		s.t.Fatalf("gylebook serve ended: %s", s.stderr())
	case <-time.After(time.Minute):
		s.t.Fatal("gylebook serve did not say where it listens")
	}
	return s
}

func (s *served) listen(stderr io.Reader, at chan<- string) {
	defer close(s.read)
	lines := bufio.NewScanner(stderr)
	for lines.Scan() {
		s.mu.Lock()
		s.said.WriteString(lines.Text() + "\n")
		s.mu.Unlock()
		if m := servesAt.FindStringSubmatch(lines.Text()); m != nil {
			at <- m[1]
		}
	}
}

// stderr is what the process has said so far.
func (s *served) stderr() string {
	s.mu.Lock()
	defer s.mu.Unlock()
	return s.said.String()
}

// end sends a signal and returns the exit code.
func (s *served) end(signal os.Signal) int {
	s.t.Helper()
	if err := s.cmd.Process.Signal(signal); err != nil {
		s.t.Fatal(err)
	}
	return s.wait()
}

func (s *served) wait() int {
	s.t.Helper()
	<-s.read
	var exit *exec.ExitError
	if err := s.cmd.Wait(); err != nil && !errors.As(err, &exit) {
		s.t.Fatal(err)
	}
	if said := s.stderr(); strings.Contains(said, "panic") || strings.Contains(said, "goroutine ") {
		s.t.Errorf("a panic reached stderr: %s", said)
	}
	return s.cmd.ProcessState.ExitCode()
}

// exported are the entries of the journal, read by another process.
func (s *served) exported() []exportedEntry {
	s.t.Helper()
	var all []exportedEntry
	for line := range strings.Lines(s.run("export")) {
		var e exportedEntry
		if err := json.Unmarshal([]byte(line), &e); err != nil {
			s.t.Fatalf("export printed %q: %v", line, err)
		}
		if e.Number > 0 {
			all = append(all, e)
		}
	}
	return all
}

type exportedEntry struct {
	Number int64
	Kind   string
	By     string
	Body   map[string]any
}
