package selfcheck

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"gylebook/gravity/method"
	"gylebook/testdata/published"
)

// slack forgives the last bits of binary arithmetic, in the unit of the column.
const slack = 1e-9

// Outcome is what one source says about one relation.
type Outcome struct {
	Source    string  // published file, without .csv
	Cited     string  // what the file cites
	Kind      string  // of the relation
	Relation  string  // id
	Compared  string  // what was compared, the file's column where it is one
	Rows      int     // values compared
	Worst     float64 // deviation of the row nearest to, or farthest beyond, its tolerance
	Tolerance float64 // of that row
	Unit      string  // of both
	Passed    bool
	Misses    []string // row, wanted, got
}

// Key names a relation among all registries: "fit/balling".
func Key(i method.Info) string { return i.Kind + "/" + i.ID }

// Key names the relation of the outcome.
func (o Outcome) Key() string { return o.Kind + "/" + o.Relation }

// Covered returns how many published values were compared with each relation, by
// Key; a row with two columns counts twice.
func Covered(outcomes []Outcome) map[string]int {
	rows := make(map[string]int)
	for _, o := range outcomes {
		rows[o.Key()] += o.Rows
	}
	return rows
}

// tally collects comparisons of one file.
type tally struct {
	file     *published.File
	outcomes []*Outcome
	err      error // the first row that could not be read
}

// of returns the outcome of a relation and what is compared.
func (t *tally) of(info method.Info, compared, unit string) *Outcome {
	for _, o := range t.outcomes {
		if o.Key() == Key(info) && o.Compared == compared {
			return o
		}
	}
	o := &Outcome{
		Source: t.file.Name, Cited: t.file.Source, Kind: info.Kind, Relation: info.ID,
		Compared: compared, Unit: unit, Passed: true,
	}
	t.outcomes = append(t.outcomes, o)
	return o
}

// compare adds one value to an outcome.
func (o *Outcome) compare(where string, want, got, tolerance float64) {
	d := math.Abs(got - want)
	if math.IsNaN(d) || math.IsInf(d, 0) {
		o.miss(fmt.Sprintf("%s: wanted %.8g, got no number", where, want))
		return
	}
	if o.Tolerance == 0 || d/tolerance > o.Worst/o.Tolerance {
		o.Worst, o.Tolerance = d, tolerance
	}
	if d > tolerance+slack {
		o.miss(fmt.Sprintf("%s: wanted %.8g within %.3g, got %.8g", where, want, tolerance, got))
		return
	}
	o.Rows++
}

// miss adds a row that did not pass.
func (o *Outcome) miss(text string) {
	o.Rows++
	o.Passed = false
	o.Misses = append(o.Misses, text)
}

// row compares got with the printed cell in col, tolerance as the row states it
// for key.
func (t *tally) row(info method.Info, key string, r published.Row, col string, got float64, err error, unit string) {
	want := t.number(r, col)
	tolerance := t.tolerance(r, key, col)
	t.value(info, r, col, want, got, tolerance, err, unit)
}

// value compares got with a number that the row prints in its own way.
func (t *tally) value(info method.Info, r published.Row, compared string, want, got, tolerance float64, err error, unit string) {
	if t.err != nil {
		return
	}
	o := t.of(info, compared, unit)
	if err != nil {
		o.miss(fmt.Sprintf("%s: %v", r.Where(), err))
		return
	}
	o.compare(r.Where(), want, got, tolerance)
}

// number reads a cell; the first that is no number ends the run.
func (t *tally) number(r published.Row, col string) float64 {
	x, err := r.Float(col)
	t.fail(err)
	return x
}

func (t *tally) tolerance(r published.Row, key, col string) float64 {
	x, _, err := r.Tolerance(key, col)
	t.fail(err)
	return x
}

// parse reads a number out of the text of a cell.
func (t *tally) parse(r published.Row, col, text string) float64 {
	x, err := strconv.ParseFloat(text, 64)
	if err != nil {
		t.fail(fmt.Errorf("%s: %s is %.40q, wanted a number in it", r.Where(), col, r.Text(col)))
	}
	return x
}

// fail keeps the first error.
func (t *tally) fail(err error) {
	if t.err == nil {
		t.err = err
	}
}

// find returns a relation that a file is for; a registry without it ends the run.
func find[F any](t *tally, set method.Set[F], id string) method.Entry[F] {
	e, err := set.Find(id)
	t.fail(err)
	return e
}

// named reports whether the row states a tolerance for this relation.
func named(row published.Row, id string) bool {
	for _, entry := range strings.Fields(row.Text("tol")) {
		if strings.HasPrefix(entry, id+":") || strings.HasPrefix(entry, id+"=") {
			return true
		}
	}
	return false
}
