package attenuation

import (
	"math"
	"strconv"
	"strings"
	"testing"

	"gylebook/gravity"
	"gylebook/testdata/published"
)

// at returns the gravities of two SG 20/20 with the default fit.
func at(tb testing.TB, og, fg float64) Gravities {
	tb.Helper()
	g, err := NewGravities(gravity.SG(og), gravity.SG(fg), gravity.Fits.Default())
	if err != nil {
		tb.Fatal(err)
	}
	return g
}

// extracts returns the gravities of two extracts in % mass, default fit.
func extracts(tb testing.TB, oe, ae float64) Gravities {
	tb.Helper()
	c := gravity.NewConverter()
	og, err := c.Convert(gravity.ScalePlato, oe, gravity.Pair2020)
	if err != nil {
		tb.Fatal(err)
	}
	pg, err := c.Convert(gravity.ScalePlato, ae, gravity.Pair2020)
	if err != nil {
		tb.Fatal(err)
	}
	return Of(og, pg)
}

// by returns the alcohol that the method with this id gives.
func by(tb testing.TB, id string, g Gravities) Alcohol {
	tb.Helper()
	e, err := ABVMethods.Find(id)
	if err != nil {
		tb.Fatal(err)
	}
	a, err := e.Fn(g)
	if err != nil {
		tb.Fatalf("%s: %v", id, err)
	}
	return a
}

func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s is %.6f, wanted %.6f within %g", what, got, want, tol)
	}
}

func load(tb testing.TB, name string) *published.File {
	tb.Helper()
	f, err := published.Load(name)
	if err != nil {
		tb.Fatal(err)
	}
	return f
}

func cell(tb testing.TB, r published.Row, col string) float64 {
	tb.Helper()
	x, err := r.Float(col)
	if err != nil {
		tb.Fatal(err)
	}
	return x
}

// example is a row of worked_examples.csv, taken apart.
type example struct {
	in   map[string]float64 // "p=12" under "p"; a bare leading number under ""
	want []float64
	tol  float64
}

func worked(tb testing.TB, id string) example {
	tb.Helper()
	for _, r := range load(tb, "worked_examples").Rows {
		if r.Text("id") != id {
			continue
		}
		ex := example{in: map[string]float64{}, tol: cell(tb, r, "tol")}
		for i, word := range strings.Fields(r.Text("inputs")) {
			key, value, named := strings.Cut(strings.Trim(word, "()"), "=")
			if !named {
				key, value = "", word
			}
			if x, err := strconv.ParseFloat(value, 64); err == nil && (named || i == 0) {
				ex.in[key] = x
			}
		}
		for _, part := range strings.Split(r.Text("published"), "|") {
			x, err := strconv.ParseFloat(part, 64)
			if err != nil {
				tb.Fatalf("%s: %v", r.Where(), err)
			}
			ex.want = append(ex.want, x)
		}
		return ex
	}
	tb.Fatalf("no worked example %s", id)
	return example{}
}
