package tempcorr_test

import (
	"errors"
	"math"
	"testing"

	"gylebook/gravity"
	"gylebook/gravity/method"
	"gylebook/tempcorr"
)

// certified carries two calibration points: +0.0010 at 1.000 and -0.0010 at 1.020.
func certified() tempcorr.Hydrometer {
	h := glass2020(gravity.ScaleSG)
	h.ID, h.InLiquid = "h1", true
	h.Certificate = []tempcorr.Certificate{{Reading: 1.000, Correction: 0.0010, U: 0.0004}, {Reading: 1.020, Correction: -0.0010, U: 0.0006}, {Reading: 1.060, Correction: 0.0002, U: 0.0002}}
	return h
}

func TestCertificateIsLinearBetweenPoints(t *testing.T) {
	// By hand: half way 0; a quarter 0.0010 - 0.0005; at 1.050 -0.0010 + 0.75 · 0.0012.
	for reading, want := range map[float64]float64{1.000: 0.0010, 1.005: 0.0005, 1.010: 0, 1.020: -0.0010, 1.050: -0.0001, 1.060: 0.0002} {
		res := correct(t, certified(), tempcorr.Observation{Reading: reading, T: 20})
		near(t, "correction", res.Certificate, want, 1e-12)
		near(t, "corrected", res.Corrected, reading+want, 1e-12)
		if hasNote(res, method.OutOfRange) {
			t.Errorf("%v is inside the certificate and carries %v", reading, res.Notes)
		}
	}
}

func TestCertificateHoldsItsEnds(t *testing.T) {
	for reading, want := range map[float64]float64{0.995: 0.0010, 1.080: 0.0002} {
		res := correct(t, certified(), tempcorr.Observation{Reading: reading, T: 20})
		near(t, "correction", res.Certificate, want, 0)
		if !hasNote(res, method.OutOfRange) {
			t.Errorf("%v is outside the certificate and carries no note", reading)
		}
	}
	// One point is a constant offset, valid everywhere.
	h := certified()
	h.Certificate = h.Certificate[:1]
	res := correct(t, h, tempcorr.Observation{Reading: 1.05, T: 20})
	near(t, "one point", res.Certificate, 0.0010, 0)
	if hasNote(res, method.OutOfRange) {
		t.Errorf("one point carries %v", res.Notes)
	}
}

// The larger U of the two points counts: at k = 2 and slope 1, 0.0006/2.
func TestCertificateUncertainty(t *testing.T) {
	res := correct(t, certified(), tempcorr.Observation{Reading: 1.010, T: 20})
	p, ok := part(res.Budget, "certificate")
	if !ok || math.Abs(p.U-0.0003) > 1e-6 || !p.Common {
		t.Errorf("got %+v, wanted u = 0.0003 common to all readings", p)
	}
}

func TestCertificateMustAscend(t *testing.T) {
	for what, points := range map[string][]tempcorr.Certificate{
		"falling":      {{Reading: 1.02}, {Reading: 1.00}},
		"twice":        {{Reading: 1.02}, {Reading: 1.02}},
		"not a number": {{Reading: 1.02}, {Reading: math.NaN()}},
	} {
		h := certified()
		h.Certificate = points
		if _, err := tempcorr.Correct(h, tempcorr.Observation{Reading: 1.01, T: 20}); !errors.Is(err, tempcorr.ErrCertificate) {
			t.Errorf("%s: got %v, wanted ErrCertificate", what, err)
		}
	}
	if err := tempcorr.CheckCertificate(nil); err != nil {
		t.Errorf("no certificate: %v", err)
	}
}

// A certificate holds at the reference temperature: it is added to the reading,
// and the sum is corrected for temperature, never the other way round.
func TestCertificateComesBeforeTemperature(t *testing.T) {
	h := certified()
	h.Certificate = []tempcorr.Certificate{{Reading: 1.000, Correction: 0}, {Reading: 1.100, Correction: 0.02}} // steep, to tell them apart
	res := correct(t, h, tempcorr.Observation{Reading: 1.040, T: 35})
	first, err := tempcorr.Sucrose(h.Float(), 1.040+0.008, tempcorr.Sample{T: 35})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "certificate first", res.Corrected, first, 1e-12)
	after, err := tempcorr.Sucrose(h.Float(), 1.040, tempcorr.Sample{T: 35})
	if err != nil {
		t.Fatal(err)
	}
	after += 0.2 * (after - 1) // the certificate's line at the corrected value
	if math.Abs(after-first) < 5e-4 {
		t.Errorf("the other order gives %.5f and %.5f: this case cannot tell", after, first)
	}
}

