package attenuation

import (
	"errors"
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity"
	"gylebook/gravity/method"
)

// By hand from the printed coefficients, to the last digit given:
//
// linear, 12 → 6: 1 − 0.00085683·12 + 0.0034941·6
// = 1 − 0.01028196 + 0.0209646 = 1.01068264
//
// cubic, 12 → 6: 1 − 0.0044993·12 + 0.011774·6 + 0.00027581·144 − 0.0012717·36 − 7.28e-6·1728 + 6.3293e-5·216
// = 1 − 0.0539916 + 0.070644 + 0.03971664 − 0.0457812 − 0.01257984 + 0.013671288 = 1.011679288
//
// older cubic, 12 → 6: 1.001843 − 0.002318474·12 − 7.775e-6·144 − 3.4e-8·1728 + 0.00574·6 + 3.344e-5·36 + 8.6e-8·216
// = 1.001843 − 0.027821688 − 0.0011196 − 0.000058752 + 0.03444 + 0.00120384 + 0.000018576 = 1.008505376
//
// 20 → 10, where every power of ten shows:
// linear: 1 − 0.0171366 + 0.034941 = 1.0178044
// cubic: 1 − 0.089986 + 0.11774 + 0.110324 − 0.12717 − 0.05824 + 0.063293 = 1.015961
// older cubic: 1.001843 − 0.04636948 − 0.00311 − 0.000272 + 0.0574 + 0.003344 + 0.000086 = 1.01292152
func TestRefractometerByHand(t *testing.T) {
	for _, c := range []struct {
		id     string
		bi, bf gravity.Plato
		want   float64
	}{
		{"terrill2011-linear", 12, 6, 1.01068264},
		{"terrill2011-cubic", 12, 6, 1.011679288},
		{"bonham2001", 12, 6, 1.008505376},
		{"terrill2011-linear", 20, 10, 1.0178044},
		{"terrill2011-cubic", 20, 10, 1.015961},
		{"bonham2001", 20, 10, 1.01292152},
	} {
		m, err := RefractometerMethods.Find(c.id)
		if err != nil {
			t.Fatal(err)
		}
		if got := m.Fn(c.bi, c.bf); math.Abs(float64(got)-c.want) > 1e-12 {
			t.Errorf("%s %g → %g: %.10f, by hand %.10f", c.id, float64(c.bi), float64(c.bf), float64(got), c.want)
		}
	}
}

// A finished beer, 12 → 6.4 °Bx: by hand 1.01208, 1.01300 and 1.01097, so the
// relations lie 2.0 points apart.
func TestRefractometerAgree(t *testing.T) {
	lo, hi := gravity.MaxSG, gravity.MinSG
	for _, e := range RefractometerEstimates(12, 6.4) {
		if e.Err != nil || !e.InRange {
			t.Errorf("%s: %v, in range %v; wanted a value in range", e.Info.ID, e.Err, e.InRange)
		}
		if len(e.Notes) != 1 || e.Notes[0].Code != method.Caution {
			t.Errorf("%s: notes %v, wanted the caution alone", e.Info.ID, e.Notes)
		}
		lo, hi = min(lo, e.SG), max(hi, e.SG)
	}
	if apart := hi.Points() - lo.Points(); !(apart > 0 && apart <= 4) {
		t.Errorf("the relations are %.2f points apart, wanted up to 4", float64(apart))
	}
}

// A beer stopped at 12 → 9 °Bx: the linear gives 1 − 0.01028196 + 0.0314469 =
// 1.02116, which is 5.4 °P, an apparent attenuation of 55 %; the cubic 1.02224,
// 5.7 °P, 53 %. Both are below the 61 % of finished beer.
func TestRefractometerUnfinished(t *testing.T) {
	inRange := map[string]bool{"terrill2011-linear": false, "terrill2011-cubic": false, "bonham2001": true}
	for _, e := range RefractometerEstimates(12, 9) {
		if e.Err != nil || e.InRange != inRange[e.Info.ID] {
			t.Errorf("%s: in range %v (%v), wanted %v", e.Info.ID, e.InRange, e.Err, inRange[e.Info.ID])
		}
		warned := false
		for _, n := range e.Notes {
			warned = warned || n.Code == method.OutOfRange && strings.Contains(n.Text, ofAttenuation)
		}
		if warned == e.InRange {
			t.Errorf("%s: in range %v, notes %v", e.Info.ID, e.InRange, e.Notes)
		}
	}
}

