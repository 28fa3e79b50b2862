package exchange

import (
	"encoding/binary"
	"errors"
	"fmt"
	"io"
)

// Scratch is a file for what does not fit into memory. It is written from its
// beginning to its end, and read anywhere meanwhile. Close takes it away.
type Scratch interface {
	io.Writer
	io.ReaderAt
	io.Closer
}

// spool keeps records in the order they came: a few in memory, many in a file.
type spool struct {
	scratch func() (Scratch, error) // nil: all stays in memory
	file    Scratch                 // nil until it is needed
	filed   int64                   // bytes in the file
	rest    []byte                  // what follows on them
}

// inMemory is how much [bytes] a spool holds before it goes to its file.
const inMemory = 1 << 20

// size is where the next record will begin.
func (s *spool) size() int64 { return s.filed + int64(len(s.rest)) }

// add appends a record.
func (s *spool) add(record []byte) error {
	s.rest = binary.AppendUvarint(s.rest, uint64(len(record)))
	s.rest = append(s.rest, record...)
	if len(s.rest) < inMemory || s.scratch == nil {
		return nil
	}
	if s.file == nil {
		var err error
		if s.file, err = s.scratch(); err != nil {
			return fmt.Errorf("rows are kept in a file until all are read: %w", err)
		}
	}
	if _, err := s.file.Write(s.rest); err != nil {
		return fmt.Errorf("rows are kept in a file until all are read: %w", err)
	}
	s.filed += int64(len(s.rest))
	s.rest = s.rest[:0]
	return nil
}

// ReadAt implements io.ReaderAt over file and memory.
func (s *spool) ReadAt(b []byte, at int64) (int, error) {
	n := 0
	if at < s.filed {
		var err error
		if n, err = s.file.ReadAt(b[:min(int64(len(b)), s.filed-at)], at); err != nil && !errors.Is(err, io.EOF) {
			return n, err
		}
		at += int64(n)
	}
	if at >= s.filed && at < s.size() {
		n += copy(b[n:], s.rest[at-s.filed:])
	}
	if n < len(b) {
		return n, io.EOF
	}
	return n, nil
}

func (s *spool) close() {
	if s.file != nil {
		_ = s.file.Close() // what was in it has been used, or is not wanted any more
	}
}

// cursor reads records of a spool, at its best when they follow each other.
type cursor struct {
	s      *spool
	from   int64 // of the window
	window []byte
}

// readAhead is how much [bytes] is read at once. Records that lie far apart cost
// as much each.
const readAhead = 4 << 10

// at returns the record that begins at a place, good until the next one is read,
// and where it ends.
func (c *cursor) at(place int64) (record []byte, end int64, err error) {
	b, err := c.bytes(place, binary.MaxVarintLen64)
	if err != nil {
		return nil, 0, err
	}
	length, n := binary.Uvarint(b)
	if n <= 0 {
		return nil, 0, io.ErrUnexpectedEOF
	}
	place += int64(n)
	end = place + int64(length)
	if b, err = c.bytes(place, int(length)); err != nil {
		return nil, 0, err
	}
	if len(b) < int(length) {
		return nil, 0, io.ErrUnexpectedEOF
	}
	return b[:length], end, nil
}

// bytes returns n bytes from a place on, fewer at the end of the spool.
func (c *cursor) bytes(place int64, n int) ([]byte, error) {
	n = int(min(int64(n), c.s.size()-place))
	if n < 0 {
		return nil, io.ErrUnexpectedEOF
	}
	if place < c.from || place+int64(n) > c.from+int64(len(c.window)) {
		want := min(int64(max(n, readAhead)), c.s.size()-place)
		if int64(cap(c.window)) < want {
			c.window = make([]byte, want)
		}
		c.window, c.from = c.window[:want], place
		if got, err := c.s.ReadAt(c.window, place); got < len(c.window) {
			c.window = c.window[:0]
			return nil, fmt.Errorf("rows kept in a file: %w", errors.Join(err, io.ErrUnexpectedEOF))
		}
	}
	return c.window[place-c.from:], nil
}