// Langberg's formula by hand, D = 5 mm, 45 mN/m, 998.2 kg/m³: s/(rho G D) = 9.194e-4 m,
// 2 rho G D²/s = 10.877, sqrt(11.877) - 1 = 2.4463, product 2.249 mm.
func TestMeniscusHeight(t *testing.T) {
	near(t, "height", tempcorr.MeniscusHeight(5, 45, 998.2), 2.249, 0.0005)
	// 19.635 mm² · 998.2 kg/m³ / 60 g = 0.32667 point per mm.
	near(t, "scale", tempcorr.ScaleSlope(5, 60, 1), 0.32667, 5e-5)
}

// Read at the top what is meant for the bottom: the liquid climbs the stem and
// hides marks, the reading is low and the correction positive.
func TestMeniscusSign(t *testing.T) {
	for _, scale := range []gravity.Scale{gravity.ScaleSG, gravity.ScalePlato, gravity.ScaleDensity, gravity.ScaleBaume} {
		h := glass2020(scale)
		h.StemMM, h.MassG, h.InLiquid = 5, 60, true
		at := func(meant, read tempcorr.Meniscus) tempcorr.Result {
			h.ReadAt = meant
			return correct(t, h, tempcorr.Observation{Reading: usual[scale], T: 20, ReadAt: read})
		}
		low, high := at(tempcorr.Bottom, tempcorr.Top), at(tempcorr.Top, tempcorr.Bottom)
		if !(low.Meniscus > 0 && low.Corrected > low.Reading) {
			t.Errorf("%s read at the top: %+g", scale, low.Meniscus)
		}
		if !(high.Meniscus < 0) {
			t.Errorf("%s read at the bottom: %+g", scale, high.Meniscus)
		}
		for _, same := range []tempcorr.Result{at(tempcorr.Bottom, ""), at(tempcorr.Top, tempcorr.Top), at("", tempcorr.Bottom)} {
			if same.Meniscus != 0 {
				t.Errorf("%s read where it is meant to be: %+g", scale, same.Meniscus)
			}
		}
		if hasNote(low, method.Assumed) {
			t.Errorf("%s: stem and mass are known, yet something was assumed", scale)
		}
	}
	// 2.249 mm at SG 1 is 2.249 · 0.32667 = 0.735 point.
	h := glass2020(gravity.ScaleSG)
	h.StemMM, h.MassG = 5, 60
	res := correct(t, h, tempcorr.Observation{Reading: 1, T: 20, ReadAt: tempcorr.Top})
	near(t, "lab instrument", 1000*res.Meniscus, 0.735, 0.001)
	// Nothing known: half way between 0.7 and 3.3 points, and it says so.
	res = correct(t, glass2020(gravity.ScaleSG), tempcorr.Observation{Reading: 1.05, T: 20, ReadAt: tempcorr.Top})
	near(t, "unknown instrument", 1000*res.Meniscus, 2.0, 1e-9)
	if !hasNote(res, method.Assumed) {
		t.Error("an assumed meniscus carries no note")
	}
}

// The liquid pulls the stem down by pi D s: 1000 · pi · 0.005 · 0.02775/(0.060 · 9.80665)
// = 0.741 point between water (72.75 mN/m) and beer (45) on a lab instrument,
// 2.408 on 24 g and 6.5 mm.
func TestTensionByHand(t *testing.T) {
	near(t, "lab", tempcorr.TensionPoints(1, 5, 60, 72.75, 45), -0.741, 0.0005)
	near(t, "kit", tempcorr.TensionPoints(1, 6.5, 24, 72.75, 45), -2.408, 0.0005)
	near(t, "adjusted in the drink", tempcorr.TensionPoints(1, 5, 60, 45, 45), 0, 0)
}

// Adjusted in water it floats too high in beer and reads high, so the correction
// is negative; adjusted for less than beer has, it is positive.
func TestTensionSign(t *testing.T) {
	for adjusted, sign := range map[float64]float64{72.75: -1, 55: -1, 40: 1} {
		h := glass2020(gravity.ScaleSG)
		h.ID, h.StemMM, h.MassG, h.Adjusted = "h1", 5, 60, adjusted
		res := correct(t, h, tempcorr.Observation{Reading: 1.01, T: 20})
		if res.Tension*sign <= 0 {
			t.Errorf("adjusted for %v mN/m: %+g", adjusted, res.Tension)
		}
		h.InLiquid = true
		if res = correct(t, h, tempcorr.Observation{Reading: 1.01, T: 20}); res.Tension != 0 {
			t.Errorf("checked in the drink itself: %+g", res.Tension)
		}
	}
}
