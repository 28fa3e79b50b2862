package gravity

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity/method"
	"gylebook/testdata/published"
)

// refractionRows loads a published file, its rows keyed by the column pct.
func refractionRows(t *testing.T, file, pct string) map[float64]published.Row {
	t.Helper()
	f, err := published.Load(file)
	if err != nil {
		t.Fatal(err)
	}
	rows := make(map[float64]published.Row)
	for _, r := range f.Rows {
		p, err := r.Float(pct)
		if err != nil {
			t.Fatal(err)
		}
		rows[p] = r
	}
	return rows
}

func ndOf(t *testing.T, r published.Row) float64 {
	t.Helper()
	n, err := r.Float("nD20")
	if err != nil {
		t.Fatal(err)
	}
	return n
}

// The tolerance is the stated error of our fit, 6e-6, against the rows as
// printed; half of their last digit (5e-6) is therefore inside it.
func TestRefractiveIndexMustTable(t *testing.T) {
	rows := refractionRows(t, "must_oiv_as2_02_t2", "sucrose_pct")
	info := Refractions.Default().Info
	for p, r := range rows {
		if !info.Valid[0].Contains(p) {
			t.Errorf("%s: %g %% is outside the range stated, %s", r.Where(), p, info.Valid[0])
		}
		want := ndOf(t, r)
		if got := Refractions.Default().Fn(Plato(p)); math.Abs(got-want) > 6e-6 {
			t.Errorf("%s: nD(%g %%) = %.6f, printed %.5f", r.Where(), p, got, want)
		}
		// The slope is 0.0015 per % mass, so 6e-6 is 0.004 %.
		back, err := ExtractOfRefraction(want)
		if err != nil || math.Abs(float64(back)-p) > 0.004 {
			t.Errorf("%s: extract of %.5f = %.5f (%v), printed %g", r.Where(), want, float64(back), err, p)
		}
	}
}

// The CRC rows have four decimals. At 20 % the two published tables disagree by
// more than that (1.3639 and 1.36384), and a fit through the one misses the
// other by up to their distance.
func TestRefractiveIndexCRC(t *testing.T) {
	must := refractionRows(t, "must_oiv_as2_02_t2", "sucrose_pct")
	inRange := 0
	for p, r := range refractionRows(t, "sucrose_crc_20c", "mass_pct") {
		if Plato(p) > maxRefraction {
			continue
		}
		want, tol := ndOf(t, r), r.HalfPlace("nD20")
		if other, ok := must[p]; ok {
			inRange++
			tol = max(tol, math.Abs(ndOf(t, other)-want))
		}
		if tol > 6.1e-5 {
			t.Errorf("%s: the tables are %.1e apart, more than the 6e-5 known at 20 %%", r.Where(), tol)
		}
		if got := RefractiveIndex(Plato(p)); math.Abs(got-want) > tol {
			t.Errorf("%s: nD(%g %%) = %.6f, printed %.4f", r.Where(), p, got, want)
		}
	}
	if inRange != 5 { // 12, 16, 20, 24 and 28 %
		t.Errorf("%d CRC rows stand in the must table too, wanted 5", inRange)
	}
}

func TestExtractOfRefractionRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := rapid.Float64Range(float64(minRefraction), float64(maxRefraction)).Draw(t, "p")
		got, err := ExtractOfRefraction(RefractiveIndex(Plato(p)))
		if err != nil || math.Abs(float64(got)-p) > 1e-9 {
			t.Fatalf("%v came back as %v (%v)", p, float64(got), err)
		}
		step := rapid.Float64Range(1e-6, 5).Draw(t, "step")
		if RefractiveIndex(Plato(p+step)) <= RefractiveIndex(Plato(p)) {
			t.Fatalf("nD does not rise from %v by %v", p, step)
		}
	})
}

func TestExtractOfRefractionRefuses(t *testing.T) {
	for _, n := range []float64{1.0, 1.32, 1.5, math.NaN(), math.Inf(1), math.Inf(-1)} {
		p, err := ExtractOfRefraction(n)
		var re *method.RangeError
		if !errors.As(err, &re) || p != 0 {
			t.Errorf("extract of nD %v = %v, %v; wanted a range error", n, p, err)
		}
	}
}
