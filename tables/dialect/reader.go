package dialect

import (
	"bufio"
	"errors"
	"fmt"
	"io"
	"unicode/utf8"
)

// MaxRecord is the longest record read, in bytes.
const MaxRecord = 1 << 20

// Record is one record. Fields hold until the next Read.
type Record struct {
	Line   int // that it begins on, from 1
	Fields []string
}

// Error says what is wrong with one record. The records after it can still be read.
type Error struct {
	Line int
	Why  string
}

func (e *Error) Error() string { return fmt.Sprintf("line %d: %s", e.Line, e.Why) }

// Reader splits a file into records, in memory that does not grow with the file.
type Reader struct {
	in      *bufio.Reader
	comma   rune
	columns int // of the first record
	ragged  bool
	line    int
	buf     []byte
	ends    []int
	fields  []string
	err     error
}

// NewReader reads records of r, in the form d.
func NewReader(r io.Reader, d Dialect) *Reader {
	in, ok := r.(*bufio.Reader)
	if !ok {
		in = bufio.NewReaderSize(r, 64<<10)
	}
	if start, _ := in.Peek(len(bom)); string(start) == bom {
		_, _ = in.Discard(len(bom))
	}
	return &Reader{in: in, comma: d.Comma, line: 1}
}

// Read returns the next record that is not an empty line; at the end the error is
// io.EOF. An *Error tells of one record: a NUL byte, text that is not UTF-8, a quote
// in the wrong place or left open, more or fewer fields than the header, more than
// MaxRecord bytes. Any other error is that of the file.
func (r *Reader) Read() (Record, error) {
	for {
		rec, err := r.next()
		if err != nil || len(rec.Fields) != 1 || rec.Fields[0] != "" {
			return rec, err
		}
	}
}

// Places in a field.
const (
	start = iota
	plain
	quoted
	closed // behind a closing quote
)

func (r *Reader) next() (Record, error) {
	if r.err != nil {
		return Record{}, r.err
	}
	rec := Record{Line: r.line}
	r.buf, r.ends = r.buf[:0], r.ends[:0]
	at, why, read := start, "", 0
	fail := func(format string, args ...any) {
		if why == "" {
			why = fmt.Sprintf(format, args...)
		}
	}
	for {
		c, size, err := r.in.ReadRune()
		if err != nil {
			r.err = err
			if !errors.Is(err, io.EOF) {
				return rec, err
			}
			if read == 0 {
				return rec, io.EOF
			}
			if at == quoted {
				fail("a quote is left open to the end of the file")
			}
			break
		}
		read += size
		switch {
		case c == utf8.RuneError && size == 1:
			fail("text is not UTF-8, wanted UTF-8: save it again in that encoding")
		case c == 0:
			fail("a NUL byte, wanted text: is this a spreadsheet's own file?")
		}
		if c == '\n' || c == '\r' && !r.follows('\n') {
			r.line++
		}
		if at == quoted {
			if c == '"' {
				at = closed
			} else {
				r.keep(c, size)
			}
			continue
		}
		switch {
		case c == '\n':
		case c == '\r':
			if r.follows('\n') {
				_, _ = r.in.Discard(1)
				r.line++
			}
		case c == r.comma:
			if read <= MaxRecord {
				r.ends = append(r.ends, len(r.buf))
			}
			at = start
			continue
		case c == '"' && at == start:
			at = quoted
			continue
		case c == '"' && at == closed: // a doubled quote
			r.keep(c, size)
			at = quoted
			continue
		case c == '"':
			fail("a quote inside a field that does not begin with one, wanted the field in quotes and the quote doubled")
			continue
		case at == closed:
			fail("text behind a closing quote, wanted the quote doubled or a %s", name(r.comma))
			continue
		default:
			at = plain
			r.keep(c, size)
			continue
		}
		break
	}
	r.ends = append(r.ends, len(r.buf))
	if read > MaxRecord {
		fail("a record of more than %d bytes: is a quote left open?", MaxRecord)
	}
	empty := len(r.ends) == 1 && len(r.buf) == 0
	if r.columns == 0 && !empty && why == "" {
		r.columns = len(r.ends)
	}
	if !r.ragged && !empty && len(r.ends) != r.columns {
		fail("%d fields, wanted %d as in the header", len(r.ends), r.columns)
	}
	if why != "" {
		return rec, &Error{rec.Line, why}
	}
	rec.Fields = r.split()
	return rec, nil
}

// keep adds c to the record, up to its longest.
func (r *Reader) keep(c rune, size int) {
	if c == utf8.RuneError && size == 1 || len(r.buf) >= MaxRecord {
		return
	}
	r.buf = utf8.AppendRune(r.buf, c)
}

func (r *Reader) follows(b byte) bool {
	next, _ := r.in.Peek(1)
	return len(next) == 1 && next[0] == b
}

// split cuts one string into the fields.
func (r *Reader) split() []string {
	text := string(r.buf)
	r.fields = r.fields[:0]
	from := 0
	for _, end := range r.ends {
		r.fields = append(r.fields, text[from:end])
		from = end
	}
	return r.fields
}
