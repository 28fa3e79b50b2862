package attenuation

import (
	"math"
	"math/rand/v2"
	"testing"

	"gylebook/gravity"
)

// rectangular is the standard uncertainty of a half width, JCGM 100:2008, 4.3.7.
func rectangular(half float64) float64 { return half / math.Sqrt(3) }

// deviation returns the standard deviation of 10⁵ values of f at og and fg, each
// moved by its own normal deviate and by one that both share.
func deviation(t *testing.T, f func(Gravities) float64, og, fg float64, uOG, uFG ReadingU) float64 {
	t.Helper()
	const draws = 100_000
	r := rand.New(rand.NewPCG(1948, 10))
	var sum, squares float64
	origin := f(at(t, og, fg))
	for range draws {
		shared := r.NormFloat64()
		g := at(t, og+r.NormFloat64()*uOG.Independent+shared*uOG.Common, fg+r.NormFloat64()*uFG.Independent+shared*uFG.Common)
		d := f(g) - origin
		sum += d
		squares += d * d
	}
	mean := sum / draws
	return math.Sqrt(squares/draws - mean*mean)
}

// JCGM 101 in small: the slopes agree with a Monte Carlo within 5 %, for the
// independent part, for the common part where it does not cancel, and for both.
func TestPropagationAgainstMonteCarlo(t *testing.T) {
	fit := gravity.Fits.Default()
	for _, u := range []struct {
		name     string
		uOG, uFG ReadingU
	}{
		{"independent", ReadingU{Independent: 0.0005}, ReadingU{Independent: 0.0003}},
		// One certificate, but the two points of it are not equally sure.
		{"common", ReadingU{Common: 0.0007}, ReadingU{Common: 0.0002}},
		{"both", ReadingU{0.0003, 0.0005}, ReadingU{0.0003, 0.0001}},
	} {
		pairs := [][2]float64{{1.048, 1.010}}
		if u.name == "both" {
			pairs = append(pairs, [][2]float64{{1.090, 1.024}, {1.050, 0.998}}...)
		}
		for _, pair := range pairs {
			og, fg := pair[0], pair[1]
			for _, e := range ABVMethods {
				if _, err := e.Fn(at(t, og, fg)); err != nil {
					t.Fatal(err)
				}
				p, err := PropagateABV(e.Fn, gravity.SG(og), gravity.SG(fg), fit, u.uOG, u.uFG)
				if err != nil {
					t.Fatal(err)
				}
				drawn := deviation(t, func(g Gravities) float64 { return float64(by(t, e.ID, g).ABV) }, og, fg, u.uOG, u.uFG)
				agree(t, u.name+" "+e.ID, p, drawn)
			}
			a, err := PropagateAttenuation(gravity.SG(og), gravity.SG(fg), fit, u.uOG, u.uFG)
			if err != nil {
				t.Fatal(err)
			}
			for _, part := range []struct {
				name string
				p    Propagated
				of   func(Attenuation) float64
			}{
				{"apparent", a.Apparent, func(a Attenuation) float64 { return a.Apparent }},
				{"points", a.ApparentPoints, func(a Attenuation) float64 { return a.ApparentPoints }},
				{"real", a.Real, func(a Attenuation) float64 { return a.Real }},
				{"RE", a.RE, func(a Attenuation) float64 { return float64(a.RE) }},
			} {
				drawn := deviation(t, func(g Gravities) float64 {
					a, err := Attenuate(g)
					if err != nil {
						t.Fatal(err)
					}
					return part.of(a)
				}, og, fg, u.uOG, u.uFG)
				agree(t, u.name+" "+part.name, part.p, drawn)
			}
		}
	}
}

func agree(t *testing.T, what string, p Propagated, drawn float64) {
	t.Helper()
	if got := math.Hypot(p.Independent, p.Common); math.Abs(got-drawn) > 0.05*drawn {
		t.Errorf("%s: propagated %.5f, drawn %.5f", what, got, drawn)
	}
}

