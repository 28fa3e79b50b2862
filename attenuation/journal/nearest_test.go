package journal

import (
	"slices"
	"testing"

	"pgregory.net/rapid"
)

func TestNearest(t *testing.T) {
	ids := []string{"B12", "B21", "b13", "T4", "T6", "MILD-7"}
	for _, tt := range []struct {
		id   string
		n    int
		want []string
	}{
		{"B12", 1, []string{"B12"}},
		{"b12", 3, []string{"B12", "B21", "b13"}}, // one swap and one change are equal: by name
		{"T5", 2, []string{"T4", "T6"}},
		{"mild7", 1, []string{"MILD-7"}},
		{"x", 0, []string{}},
		{"", 9, []string{"T4", "T6", "B12", "B21", "b13", "MILD-7"}}, // the shortest first
	} {
		if got := Nearest(tt.id, ids, tt.n); !slices.Equal(got, tt.want) {
			t.Errorf("%q: %v, want %v", tt.id, got, tt.want)
		}
	}
	if got := Nearest("T1", nil, 3); len(got) != 0 {
		t.Errorf("nothing gives %v", got)
	}
}

func TestDistance(t *testing.T) {
	for _, tt := range []struct {
		a, b string
		want int
	}{{"", "", 0}, {"", "abc", 3}, {"ab", "ba", 1}, {"kitten", "sitting", 3}, {"abc", "ac", 1}, {"abcd", "acbd", 1}} {
		if got := distance([]rune(tt.a), []rune(tt.b)); got != tt.want {
			t.Errorf("%q %q: %d, want %d", tt.a, tt.b, got, tt.want)
		}
	}
	rapid.Check(t, func(t *rapid.T) {
		a, b := []rune(rapid.StringMatching(`[abc]{0,8}`).Draw(t, "a")), []rune(rapid.StringMatching(`[abc]{0,8}`).Draw(t, "b"))
		d := distance(a, b)
		if d != distance(b, a) || (d == 0) != slices.Equal(a, b) || d > max(len(a), len(b)) {
			t.Fatalf("%q %q: %d", string(a), string(b), d)
		}
	})
}
