package chart

import (
	"math"
	"math/big"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func texts(list []tick) string {
	parts := make([]string, len(list))
	for k, t := range list {
		parts[k] = t.text
	}
	return strings.Join(parts, " ")
}

func TestTicks(t *testing.T) {
	for _, c := range []struct {
		s      span
		most   int
		label  string
		wanted string
	}{
		{span{0, 8}, 12, "days", "0 1 2 3 4 5 6 7 8"},
		{span{-0.2, 14.3}, 8, "days", "0 2 4 6 8 10 12 14"},
		{span{1.008, 1.052}, 6, "SG 20/20", "1.010 1.020 1.030 1.040 1.050"},
		{span{76.1, 81.9}, 6, "apparent attenuation, %", "77.0 78.0 79.0 80.0 81.0"},
		{span{-1, 1}, 5, "", "−1.0 −0.5 0.0 0.5 1.0"},
		{span{2.4, 12.6}, 6, "°P", "4 6 8 10 12"},
	} {
		if got := texts(ticksFor(c.s, c.most, usualPlaces(c.label, c.s))); got != c.wanted {
			t.Errorf("%v of %s: %s, wanted %s", c.s, c.label, got, c.wanted)
		}
	}
}

// Days are whole days as soon as there are three.
func TestNumbersAreWhole(t *testing.T) {
	for end, want := range map[float64]string{5.5: "0 1 2 3 4 5", 3: "0 1 2 3", 1: "0.0 0.1 0.2 0.3 0.4 0.5 0.6 0.7 0.8 0.9 1.0", 21: "0 2 4 6 8 10 12 14 16 18 20"} {
		c := Course{Marks: []Mark{{X: 0, Y: 1.05}, {X: end, Y: 1.01}}}
		if got := texts(c.draw(Page).numbers()); got != want {
			t.Errorf("an axis to %g reads %s, wanted %s", end, got, want)
		}
	}
}

// Ticks lie in the span, are evenly spaced, not more than asked and not fewer than a
// third of it.
func TestTicksEven(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		lo := rapid.Float64Range(-1e6, 1e6).Draw(t, "low")
		s := span{lo, lo + math.Abs(lo)*0.01 + rapid.Float64Range(1e-3, 1e5).Draw(t, "width")}
		most := rapid.IntRange(4, 12).Draw(t, "most")
		list := ticksFor(s, most, 0)
		if len(list) > most || len(list) < most/3 {
			t.Fatalf("%d ticks in %v, asked for %d at most", len(list), s, most)
		}
		for k, one := range list {
			if one.at < s.lo-s.width()*1e-6 || one.at > s.hi+s.width()*1e-6 {
				t.Fatalf("tick %g outside %v", one.at, s)
			}
			if k > 1 && math.Abs((one.at-list[k-1].at)-(list[1].at-list[0].at)) > 1e-6*s.width() {
				t.Fatalf("ticks %v are not even", list)
			}
			if k > 0 && one.text == list[k-1].text {
				t.Fatalf("two ticks read %s", one.text)
			}
		}
	})
}

// Half to even on the decimal that is printed, not on the binary value.
func TestRounded(t *testing.T) {
	for _, c := range []struct {
		x      float64
		places int
		want   string
	}{
		{1.0485, 3, "1.048"},
		{1.0495, 3, "1.050"},
		{0.5, 0, "0"},
		{1.5, 0, "2"},
		{2.5, 0, "2"},
		{9.96, 1, "10.0"},
		{-0.04, 1, "0.0"},
		{-2.25, 1, "−2.2"},
		{79, 1, "79.0"},
		{0.35, 1, "0.4"},
	} {
		if got := rounded(c.x, c.places); got != c.want {
			t.Errorf("%v to %d places is %s, wanted %s", c.x, c.places, got, c.want)
		}
	}
}

// Never further from the value than half a unit of the last place.
func TestRoundedIsNear(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		x := rapid.Float64Range(-1e6, 1e6).Draw(t, "x")
		places := rapid.IntRange(0, 6).Draw(t, "places")
		text := rounded(x, places)
		got, ok := new(big.Rat).SetString(strings.Replace(text, "−", "-", 1))
		if !ok {
			t.Fatalf("%s is no number", text)
		}
		off, _ := got.Sub(got, new(big.Rat).SetFloat64(x)).Float64()
		if math.Abs(off) > 0.5*math.Pow(10, -float64(places))*(1+1e-9) {
			t.Fatalf("%v became %s", x, text)
		}
	})
}