// Half a point (rectangular) on each gravity alone. By hand, the factor of the
// difference near 0.130 % vol a point: u = 0.130·(0.5/√3)·√2 = 0.053, U = 0.106;
// Balling's slope is a little steeper. Half up to 0.11.
func TestHalfPointOnBoth(t *testing.T) {
	u := ReadingU{Independent: rectangular(0.0005)}
	for _, id := range []string{"balling", "factor-131", "uk-duty"} {
		e, err := ABVMethods.Find(id)
		if err != nil {
			t.Fatal(err)
		}
		p, err := PropagateABV(e.Fn, 1.048, 1.010, gravity.Fits.Default(), u, u)
		if err != nil {
			t.Fatal(err)
		}
		near(t, id+" U of the readings", 2*p.Independent, 0.11, 0.005)
		// With the method's 0.15: √(0.053² + 0.15²) = 0.159, U = 0.32.
		near(t, id+" U", p.Expanded, 0.32, 0.005)
		if p.Method != MethodU || p.Common != 0 {
			t.Errorf("%s: parts %+v", id, p)
		}
	}
}

// A point too high in both readings. By hand: the fit's slope 1111.14 - 2·630.272
// S + 3·135.997 S² is 0.2382 °P a point at OG and 0.2542 at FG. Apparent
// attenuation moves by 100·(2.562/11.914²·0.2382 - 0.2542/11.914) = -1.704 points
// of %, real extract, q = 1.2319, by 0.2382 - (0.2382 - 0.2542)/q + 9.352/q²·0.001·0.2382
// = 0.2527 °P; the difference of the gravities, and so the alcohol, hardly moves (slopes
// 0.1314 and -0.1337 % vol a point nearly cancel).
func TestCommonPoint(t *testing.T) {
	one := ReadingU{Common: 0.001}
	fit := gravity.Fits.Default()
	p, err := PropagateABV(balling, 1.048, 1.010, fit, one, one)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "ABV", p.Common, 0.002, 0.0015)
	a, err := PropagateAttenuation(1.048, 1.010, fit, one, one)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "apparent attenuation", a.Apparent.Common, 1.704, 0.002)
	near(t, "real extract", a.RE.Common, 0.2527, 0.0003)
	if a.RE.Independent != 0 || a.RE.Method != 0 {
		t.Errorf("other parts: %+v", a.RE)
	}
	// The same point with its sign, straight through the relations.
	before, err := Attenuate(at(t, 1.048, 1.010))
	if err != nil {
		t.Fatal(err)
	}
	after, err := Attenuate(at(t, 1.049, 1.011))
	if err != nil {
		t.Fatal(err)
	}
	near(t, "ABV moved", float64(after.ABV-before.ABV), 0.002, 0.0015)
	near(t, "attenuation moved", after.Apparent-before.Apparent, -1.7, 0.05)
	near(t, "real extract moved", float64(after.RE-before.RE), 0.25, 0.005)

	// Taken for independent, the same points are 0.19 % vol: 0.1314 and 0.1337 in
	// quadrature.
	own := ReadingU{Independent: 0.001}
	p, err = PropagateABV(balling, 1.048, 1.010, fit, own, own)
	if err != nil {
		t.Fatal(err)
	}
	near(t, "ABV at r = 0", p.Independent, 0.19, 0.005)
}

// Slopes at the edges of what a method answers for, and inputs that are none.
func TestPropagationEdges(t *testing.T) {
	fit := gravity.Fits.Default()
	u := ReadingU{Independent: 0.0003}
	// 100.0 points: one point more has no factor, the slope is that to the
	// other side, 0.135.
	p, err := PropagateABV(ukDuty, 1.110, 1.010, fit, ReadingU{Independent: 0.001}, ReadingU{})
	if err != nil {
		t.Fatal(err)
	}
	near(t, "uk-duty near its end", p.Independent, 0.135, 1e-9)
	if _, err := PropagateABV(balling, 1.010, 1.010, fit, u, u); err != nil {
		t.Errorf("equal gravities: %v", err)
	}
	if _, err := PropagateABV(balling, 1.010, 1.020, fit, u, u); err == nil {
		t.Error("risen gravity has an uncertainty")
	}
	if _, err := PropagateAttenuation(1.000, 1.000, fit, u, u); err == nil {
		t.Error("water has an attenuation")
	}
	for _, bad := range []float64{math.NaN(), math.Inf(1), -0.001} {
		if _, err := PropagateABV(balling, 1.048, 1.010, fit, ReadingU{Common: bad}, u); !hasRange(err) {
			t.Errorf("uncertainty %v: %v, wanted a range error", bad, err)
		}
	}
}
