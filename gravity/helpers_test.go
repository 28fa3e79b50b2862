package gravity_test

import (
	"errors"
	"math"
	"testing"

	"gylebook/gravity/method"
	"gylebook/testdata/published"
)

// rows returns the rows of a published file.
func rows(t *testing.T, name string) []published.Row {
	t.Helper()
	f, err := published.Load(name)
	if err != nil {
		t.Fatal(err)
	}
	return f.Rows
}

// number returns a printed cell.
func number(t *testing.T, r published.Row, col string) float64 {
	t.Helper()
	x, err := r.Float(col)
	if err != nil {
		t.Fatal(err)
	}
	return x
}

// agree compares got with a printed cell times factor, within the tolerance that
// stands beside the row.
func agree(t *testing.T, r published.Row, relation, col string, factor, got float64) {
	t.Helper()
	tol, _, err := r.Tolerance(relation, col)
	if err != nil {
		t.Fatal(err)
	}
	want := factor * number(t, r, col)
	// A rounding of the last bits is forgiven where a value falls on half a place.
	if !(math.Abs(got-want) <= tol*(1+1e-9)) {
		t.Errorf("%s: %s gives %s %.6f, printed %.6f ± %g", r.Where(), relation, col, got, want, tol)
	}
}

// near fails unless got is within tol of want.
func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s: got %.9g, wanted %.9g ± %g", what, got, want, tol)
	}
}

// refused fails unless err is a *method.RangeError.
func refused(t *testing.T, what string, err error) {
	t.Helper()
	var r *method.RangeError
	if !errors.As(err, &r) {
		t.Errorf("%s: got %v, wanted a *method.RangeError", what, err)
	}
}

// rms collects deviations.
type rms struct {
	sum float64
	n   int
}

func (r *rms) add(d float64) { r.sum += d * d; r.n++ }

func (r *rms) value() float64 { return math.Sqrt(r.sum / float64(r.n)) }