// The cubic's slope in bf, 0.011774 − 0.0025434 bf + 1.89879e-4 bf², has no zero
// (0.0025434² < 4·0.011774·1.89879e-4); the other two have positive terms only.
func TestRefractometerMonotone(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		bi := rapid.Float64Range(4, 40).Draw(t, "bi")
		low := rapid.Float64Range(2, bi).Draw(t, "low")
		high := rapid.Float64Range(low, bi).Draw(t, "high")
		for _, m := range RefractometerMethods {
			a, b := m.Fn(gravity.Plato(bi), gravity.Plato(low)), m.Fn(gravity.Plato(bi), gravity.Plato(high))
			if b < a-1e-12 {
				t.Fatalf("%s at %v: %v for %v, %v for %v", m.ID, bi, a, low, b, high)
			}
		}
	})
}

func TestRefractometerRefuses(t *testing.T) {
	nan, inf := gravity.Plato(math.NaN()), gravity.Plato(math.Inf(1))
	for _, c := range []struct {
		bi, bf gravity.Plato
		order  bool
	}{
		{6, 12, true},
		{12, 12, true},
		{nan, 6, false},
		{12, nan, false},
		{inf, 6, false},
		{12, inf, false},
		{12, -inf, false},
		{0, 0, false},
		{-3, -4, false},
		{12, -0.1, false},
		{90, 6, false},
	} {
		es := RefractometerEstimates(c.bi, c.bf)
		if len(es) != len(RefractometerMethods) {
			t.Fatalf("%d estimates, wanted one a relation", len(es))
		}
		for _, e := range es {
			var re *method.RangeError
			var oe *BrixOrderError
			ok := errors.As(e.Err, &re)
			if c.order {
				ok = errors.As(e.Err, &oe) && errors.Is(e.Err, ErrOrder) && oe.Hint() != ""
			}
			if !ok || e.SG != 0 || e.InRange || len(e.Notes) != 0 {
				t.Errorf("%s %v → %v: %v, %v; wanted an error alone", e.Info.ID, c.bi, c.bf, e.SG, e.Err)
			}
		}
	}
}

// Whatever is asked, there is an error or an SG that a liquid of the trade has.
func TestRefractometerNeverNaN(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		bi := gravity.Plato(rapid.Float64().Draw(t, "bi"))
		bf := gravity.Plato(rapid.Float64().Draw(t, "bf"))
		if rapid.Bool().Draw(t, "usual") {
			bi = gravity.Plato(rapid.Float64Range(0, 70).Draw(t, "usual bi"))
			bf = gravity.Plato(rapid.Float64Range(-1, 70).Draw(t, "usual bf"))
		}
		for _, e := range RefractometerEstimates(bi, bf) {
			if e.Err == nil && gravity.CheckSG(e.SG) != nil {
				t.Fatalf("%s %v → %v: SG %v without an error", e.Info.ID, bi, bf, e.SG)
			}
		}
	})
}

func TestRefractometerInfos(t *testing.T) {
	if id := RefractometerMethods.Default().ID; id != "terrill2011-linear" {
		t.Errorf("the default is %s", id)
	}
	for _, i := range RefractometerMethods.Infos() {
		if i.Kind != "refractometer relation" || i.Check != method.FormulaOnly || !strings.Contains(i.Use, RefractometerCaution) {
			t.Errorf("%s: kind %q, check %q, use %q", i.ID, i.Kind, i.Check, i.Use)
		}
	}
}
