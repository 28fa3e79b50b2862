package main

import (
	"fmt"
	"math"

	"gylebook/attenuation/curve"

	"gonum.org/v1/gonum/stat"
	"gonum.org/v1/gonum/stat/distuv"
)

// guessBy forecasts a course from its first k readings by one method.
func guessBy(method string, f finished, past []finished, k int, u float64) (guess, error) {
	switch method {
	case "last":
		return guess{fg: f.points[k-1], hours: f.hours[k-1]}, nil
	case "history-mean":
		return historyMean(f, past), nil
	case "logistic-ls":
		return logistic(f.course, k)
	}
	b := f.batch(k, u)
	c, err := prior(f, past).Forecast(b, f.hours[k-1])
	if err != nil {
		return guess{}, fmt.Errorf("%s after %d readings: %w", f.name, k, err)
	}
	g := guess{fg: c.FG.Median, hours: c.Hours.Median, fgIn: &c.FG, hoursIn: &c.Hours}
	c.Of(func(fg float64) float64 { g.draws = append(g.draws, fg); return fg })
	if !c.Curve { // history alone gives no time
		g.hours, g.hoursIn = historyMean(f, past).hours, nil
	}
	return g, nil
}

// historyMean takes the mean attenuation and the mean time of the history, with
// the interval of one more of them (Student t). Without a history it takes the
// usual 80 % or 102 % and the cold start's time.
func historyMean(f finished, past []finished) guess {
	if len(past) == 0 {
		cold := curve.NewPrior(f.kind, nil)
		p := cold.Centre()
		return guess{fg: p.FG(f.points[0]), hours: p.TimeTo(f.points[0], nearEnd)}
	}
	var fgs, hours []float64
	for _, p := range past {
		fgs = append(fgs, f.points[0]*p.fg/p.points[0])
		hours = append(hours, p.end)
	}
	g := guess{fg: stat.Mean(fgs, nil), hours: stat.Mean(hours, nil)}
	if n := float64(len(past)); n > 1 {
		t := distuv.StudentsT{Mu: 0, Sigma: 1, Nu: n - 1}
		about := func(xs []float64) (i curve.Interval, sd float64) {
			mean, s := stat.MeanStdDev(xs, nil)
			s *= math.Sqrt(1 + 1/n)
			return curve.Interval{Lo: mean - t.Quantile(0.95)*s, Median: mean, Hi: mean + t.Quantile(0.95)*s}, s
		}
		i, sd := about(fgs)
		j, _ := about(hours)
		g.fgIn, g.hoursIn = &i, &j
		for k := range 200 {
			g.draws = append(g.draws, g.fg+sd*t.Quantile((float64(k)+0.5)/200))
		}
	}
	return g
}

// logistic lays the four-parameter logistic
// P_e + P_D/(1+e^{B(t-M)}) through the readings by least squares, free of any
// history. With three readings it is not determined, and the answer is the
// nearest to the start.
func logistic(c course, k int) (guess, error) {
	og, last := c.points[0], c.points[k-1]
	fell := math.Max(og-last, 1)
	x, _, err := curve.LeastSquares(func(r, x []float64) {
		for i := range k {
			r[i] = c.points[i] - logisticAt(x, c.hours[i])
		}
	}, k, []float64{fell * 1.3, og - fell*1.3, math.Log(0.08), math.Max(c.hours[k-1]*0.6, 6)})
	if err != nil {
		return guess{}, fmt.Errorf("%s, logistic after %d readings: %w", c.name, k, err)
	}
	// An asymptote below anything that ferments is held there.
	g := guess{fg: math.Min(math.Max(x[1], -30), og)}
	b := math.Exp(x[2])
	g.hours = x[3] + math.Log(math.Max(x[0]/nearEnd-1, 1e-9))/b
	g.hours = math.Min(math.Max(g.hours, c.hours[k-1]), 2000)
	return g, nil
}

// logisticAt takes P_D, P_e, ln B and M.
func logisticAt(x []float64, t float64) float64 {
	return x[1] + x[0]/(1+math.Exp(math.Min(math.Exp(x[2])*(t-x[3]), 700)))
}
