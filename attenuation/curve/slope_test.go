package curve

import (
	"math"
	"testing"
)

// daysAt gives readings with the uncertainty of a rounding, days apart.
func daysAt(division float64, dayPoints ...float64) []Reading {
	rs := readingsOf(dayPoints...)
	for k := range rs {
		rs[k].Hours *= 24
		rs[k].U, rs[k].Division = 0, division
	}
	return rs
}

// Two readings of 1.012 a day apart, divisions of a point: the difference of
// two roundings is triangular, 95 % within 1-√0.05 = 0.776 of a division, and
// by the readings' u = 1/√12 = 0.289 it is 1.96·0.289·√2 = 0.80 a day.
func TestTwoEqualReadingsExcludeLittle(t *testing.T) {
	s, ok := SlopeOf(daysAt(1, 0, 12, 1, 12))
	if !ok || math.Round(10*s.NotExcluded) != 8 {
		t.Errorf("%+v: wanted 0.8 points a day not excluded", s)
	}
}

// Ten over nine days: 0.776/9 = 0.086; the standard error alone,
// 1.96·0.289/√82.5 = 0.062, would take their roundings for independent.
func TestTenEqualReadingsShareTheirRounding(t *testing.T) {
	var values []float64
	for day := range 10 {
		values = append(values, float64(day), 12)
	}
	s, ok := SlopeOf(daysAt(1, values...))
	if !ok || math.Round(100*s.NotExcluded) != 9 {
		t.Errorf("%+v: wanted 0.09 points a day not excluded", s)
	}
}

// 0.002 in 40 days is 2 points in 0.4 times 100 days, 5 FSU; the error is
// 1.96·0.289·√2/40·100 = 2.0.
func TestRateOfCider(t *testing.T) {
	s, ok := SlopeOf(daysAt(1, 0, 8, 40, 6))
	rate, pm := s.FSU()
	if !ok || math.Abs(rate-5) > 1e-9 || math.Abs(pm-2) > 0.05 {
		t.Errorf("%.2f ± %.2f FSU, wanted 5 ± 2", rate, pm)
	}
}

func TestScatterWidensTheSlope(t *testing.T) {
	still, _ := SlopeOf(daysAt(1, 0, 12, 1, 12, 2, 12, 3, 12))
	wild, _ := SlopeOf(daysAt(1, 0, 9, 1, 15, 2, 15, 3, 9))
	if !(wild.SE > 2*still.SE) {
		t.Errorf("error %.3f with scatter, %.3f without", wild.SE, still.SE)
	}
}

func TestNoSlope(t *testing.T) {
	for _, rs := range [][]Reading{nil, daysAt(1, 0, 12), daysAt(1, 2, 12, 2, 13)} {
		if s, ok := SlopeOf(rs); ok {
			t.Errorf("slope %+v of %v", s, rs)
		}
	}
	if s, ok := SlopeOf(daysAt(0, 0, 12, 1, 20)); !ok || s.NotExcluded < 0 {
		t.Errorf("%+v of a rise, wanted nothing below 0", s)
	}
}
