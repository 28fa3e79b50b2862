package sqlstore

import (
	"path/filepath"
	"strings"
	"testing"
	"time"
)

// The finished batches of a product come from the index run backwards: nothing is
// sorted or read from end to end, so that whoever stops early has not paid for all.
func TestPlansOfFinished(t *testing.T) {
	s := openAt(t, filepath.Join(t.TempDir(), "journal"))
	sel := finishedOnes("cider", "house", time.Date(2026, 5, 4, 12, 0, 0, 0, time.UTC))
	readingsSQL, readingsArgs := childSQL(sel, readings)
	closesSQL, closesArgs := childSQL(sel, closes)
	for _, q := range []struct {
		text string
		args []any
	}{{sel.batchSQL(), sel.args}, {readingsSQL, readingsArgs}, {closesSQL, closesArgs}} {
		steps := plan(t, s, q.text, q.args...)
		if len(steps) == 0 {
			t.Fatalf("no plan of %s", q.text)
		}
		for _, step := range steps {
			if strings.Contains(step, "TEMP B-TREE") || strings.HasPrefix(step, "SCAN") {
				t.Errorf("%s in %s", step, q.text)
			}
		}
	}
}
