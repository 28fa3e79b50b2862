package report

import (
	"strings"

	"gylebook/tables"
)

// em is the width of s in units of the size of type, a little more than it takes in
// the sans-serif faces that the stylesheet names: text that is measured too wide
// leaves white, text that is measured too narrow breaks the page.
func em(s string) float64 {
	width := 0.0
	for _, r := range s {
		switch {
		case strings.ContainsRune(" .,:;'|!ijlIt/()[]·", r):
			width += 0.35
		case r >= '0' && r <= '9':
			width += 0.6
		case r == '+' || r == '−' || r == '<' || r == '>' || r == '=':
			width += 0.65
		case strings.ContainsRune("mwMW%@—…", r):
			width += 0.95
		case r >= 'A' && r <= 'Z':
			width += 0.75
		default:
			width += 0.62 * float64(tables.Width(string(r)))
		}
	}
	return width
}

// bold is how much wider bold type is.
const bold = 1.08

// lines is the number of lines that text takes in a width, both in points, when
// broken between words.
func lines(text string, size, width float64) int {
	n, used := 1, 0.0
	for _, word := range strings.Fields(text) {
		w := em(word) * size
		if used > 0 && used+em(" ")*size+w > width {
			n, used = n+1, 0
		}
		if used > 0 {
			used += em(" ") * size
		}
		for used += w; used > width; used -= width {
			n++ // a word longer than the line
		}
	}
	return n
}
