package main

import (
	"slices"
	"strings"
	"testing"

	"gylebook/tables"
)

// On a terminal an error is wrapped at its width, nothing of it lost; elsewhere it
// is one line, however long.
func TestTold(t *testing.T) {
	text := "gylebook: line 5: 1.0250 is 11.0 points over the reading before it (1.0140, 2026-11-17 07:40 +00:00), and nothing was added since"
	if got := told(text, 0); !slices.Equal(got, []string{text}) {
		t.Errorf("%q, wanted one line", got)
	}
	for _, width := range []int{20, 40, 80, 200} {
		lines := told(text, width)
		for k, line := range lines {
			if tables.Width(line) > width || k > 0 && !strings.HasPrefix(line, "  ") {
				t.Errorf("at %d: %q", width, line)
			}
		}
		if joined := strings.Join(strings.Fields(strings.Join(lines, " ")), " "); joined != text {
			t.Errorf("at %d: %q", width, joined)
		}
	}
	var b strings.Builder
	say(&b, "line 3", dataError("type it anew "+strings.Repeat("and anew ", 20), "%s", text))
	if strings.Count(b.String(), "\n") != 2 {
		t.Errorf("%q, wanted an error and a hint, a line each", b.String())
	}
}
