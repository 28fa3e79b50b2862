package tables

import (
	"strings"

	"github.com/olekukonko/tablewriter/pkg/twwidth"
)

// Width returns the number of terminal columns that s takes: combining marks
// none, wide characters two, ° and the rest one. It is the measure that aligns
// the table, so in a Chinese, Japanese or Korean locale of an older terminal
// characters of ambiguous width (Unicode Standard Annex 11), ° among them, count
// two there and here.
func Width(s string) int { return twwidth.Width(s) }

// Wrap breaks s between words into lines of at most width columns. A word longer
// than a line is split, a no-break space never breaks, line ends in s stay line
// ends. A width below 1 breaks nowhere else. There is always at least one line.
func Wrap(s string, width int) []string {
	var lines []string
	for _, part := range strings.Split(s, "\n") {
		lines = append(lines, wrapLine(part, width)...)
	}
	return lines
}

func wrapLine(s string, width int) []string {
	words := strings.FieldsFunc(s, func(r rune) bool { return r == ' ' || r == '\t' || r == '\r' })
	if width < 1 {
		return []string{strings.Join(words, " ")}
	}
	var lines []string
	line, used := "", 0
	for _, word := range words {
		for _, piece := range split(word, width) {
			n := Width(piece)
			switch {
			case line == "":
				line, used = piece, n
			case used+1+n <= width:
				line, used = line+" "+piece, used+1+n
			default:
				lines = append(lines, line)
				line, used = piece, n
			}
		}
	}
	return append(lines, line)
}

// split cuts a word into pieces of at most width columns. A mark of no width
// stays with the character before it; a character wider than width stands alone.
func split(word string, width int) []string {
	if Width(word) <= width {
		return []string{word}
	}
	var pieces []string
	start, used := 0, 0
	for i, r := range word {
		n := Width(string(r))
		if used+n > width && i > start {
			pieces = append(pieces, word[start:i])
			start, used = i, 0
		}
		used += n
	}
	return append(pieces, word[start:])
}

// Clean makes user text safe for one line of a terminal. Tabs and line breaks
// become one space; the other control characters (C0, DEL, C1) and those that
// reorder what is read (bidirectional embeddings, overrides and isolates, Unicode
// Standard Annex 9) go. What is not UTF-8 becomes U+FFFD. The rest stays.
func Clean(s string) string {
	s = strings.ReplaceAll(s, "\r\n", "\n")
	return strings.Map(func(r rune) rune {
		switch {
		case strings.ContainsRune("\t\n\v\f\r\u0085\u2028\u2029", r):
			return ' '
		case steers(r):
			return -1
		}
		return r
	}, s)
}

// steers reports whether r acts on the terminal instead of being shown.
func steers(r rune) bool {
	return r < 0x20 || r >= 0x7f && r <= 0x9f ||
		r >= 0x202a && r <= 0x202e || r >= 0x2066 && r <= 0x2069
}
