package exchange

import (
	"cmp"
	"errors"
	"fmt"
	"slices"

	"gylebook/tables/dialect"
)

// ErrRefused says that rows were refused and nothing was written.
var ErrRefused = errors.New("nothing was written")

// MaxListed is how many reasons of refusal, repairs and differences a report names each;
// the rest are counted.
const MaxListed = 50

// Refusal is a reason for which rows were refused.
type Refusal struct {
	Line   int // of the first
	Reason string
	Rows   int
}

// Difference is a derived figure that the file has otherwise than the journal.
type Difference struct {
	Line       int
	Batch      string
	Column     string
	File, Ours string // Ours is "" when it cannot be given
}

// Report says what an import did, or would do.
type Report struct {
	Dialect     dialect.Dialect
	Notes       []string
	Rows        int      // read, without the header
	Readings    int      // accepted
	Voids       int      // of them, void
	Repeats     int      // passed over: same batch, minute and value
	Batches     []string // made
	Instruments []string // made
	First, Last int64    // entries written; 0 when none were

	Refused      []Refusal // in order of the first line
	RefusedCount int       // rows
	Lacks        bool      // rows were refused for a batch or an instrument that Create makes
	Repairs      []Repair
	RepairCount  int
	Differences  []Difference // in order of line
	DiffersCount int
}

func (r *Report) refuse(line int, reason string) {
	r.RefusedCount++
	one := Refusal{Line: line, Reason: reason, Rows: 1}
	if i := slices.IndexFunc(r.Refused, func(x Refusal) bool { return x.Reason == reason }); i >= 0 {
		one.Line, one.Rows = min(line, r.Refused[i].Line), r.Refused[i].Rows+1
		r.Refused = slices.Delete(r.Refused, i, i+1)
	}
	r.Refused = keepFirst(r.Refused, one, func(x Refusal) int { return x.Line })
}

func (r *Report) repair(list []Repair) {
	r.RepairCount += len(list)
	if room := MaxListed - len(r.Repairs); room > 0 {
		r.Repairs = append(r.Repairs, list[:min(room, len(list))]...)
	}
}

// listsDifference reports whether a difference in a line would still be named.
func (r *Report) listsDifference(line int) bool {
	return len(r.Differences) < MaxListed || line < r.Differences[MaxListed-1].Line
}

func (r *Report) differ(d Difference) {
	r.Differences = keepFirst(r.Differences, d, func(x Difference) int { return x.Line })
}

// keepFirst puts x into its place and keeps the MaxListed earliest lines.
func keepFirst[T any](list []T, x T, line func(T) int) []T {
	if len(list) == MaxListed && line(x) >= line(list[len(list)-1]) {
		return list
	}
	i, _ := slices.BinarySearchFunc(list, line(x)+1, func(e T, l int) int { return cmp.Compare(line(e), l) })
	list = slices.Insert(list, i, x)
	return list[:min(len(list), MaxListed)]
}

// err is ErrRefused with a count, or nil.
func (r *Report) err() error {
	switch r.RefusedCount {
	case 0:
		return nil
	case 1:
		return fmt.Errorf("line %d: %s: %w", r.Refused[0].Line, r.Refused[0].Reason, ErrRefused)
	}
	return fmt.Errorf("%d rows refused, the first in line %d: %s: %w", r.RefusedCount, r.Refused[0].Line, r.Refused[0].Reason, ErrRefused)
}
