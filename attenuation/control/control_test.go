package control_test

import (
	"math"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"gylebook/attenuation/control"
)

func near(t *testing.T, what string, got, want, tol float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tol) {
		t.Errorf("%s is %v, wanted %v within %v", what, got, want, tol)
	}
}

// By hand: the sum of 78, 79, 77, 80, 78, 79 is 471, /6 = 78.5. The steps are 1, 2,
// 3, 2, 1, in all 9, /5 = 1.8. Then 3/1.128·1.8 = 4.787, 2/3 of it 3.191,
// 3.267·1.8 = 5.8806 and 2/3 of it 3.9204.
func TestLimitsByHand(t *testing.T) {
	c, err := control.Individuals([]float64{78, 79, 77, 80, 78, 79}, control.Default)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "centre", c.Centre, 78.5, 1e-12)
	near(t, "mean moving range", c.MeanRange, 1.8, 1e-12)
	near(t, "lower limit", c.Lower, 73.7, 0.05)
	near(t, "upper limit", c.Upper, 83.3, 0.05)
	near(t, "lower limit", c.Lower, 78.5-4.787, 5e-4)
	near(t, "upper limit", c.Upper, 78.5+4.787, 5e-4)
	near(t, "lower warning", c.LowerWarning, 78.5-3.191, 5e-4)
	near(t, "upper warning", c.UpperWarning, 78.5+3.191, 5e-4)
	near(t, "limit of the moving range", c.RangeLimit, 5.8806, 1e-9)
	near(t, "warning of the moving range", c.RangeWarning, 3.9204, 1e-9)
	if !c.TooFew || c.N != 6 || c.Broken != nil || c.Wide != nil {
		t.Errorf("%+v, wanted six points, too few, nothing broken", c)
	}
}

func TestTooFewBelow15(t *testing.T) {
	for n, want := range map[int]bool{2: true, 14: true, 15: false, 40: false} {
		points := make([]float64, n)
		for k := range points {
			points[k] = float64(k % 2)
		}
		c, err := control.Individuals(points, control.Default)
		if err != nil || c.TooFew != want {
			t.Errorf("%d points: too few %v, %v; wanted %v", n, c.TooFew, err, want)
		}
	}
}

// 0.1 and its like have no exact sum: what is equal must not be flagged for it.
func TestEqualPointsBreakNothing(t *testing.T) {
	for _, x := range []float64{0, 0.1, 78.3, -1e-9, 1e12} {
		points := make([]float64, 33)
		for k := range points {
			points[k] = x
		}
		c, err := control.Individuals(points, control.Of(1, 2, 3, 4, 5, 6, 7, 8))
		if err != nil || c.Broken != nil || c.Wide != nil || c.MeanRange != 0 {
			t.Errorf("%v: %+v, %v", x, c, err)
		}
	}
}

func TestNoLimits(t *testing.T) {
	for _, points := range [][]float64{
		nil, {78}, {78, math.NaN()}, {78, math.Inf(1)}, {math.MaxFloat64, -math.MaxFloat64, math.MaxFloat64},
	} {
		if c, err := control.Individuals(points, control.Default); err == nil || !strings.Contains(err.Error(), "wanted") {
			t.Errorf("%v: %+v, %v; wanted an error", points, c, err)
		}
	}
}

// Mean 1 of 0 and 2 in turn, each step 2; one of 20 makes two steps of 20 or 18.
func TestWideSteps(t *testing.T) {
	points := []float64{0, 2, 0, 2, 0, 20, 0, 2, 0, 2, 0, 2}
	// Steps: nine of 2 and two of 20 are 58, /11 = 5.27, ·3.267 = 17.2.
	c, err := control.Individuals(points, control.Default)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "limit of the moving range", c.RangeLimit, 17.226, 5e-4)
	if diff := cmp.Diff([]int{5, 6}, c.Wide); diff != "" {
		t.Error(diff)
	}
}

func TestSet(t *testing.T) {
	for text, want := range map[string][]int{
		"1,2,5,6": {1, 2, 5, 6}, " 6, 5 ,2,1": {1, 2, 5, 6}, "8": {8}, "3,3": {3}, "1,2,3,4,5,6,7,8": {1, 2, 3, 4, 5, 6, 7, 8},
	} {
		s, err := control.ParseSet(text)
		if err != nil {
			t.Errorf("%q: %v", text, err)
		}
		if diff := cmp.Diff(want, s.Numbers()); diff != "" {
			t.Errorf("%q: %s", text, diff)
		}
		if again, err := control.ParseSet(s.String()); err != nil || again != s {
			t.Errorf("%q: %q is read as %v, %v", text, s, again, err)
		}
	}
	for _, text := range []string{"", "9", "0", "-1", "x", "1,", ",1", "1;2", "1 2", "1.5", "257", strings.Repeat("9", 400)} {
		if s, err := control.ParseSet(text); err == nil || len(err.Error()) > 120 || !strings.Contains(err.Error(), "wanted numbers from 1 to 8") {
			t.Errorf("%.20q: %v, %v; wanted an error", text, s, err)
		}
	}
	if control.Default.String() != "1,2,5,6" || control.Of(0, 9, -1, 300) != 0 {
		t.Errorf("default %q, out of range %v", control.Default, control.Of(0, 9, -1, 300))
	}
}
