package curve

import (
	"errors"
	"math"
	"testing"

	"gylebook/gravity/method"
)

// logisticBatch is the four-parameter logistic of ASBC Yeast-14,
// P_e + P_D/(1+e^{B(t-M)}), with P_D 9.5, P_e 2.5, B 0.10/h and M 40 h. At 0 it
// is 2.5 + 9.5/(1+e^-4) = 11.829.
func logisticBatch() Batch {
	b := Batch{OG: 11.83, UOG: 0.05}
	for _, h := range []float64{0, 12, 24, 36, 48, 60, 72, 96, 120} {
		b.Readings = append(b.Readings, Reading{Hours: h, Points: 2.5 + 9.5/(1+math.Exp(0.1*(h-40))), U: 0.05})
	}
	return b
}

func TestExactLogisticIsRecovered(t *testing.T) {
	f, err := Fit(logisticBatch(), NewPrior(Beer, nil), Options{Tau: 0})
	if err != nil {
		t.Fatal(err)
	}
	if math.Abs(f.FG()-2.5) > 0.02 {
		t.Errorf("end %.4f, wanted 2.50 ± 0.02", f.FG())
	}
	// 2 above the end where 9.5/(1+e^{x}) = 2: e^x = 3.75, t = 40 + ln(3.75)/0.1 = 53.2 h.
	if math.Abs(f.Hours()-53.2) > 0.5 {
		t.Errorf("2 above the end at hour %.2f, wanted 53.2", f.Hours())
	}
}

func TestFinishedFitEndsWhereItEnded(t *testing.T) {
	b := Batch{OG: 50, Readings: []Reading{{Hours: 0, Points: 50}, {Hours: 24, Points: 40}, {Hours: 48, Points: 24}, {Hours: 72, Points: 15}}}
	prior := NewPrior(Beer, nil)
	for _, fg := range []float64{8, 11, 14} {
		f, err := FitFinished(b, fg, 0.2, prior, prior.Options())
		if err != nil {
			t.Fatal(err)
		}
		if math.Abs(f.FG()-fg) > 0.5 {
			t.Errorf("fit ends at %.2f, the batch did at %g", f.FG(), fg)
		}
	}
}

func TestFitRefuses(t *testing.T) {
	prior := NewPrior(Beer, nil)
	three := []Reading{{Hours: 0, Points: 50}, {Hours: 30, Points: 40}, {Hours: 50, Points: 30}}
	if _, err := Fit(Batch{Readings: three}, prior, prior.Options()); !errors.Is(err, ErrNoOG) {
		t.Errorf("no original gravity: %v, wanted ErrNoOG", err)
	}
	if _, err := Fit(Batch{OG: 50, Readings: three[:2]}, prior, prior.Options()); !errors.Is(err, ErrNoReadings) {
		t.Errorf("two readings: %v, wanted ErrNoReadings", err)
	}
	var out *method.RangeError
	for _, o := range []Options{{Tau: -1}, {Tau: math.NaN()}, {Tau: 1, Nu: -3}} {
		if _, err := Fit(Batch{OG: 50, Readings: three}, prior, o); !errors.As(err, &out) {
			t.Errorf("options %+v: %v, wanted a range error", o, err)
		}
	}
	if _, err := FitFinished(Batch{OG: 50, Readings: three}, math.NaN(), 1, prior, prior.Options()); !errors.As(err, &out) {
		t.Errorf("final gravity NaN: %v, wanted a range error", err)
	}
	if _, err := FitFinished(Batch{OG: 50, Readings: three}, 10, 0, prior, prior.Options()); !errors.As(err, &out) {
		t.Errorf("final gravity without uncertainty: %v, wanted a range error", err)
	}
}
