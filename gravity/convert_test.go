package gravity_test

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity"
	"gylebook/gravity/method"
)

// on returns the value of f on a scale.
func on(f gravity.Figures, s gravity.Scale) float64 {
	switch s {
	case gravity.ScaleSG:
		return float64(f.SG)
	case gravity.ScalePlato, gravity.ScaleBrix:
		return float64(f.Extract)
	case gravity.ScalePoints:
		return float64(f.Points)
	case gravity.ScaleOechsle:
		return f.Oechsle
	case gravity.ScaleKMW:
		return f.KMW
	case gravity.ScaleBaume:
		return f.Baume
	case gravity.ScaleTwaddell:
		return f.Twaddell
	case gravity.ScaleDensity:
		return float64(f.Density)
	case gravity.ScaleGPL:
		return float64(f.GPL)
	}
	return math.NaN()
}

// converters are every fit with every modulus.
func converters() []gravity.Converter {
	var all []gravity.Converter
	for _, e := range gravity.Fits {
		for _, m := range []gravity.Modulus{gravity.Modulus145, gravity.Modulus1443} {
			all = append(all, gravity.Converter{Fit: e, Modulus: m})
		}
	}
	return all
}

func scaleIDs() []gravity.Scale {
	var all []gravity.Scale
	for _, s := range gravity.Scales() {
		all = append(all, s.Scale)
	}
	return all
}

// values lists every number of f.
func values(f gravity.Figures) []float64 {
	v := []float64{f.Long}
	for _, s := range scaleIDs() {
		v = append(v, on(f, s))
	}
	return v
}

func TestConvertRoundTrips(t *testing.T) {
	all := converters()
	rapid.Check(t, func(t *rapid.T) {
		c := rapid.SampledFrom(all).Draw(t, "converter")
		scale := rapid.SampledFrom(scaleIDs()).Draw(t, "scale")
		// A start inside every fit's reach, turned into a value of the scale.
		start, err := c.Convert(gravity.ScaleSG, rapid.Float64Range(0.982, 1.40).Draw(t, "sg"), gravity.Pair2020)
		if err != nil {
			t.Fatal(err)
		}
		v := on(start, scale)
		f, err := c.Convert(scale, v, gravity.Pair2020)
		if err != nil {
			t.Fatal(err)
		}
		if d := on(f, scale) - v; math.Abs(d) > 1e-8 {
			t.Fatalf("%v %s came back as %v with %s", v, scale, on(f, scale), c.Fit.ID)
		}
		// Each figure typed again on its own scale gives itself.
		for _, s := range scaleIDs() {
			again, err := c.Convert(s, on(f, s), gravity.Pair2020)
			if err != nil {
				t.Fatal(err)
			}
			if d := on(again, s) - on(f, s); math.Abs(d) > 1e-8 {
				t.Fatalf("%v %s came back as %v with %s", on(f, s), s, on(again, s), c.Fit.ID)
			}
		}
	})
}

func TestConvertIsMonotone(t *testing.T) {
	all := converters()
	rapid.Check(t, func(t *rapid.T) {
		c := rapid.SampledFrom(all).Draw(t, "converter")
		from := rapid.SampledFrom(scaleIDs()).Draw(t, "scale")
		lo := rapid.Float64Range(0.982, 1.39).Draw(t, "sg")
		step := rapid.Float64Range(1e-5, 0.01).Draw(t, "step")
		a, err := c.Convert(gravity.ScaleSG, lo, gravity.Pair2020)
		if err != nil {
			t.Fatal(err)
		}
		b, err := c.Convert(gravity.ScaleSG, lo+step, gravity.Pair2020)
		if err != nil {
			t.Fatal(err)
		}
		if a, err = c.Convert(from, on(a, from), gravity.Pair2020); err != nil {
			t.Fatal(err)
		}
		if b, err = c.Convert(from, on(b, from), gravity.Pair2020); err != nil {
			t.Fatal(err)
		}
		low, high := values(a), values(b)
		for i := range low {
			if !(high[i] > low[i]) {
				t.Fatalf("figure %d does not rise: %v to %v", i, low[i], high[i])
			}
		}
	})
}

