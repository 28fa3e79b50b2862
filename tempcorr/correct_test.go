package tempcorr_test

import (
	"errors"
	"fmt"
	"math"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity"
	"gylebook/gravity/method"
	"gylebook/tempcorr"
)

// usual readings of an unfermented liquid on each scale of a hydrometer.
var usual = map[gravity.Scale]float64{
	gravity.ScaleSG: 1.05, gravity.ScalePlato: 12, gravity.ScaleBrix: 12, gravity.ScalePoints: 50, gravity.ScaleOechsle: 50,
	gravity.ScaleKMW: 10.5, gravity.ScaleBaume: 7, gravity.ScaleTwaddell: 10, gravity.ScaleDensity: 1048,
}

func TestNothingCorrectedAtTheReference(t *testing.T) {
	for scale, v := range usual {
		for _, pair := range []gravity.Pair{gravity.Pair2020, gravity.Pair1515, gravity.Pair6060F, gravity.Pair154, gravity.Pair175175} {
			for _, oe := range []gravity.Plato{0, 12, 20} {
				for _, body := range tempcorr.Bodies {
					res := correct(t, tempcorr.New(scale, pair, body), tempcorr.Observation{Reading: v, Step: 0.001, T: pair.Sample, OE: oe})
					if res.Corrected != v || res.Temperature != 0 {
						t.Errorf("%v %s on %v, OE %v: corrected to %v", v, scale, pair, oe, res.Corrected)
					}
				}
			}
		}
	}
	// The temperature-only cubic is the exception: +0.11 point at its own 59 °F.
	h := tempcorr.New(gravity.ScaleSG, gravity.Pair1515, tempcorr.Bodies[0])
	res := correct(t, h, tempcorr.Observation{Reading: 1.05, T: 15, Method: "lyons1992"})
	near(t, "lyons1992 at 59 °F", 1000*res.Temperature, 0.109204, 1e-6)
}

func TestCorrectedIsMonotone(t *testing.T) {
	bodies := tempcorr.Bodies[:2] // a plastic body outgrows cold water
	rapid.Check(t, func(t *rapid.T) {
		body := rapid.SampledFrom(bodies).Draw(t, "body")
		h := tempcorr.New(gravity.ScaleSG, rapid.SampledFrom([]gravity.Pair{gravity.Pair2020, gravity.Pair6060F}).Draw(t, "pair"), body)
		o := tempcorr.Observation{
			Reading: rapid.Float64Range(0.99, 1.15).Draw(t, "reading"), Step: 0.001,
			// Water is densest at 4 °C, and floats glass deepest near 6 °C.
			T:  gravity.Celsius(rapid.Float64Range(8, 39).Draw(t, "t")),
			OE: gravity.Plato(rapid.SampledFrom([]float64{0, 11, 25}).Draw(t, "oe")),
		}
		dr := rapid.Float64Range(1e-5, 0.01).Draw(t, "dr")
		dt := rapid.Float64Range(0.01, 1).Draw(t, "dt")
		get := func(o tempcorr.Observation) float64 {
			res, err := tempcorr.Correct(h, o)
			if err != nil {
				t.Fatal(err)
			}
			return res.Corrected
		}
		base := get(o)
		denser, warmer := o, o
		denser.Reading += dr
		warmer.T += gravity.Celsius(dt)
		if got := get(denser); !(got > base) {
			t.Fatalf("a higher reading gives %v, the lower %v", got, base)
		}
		if got := get(warmer); !(got > base) {
			t.Fatalf("a warmer sample gives %v, the colder %v", got, base)
		}
	})
}

func TestStepsAddUp(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		h := glass2020(rapid.SampledFrom([]gravity.Scale{gravity.ScaleSG, gravity.ScaleDensity, gravity.ScalePlato}).Draw(t, "scale"))
		v := usual[h.Scale]
		h.ID, h.StemMM, h.MassG, h.Adjusted = "h1", 5, 60, rapid.Float64Range(40, 75).Draw(t, "adjusted")
		h.Certificate = []tempcorr.Certificate{{Reading: v * 0.99, Correction: v * 1e-4, U: v * 1e-4}, {Reading: v * 1.01, Correction: -v * 2e-4, U: v * 1e-4}}
		res, err := tempcorr.Correct(h, tempcorr.Observation{
			Reading: v, Step: v / 1000, T: gravity.Celsius(rapid.Float64Range(0, 60).Draw(t, "t")),
			ReadAt: rapid.SampledFrom([]tempcorr.Meniscus{"", tempcorr.Bottom, tempcorr.Top}).Draw(t, "read at"),
		})
		if err != nil {
			t.Fatal(err)
		}
		sum := res.Reading + res.Meniscus + res.Certificate + res.Tension + res.Temperature
		if math.Abs(sum-res.Corrected) > 1e-12*v {
			t.Fatalf("the steps add up to %v, corrected is %v", sum, res.Corrected)
		}
		if res.Instrument() != res.Certificate+res.Tension {
			t.Fatalf("instrument correction %v", res.Instrument())
		}
	})
}

