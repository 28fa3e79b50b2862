package sqlstore

import (
	"context"
	"errors"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"gylebook/attenuation/journal"
)

func TestAuditMakesTheCacheAnew(t *testing.T) {
	ctx := context.Background()
	s := openAt(t, filepath.Join(t.TempDir(), "journal"))
	everyKind(t, s)
	want := []string{"B-00002"}
	for _, harm := range []string{
		"SELECT 1", "DELETE FROM open_batch", "INSERT INTO open_batch VALUES ('B-00001', 'T1')", "UPDATE open_batch SET vessel = 'T9'",
	} {
		if _, err := s.db.Exec(harm); err != nil {
			t.Fatal(err)
		}
		wanted := 1
		if harm == "SELECT 1" {
			wanted = 0
		}
		if n, err := s.Audit(ctx); n != wanted || err != nil {
			t.Errorf("%s: %d wrong, error %v, wanted %d", harm, n, err, wanted)
		}
		list, err := s.Open(ctx)
		got := []string{}
		for _, r := range list {
			got = append(got, r.Batch.ID)
		}
		if err != nil || !slices.Equal(got, want) {
			t.Errorf("%s: open %v, error %v, wanted %v", harm, got, err, want)
		}
		if n, err := s.Audit(ctx); n != 0 || err != nil {
			t.Errorf("%s: %d wrong after the audit, error %v", harm, n, err)
		}
	}
}

func TestAuditOfMigrations(t *testing.T) {
	s := openAt(t, filepath.Join(t.TempDir(), "journal"))
	if _, err := s.db.Exec("DROP TRIGGER migration_no_update; UPDATE migration SET digest = 'x'"); err != nil {
		t.Fatal(err)
	}
	if _, err := s.Audit(context.Background()); !errors.Is(err, journal.ErrTampered) {
		t.Errorf("a migration that is recorded otherwise: %v, wanted %v", err, journal.ErrTampered)
	}
}

// What is looked at daily goes through indexes: nothing is sorted, and but for the
// batches of a season nothing is read from end to end.
func TestPlans(t *testing.T) {
	s := openAt(t, filepath.Join(t.TempDir(), "journal"))
	all, id := selectionOf(journal.Filter{}), byID
	id.args = []any{"B-1"}
	last := openOnes
	last.last = 3
	for name, c := range map[string]struct {
		sel  selection
		scan string // the one table that may be read from end to end
	}{"season": {all, "SCAN b USING"}, "open": {openOnes, "SCAN o USING"}, "newest": {last, "SCAN o USING"}, "one": {id, ""}} {
		for _, step := range planOf(t, s, c.sel) {
			if strings.Contains(step, "TEMP B-TREE") || strings.HasPrefix(step, "SCAN") && (c.scan == "" || !strings.HasPrefix(step, c.scan)) {
				t.Errorf("%s: %s", name, step)
			}
		}
	}
	bounded := slices.ContainsFunc(planOf(t, s, last), func(step string) bool {
		return strings.HasPrefix(step, "SEARCH c USING") && strings.Contains(step, "taken_ms>?")
	})
	if !bounded {
		t.Error("the newest readings are not found by the key")
	}
	for _, query := range []string{batchState, instrumentState} {
		for _, step := range plan(t, s, query, "X") {
			if strings.HasPrefix(step, "SCAN") && step != "SCAN CONSTANT ROW" {
				t.Errorf("%s in %s", step, query)
			}
		}
	}
}

// planOf returns the steps by which records are read.
func planOf(t *testing.T, s *Store, sel selection) []string {
	t.Helper()
	b := newBundles(sel, s.version)
	return plan(t, s, sel.recordSQL(b.columns), slices.Concat(b.args, sel.args)...)
}

// plan returns the steps by which a query runs.
func plan(t *testing.T, s *Store, query string, args ...any) []string {
	t.Helper()
	rows, err := s.db.Query("EXPLAIN QUERY PLAN "+query, args...)
	if err != nil {
		t.Fatal(err)
	}
	defer rows.Close()
	var steps []string
	for rows.Next() {
		var id, parent, unused int
		var step string
		if err := rows.Scan(&id, &parent, &unused, &step); err != nil {
			t.Fatal(err)
		}
		steps = append(steps, step)
	}
	if err := rows.Err(); err != nil || len(steps) == 0 {
		t.Fatalf("%d steps, error %v", len(steps), err)
	}
	return steps
}
