package curve

import (
	"math"
	"testing"
)

// aCourse is a finished batch that attenuated by aa.
func aCourse(aa float64) Fitted {
	return Fitted{Params: Params{AA: aa, LnT50: 3.9, Phi: 0.8, LnS: -0.6}, OG: 50, RMS: 0.5, N: 9}
}

// The covariance of a t distribution is scale·ν/(ν-2); cold it is the spread
// that the kind states.
func TestColdPriorHasTheStatedSpread(t *testing.T) {
	for _, k := range []Kind{Beer, Wine, Cider, Mead} {
		p, start := NewPrior(k, nil), k.coldStart()
		for i := range dims {
			sd := math.Sqrt(p.spread.At(i, i) * p.free / (p.free - 2))
			if math.Abs(sd-start.spread[i]) > 1e-12 || p.centre[i] != start.centre[i] {
				t.Errorf("%s, parameter %d: %g ± %g, wanted %g ± %g", k, i, p.centre[i], sd, start.centre[i], start.spread[i])
			}
		}
	}
}

func TestHistoryMovesAndNarrows(t *testing.T) {
	before := NewPrior(Beer, nil)
	var past []Fitted
	for _, aa := range []float64{0.70, 0.71, 0.69, 0.70, 0.72, 0.68} {
		past = append(past, aCourse(aa))
		p := NewPrior(Beer, past)
		if !(p.spread.At(0, 0)*p.free/(p.free-2) < before.spread.At(0, 0)*before.free/(before.free-2)) {
			t.Errorf("%d batches that agree do not narrow the attenuation", len(past))
		}
		before = p
	}
	// n·mean + κ0·cold over n + κ0: (6·0.70 + 0.2·0.80)/6.2 = 0.7032.
	if math.Abs(before.centre[0]-0.7032) > 0.001 {
		t.Errorf("attenuation %.4f, wanted 0.7032", before.centre[0])
	}
	if before.History() != 6 {
		t.Errorf("history of %d, wanted 6", before.History())
	}
}

func TestOddBatchDoesNotDrawTheOthers(t *testing.T) {
	past := []Fitted{aCourse(0.80), aCourse(0.81), aCourse(0.79), aCourse(0.80), aCourse(0.55)}
	p := NewPrior(Beer, past)
	mean := (0.80 + 0.81 + 0.79 + 0.80 + 0.55) / 5 // 0.75
	if !(p.centre[0] > mean+0.01) {
		t.Errorf("centre %.3f, wanted clearly above the mean %.3f", p.centre[0], mean)
	}
	alike := NewPrior(Beer, past[:4])
	if !(p.spread.At(0, 0) > alike.spread.At(0, 0)) {
		t.Error("an odd batch does not widen the prior")
	}
}

func TestUnusableHistoryIsLeftOut(t *testing.T) {
	past := []Fitted{{}, {Params: Params{AA: math.NaN()}, OG: 50}, {Params: Params{AA: 0.8, LnT50: math.Inf(1)}, OG: 50}, aCourse(0.7)}
	if n := NewPrior(Beer, past).History(); n != 1 {
		t.Errorf("history of %d, wanted the one usable batch", n)
	}
}

func TestKindNames(t *testing.T) {
	for _, k := range []Kind{Beer, Wine, Cider, Mead} {
		if got, err := FindKind(" " + k.String()); err != nil || got != k {
			t.Errorf("%s found as %v, %v", k, got, err)
		}
	}
	if _, err := FindKind("perry"); err == nil {
		t.Error("an unknown kind was taken")
	}
}
