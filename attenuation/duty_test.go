package attenuation

import (
	"errors"
	"fmt"
	"strconv"
	"testing"

	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// HMRC Excise Notice 226, par. 30.2-30.3: the factor of both ends of each band.
// The strengths printed at the upper ends are neither cut nor rounded throughout
// (17.2·0.127 = 2.184 is printed 2.1, 57.1·0.131 = 7.480 is printed 7.5), so they
// bind to one unit of their last place, as the examples from the same notice do.
func TestDutyBands(t *testing.T) {
	rows := load(t, "uk_beer_duty_factors").Rows
	if len(rows) != len(DutyBands) {
		t.Fatalf("%d bands, published %d", len(DutyBands), len(rows))
	}
	for i, r := range rows {
		from, to, f := cell(t, r, "diff_from"), cell(t, r, "diff_to"), cell(t, r, "f")
		if DutyBands[i] != (DutyBand{from, to, f}) {
			t.Errorf("%s: band is %v", r.Where(), DutyBands[i])
		}
		for _, d := range []float64{from, to} {
			points, factor, err := DutyFactor(gravity.Points(d+2).SG(), 1.002)
			if err != nil || points != d || factor != f {
				t.Errorf("%s: %v points at %v, %v", r.Where(), points, factor, err)
			}
		}
		printed := cell(t, r, "printed_ABV_to")
		a := by(t, idUKDuty, at(t, 1+to/1000, 1))
		near(t, r.Where()+" strength", float64(a.ABV), printed, 2*r.HalfPlace("printed_ABV_to"))
	}
}

// The same table's strengths at the upper ends of bands, with the tolerance of
// the row; 4.19 is declared as 4.1.
func TestDutyExamples(t *testing.T) {
	for _, id := range []string{"25", "27", "29", "31", "33"} {
		ex := worked(t, id)
		points, f, err := DutyFactor(gravity.Points(ex.in["OG-PG"]).SG(), 1)
		if err != nil || f != ex.in["f"] {
			t.Errorf("row %s: factor %v, %v, printed %v", id, f, err, ex.in["f"])
		}
		near(t, "row "+id+" strength", asread.Product(points, f), ex.want[0], ex.tol)
	}
	ex := worked(t, "23")
	rule, err := FindRule(idUKDuty)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "row 23", float64(rule.Declare(gravity.VolPct(ex.in[""]))), ex.want[0], 0)
}

// Every original gravity from 1.0361 up, in steps of 0.0001, as a person types
// it: a difference of exactly 36.0 points is in the band of 0.129, 36.1 in that
// of 0.130 (Notice 226, par. 30.3). So is every other end of a band.
func TestDutyEdgesForEveryOG(t *testing.T) {
	for i := 361; i <= 1800; i++ {
		for _, c := range []struct {
			tenths int
			factor float64
		}{
			{69, 0.125},
			{70, 0.126},
			{104, 0.126},
			{105, 0.127},
			{172, 0.127},
			{173, 0.128},
			{261, 0.128},
			{262, 0.129},
			{360, 0.129},
			{361, 0.130},
			{465, 0.130},
			{466, 0.131},
			{571, 0.131},
			{572, 0.132},
			{679, 0.132},
			{680, 0.133},
			{788, 0.133},
			{789, 0.134},
			{897, 0.134},
			{898, 0.135},
			{1007, 0.135},
		} {
			og, fg := typed(t, 10000+i), typed(t, 10000+i-c.tenths)
			points, f, err := DutyFactor(og, fg)
			if err != nil || f != c.factor || points != float64(c.tenths)/10 {
				t.Errorf("%v - %v: %v points, factor %v, %v; wanted %v", og, fg, points, f, err, c.factor)
			}
		}
	}
}

// typed returns n/10000 as it is read from text.
func typed(t *testing.T, n int) gravity.SG {
	t.Helper()
	x, err := strconv.ParseFloat(fmt.Sprintf("%d.%04d", n/10000, n%10000), 64)
	if err != nil {
		t.Fatal(err)
	}
	return gravity.SG(x)
}

// 1.055 and 1.016: 39.0·0.130 = 5.07, declared 5.0.
func TestDutyDeclared(t *testing.T) {
	rule, err := FindRule("")
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		og, fg        float64
		abv, declared gravity.VolPct
	}{{1.048, 1.010, 4.94, 4.9}, {1.055, 1.016, 5.07, 5.0}} {
		a := by(t, rule.Method, at(t, c.og, c.fg))
		if a.ABV != c.abv || rule.Declare(a.ABV) != c.declared {
			t.Errorf("%v/%v: %v declared %v, wanted %v and %v", c.og, c.fg, a.ABV, rule.Declare(a.ABV), c.abv, c.declared)
		}
	}
}

func TestDutyEnds(t *testing.T) {
	if _, _, err := DutyFactor(1.1008, 1.0000); !errors.Is(err, ErrNoFactor) {
		t.Errorf("100.8 points: %v, wanted no factor", err)
	}
	// Half up to one decimal, then the band: 36.05 is 36.1.
	if p, f, err := DutyFactor(1.04605, 1.01); err != nil || p != 36.1 || f != 0.130 {
		t.Errorf("36.05 points: %v, %v, %v", p, f, err)
	}
	if _, _, err := DutyFactor(1.010, 1.011); !errors.Is(err, ErrOrder) {
		t.Errorf("risen gravity: %v", err)
	}
}