func TestRefusals(t *testing.T) {
	sg := glass2020(gravity.ScaleSG)
	for _, at := range []float64{60, 0} {
		correct(t, sg, tempcorr.Observation{Reading: 1.05, T: gravity.Celsius(at)})
	}
	for what, o := range map[string]tempcorr.Observation{
		"above 60 °C": {Reading: 1.05, T: 60.1}, "below 0 °C": {Reading: 1.05, T: -0.1},
		"temperature not a number": {Reading: 1.05, T: gravity.Celsius(math.NaN())}, "endless heat": {Reading: 1.05, T: gravity.Celsius(math.Inf(1))},
		"reading not a number": {Reading: math.NaN(), T: 20}, "endless reading": {Reading: math.Inf(1), T: 20},
		"reading of no liquid": {Reading: 1.6, T: 25}, "reading of nothing": {Reading: 0, T: 25},
		"points for SG": {Reading: 48, T: 25}, "R 22 ends at 40 °C": {Reading: 1.012, T: 40.1, OE: 12},
	} {
		_, err := tempcorr.Correct(sg, o)
		var r *method.RangeError
		if !errors.As(err, &r) {
			t.Errorf("%s: got %v, wanted a *method.RangeError", what, err)
		}
	}
	correct(t, sg, tempcorr.Observation{Reading: 1.012, T: 40, OE: 12})

	if _, err := tempcorr.Correct(glass2020(gravity.ScaleGPL), tempcorr.Observation{Reading: 104, T: 20}); !errors.Is(err, tempcorr.ErrScale) {
		t.Errorf("g/L: got %v, wanted ErrScale", err)
	}
	if _, err := tempcorr.Correct(sg, tempcorr.Observation{Reading: 1.05, T: 25, Method: "fermenting"}); !errors.Is(err, tempcorr.ErrNeedsOG) {
		t.Errorf("no OG: got %v, wanted ErrNeedsOG", err)
	}
	var unknown *method.UnknownError
	if _, err := tempcorr.Correct(sg, tempcorr.Observation{Reading: 1.05, T: 25, Method: "guess"}); !errors.As(err, &unknown) {
		t.Errorf("unknown method: got %v", err)
	}
	if _, err := tempcorr.FindBody("wood"); !errors.As(err, &unknown) {
		t.Errorf("unknown body: got %v", err)
	}
	if b, err := tempcorr.FindBody(""); err != nil || b.ID != "glass" {
		t.Errorf("no body named: got %v, %v, wanted glass", b.ID, err)
	}
}

// The three wants of a temperature refusal: what was read, what was wanted, what to do.
func TestTemperatureRefusalSaysWhatToDo(t *testing.T) {
	_, err := tempcorr.Correct(glass2020(gravity.ScaleSG), tempcorr.Observation{Reading: 1.05, T: 72})
	var r *method.RangeError
	if !errors.As(err, &r) || r.Hint == "" || err.Error() != "sample temperature is 72 °C, wanted 0 to 60 °C" {
		t.Errorf("got %v", err)
	}
}

func TestNotes(t *testing.T) {
	h := glass2020(gravity.ScaleSG)
	for _, c := range []struct {
		o    tempcorr.Observation
		code string
		want bool
	}{
		{tempcorr.Observation{Reading: 1.05, T: 41}, method.HotSample, true},
		{tempcorr.Observation{Reading: 1.05, T: 40}, method.HotSample, false},
		{tempcorr.Observation{Reading: 1.05, T: 30.5}, method.OutOfRange, true},
		{tempcorr.Observation{Reading: 1.05, T: 9}, method.OutOfRange, true},
		{tempcorr.Observation{Reading: 1.05, T: 25}, method.OutOfRange, false},
		{tempcorr.Observation{Reading: 1.05, T: 35}, method.Extrapolated, true},
		{tempcorr.Observation{Reading: 1.05, T: 25}, method.Extrapolated, false},
		{tempcorr.Observation{Reading: 0.995, T: 20}, method.Extrapolated, true},
		{tempcorr.Observation{Reading: 0.995, T: 20, OE: 12}, method.Extrapolated, false},
		{tempcorr.Observation{Reading: 1.05, T: 20, OE: 10}, method.NoAlcohol, true},
		{tempcorr.Observation{Reading: 1.02, T: 20, OE: 10}, method.NoAlcohol, false},
		{tempcorr.Observation{Reading: 1.05, T: 20, Method: "lyons1992"}, method.OtherBasis, true},
		{tempcorr.Observation{Reading: 1.05, T: 20, ReadAt: tempcorr.Top}, method.Assumed, true},
	} {
		if got := hasNote(correct(t, h, c.o), c.code); got != c.want {
			t.Errorf("%+v: note %s is %t, wanted %t", c.o, c.code, got, c.want)
		}
	}
}

// One liquid read on instruments of several scales gives one SG and one extract.
func TestScalesAgreeOnOneLiquid(t *testing.T) {
	for _, at := range []gravity.Celsius{10, 20, 30} {
		base := correct(t, glass2020(gravity.ScaleSG), tempcorr.Observation{Reading: 1.05, T: at})
		for scale, v := range map[gravity.Scale]float64{gravity.ScalePoints: 50, gravity.ScaleOechsle: 50, gravity.ScaleTwaddell: 10, gravity.ScaleBaume: 145 - 145/1.05} {
			res := correct(t, glass2020(scale), tempcorr.Observation{Reading: v, T: at})
			near(t, fmt.Sprintf("SG from %s at %v °C", scale, at), float64(res.SG), float64(base.SG), 1e-11)
			near(t, fmt.Sprintf("extract from %s at %v °C", scale, at), float64(res.Extract), float64(base.Extract), 1e-8)
		}
	}
}
