package main

import (
	"bufio"
	"context"
	"errors"
	"io"
	"os"
	"os/exec"
	"runtime"
	"strings"
	"testing"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/sqlstore"
	"gylebook/gravity/asread"
)

// walkOver types keys into a round over the journal and returns it with what it
// printed, prompts left out.
func walkOver(t *testing.T, place, keys string) (*round, string) {
	t.Helper()
	var stdout strings.Builder
	b := &bench{in: strings.NewReader(keys), out: &stdout, err: io.Discard, set: settings{
		operator: "ada", journal: place, now: time.Now(), width: 80, units: asread.C, quiet: true,
	}}
	s, err := sqlstore.Open(context.Background(), place)
	if err != nil {
		t.Fatal(err)
	}
	defer s.Close()
	open, err := s.Open(context.Background())
	if err != nil {
		t.Fatal(err)
	}
	r := &round{bench: b, ctx: context.Background(), store: s}
	for _, rec := range open {
		r.stops = append(r.stops, &stop{batch: rec.Batch.ID, vessel: vesselOf(rec)})
	}
	if err := r.walk(); err != nil {
		t.Fatal(err)
	}
	return r, stdout.String()
}

// In the common case a vessel takes 12 keystrokes at most, Enter counted: whatever
// the form, and four decimals with a half degree too.
func TestRoundsKeystrokes(t *testing.T) {
	lines := []string{"1.0125 18.5", "1012 18", "1.012", "12.1pt 18C", "3.1P 18", "1.0125"}
	var batches []string
	for _, n := range []string{"1", "2", "3", "4", "5", "6"} {
		batches = append(batches, "B26-"+n+":T"+n)
	}
	for _, line := range lines {
		if keys := len([]rune(line)) + 1; keys > 12 {
			t.Errorf("%q takes %d keystrokes, wanted 12 at most", line, keys)
		}
	}
	r, out := walkOver(t, openJournal(t, batches...), strings.Join(lines, "\n")+"\n")
	if len(r.done) != len(lines) || strings.Count(out, "\n") != len(lines) {
		t.Errorf("%d entries, wanted one a line of\n%s\nprinted:\n%s", len(r.done), strings.Join(lines, "\n"), out)
	}
}

// Nothing of a round is lost with it: what was echoed is in the journal when the
// round is interrupted.
func TestRoundsInterrupted(t *testing.T) {
	if runtime.GOOS == "windows" {
		t.Skip("a process cannot be sent an interrupt on Windows")
	}
	place := openJournal(t, "B26-1:T2", "B26-2:T3")
	cmd := exec.Command("gylebook", "rounds", "--quiet")
	cmd.Env = append(os.Environ(), "GYLEBOOK_JOURNAL="+place)
	stdin, err := cmd.StdinPipe()
	if err != nil {
		t.Fatal(err)
	}
	stdout, err := cmd.StdoutPipe()
	if err != nil {
		t.Fatal(err)
	}
	if err := cmd.Start(); err != nil {
		t.Fatal(err)
	}
	if _, err := io.WriteString(stdin, "T2 1.0480 20\n"); err != nil {
		t.Fatal(err)
	}
	echoed, err := bufio.NewReader(stdout).ReadString('\n')
	if err != nil || !strings.HasPrefix(echoed, "T2  1.0480  read SG 1.0480 at 20 °C") {
		t.Errorf("echoed %q, %v", echoed, err)
	}
	if err := cmd.Process.Signal(os.Interrupt); err != nil {
		t.Fatal(err)
	}
	var exit *exec.ExitError
	if err := cmd.Wait(); !errors.As(err, &exit) || exit.ExitCode() != exitInterrupted {
		t.Errorf("%v, wanted exit code %d", err, exitInterrupted)
	}
	s, err := sqlstore.Open(context.Background(), place)
	if err != nil {
		t.Fatal(err)
	}
	defer s.Close()
	rec, err := s.Batch(context.Background(), "B26-1")
	if err != nil || len(rec.Readings) != 1 || rec.Readings[0].Body.Gravity.Text != "1.0480" {
		t.Errorf("readings %v, %v; wanted the one that was echoed", rec, err)
	}
	if _, err := journal.VerifyAll(context.Background(), s); err != nil {
		t.Error(err)
	}
}

// A batch that somebody else closes during the round is passed over.
func TestRoundsPassesClosed(t *testing.T) {
	place := openJournal(t, "B26-1:T2", "B26-2:T3")
	s, err := sqlstore.Open(context.Background(), place)
	if err != nil {
		t.Fatal(err)
	}
	defer s.Close()
	var prompts strings.Builder
	b := &bench{in: strings.NewReader("\n"), out: io.Discard, err: &prompts, set: settings{operator: "ada", now: time.Now(), width: 80}}
	r := &round{bench: b, ctx: context.Background(), store: s, stops: []*stop{{batch: "B26-1", vessel: "T2"}, {batch: "B26-2", vessel: "T3"}}}
	if _, err := b.commitOne(context.Background(), s, journal.Close{Batch: "B26-1", At: time.Now()}); err != nil {
		t.Fatal(err)
	}
	if err := r.walk(); err != nil || prompts.String() != "T3 Lane Bitter, no reading > " {
		t.Errorf("prompted %q, %v", prompts.String(), err)
	}
}

func TestAgo(t *testing.T) {
	now := time.Date(2026, 11, 18, 11, 6, 0, 0, time.Local)
	for _, c := range []struct {
		hours float64
		want  string
	}{
		{0, "today 11:06"},
		{11, "today 00:06"},
		{12, "yesterday 23:06"},
		{35, "yesterday 00:06"},
		{36, "Mon 23:06"},
		{24 * 6, "Thu 11:06"},
		{24 * 7, "2026-11-11"},
		// Ahead, as by another machine's clock.
		{-24, "2026-11-19"},
	} {
		if got := ago(now.Add(-time.Duration(c.hours*float64(time.Hour))), now); got != c.want {
			t.Errorf("%v h ago: %q, wanted %q", c.hours, got, c.want)
		}
	}
}
