package attenuation

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity"
	"gylebook/gravity/method"
)

// 100 L of SG 1.050 weigh 100 · 0.9982 · 1.050 = 104.81 kg and hold 12.39 % by
// the ASBC fit. With 2 kg of sugar: (104.81 · 12.39 + 2 · 100)/106.81 =
// (1298.6 + 200)/106.81 = 14.03 %.
func TestSugarRaisesOriginalExtract(t *testing.T) {
	fit := gravity.Fits.Default().Fn
	w := FromVolume(100, fit.Extract(1.050), 20).Add(Wort{MassKg: 2, Extract: 100})
	near(t, "mass", w.MassKg, 106.81, 0.02)
	near(t, "extract", float64(w.Extract), 14.03, 0.005)
	sg, err := fit.SG(w.Extract)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "effective OG", float64(sg), 1.0570, 0.00005)
}

// 100 L of 15 °P at 1059.2 kg/m³ (SG 1.0611 · 998.2) are 105.92 kg; at 12 °P the
// same extract is in 105.92 · 15/12 = 132.40 kg, 26.48 kg more.
func TestDilutionWater(t *testing.T) {
	w := FromVolume(100, 15, 20)
	kg, err := DilutionWater(w, 12)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "water", kg, 26.5, 0.05)
	near(t, "diluted", float64(w.Add(Wort{MassKg: kg}).Extract), 12, 1e-12)
	for _, tt := range []struct {
		w      Wort
		target gravity.Plato
	}{{w, 0}, {w, -1}, {w, 15.1}, {w, gravity.Plato(math.NaN())}, {Wort{}, 12}, {Wort{math.NaN(), 15}, 12}} {
		_, err := DilutionWater(tt.w, tt.target)
		var r *method.RangeError
		if !errors.As(err, &r) {
			t.Errorf("%v to %v: %v, want a range error", tt.w, tt.target, err)
		}
	}
}

// The figure of the trade for wort at 80 °C, 2.7 %, lies by water: 971.79 kg/m³ at
// 80 °C and 998.20 at 20 °C (Kell 1975) give 1 − 971.79/998.20 = 2.65 %.
func TestCoolingShrinks(t *testing.T) {
	near(t, "water", 100*(1-FromVolume(100, 0, 80).Litres()/100), 2.65, 0.01)
	near(t, "12 °P", 100*(1-FromVolume(100, 12, 80).Litres()/100), 2.7, 0.05)
}

// 5.00 % mass of ethanol and 4.00 % of real extract in 100 kg of beer. It came
// from 100 + 1.0665 · 5 = 105.33 kg. 0.6 kg of sugar gives 0.6/2.0665 =
// 0.29035 kg of ethanol and loses 1.0665 · 0.29035 = 0.30966 kg, so that
// (5 + 0.29035)/(100 + 0.6 − 0.30966) = 5.2750 % mass are in it.
func TestPrimedStrength(t *testing.T) {
	a := Attenuation{ABW: 5, RE: 4}
	w := Wort{MassKg: 105.3325, Extract: 13}
	got, err := PrimedStrength(w, a, 1.010, Wort{MassKg: 0.6, Extract: 100})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "ABW", float64(*got.ABW), 5.2750, 0.0001)
	// The same with a thousandth of a gram is the strength before.
	none, err := PrimedStrength(w, a, 1.010, Wort{MassKg: 1e-6, Extract: 100})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "unprimed", float64(none.ABV), float64(VolumeOf(5, 1.010)), 1e-6)
	// Each % mass of ethanol lowers SG by about 0.0015 (densities of ethanol and
	// water at 20 °C, from memory), and the extract thins from 4.00 to 3.99 %, so SG
	// falls by 0.0005: (5.2750 · 1.0095 − 5 · 1.010) · 998.2/789.24 = 0.348 % vol.
	near(t, "gain", float64(got.ABV-none.ABV), 0.348, 0.001)
	for _, bad := range []Wort{{}, {MassKg: -1, Extract: 100}, {MassKg: 1, Extract: 101}} {
		if _, err := PrimedStrength(w, a, 1.010, bad); err == nil {
			t.Errorf("%+v was accepted", bad)
		}
	}
}

func TestNoAmount(t *testing.T) {
	nan := math.NaN()
	for _, w := range []Wort{
		FromVolume(nan, 12, 20), FromVolume(-1, 12, 20), FromVolume(0, 12, 20), FromVolume(math.Inf(1), 12, 20),
		FromVolume(1, gravity.Plato(nan), 20), FromVolume(1, 99, 20), FromVolume(1, 12, gravity.Celsius(nan)), FromVolume(1, 12, 101),
	} {
		if w != (Wort{}) || w.Known() || w.Litres() != 0 {
			t.Errorf("got %+v, want the zero amount", w)
		}
	}
	w := Wort{MassKg: 10, Extract: 12}
	for _, x := range []Wort{{}, {nan, 12}, {5, gravity.Plato(nan)}, {-5, 12}} {
		if got := w.Add(x); got != w {
			t.Errorf("%+v added to %+v", x, got)
		}
		if got := x.Add(w); got != w {
			t.Errorf("%+v and an amount are %+v", x, got)
		}
	}
}

// Mass is kept, extract is kept, and a mixture lies between its parts.
func TestAddBalances(t *testing.T) {
	amount := rapid.Custom(func(t *rapid.T) Wort {
		return Wort{rapid.Float64Range(0.001, 1e5).Draw(t, "kg"), gravity.Plato(rapid.Float64Range(0, 100).Draw(t, "extract"))}
	})
	rapid.Check(t, func(t *rapid.T) {
		a, b := amount.Draw(t, "a"), amount.Draw(t, "b")
		m := a.Add(b)
		lo, hi := min(a.Extract, b.Extract), max(a.Extract, b.Extract)
		inside := m.Extract >= lo-1e-9 && m.Extract <= hi+1e-9
		total := a.MassKg*float64(a.Extract) + b.MassKg*float64(b.Extract)
		if !inside || m.MassKg != a.MassKg+b.MassKg || math.Abs(m.MassKg*float64(m.Extract)-total) > 1e-9*(1+total) {
			t.Fatalf("%+v and %+v make %+v", a, b, m)
		}
	})
}
