package tables

import (
	"reflect"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

// Unicode Standard Annex 11: ideographs are wide, ° is ambiguous and narrow
// outside East Asian contexts; U+0301 combines.
func TestWidth(t *testing.T) {
	for in, want := range map[string]int{"": 0, "abc": 3, "°P": 2, "e\u0301": 1, "é": 1, "酒": 2, "Baumé 12": 8} {
		if got := Width(in); got != want {
			t.Errorf("Width(%q) = %d, want %d", in, got, want)
		}
	}
}

func TestWrap(t *testing.T) {
	for _, c := range []struct {
		in    string
		width int
		want  []string
	}{
		{"", 10, []string{""}},
		{"one two three", 7, []string{"one two", "three"}},
		{"one two three", 6, []string{"one", "two", "three"}},
		{"one  two", 0, []string{"one two"}},
		{"one\n\ntwo", 10, []string{"one", "", "two"}},
		{"a abcdefgh b", 3, []string{"a", "abc", "def", "gh", "b"}},
		{"at 20\u00a0°C", 6, []string{"at", "20\u00a0°C"}},
		{"酒酒酒", 5, []string{"酒酒", "酒"}},
		{"酒酒", 1, []string{"酒", "酒"}},
		{"abe\u0301f", 3, []string{"abe\u0301", "f"}},
	} {
		if got := Wrap(c.in, c.width); !reflect.DeepEqual(got, c.want) {
			t.Errorf("Wrap(%q, %d) = %q, want %q", c.in, c.width, got, c.want)
		}
	}
}

// Wrapping only moves white space: every other character is still there, in
// order, and no line of two columns or more is exceeded.
func TestWrapKeepsText(t *testing.T) {
	bare := func(s string) string {
		return strings.Map(func(r rune) rune {
			if strings.ContainsRune(" \t\r\n", r) {
				return -1
			}
			return r
		}, s)
	}
	rapid.Check(t, func(t *rapid.T) {
		s := Clean(rapid.String().Draw(t, "s"))
		width := rapid.IntRange(2, 40).Draw(t, "width")
		lines := Wrap(s, width)
		if got, want := bare(strings.Join(lines, "")), bare(s); got != want {
			t.Fatalf("text %q became %q", want, got)
		}
		for _, line := range lines {
			if Width(line) > width {
				t.Fatalf("line %q is %d wide, want at most %d", line, Width(line), width)
			}
		}
	})
}

func TestClean(t *testing.T) {
	for in, want := range map[string]string{
		"plain °P é 酒":          "plain °P é 酒",
		"a\tb\nc\r\nd\re":       "a b c d e",
		"\x1b[31mred\x1b[0m":    "[31mred[0m",
		"\x00a\x07b\x7fc":       "abc",
		"a\u009bb\u0085c":       "ab c",
		"a\u202eb\u2066c\u2069": "abc",
		"a\xffb":                "a\ufffdb",
		"e\u0301":               "e\u0301",
		"no\u00a0break":         "no\u00a0break",
	} {
		if got := Clean(in); got != want {
			t.Errorf("Clean(%q) = %q, want %q", in, got, want)
		}
	}
}

func TestCleanTwiceIsOnce(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		once := Clean(anyText().Draw(t, "s"))
		if twice := Clean(once); twice != once {
			t.Fatalf("%q became %q", once, twice)
		}
		if strings.ContainsFunc(once, steers) {
			t.Fatalf("%q still steers", once)
		}
	})
}