// 12 % stays 12 % with every fit, also through its own density, and its SG is the
// table's: NBS C440 Table 114 prints 1.04837 for 12 %.
func TestTwelvePercentStays(t *testing.T) {
	for _, r := range rows(t, "sucrose_nbs_c440_t114") {
		if number(t, r, "brix") != 12 {
			continue
		}
		for _, id := range []string{"asbc", "nbs"} {
			e, err := gravity.Fits.Find(id)
			if err != nil {
				t.Fatal(err)
			}
			c := gravity.Converter{Fit: e, Modulus: gravity.Modulus145}
			f, err := c.Convert(gravity.ScaleBrix, 12, gravity.Pair2020)
			if err != nil {
				t.Fatal(err)
			}
			if f.Extract != 12 {
				t.Errorf("%s: 12 %% became %v", id, f.Extract)
			}
			agree(t, r, id, "sg_20_20_apparent", 1, float64(f.SG))
			// A density is true and the fit is in air, or the value would move.
			f, err = c.Convert(gravity.ScaleDensity, float64(f.Density), gravity.Pair2020)
			if err != nil {
				t.Fatal(err)
			}
			near(t, id+" through its density", float64(f.Extract), 12, 0.005)
		}
	}
}

// No figure is NaN, infinite or -0, at water and at -0 least of all.
func TestConvertGivesNumbersOnly(t *testing.T) {
	negativeZero := math.Copysign(0, -1)
	for _, c := range converters() {
		for _, scale := range scaleIDs() {
			for _, v := range []float64{0, negativeZero, 1, 1.05, 5, 20, 50, 100, 998.2031227373548, 1050, 1400} {
				f, err := c.Convert(scale, v, gravity.Pair2020)
				if err != nil {
					continue // a value that this scale does not have
				}
				for i, x := range values(f) {
					if math.IsNaN(x) || math.IsInf(x, 0) || x == 0 && math.Signbit(x) {
						t.Errorf("%s: %v %s: figure %d is %v", c.Fit.ID, v, scale, i, x)
					}
				}
			}
		}
	}
}

func TestConvertRefuses(t *testing.T) {
	outside := map[gravity.Scale][]float64{
		gravity.ScaleSG: {0.94, 1.46, 0, -1}, gravity.ScalePoints: {-51, 451}, gravity.ScaleOechsle: {-51, 451},
		gravity.ScaleKMW: {-12, 80, -210, -300}, gravity.ScaleBaume: {-8, 46, 145, 146, 1000}, gravity.ScaleTwaddell: {-11, 91},
		gravity.ScalePlato: {-16, 120, 240, 1000, -1000}, gravity.ScaleBrix: {-16, 120, 240, 1000, -1000},
		gravity.ScaleDensity: {900, 1460, 0, -1050}, gravity.ScaleGPL: {-200, 1300, 1e6},
	}
	for _, c := range converters() {
		for _, scale := range scaleIDs() {
			if len(outside[scale]) == 0 {
				t.Errorf("%s has no value outside", scale)
			}
			for _, v := range append(outside[scale], math.NaN(), math.Inf(1), math.Inf(-1)) {
				for _, pair := range pairs {
					f, err := c.Convert(scale, v, pair)
					refused(t, scale.String(), err)
					if f.SG != 0 || f.Extract != 0 {
						t.Errorf("%v %s was refused with figures %+v", v, scale, f)
					}
				}
			}
		}
	}
}

// A relative density is read on its pair; the rational Baumé stands on 15/4.
func TestConvertReadsThePair(t *testing.T) {
	c := gravity.NewConverter()
	r := gravity.Relative{Value: 1.05, Pair: gravity.Pair1515}
	want, err := r.SG()
	if err != nil {
		t.Fatal(err)
	}
	f, err := c.Convert(gravity.ScalePoints, 50, gravity.Pair1515)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "50 points on 15/15", float64(f.SG), float64(want), 1e-12)

	c.Modulus = gravity.Modulus1443
	v := 144.3 - 144.3/1.05
	a, errA := c.Convert(gravity.ScaleBaume, v, gravity.Pair2020)
	b, errB := c.Convert(gravity.ScaleBaume, v, gravity.Pair6060F)
	if errA != nil || errB != nil {
		t.Fatal(errA, errB)
	}
	on154, err := a.SG.Relative().On(gravity.Pair154)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "rational Baumé on 15/4", on154.Value, 1.05, 1e-12)
	near(t, "whatever the pair", float64(b.SG), float64(a.SG), 0)
}

func TestConvertNotesOutOfRange(t *testing.T) {
	f, err := gravity.NewConverter().Convert(gravity.ScaleSG, 1.15, gravity.Pair2020)
	if err != nil {
		t.Fatal(err)
	}
	if len(f.Notes) != 1 || f.Notes[0].Code != method.OutOfRange {
		t.Errorf("SG 1.15 by asbc carries %v", f.Notes)
	}
}
