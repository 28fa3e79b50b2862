package volume

import (
	"bytes"
	"math"
	"strconv"
	"unicode/utf8"

	"gylebook/tables/dialect"
)

// form is how rows are written.
type form struct {
	comma   byte
	decimal byte // point or comma
	eol     string
	lines   bool     // JSON Lines
	names   [][]byte // in JSON: a comma or brace and the quoted name of each column, results last
	columns int      // of the input
}

// results appends all results, a separator before each in CSV.
func (f *form) results(dst []byte, all []result) []byte {
	last := 0 // where the text of the result before begins
	for i := range all {
		c := &all[i]
		if f.lines {
			dst = append(dst, f.names[f.columns+i]...)
		} else {
			dst = append(dst, f.comma)
		}
		from := len(dst)
		switch {
		case c.kind == number && i > 0 && all[i-1].kind == number && math.Float64bits(c.x) == math.Float64bits(all[i-1].x):
			dst = append(dst, dst[last:from-f.gap(i)]...)
		case c.kind == number && !math.IsNaN(c.x) && !math.IsInf(c.x, 0):
			dst = f.number(dst, c.x)
		case c.kind == truth:
			dst = strconv.AppendBool(dst, c.yes)
		case c.kind == text && c.s != "" && f.lines:
			dst = quoteJSON(dst, c.s)
		case c.kind == text:
			dst = f.cell(dst, dialect.Guard(c.s))
		case f.lines:
			dst = append(dst, "null"...)
		}
		last = from
	}
	return dst
}

// end appends the end of a row.
func (f *form) end(dst []byte) []byte {
	if len(f.eol) == 1 { // one byte is not worth a call of memmove
		return append(dst, f.eol[0])
	}
	return append(dst, f.eol...)
}

// gap is how many bytes stand before result i.
func (f *form) gap(i int) int {
	if f.lines {
		return len(f.names[f.columns+i])
	}
	return 1
}

// number appends x in the fewest digits that read back as x: plain decimals from
// 1e-6 up to 1e21 and with an exponent outside, minus zero as 0.
func (f *form) number(dst []byte, x float64) []byte {
	if x == 0 {
		return append(dst, '0')
	}
	from := len(dst)
	dst, ok := appendShort(dst, x)
	if !ok {
		verb := byte('f')
		if a := math.Abs(x); a < 1e-6 || a >= 1e21 {
			verb = 'e'
		}
		dst = strconv.AppendFloat(dst, x, verb, -1, 64)
	}
	if f.lines || f.decimal != ',' {
		return dst
	}
	if n := bytes.IndexByte(dst[from:], '.'); n >= 0 {
		dst[from+n] = ','
		if f.comma == ',' {
			dst = append(dst, 0, '"')
			copy(dst[from+1:], dst[from:len(dst)-2])
			dst[from] = '"'
		}
	}
	return dst
}

// cell appends text, quoted where separated values need it.
func (f *form) cell(dst []byte, s string) []byte {
	if !needsQuotes(s, f.comma) {
		return append(dst, s...)
	}
	dst = append(dst, '"')
	for i := range len(s) {
		if s[i] == '"' {
			dst = append(dst, '"')
		}
		dst = append(dst, s[i])
	}
	return append(dst, '"')
}

func needsQuotes(s string, comma byte) bool {
	for i := range len(s) {
		if c := s[i]; c == comma || c == '"' || c == '\n' || c == '\r' {
			return true
		}
	}
	return false
}

// rewrite appends the cells of a record whose form is broken, so that it has one for
// each column: missing ones are empty, what is too much is joined into the last.
func (f *form) rewrite(dst []byte, r *record) []byte {
	for i := range f.columns {
		if i > 0 {
			dst = append(dst, f.comma)
		}
		switch {
		case i >= len(r.fields):
		case i == f.columns-1:
			dst = f.cell(dst, clean(bytes.Join(r.fields[i:], []byte{f.comma})))
		default:
			dst = f.cell(dst, clean(r.fields[i]))
		}
	}
	return dst
}

// clean puts the replacement character where a NUL or no text stands.
func clean(b []byte) string {
	return string(bytes.ReplaceAll(bytes.ToValidUTF8(b, []byte("\ufffd")), []byte{0}, []byte("\ufffd")))
}

// object appends the cells of a record as the beginning of a JSON object.
func (f *form) object(dst []byte, r *record) []byte {
	for i := range f.columns {
		dst = append(dst, f.names[i]...)
		switch {
		case i >= len(r.fields):
			dst = append(dst, "null"...)
		case i == f.columns-1 && len(r.fields) > f.columns:
			dst = quoteJSON(dst, string(bytes.Join(r.fields[i:], []byte{f.comma})))
		default:
			dst = quoteJSON(dst, r.fields[i])
		}
	}
	return dst
}

// quoteJSON appends s as a JSON string (RFC 8259, section 7); what is no UTF-8
// becomes the replacement character.
func quoteJSON[T string | []byte](dst []byte, s T) []byte {
	dst = append(dst, '"')
	for i := 0; i < len(s); i++ {
		c := s[i]
		switch {
		case c == '"' || c == '\\':
			dst = append(dst, '\\', c)
		case c < ' ':
			const hex = "0123456789abcdef"
			dst = append(dst, '\\', 'u', '0', '0', hex[c>>4], hex[c&15])
		case c < utf8.RuneSelf:
			dst = append(dst, c)
		default:
			end := min(i+utf8.UTFMax, len(s))
			r, size := utf8.DecodeRuneInString(string(s[i:end]))
			dst = utf8.AppendRune(dst, r)
			i += size - 1
		}
	}
	return append(dst, '"')
}
