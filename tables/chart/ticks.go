package chart

import (
	"math"
	"strconv"
	"strings"

	"gonum.org/v1/plot/vg"
)

// span is a range of values that grows.
type span struct{ lo, hi float64 }

var nothing = span{math.Inf(1), math.Inf(-1)}

func (s span) with(values ...float64) span {
	for _, v := range values {
		s.lo, s.hi = math.Min(s.lo, v), math.Max(s.hi, v)
	}
	return s
}

func (s span) empty() bool    { return s.lo > s.hi }
func (s span) width() float64 { return s.hi - s.lo }

// atLeast widens a span around its middle to a part of its greatest value, so that
// noise is not blown up to the size of a picture. A span of one value becomes single,
// which is widened too.
func (s span) atLeast(part, single float64) span {
	if s.empty() {
		return span{0, 1}
	}
	least := math.Max(part*math.Max(math.Abs(s.lo), math.Abs(s.hi)), 1e-6)
	if s.lo == s.hi {
		least = math.Max(least, single)
	}
	if s.width() >= least {
		return s
	}
	mid := s.lo + s.width()/2
	return span{mid - least/2, mid + least/2}
}

func (s span) padded(low, high float64) span {
	return span{s.lo - low*s.width(), s.hi + high*s.width()}
}

// tick is a labelled place on an axis.
type tick struct {
	at   float64
	text string
}

// ticksFor are at most so many round values within a span, with as many decimals as
// their step needs, and at least places.
func ticksFor(s span, most, places int) []tick {
	for step := niceStep(s.width() / float64(most)); ; step = niceStep(step * 1.01) {
		first, last := math.Ceil(s.lo/step-1e-9), math.Floor(s.hi/step+1e-9)
		if last-first+1 > float64(most) {
			continue
		}
		places = max(min(places, 6), placesOf(step))
		var list []tick
		for k := first; k <= last; k++ {
			list = append(list, tick{k * step, rounded(k*step, places)})
		}
		return list
	}
}

// niceStep is the least of 1, 2 and 5 times a power of ten that is not below x.
func niceStep(x float64) float64 {
	power := math.Pow(10, math.Floor(math.Log10(x)))
	for _, m := range []float64{1, 2, 5} {
		if m*power >= x*(1-1e-9) {
			return m * power
		}
	}
	return 10 * power
}

// placesOf is how many decimals a step of 1, 2 or 5 times a power of ten has.
func placesOf(step float64) int {
	return max(0, int(-math.Floor(math.Log10(step*(1+1e-9)))))
}

// usualPlaces are the decimals a reader expects of a quantity: one of a percentage,
// three of a ratio that stays near one.
func usualPlaces(label string, s span) int {
	switch {
	case strings.Contains(label, "%"):
		return 1
	case s.lo > 0.5 && s.hi < 2:
		return 3
	}
	return 0
}

// rounded prints x with so many decimals, half to even on the shortest decimal that
// is x, without -0.
func rounded(x float64, places int) string {
	text := strconv.FormatFloat(math.Abs(x), 'f', -1, 64)
	whole, part, _ := strings.Cut(text, ".")
	if len(part) <= places {
		part += strings.Repeat("0", places-len(part))
	}
	digits, rest := []byte(whole+part[:places]), part[places:]
	up := rest > "5"
	if rest == "5" {
		up = (digits[len(digits)-1]-'0')%2 == 1
	}
	for k := len(digits) - 1; up && k >= 0; k-- {
		if digits[k] < '9' {
			digits[k]++
			up = false
		} else {
			digits[k] = '0'
		}
	}
	if up {
		digits = append([]byte{'1'}, digits...)
	}
	out := string(digits)
	if places > 0 {
		out = out[:len(out)-places] + "." + out[len(out)-places:]
	}
	if x < 0 && strings.Trim(out, "0.") != "" {
		return "−" + out
	}
	return out
}

// roomFor is how many labels of a width fit side by side.
func roomFor(length, width vg.Length) int {
	return max(2, int(length/(width+8)))
}
