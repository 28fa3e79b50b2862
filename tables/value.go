package tables

import (
	"fmt"
	"io"
	"math"
	"strconv"
	"strings"
)

// Note is a warning that travels with a value.
type Note struct {
	Code string `json:"code"`
	Text string `json:"text"`
}

// Field is one named value of a record. Value holds a string, bool, int,
// float64, *float64, []Note, []string, []Record or nil; anything else is refused
// when the record is written. A nil pointer, NaN and an infinity count as nil.
// Records inside a record are for JSON alone: CSV has no place for them.
type Field struct {
	Name  string
	Value any
}

// Record is an ordered list of fields.
type Record []Field

// Get returns the value of the first field with this name, nil if there is none.
func (r Record) Get(name string) any {
	for _, f := range r {
		if f.Name == name {
			return f.Value
		}
	}
	return nil
}

func (r Record) has(name string) bool {
	for _, f := range r {
		if f.Name == name {
			return true
		}
	}
	return false
}

// names lists the field names in order.
func (r Record) names() []string {
	names := make([]string, len(r))
	for i, f := range r {
		names[i] = f.Name
	}
	return names
}

// check refuses a name that stands twice: JSON readers keep one of the two, and
// nobody knows which.
func (r Record) check() error {
	for i, f := range r {
		if r[:i].has(f.Name) {
			return fmt.Errorf("field %q stands twice, wanted every name once", f.Name)
		}
	}
	return nil
}

// plain turns pointers into what they point to, and what is no number into nil.
func plain(v any) any {
	if p, ok := v.(*float64); ok {
		if p == nil {
			return nil
		}
		v = *p
	}
	if x, ok := v.(float64); ok && (math.IsNaN(x) || math.IsInf(x, 0)) {
		return nil
	}
	return v
}

// number prints a finite x in the fewest digits that read back as x, in plain
// decimals from 1e-6 up to 1e21 and with an exponent outside. Both are valid
// JSON numbers (RFC 8259, section 6). Minus zero prints as 0.
func number(x float64) string {
	if x == 0 {
		return "0"
	}
	if a := math.Abs(x); a < 1e-6 || a >= 1e21 {
		return strconv.FormatFloat(x, 'e', -1, 64)
	}
	return strconv.FormatFloat(x, 'f', -1, 64)
}

// texts joins the texts of notes with "; ".
func texts(notes []Note) string {
	parts := make([]string, len(notes))
	for i, n := range notes {
		parts[i] = n.Text
	}
	return strings.Join(parts, "; ")
}

func errValue(f Field) error {
	return fmt.Errorf("field %q holds a %T, wanted string, bool, int, float64, *float64, []Note, []string, []Record (in JSON) or nil", f.Name, f.Value)
}

// writeAll hands b to w whole and takes a short write for an error.
func writeAll(w io.Writer, b []byte) error {
	n, err := w.Write(b)
	if err == nil && n < len(b) {
		err = io.ErrShortWrite
	}
	return err
}
