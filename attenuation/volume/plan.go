package volume

import (
	"fmt"

	"gylebook/tables/dialect"
)

// ErrorColumn is the result column that says what is wrong with a row.
const ErrorColumn = "error"

// Plan says which columns are read, which are added and how.
type Plan struct {
	// Inputs are the names of the columns that a Worker is given, in its order.
	Inputs []string
	// Results are the names of the columns added, in order. ErrorColumn may be among
	// them; a row that is refused has its reason there.
	Results []string
	// New returns a Worker. Each is used by one goroutine.
	New func() Worker
	// Stop ends the run at the first row that is refused.
	Stop bool
	// Lines writes JSON Lines instead of separated values.
	Lines bool
	// Workers is their number, 0 for one a processor.
	Workers int
	// Progress, if any, is told after each piece how many rows and how many bytes of
	// input are done. It is called by the goroutine that called Run.
	Progress func(rows int, bytes int64)

	chunk int // bytes a piece, 0 for the usual; tests vary it
}

// Worker computes the results of one row. The cells are text as it stands in the
// file, quotes taken off; they hold until Row returns. Results that are not set
// stay empty. An error refuses the row. What Row gives may depend on the cells
// alone: equal cells may be answered from the results of an earlier row.
type Worker interface {
	Row(cells [][]byte, out *Results) error
}

// Summary is what a run did.
type Summary struct {
	Rows    int // read, refused ones among them
	Refused int
	First   *RowError // the first row refused, nil if none was
	Dialect dialect.Dialect
}

// RowError says why a row was refused.
type RowError struct {
	Line int // on which the row begins, from 1
	Err  error
}

func (e *RowError) Error() string { return fmt.Sprintf("line %d: %v", e.Line, e.Err) }

// Unwrap returns the reason.
func (e *RowError) Unwrap() error { return e.Err }

// FileError says that a file cannot be worked at all.
type FileError struct {
	Missing   string // the column that is not there, else ""
	why, hint string
}

func (e *FileError) Error() string { return e.why }

// Hint says what to do about it, "" when nothing comes to mind.
func (e *FileError) Hint() string { return e.hint }

// Results takes the results of one row, by their place in Plan.Results.
type Results struct{ cells []result }

type kind uint8

const (
	empty kind = iota
	number
	text
	truth
)

// result is of a kind; what belongs to another kind is left over from other rows.
type result struct {
	kind kind
	yes  bool
	x    float64
	s    string
}

// Number sets a number. What is not finite stays empty.
func (r *Results) Number(i int, x float64) {
	c := &r.cells[i]
	c.kind, c.x = number, x
}

// Text sets a text. An empty one stays empty.
func (r *Results) Text(i int, s string) { r.cells[i] = result{kind: text, s: s} }

// Bool sets a truth value.
func (r *Results) Bool(i int, yes bool) { r.cells[i] = result{kind: truth, yes: yes} }

func (r *Results) clear() {
	for i := range r.cells {
		r.cells[i].kind = empty
	}
}
