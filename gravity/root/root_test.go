package root_test

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity/root"
)

func TestFindKnownZeros(t *testing.T) {
	for name, c := range map[string]struct {
		f      func(float64) (float64, float64)
		lo, hi float64
		want   float64
	}{
		"square root of two": {func(x float64) (float64, float64) { return x*x - 2, 2 * x }, 0, 2, math.Sqrt2},
		"falling":            {func(x float64) (float64, float64) { return 2 - x*x, -2 * x }, 0, 2, math.Sqrt2},
		"cosine":             {func(x float64) (float64, float64) { return math.Cos(x), -math.Sin(x) }, 0, 3, math.Pi / 2},
		"logarithm":          {func(x float64) (float64, float64) { return math.Log(x) - 1, 1 / x }, 0.001, 100, math.E},
		"limits swapped":     {func(x float64) (float64, float64) { return x*x - 2, 2 * x }, 2, 0, math.Sqrt2},
		"at the low end":     {func(x float64) (float64, float64) { return x, 1 }, 0, 1, 0},
		"at the high end":    {func(x float64) (float64, float64) { return x - 1, 1 }, 0, 1, 1},
		"in the middle":      {func(x float64) (float64, float64) { return x - 0.5, 1 }, 0, 1, 0.5},
		// Newton alone leaps ever further out here.
		"arc tangent": {func(x float64) (float64, float64) { return math.Atan(x - 3), 1 / (1 + (x-3)*(x-3)) }, -50, 1000, 3},
	} {
		got, err := root.Find(c.f, c.lo, c.hi, 1e-13)
		if err != nil || math.Abs(got-c.want) > 1e-12 {
			t.Errorf("%s: got %v, %v, wanted %v", name, got, err, c.want)
		}
	}
}

// Without a useful slope the bracket is halved.
func TestFindWithoutASlope(t *testing.T) {
	for name, slope := range map[string]float64{
		"flat": 0, "reversed": -3, "not a number": math.NaN(), "infinitely flat the other way": math.Copysign(0, -1),
	} {
		f := func(x float64) (float64, float64) { return x*x*x - 5, slope }
		got, err := root.Find(f, 0, 10, 1e-13)
		if err != nil || math.Abs(got-math.Cbrt(5)) > 1e-12 {
			t.Errorf("slope %s: got %v, %v, wanted %v", name, got, err, math.Cbrt(5))
		}
	}
}

func TestFindStepWithoutATangent(t *testing.T) {
	f := func(x float64) (float64, float64) {
		if x < 0.3 {
			return -1, 0
		}
		return 1, 0
	}
	got, err := root.Find(f, 0, 1, 1e-12)
	if err != nil || math.Abs(got-0.3) > 1e-11 {
		t.Errorf("got %v, %v, wanted the jump at 0.3", got, err)
	}
}

func TestFindNoBracket(t *testing.T) {
	for name, f := range map[string]func(float64) (float64, float64){
		"above":        func(x float64) (float64, float64) { return x*x + 1, 2 * x },
		"below":        func(x float64) (float64, float64) { return -x*x - 1, -2 * x },
		"not a number": func(float64) (float64, float64) { return math.NaN(), math.NaN() },
		"not a number at one end": func(x float64) (float64, float64) {
			if x > 0 {
				return math.NaN(), 1
			}
			return x - 1, 1
		},
	} {
		got, err := root.Find(f, -1, 1, 1e-12)
		if !errors.Is(err, root.ErrNoBracket) || got != 0 {
			t.Errorf("%s: got %v, %v, wanted ErrNoBracket", name, got, err)
		}
	}
}

func TestFindInvertsACubic(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		a := rapid.Float64Range(0.1, 10).Draw(t, "a")
		b := rapid.Float64Range(0.1, 10).Draw(t, "b")
		want := rapid.Float64Range(-5, 5).Draw(t, "want")
		cubic := func(x float64) float64 { return x * (a + b*x*x) } // rises everywhere
		got, err := root.Find(func(x float64) (float64, float64) {
			return cubic(x) - cubic(want), a + 3*b*x*x
		}, -5, 5, 1e-13)
		if err != nil || math.Abs(got-want) > 1e-10 {
			t.Fatalf("got %v, %v, wanted %v", got, err, want)
		}
	})
}
