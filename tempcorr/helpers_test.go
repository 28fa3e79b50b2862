package tempcorr_test

import (
	"math"
	"testing"

	"gylebook/gravity"
	"gylebook/tempcorr"
	"gylebook/testdata/published"
)

func rows(t *testing.T, name string) []published.Row {
	t.Helper()
	f, err := published.Load(name)
	if err != nil {
		t.Fatal(err)
	}
	return f.Rows
}

func number(t *testing.T, r published.Row, col string) float64 {
	t.Helper()
	x, err := r.Float(col)
	if err != nil {
		t.Fatal(err)
	}
	return x
}

// agree compares got with a printed cell within the row's own tolerance.
func agree(t *testing.T, r published.Row, relation, col string, got float64) {
	t.Helper()
	tol, _, err := r.Tolerance(relation, col)
	if err != nil {
		t.Fatal(err)
	}
	if want := number(t, r, col); !(math.Abs(got-want) <= tol*(1+1e-9)) {
		t.Errorf("%s: %s gives %s %.5f, printed %.5f ± %g", r.Where(), relation, col, got, want, tol)
	}
}

func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s: got %.9g, wanted %.9g ± %g", what, got, want, tol)
	}
}

// glass2020 is a glass instrument on 20/20 of which nothing else is known.
func glass2020(scale gravity.Scale) tempcorr.Hydrometer {
	return tempcorr.New(scale, gravity.Pair2020, tempcorr.Bodies[0])
}

func correct(t *testing.T, h tempcorr.Hydrometer, o tempcorr.Observation) tempcorr.Result {
	t.Helper()
	res, err := tempcorr.Correct(h, o)
	if err != nil {
		t.Fatalf("%+v: %v", o, err)
	}
	return res
}

// hasNote says whether a note of this code is among them.
func hasNote(res tempcorr.Result, code string) bool {
	for _, n := range res.Notes {
		if n.Code == code {
			return true
		}
	}
	return false
}

// part returns the budget's line of this name.
func part(b tempcorr.Budget, name string) (tempcorr.Contribution, bool) {
	for _, p := range b.Parts {
		if p.Name == name {
			return p, true
		}
	}
	return tempcorr.Contribution{}, false
}
