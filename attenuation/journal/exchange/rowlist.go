package exchange

import (
	"cmp"
	"encoding/binary"
	"iter"
	"slices"
	"time"
)

// rowList is where the rows of one batch lie in a spool: stretches of rows that
// follow each other. Of a file that goes batch by batch it takes a few bytes a
// batch, of one that goes round by round a few a row.
type rowList struct {
	packed   []byte // of each stretch: the gap before it, and the rows of all but the last
	rows     uint64 // of the last stretch
	end      int64  // of the last row
	last     time.Time
	unsorted bool // by time
}

// add puts a row at the end of the list.
func (l *rowList) add(from, end int64, at time.Time) {
	if l.rows > 0 && at.Before(l.last) {
		l.unsorted = true
	}
	if l.rows == 0 || from != l.end {
		if l.rows > 0 {
			l.packed = binary.AppendUvarint(l.packed, l.rows)
		}
		l.packed = binary.AppendUvarint(l.packed, uint64(from-l.end))
		l.rows = 0
	}
	l.rows++
	l.end, l.last = end, at
}

// located is a record with the place where it begins.
type located struct {
	place  int64
	record []byte
}

// each reads the rows in the order of the file. A record is good until the next.
func (l *rowList) each(c *cursor) iter.Seq2[located, error] {
	return func(yield func(located, error) bool) {
		place, packed := int64(0), l.packed
		for len(packed) > 0 {
			gap, n := binary.Uvarint(packed)
			packed = packed[n:]
			rows := l.rows
			if len(packed) > 0 {
				rows, n = binary.Uvarint(packed)
				packed = packed[n:]
			}
			place += int64(gap)
			for range rows {
				record, end, err := c.at(place)
				if !yield(located{place, record}, err) || err != nil {
					return
				}
				place = end
			}
		}
	}
}

// byTime reads the rows of the lists in the order of their time, those of the same
// time in the order of the file. One list that is in order is read as it lies; else
// the times of all the rows are held.
func byTime(c *cursor, lists []*rowList) iter.Seq2[[]byte, error] {
	if len(lists) == 1 && !lists[0].unsorted {
		return func(yield func([]byte, error) bool) {
			for row, err := range lists[0].each(c) {
				if !yield(row.record, err) {
					return
				}
			}
		}
	}
	type mark struct {
		seconds     int64
		nanoseconds int32
		place       int64
	}
	return func(yield func([]byte, error) bool) {
		var marks []mark
		for _, l := range lists {
			for row, err := range l.each(c) {
				if err != nil {
					yield(nil, err)
					return
				}
				at, _ := when(row.record)
				marks = append(marks, mark{at.Unix(), int32(at.Nanosecond()), row.place})
			}
		}
		slices.SortFunc(marks, func(a, b mark) int {
			return cmp.Or(cmp.Compare(a.seconds, b.seconds), cmp.Compare(a.nanoseconds, b.nanoseconds), cmp.Compare(a.place, b.place))
		})
		for _, m := range marks {
			record, _, err := c.at(m.place)
			if !yield(record, err) || err != nil {
				return
			}
		}
	}
}
