package exchange

import (
	"encoding/binary"
	"errors"
	"strings"
	"time"

	"gylebook/attenuation/journal"
)

// planned is one row that was read.
type planned struct {
	reading journal.Reading
	reason  string // of a void row
	claim   []byte // packed, nil: the row has no figures; good until the next row
	place   int    // among the rows that were kept
	line    int
	own     bool // written by this program
	failed  bool // status says that it could not be corrected
	void    bool
}

const (
	flagOwn = 1 << iota
	flagFailed
	flagVoid
	flagGassy
)

// texts are the fields of a row that are text, in the order they are kept.
func (p *planned) texts() [11]*string {
	r := &p.reading
	return [...]*string{
		&r.Batch, &r.Vessel, &r.Quality, &r.Gravity.Text, &r.Gravity.Scale, &r.Temp.Text, &r.Temp.Unit, &r.Instrument, &r.Keep, &r.Note, &p.reason,
	}
}

// pack appends the row in a short form that unpack knows.
func (p *planned) pack(b []byte) []byte {
	at := p.reading.TakenAt
	_, offset := at.Zone()
	b = binary.AppendVarint(b, at.Unix())
	b = binary.AppendUvarint(b, uint64(at.Nanosecond()))
	b = binary.AppendVarint(b, int64(offset))
	b = binary.AppendUvarint(b, uint64(p.place))
	b = binary.AppendUvarint(b, uint64(p.line))
	flags := byte(0)
	if p.own {
		flags |= flagOwn
	}
	if p.failed {
		flags |= flagFailed
	}
	if p.void {
		flags |= flagVoid
	}
	if p.reading.Gassy {
		flags |= flagGassy
	}
	b = append(b, flags)
	for _, s := range p.texts() {
		b = binary.AppendUvarint(b, uint64(len(*s)))
		b = append(b, *s...)
	}
	return append(b, p.claim...)
}

// unpacker makes rows of what pack made. Texts and zones come again and again:
// there is one of each.
type unpacker struct {
	texts map[string]string
	zones map[int64]*time.Location
}

func newUnpacker() *unpacker {
	return &unpacker{texts: make(map[string]string), zones: make(map[int64]*time.Location)}
}

// mostTexts is how many texts are held to share them.
const mostTexts = 4096

func (u *unpacker) text(b []byte) string {
	if s, ok := u.texts[string(b)]; ok {
		return s
	}
	if len(u.texts) == mostTexts {
		clear(u.texts)
	}
	s := string(b)
	u.texts[s] = s
	return s
}

func (u *unpacker) zone(offset int64) *time.Location {
	if offset == 0 {
		return time.UTC
	}
	if u.zones[offset] == nil {
		u.zones[offset] = time.FixedZone("", int(offset))
	}
	return u.zones[offset]
}

// when is the time of a packed row, which stands first in it.
func when(b []byte) (at time.Time, rest []byte) {
	seconds, n := binary.Varint(b)
	b = b[max(n, 0):]
	nanoseconds, n := binary.Uvarint(b)
	return time.Unix(seconds, int64(nanoseconds)), b[max(n, 0):]
}

// errPacked says that a row did not come back as it was kept.
var errPacked = errors.New("a row that was kept in a file came back damaged")

// unpack fills p from a record.
func (u *unpacker) unpack(p *planned, b []byte) error {
	number := func() uint64 {
		v, n := binary.Uvarint(b)
		b = b[max(n, 0):]
		return v
	}
	at, b := when(b)
	offset, n := binary.Varint(b)
	b = b[max(n, 0):]
	*p = planned{place: int(number()), line: int(number())}
	if len(b) == 0 {
		return errPacked
	}
	flags := b[0]
	b = b[1:]
	p.own, p.failed, p.void = flags&flagOwn != 0, flags&flagFailed != 0, flags&flagVoid != 0
	p.reading.Gassy, p.reading.TakenAt = flags&flagGassy != 0, at.In(u.zone(offset))
	for _, s := range p.texts() {
		length := number()
		if length > uint64(len(b)) {
			return errPacked
		}
		*s = u.text(b[:length])
		b = b[length:]
	}
	if len(b) > 0 {
		p.claim = b
	}
	return nil
}

// sharer returns one copy of a text that comes again and again. A cell is part of
// the string of its whole row, which what is kept must not hold.
type sharer map[string]string

func (t sharer) share(s string) string {
	if one, ok := t[s]; ok {
		return one
	}
	s = strings.Clone(s)
	if len(t) < mostTexts {
		t[s] = s
	}
	return s
}
