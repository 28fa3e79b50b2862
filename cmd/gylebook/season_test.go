package main

import (
	"context"
	"encoding/json"
	"io"
	"path/filepath"
	"strconv"
	"strings"
	"testing"

	"gylebook/attenuation/journal/demo"
	"gylebook/attenuation/journal/sqlstore"
)

// printed runs one command and returns its records.
func printed(t *testing.T, args ...string) []map[string]any {
	t.Helper()
	var stdout, stderr strings.Builder
	if code := run(context.Background(), append(args, "--json"), strings.NewReader(""), &stdout, &stderr); code != exitOK {
		t.Fatalf("%v: exit code %d, %s", args, code, stderr.String())
	}
	var d struct{ Records []map[string]any }
	if err := json.Unmarshal([]byte(stdout.String()), &d); err != nil {
		t.Fatal(err)
	}
	return d.Records
}

// demoJournal is the invented season, used in place of the user's journal.
func demoJournal(t *testing.T) {
	t.Helper()
	path := filepath.Join(t.TempDir(), "demo.db")
	s, _, err := sqlstore.OpenOrCreate(context.Background(), path)
	if err != nil {
		t.Fatal(err)
	}
	if _, err := demo.Write(context.Background(), s); err != nil {
		t.Fatal(err)
	}
	if err := s.Close(); err != nil {
		t.Fatal(err)
	}
	t.Setenv("GYLEBOOK_JOURNAL", path)
}

// The season shows the figures that each batch shows of itself, to the last digit.
func TestSeasonAgreesWithBatches(t *testing.T) {
	demoJournal(t)
	rows := printed(t, "season")
	if len(rows) < 30 {
		t.Fatalf("%d batches, wanted the 30 and more of the demo season", len(rows))
	}
	compared := 0
	for _, row := range rows {
		id, _ := row["batch_id"].(string)
		batch := printed(t, "batch", "show", id)[0]
		for name, got := range row {
			want, there := batch[name]
			if !there || name == "readings" { // there a list, here a count
				continue
			}
			compared++
			if got != want {
				t.Errorf("%s: %s is %v in the season and %v of itself", id, name, got, want)
			}
		}
	}
	if compared < 18*len(rows) {
		t.Errorf("%d figures compared of %d batches, wanted 18 each", compared, len(rows))
	}
}

// Whatever the width, no line of the demo cellar is wider, and at 80 columns and
// above every batch has one line.
func TestDemoFitsTheScreen(t *testing.T) {
	demoJournal(t)
	for _, line := range []string{"today --at 2026-11-27T12:00:00Z", "season", "season 2026", "today --at 2026-06-01T12:00:00Z"} {
		for _, width := range []int{40, 59, 60, 80, 100} {
			t.Setenv("COLUMNS", strconv.Itoa(width))
			var stdout strings.Builder
			if code := run(context.Background(), strings.Fields(line), strings.NewReader(""), &stdout, io.Discard); code != exitOK {
				t.Fatalf("%s: exit code %d", line, code)
			}
			for text := range strings.Lines(stdout.String()) {
				if n := len([]rune(strings.TrimRight(text, "\n"))); n > width {
					t.Errorf("%s at %d columns: %d wide: %s", line, width, n, text)
				}
			}
			if width >= 80 && !strings.Contains(stdout.String(), "\n---") {
				t.Errorf("%s at %d columns: no table\n%s", line, width, stdout.String())
			}
		}
	}
}
