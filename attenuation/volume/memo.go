package volume

import "encoding/binary"

// memo keeps the written results of rows with short cells. Readings come from few
// marks and few temperatures and stand still for days, so the same cells come again
// and again.
//
// Where they do not, looking costs more than it saves, so that it is left alone for
// some chunks when few of one were found, and for twice as many the next time.
type memo struct {
	slots        []slot
	asked, found int // in this chunk
	rest         int // chunks for which it is left alone
	last         int // what rest was the last time
}

const (
	memoBits = 11
	memoText = 110
	memoRest = 16       // chunks, at first
	memoLong = 256      // and at most
	memoFew  = 250      // rows; so few tell nothing
	memoFrom = 32 << 10 // bytes; less to work is not worth a memo
)

type slot struct {
	key  memoKey
	n    uint8 // length of text, 0 for a free slot
	text [memoText]byte
}

type memoKey [2]uint64

// chunk begins a chunk of n bytes and looks back on the one before.
func (m *memo) chunk(n int) {
	switch {
	case m.slots == nil && n >= memoFrom:
		m.slots = make([]slot, 1<<memoBits)
	case m.rest > 0:
		m.rest--
	case m.asked < memoFew:
	case m.found < m.asked/4:
		m.last = min(max(2*m.last, memoRest), memoLong)
		m.rest = m.last
	default:
		m.last = 0
	}
	m.asked, m.found = 0, 0
}

// keyOf packs at most two cells of at most eight bytes. A cell holds no NUL, so that
// what stands for its end is not text.
func keyOf(cells [][]byte) (k memoKey, ok bool) {
	if len(cells) > len(k) {
		return k, false
	}
	for i, c := range cells {
		if len(c) > 8 {
			return k, false
		}
		if cap(c) >= 8 {
			k[i] = binary.LittleEndian.Uint64(c[:8:8]) & (1<<(8*len(c)) - 1)
			continue
		}
		for n, b := range c {
			k[i] |= uint64(b) << (8 * n)
		}
	}
	return k, true
}

// awake reports whether the memo is to be asked.
func (m *memo) awake() bool { return m.rest == 0 && m.slots != nil }

// slot returns the place for the results of these cells, nil for none, and whether
// they are there.
func (m *memo) slot(cells [][]byte) (s *slot, k memoKey, there bool) {
	k, ok := keyOf(cells)
	if !ok {
		return nil, k, false
	}
	s = m.at(k)
	m.asked++
	if s.n > 0 && s.key == k {
		m.found++
		return s, k, true
	}
	return s, k, false
}

func (m *memo) at(k memoKey) *slot {
	h := (k[0]*0x9e3779b97f4a7c15 ^ k[1]) * 0xbf58476d1ce4e5b9
	return &m.slots[h>>(64-memoBits)]
}
