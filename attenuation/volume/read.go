package volume

import (
	"errors"
	"io"

	"gylebook/tables/dialect"
)

// chunkSize is how much of the input is worked at a time.
const chunkSize = 64 << 10

// cutter cuts a stream into chunks at record boundaries.
type cutter struct {
	in    io.Reader
	comma byte
	size  int
	rest  []byte // of the last read, the beginning of the next chunk
	err   error  // how the stream ended
}

// fill puts the next records into c. It returns io.EOF at the end, then or with the
// last records, or the error of the stream. A stream that gives less than asked is
// not waited for once a record is whole, so that a pipe is answered as it comes.
func (r *cutter) fill(c *chunk) error {
	c.tooLong, c.lines = false, 0
	c.in = append(c.in[:0], r.rest...)
	r.rest = r.rest[:0]
	split := splitter{comma: r.comma}
	seen, end := 0, 0
	for {
		// A CR at the end may be half a line end: it waits for what follows.
		upTo := len(c.in)
		if r.err == nil && upTo > seen && c.in[upTo-1] == '\r' {
			upTo--
		}
		if e := split.last(c.in[seen:upTo]); e > 0 {
			end = seen + e
		}
		seen = upTo
		switch {
		case r.err != nil && !errors.Is(r.err, io.EOF):
			return r.err
		case r.err != nil:
			c.bytes = len(c.in)
			return io.EOF
		case end > 0:
			r.rest = append(r.rest, c.in[end:]...)
			c.in = c.in[:end]
			c.bytes = end
			return nil
		case len(c.in) > dialect.MaxRecord:
			return r.skip(c, &split, seen)
		}
		r.read(c)
	}
}

// read adds what the stream gives at once to c, up to the size of a chunk, and
// beyond it as long as one record is not whole.
func (r *cutter) read(c *chunk) {
	room := r.size - len(c.in)
	if room <= 0 {
		room = max(len(c.in)/2, 1)
	}
	from := len(c.in)
	if cap(c.in)-from < room {
		c.in = append(make([]byte, 0, from+room), c.in...)
	}
	n := 0
	for n == 0 && r.err == nil {
		n, r.err = r.in.Read(c.in[from : from+room])
	}
	c.in = c.in[:from+n]
}

// skip passes over the rest of a record that is too long. What is seen of it has
// been scanned.
func (r *cutter) skip(c *chunk, split *splitter, seen int) error {
	c.tooLong, c.bytes = true, seen
	c.lines = lineEnds(c.in[:seen])
	held := len(c.in) > seen // a CR
	buf := c.in[:0]
	if held {
		buf = append(buf, '\r')
	}
	for {
		n := 0
		room := buf[len(buf):min(cap(buf), len(buf)+r.size)]
		for n == 0 && r.err == nil {
			n, r.err = r.in.Read(room)
		}
		buf = buf[:len(buf)+n]
		upTo := len(buf)
		if r.err == nil && upTo > 0 && buf[upTo-1] == '\r' {
			upTo--
		}
		end := split.first(buf[:upTo])
		if end == 0 && r.err == nil {
			c.lines += lineEnds(buf[:upTo])
			c.bytes += upTo
			buf = append(buf[:0], buf[upTo:]...)
			continue
		}
		if end == 0 {
			end = len(buf)
		}
		c.lines += lineEnds(buf[:end])
		c.bytes += end
		r.rest = append(r.rest[:0], buf[end:]...)
		c.in = c.in[:0]
		if r.err != nil && !errors.Is(r.err, io.EOF) {
			return r.err
		}
		if r.err != nil && len(r.rest) == 0 {
			return io.EOF
		}
		return nil
	}
}
