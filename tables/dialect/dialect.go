package dialect

import (
	"fmt"
	"strings"
	"unicode/utf8"
)

// Dialect is a form of separated values. The zero value of Decimal means that no
// number with decimals was seen.
type Dialect struct {
	Comma   rune // comma, semicolon or tab
	Decimal rune // point, comma or 0
	BOM     bool // begins with a UTF-8 byte order mark
	CRLF    bool // the header ends in CR LF
}

// String says what was found: "semicolon, decimal comma, BOM, CRLF".
func (d Dialect) String() string {
	parts := []string{name(d.Comma)}
	if d.Decimal != 0 {
		parts = append(parts, "decimal "+name(d.Decimal))
	}
	if d.BOM {
		parts = append(parts, "BOM")
	}
	if d.CRLF {
		parts = append(parts, "CRLF")
	}
	return strings.Join(parts, ", ")
}

const bom = "\ufeff"

// separators in the order in which they are tried.
var separators = []rune{',', ';', '\t'}

func name(r rune) string {
	switch r {
	case ',':
		return "comma"
	case ';':
		return "semicolon"
	case '\t':
		return "tab"
	case '.':
		return "point"
	}
	return fmt.Sprintf("%q", r)
}

// Mark returns the decimal mark of a cell that begins with a number: the last
// point or comma of its sign, digits and marks. It is 0 for a whole number and for
// a cell that does not begin with a number; all reports whether the number is the
// whole cell.
func Mark(cell string) (mark rune, all bool) {
	cell = strings.TrimSpace(cell)
	digits, end := false, len(cell)
scan:
	for i, r := range cell {
		switch {
		case r >= '0' && r <= '9':
			digits = true
		case r == '.', r == ',':
			mark = r
		case i == 0 && (r == '-' || r == '+' || r == '\u2212'):
		default:
			end = i
			break scan
		}
	}
	if !digits {
		return 0, false
	}
	// "12. " of running text is no decimal mark.
	if last, _ := utf8.DecodeLastRuneInString(cell[:end]); last == mark {
		mark = 0
	}
	return mark, end == len(cell)
}

// risky are the first characters at which a spreadsheet runs a cell as a formula,
// or loses it.
const risky = "=+-@\t\r"

// Guard keeps a spreadsheet from running a text cell as a formula: one that begins
// with = + - @, tab or CR gets an apostrophe in front, and so does one that already
// begins with apostrophes before such a character, so that Strip gives every text
// back. A plain number such as -0.5 is left alone.
func Guard(cell string) string {
	if !runs(cell) {
		return cell
	}
	if _, all := Mark(cell); all && cell == strings.TrimSpace(cell) {
		return cell
	}
	return "'" + cell
}

// Strip takes off what Guard put in front.
func Strip(cell string) string {
	if strings.HasPrefix(cell, "'") && runs(cell) {
		return cell[1:]
	}
	return cell
}

func runs(cell string) bool {
	rest := strings.TrimLeft(cell, "'")
	return rest != "" && strings.IndexByte(risky, rest[0]) >= 0
}
