package control_test

import (
	"slices"
	"testing"

	"github.com/google/go-cmp/cmp"
	"pgregory.net/rapid"

	"gylebook/attenuation/control"
)

// unit has its centre at 0 and a standard deviation of 1.
var unit = control.LimitsOf(0, 1.128)

// at returns the points, from 1, that test n flags.
func at(points []float64, n int) []int {
	var flagged []int
	for _, v := range unit.Judge(points, control.Of(n)) {
		flagged = append(flagged, v.Point+1)
	}
	return flagged
}

// Each pattern just there and just not, in standard deviations; the point that
// completes it is flagged.
func TestNelson(t *testing.T) {
	turns := func(n int) []float64 { // 14 points up and down in turn, from the lower
		var points []float64
		for k := range n {
			points = append(points, 0.5*float64(k%2))
		}
		return points
	}
	for _, c := range []struct {
		test   int
		what   string
		points []float64
		want   []int
	}{
		{1, "beyond", []float64{0, 3.01, 0, -3.01}, []int{2, 4}},
		{1, "on the line", []float64{0, 3, -3}, nil},
		{2, "9 above", []float64{-1, .1, .2, .1, .3, .1, .1, .2, .1, .1}, []int{10}},
		{2, "10 below", []float64{-.1, -.2, -.1, -.3, -.1, -.1, -.2, -.1, -.1, -.5}, []int{9, 10}},
		{2, "8 above", []float64{-1, .1, .2, .1, .3, .1, .1, .2, .1, -1}, nil},
		{2, "one on the centre", []float64{.1, .2, .1, .3, 0, .1, .2, .1, .1}, nil},
		{3, "6 rising", []float64{0, -1, -.5, 0, .5, 1, 1.5, 0}, []int{7}},
		{3, "6 falling", []float64{1.5, 1, .5, 0, -.5, -1}, []int{6}},
		{3, "5 rising", []float64{0, -1, -.5, 0, .5, 1, 0}, nil},
		{3, "with a rest", []float64{-1, -.5, 0, 0, .5, 1, 1.5}, nil},
		{4, "14 in turn", turns(14), []int{14}},
		{4, "13 in turn", turns(13), nil},
		{4, "rising is not in turn", []float64{0, .1, .2, .3, .4, .5, .6, .7, .8, .9, 1, 1.1, 1.2, 1.3}, nil},
		{5, "2 of 3", []float64{2.1, 0, 2.1, 0}, []int{3}},
		{5, "2 of 2 at the beginning", []float64{-2.1, -2.1, 0}, []int{2}},
		{5, "2 of 4", []float64{2.1, 0, 0, 2.1}, nil},
		{5, "on both sides", []float64{2.1, -2.1, 2.1}, []int{3}},
		{5, "on different sides", []float64{2.1, 0, -2.1, 0}, nil},
		{6, "4 of 5", []float64{1.1, 1.2, 0, 1.1, 1.3, 0}, []int{5}},
		{6, "4 of 6", []float64{1.1, 1.2, 0, 0, 1.1, 1.3}, nil},
		{6, "3 and one across", []float64{1.1, 1.2, -1.1, 1.1, 0}, nil},
		{7, "15 within", slices.Repeat([]float64{.9, -.9, .1}, 5), []int{15}},
		{7, "14 within", append([]float64{1.1}, slices.Repeat([]float64{.5, -.5}, 7)...), nil},
		{8, "8 outside", []float64{1.1, -1.1, 1.2, -2, 1.1, 1.1, -1.1, -1.2}, []int{8}},
		{8, "on one side only", slices.Repeat([]float64{1.1}, 8), nil},
		{8, "one inside", []float64{1.1, -1.1, 1.2, .9, 1.1, 1.1, -1.1, -1.2}, nil},
	} {
		if diff := cmp.Diff(c.want, at(c.points, c.test)); diff != "" {
			t.Errorf("test %d, %s: %s", c.test, c.what, diff)
		}
	}
}

// A point may break several tests, and only those asked for are told.
func TestViolationsOfOnePoint(t *testing.T) {
	points := []float64{0, 2.5, 3.5}
	want := []control.Violation{{Point: 2, Tests: control.Of(1, 5)}}
	if diff := cmp.Diff(want, unit.Judge(points, control.Default)); diff != "" {
		t.Error(diff)
	}
	want[0].Tests = control.Of(5)
	if diff := cmp.Diff(want, unit.Judge(points, control.Of(2, 5, 6))); diff != "" {
		t.Error(diff)
	}
	if got := unit.Judge(points, 0); got != nil {
		t.Errorf("no test finds %v", got)
	}
}

func TestRegistry(t *testing.T) {
	if len(control.Tests) != 8 {
		t.Fatalf("%d tests, wanted 8", len(control.Tests))
	}
	for k, e := range control.Tests {
		if want := "nelson-" + string(rune('1'+k)); e.ID != want || e.Source.Year != 1984 {
			t.Errorf("test %d is %+v, wanted %s", k+1, e.Info, want)
		}
	}
}

var everyTest = control.Of(1, 2, 3, 4, 5, 6, 7, 8)

func pointsOf(t *rapid.T) []float64 {
	marks := rapid.SliceOfN(rapid.IntRange(-40, 40), 2, 40).Draw(t, "points")
	points := make([]float64, len(marks))
	for k, m := range marks {
		points[k] = 78 + float64(m)/10
	}
	return points
}

// The unit and the zero of the points, and which way is up, make no difference.
func TestShiftAndScale(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		points := pointsOf(t)
		shift := rapid.Float64Range(-500, 500).Draw(t, "shift")
		scale := rapid.Float64Range(0.01, 100).Draw(t, "scale")
		if rapid.Bool().Draw(t, "upside down") {
			scale = -scale
		}
		other := make([]float64, len(points))
		for k, x := range points {
			other[k] = shift + scale*x
		}
		a, err := control.Individuals(points, everyTest)
		if err != nil {
			t.Fatal(err)
		}
		b, err := control.Individuals(other, everyTest)
		if err != nil {
			t.Fatal(err)
		}
		if diff := cmp.Diff(a.Broken, b.Broken); diff != "" {
			t.Fatal(diff)
		}
		if diff := cmp.Diff(a.Wide, b.Wide); diff != "" {
			t.Fatal(diff)
		}
	})
}

// Against given limits the order matters to runs alone: a shuffle leaves the points
// beyond 3 sigma, and read backwards every pattern is still there.
func TestOrder(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		points := pointsOf(t)
		l := control.LimitsOf(78, rapid.Float64Range(0.2, 4).Draw(t, "mean moving range"))
		count := func(points []float64, n int) int { return len(l.Judge(points, control.Of(n))) }
		shuffled := rapid.Permutation(points).Draw(t, "shuffled")
		if a, b := count(points, 1), count(shuffled, 1); a != b {
			t.Fatalf("test 1 flags %d points, shuffled %d", a, b)
		}
		back := slices.Clone(points)
		slices.Reverse(back)
		for n := 1; n <= 8; n++ {
			if a, b := count(points, n), count(back, n); a > 0 != (b > 0) {
				t.Fatalf("test %d flags %d points, backwards %d", n, a, b)
			}
		}
	})
}
