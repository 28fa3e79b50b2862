package exchange

import (
	"errors"
	"fmt"
	"slices"
	"strings"
)

// ErrHeader says that the header lacks what the table needs.
var ErrHeader = errors.New("header")

// header knows the place of each column; -1 stands for one that is not there.
type header struct {
	place   map[string]int
	figures [figCount]int
	derived bool // any figure is there
}

// readHeader finds the columns by name, in any order. Unknown ones are noted.
func readHeader(fields []string) (header, []string, error) {
	h := header{place: make(map[string]int)}
	known := append(Columns(), colNote)
	var present, strange []string
	for i, f := range fields {
		name := columnName(f)
		present = append(present, name)
		if !slices.Contains(known, name) {
			if name != "" {
				strange = append(strange, name)
			}
			continue
		}
		if _, twice := h.place[name]; twice {
			return h, nil, fmt.Errorf("%w: column %s stands twice, wanted it once", ErrHeader, name)
		}
		h.place[name] = i
	}
	var missing []string
	if !h.has(colBatch) && !h.has(colVessel) {
		missing = append(missing, colBatch+" or "+colVessel)
	}
	for _, name := range []string{colTaken, colText, colTemp} {
		if !h.has(name) {
			missing = append(missing, name)
		}
	}
	if len(missing) > 0 {
		return h, nil, fmt.Errorf("%w: missing %s; line 1 has %s", ErrHeader, strings.Join(missing, ", "), shorten(strings.Join(present, ", ")))
	}
	for i, f := range figureColumns {
		h.figures[i] = -1
		if at, ok := h.place[f.name]; ok {
			h.figures[i], h.derived = at, true
		}
	}
	var notes []string
	if len(strange) > 0 {
		notes = append(notes, "columns not read: "+shorten(strings.Join(strange, ", ")))
	}
	return h, notes, nil
}

func (h header) has(name string) bool { _, ok := h.place[name]; return ok }

func shorten(s string) string {
	r := []rune(s)
	if len(r) <= 400 {
		return s
	}
	return string(r[:400]) + " …"
}
