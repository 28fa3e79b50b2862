package curve

import (
	"math"
	"testing"
)

// problem is one of the NIST Statistical Reference Datasets for nonlinear
// regression. Data and certified values are from memory; that all the certified
// digits come out of the data confirms both.
type problem struct {
	name      string
	model     func(b []float64, x float64) float64
	x, y      []float64
	start     [][]float64
	certified []float64
	sum       float64 // residual sum of squares
}

var problems = []problem{
	{
		name:  "Misra1a, lower difficulty",
		model: func(b []float64, x float64) float64 { return b[0] * (1 - math.Exp(-b[1]*x)) },
		x:     []float64{77.6, 114.9, 141.1, 190.8, 239.9, 289.0, 332.8, 378.4, 434.8, 477.3, 536.8, 593.1, 689.1, 760.0},
		y:     []float64{10.07, 14.73, 17.94, 23.93, 29.61, 35.18, 40.02, 44.82, 50.76, 55.05, 61.01, 66.40, 75.47, 81.78},
		start: [][]float64{{500, 0.0001}, {250, 0.0005}}, certified: []float64{238.94212918, 5.5015643181e-4}, sum: 1.2455138894e-1,
	},
	{
		name:  "Rat42, higher difficulty",
		model: func(b []float64, x float64) float64 { return b[0] / (1 + math.Exp(b[1]-b[2]*x)) },
		x:     []float64{9, 14, 21, 28, 42, 57, 63, 70, 79},
		y:     []float64{8.93, 10.80, 18.59, 22.33, 39.35, 56.11, 61.73, 64.62, 67.08},
		start: [][]float64{{100, 1, 0.1}, {75, 2.5, 0.07}}, certified: []float64{72.462237576, 2.6180768402, 0.067359200066}, sum: 8.0565229338,
	},
	{
		name:  "Rat43, higher difficulty",
		model: func(b []float64, x float64) float64 { return b[0] / math.Pow(1+math.Exp(b[1]-b[2]*x), 1/b[3]) },
		x:     []float64{1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12, 13, 14, 15},
		y:     []float64{16.08, 33.83, 65.80, 97.20, 191.55, 326.20, 386.87, 520.53, 590.03, 651.92, 724.93, 699.56, 689.96, 637.56, 717.41},
		start: [][]float64{{100, 10, 1, 1}, {700, 5, 0.75, 1.3}}, certified: []float64{699.64151270, 5.2771253025, 0.75962938329, 1.2792483859}, sum: 8786.4049080,
	},
	{
		name: "MGH17, average difficulty",
		model: func(b []float64, x float64) float64 {
			return b[0] + b[1]*math.Exp(-x*b[3]) + b[2]*math.Exp(-x*b[4])
		},
		x: every10(33),
		y: []float64{
			.844, .908, .932, .936, .925, .908, .881, .850, .818, .784, .751, .718, .685, .658, .628, .603, .580,
			.558, .538, .522, .506, .490, .478, .467, .457, .448, .438, .431, .424, .420, .414, .411, .406,
		},
		start:     [][]float64{{0.5, 1.5, -1, 0.01, 0.02}},
		certified: []float64{0.37541005211, 1.9358469127, -1.4646871366, 0.012867534640, 0.022122699662}, sum: 5.4648946975e-5,
	},
}

func every10(n int) []float64 {
	x := make([]float64, n)
	for k := range x {
		x[k] = 10 * float64(k)
	}
	return x
}

func TestNISTReferenceProblems(t *testing.T) {
	for _, p := range problems {
		for _, start := range p.start {
			b, sum, err := LeastSquares(func(r, b []float64) {
				for k := range r {
					r[k] = p.y[k] - p.model(b, p.x[k])
				}
			}, len(p.y), start)
			if err != nil {
				t.Errorf("%s from %v: %v", p.name, start, err)
				continue
			}
			for k, want := range p.certified {
				if math.Abs(b[k]/want-1) > 1e-6 {
					t.Errorf("%s from %v: b%d = %.10g, certified %.10g", p.name, start, k+1, b[k], want)
				}
			}
			if math.Abs(sum/p.sum-1) > 1e-6 {
				t.Errorf("%s from %v: sum of squares %.10g, certified %.10g", p.name, start, sum, p.sum)
			}
		}
	}
}

func TestLeastSquaresRefuses(t *testing.T) {
	none := func(_, _ []float64) {}
	if _, _, err := LeastSquares(none, 0, []float64{1}); err == nil {
		t.Error("no residual was taken")
	}
	if _, _, err := LeastSquares(none, 1, nil); err == nil {
		t.Error("no parameter was taken")
	}
	bad := func(r, _ []float64) { r[0] = math.NaN() }
	if _, _, err := LeastSquares(bad, 1, []float64{1}); err == nil {
		t.Error("a start without finite residuals was taken")
	}
}
