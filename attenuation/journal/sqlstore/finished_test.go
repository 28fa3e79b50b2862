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
	for _, step := range planOf(t, s, sel) {
		if strings.Contains(step, "TEMP B-TREE") || strings.HasPrefix(step, "SCAN") {
			t.Error(step)
		}
	}
}
