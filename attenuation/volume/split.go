package volume

import "bytes"

// splitter finds where records end, in pieces of any size. It sees quotes as
// package dialect does: one opens only at the start of a field, and behind a
// closing quote another opens again before the next separator.
type splitter struct {
	comma byte
	at    place
}

type place uint8

const (
	fieldStart place = iota
	inField
	inQuotes
	afterQuotes
)

// last returns the end of a late record that ends in b, line end included, or 0 when
// none does: the last one, save where a CR ends records behind the last LF. It goes on from where the bytes before b left it. A CR that ends b may be half a
// line end and counts as none.
func (s *splitter) last(b []byte) int { return s.scan(b, false) }

// first returns the end of the first record that ends in b; what follows it is not
// looked at.
func (s *splitter) first(b []byte) int { return s.scan(b, true) }

func (s *splitter) scan(b []byte, first bool) int {
	end := 0
	for i := 0; i < len(b); {
		switch s.at {
		case inQuotes:
			n := bytes.IndexByte(b[i:], '"')
			if n < 0 {
				return end
			}
			i += n + 1
			s.at = afterQuotes
		case afterQuotes:
			for ; i < len(b) && s.at == afterQuotes; i++ {
				switch c := b[i]; {
				case c == '"':
					s.at = inQuotes
				case c == s.comma:
					s.at = fieldStart
				case c == '\n', c == '\r' && i+1 < len(b) && b[i+1] != '\n':
					s.at, end = fieldStart, i+1
					if first {
						return end
					}
				}
			}
		default:
			// Up to the next quote no quote matters.
			n := bytes.IndexByte(b[i:], '"')
			stop := len(b)
			if n >= 0 {
				stop = i + n
			}
			if e := recordEnd(b, i, stop, first); e > 0 {
				end = e
				if first {
					s.at = fieldStart
					return end
				}
			}
			s.after(b, i, stop)
			i = stop
			if n >= 0 {
				if s.at == fieldStart {
					s.at = inQuotes
				}
				i++
			}
		}
	}
	return end
}

// after sets the place behind b[i:stop], which holds no quote.
func (s *splitter) after(b []byte, i, stop int) {
	if stop == i {
		return
	}
	s.at = inField
	switch c := b[stop-1]; {
	case c == s.comma, c == '\n':
		s.at = fieldStart
	case c == '\r' && stop < len(b): // a quote follows, so the CR ends a line
		s.at = fieldStart
	}
}

// recordEnd returns the end of the first or last line in b[i:stop], 0 for none.
func recordEnd(b []byte, i, stop int, first bool) int {
	part := b[i:stop]
	if first {
		for k, c := range part {
			if c == '\n' || c == '\r' && i+k+1 < len(b) && b[i+k+1] != '\n' {
				return i + k + 1
			}
		}
		return 0
	}
	if n := bytes.LastIndexByte(part, '\n'); n >= 0 {
		return i + n + 1
	}
	for to := len(part); ; {
		n := bytes.LastIndexByte(part[:to], '\r')
		if n < 0 {
			return 0
		}
		if k := i + n + 1; k < len(b) && b[k] != '\n' {
			return k
		}
		to = n
	}
}

// lineEnds counts the line ends in b: LF, CR LF and a CR alone.
func lineEnds(b []byte) int {
	n := bytes.Count(b, []byte{'\n'})
	if cr := bytes.Count(b, []byte{'\r'}); cr > 0 {
		n += cr - bytes.Count(b, []byte("\r\n"))
	}
	return n
}
