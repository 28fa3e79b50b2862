package volume

import (
	"bytes"
	"encoding/binary"
	"fmt"
	"math/bits"
	"unicode/utf8"

	"gylebook/tables/dialect"
)

// record is one record taken apart. Its cells hold until the next one.
type record struct {
	comma  byte
	fields [][]byte
	why    string // what is wrong with its form, "" for nothing

	open bool   // a quote is open at its end, which is that of the file
	buf  []byte // text of the fields, quotes taken off
	ends []int
}

// simple reports whether b can be cut at every separator and line end: no quote, no
// NUL, all of it UTF-8 and no CR but before LF.
func simple(b []byte) bool {
	if bytes.IndexByte(b, '"') >= 0 || bytes.IndexByte(b, 0) >= 0 || !utf8.Valid(b) {
		return false
	}
	cr := bytes.Count(b, []byte{'\r'})
	return cr == 0 || cr == bytes.Count(b, []byte("\r\n"))
}

// cut takes a simple record without its line end apart.
func (r *record) cut(b []byte) {
	r.why = ""
	fields, from, i := r.fields[:0], 0, 0
	// Eight bytes at once: those equal to the separator become zero, and the high bit
	// of each zero byte, and of no other, is set.
	const low, high = 0x7f7f7f7f_7f7f7f7f, 0x80808080_80808080
	commas := uint64(r.comma) * 0x01010101_01010101
	for ; i+8 <= len(b); i += 8 {
		x := binary.LittleEndian.Uint64(b[i:]) ^ commas
		for found := ^(x&low + low | x) & high; found != 0; found &= found - 1 {
			at := i + bits.TrailingZeros64(found)/8
			fields = append(fields, b[from:at])
			from = at + 1
		}
	}
	for ; i < len(b); i++ {
		if b[i] == r.comma {
			fields = append(fields, b[from:i])
			from = i + 1
		}
	}
	r.fields = append(fields, b[from:])
}

// parse takes the record that b begins with apart and returns how long it is with
// its line end. It understands and refuses what a dialect.Reader does.
func (r *record) parse(b []byte) int {
	r.why = ""
	r.buf, r.ends = r.buf[:0], r.ends[:0]
	at, end := fieldStart, len(b)
	fail := func(why string) {
		if r.why == "" {
			r.why = why
		}
	}
scan:
	for i := 0; i < len(b); {
		c, size := rune(b[i]), 1
		if c >= utf8.RuneSelf {
			c, size = utf8.DecodeRune(b[i:])
		}
		i += size
		switch {
		case c == utf8.RuneError && size == 1:
			fail("text is not UTF-8, wanted UTF-8: save it again in that encoding")
		case c == 0:
			fail("a NUL byte, wanted text: is this a spreadsheet's own file?")
		}
		if at == inQuotes {
			if c == '"' {
				at = afterQuotes
			} else {
				r.buf = utf8.AppendRune(r.buf, c)
			}
			continue
		}
		switch {
		case c == '\r' && i < len(b) && b[i] == '\n':
			end = i + 1
			break scan
		case c == '\n', c == '\r':
			end = i
			break scan
		case c == rune(r.comma):
			r.ends = append(r.ends, len(r.buf))
			at = fieldStart
		case c == '"' && at == fieldStart:
			at = inQuotes
		case c == '"' && at == afterQuotes: // a doubled quote
			r.buf = append(r.buf, '"')
			at = inQuotes
		case c == '"':
			fail("a quote inside a field that does not begin with one, wanted the field in quotes and the quote doubled")
			r.buf = append(r.buf, '"')
		case at == afterQuotes:
			fail("text behind a closing quote, wanted the quote doubled or a separator")
			r.buf = utf8.AppendRune(r.buf, c)
		default:
			at = inField
			r.buf = utf8.AppendRune(r.buf, c)
		}
	}
	if r.open = at == inQuotes; r.open {
		fail("a quote is left open to the end of the file")
	}
	r.ends = append(r.ends, len(r.buf))
	r.fields = r.fields[:0]
	from := 0
	for _, e := range r.ends {
		r.fields = append(r.fields, r.buf[from:e])
		from = e
	}
	if end > dialect.MaxRecord {
		r.fields, r.why = r.fields[:0], tooLong()
	}
	return end
}

// blank reports whether the record is an empty line.
func (r *record) blank() bool { return len(r.fields) == 1 && len(r.fields[0]) == 0 && r.why == "" }

func tooLong() string {
	return fmt.Sprintf("a record of more than %d bytes: is a quote left open?", dialect.MaxRecord)
}
