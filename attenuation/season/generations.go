package season

import (
	"cmp"
	"math"
	"slices"

	"gonum.org/v1/gonum/stat"
	"gonum.org/v1/gonum/stat/distuv"
)

// MinTrend is how many batches it takes for a word on a trend.
const MinTrend = 3

// Lineage is what the generations of a yeast did with a product. Only closed
// batches whose generation is known are in it.
type Lineage struct {
	Product     string
	Yeast       string
	N           int
	Generations []Generation // in order of their numbers
	Apparent    Trend        // of the apparent attenuation, % a generation
	Midpoint    Trend        // of the hours to half of the fall, h a generation
	Rate        Trend        // of the rate of the fall, points a day and generation
}

// Generation is what one generation of a yeast did.
type Generation struct {
	Number   int
	N        int
	Apparent Spread // apparent attenuation, % of the original extract
	Midpoint Spread // hours to half of the fall
	Rate     Spread // points a day over the middle half of the fall
}

// Trend is the straight line by least squares of a figure against the generation:
// its slope and the 95 % interval of it.
type Trend struct {
	N         int  // batches that have the figure
	TooFew    bool // no slope: fewer than MinTrend, or all of one generation
	Slope     float64
	Low, High float64
}

// Direction returns -1 or 1 when the interval leaves zero out, else 0: no trend is
// shown, which does not mean that there is none.
func (t Trend) Direction() int {
	switch {
	case t.TooFew:
		return 0
	case t.High < 0:
		return -1
	case t.Low > 0:
		return 1
	}
	return 0
}

// Lineages sums up rows by product and yeast, in the order of these. The order of
// the rows does not matter.
func Lineages(rows []Row) []Lineage {
	known := make([]*Row, 0, len(rows))
	for k := range rows {
		if r := &rows[k]; !r.Open && r.Generation > 0 {
			known = append(known, r)
		}
	}
	slices.SortFunc(known, func(a, b *Row) int {
		return cmp.Or(cmp.Compare(a.Product, b.Product), cmp.Compare(a.Yeast, b.Yeast),
			cmp.Compare(a.Generation, b.Generation), a.Pitched.Compare(b.Pitched), cmp.Compare(a.Batch, b.Batch))
	})
	var list []Lineage
	for len(known) > 0 {
		n := 1
		for n < len(known) && known[n].Product == known[0].Product && known[n].Yeast == known[0].Yeast {
			n++
		}
		list = append(list, lineage(known[:n]))
		known = known[n:]
	}
	return list
}

// What is followed through the generations; ok is false of a batch without it.
func apparentOf(r *Row) (x float64, ok bool) { return Apparent.of(r) }

func midpointOf(r *Row) (x float64, ok bool) {
	if r.Course == nil {
		return 0, false
	}
	return r.Course.Midpoint, true
}

func rateOf(r *Row) (x float64, ok bool) {
	if r.Course == nil {
		return 0, false
	}
	return r.Course.Rate, true
}

// lineage sums up the batches of one product and yeast, in order of generation.
func lineage(rows []*Row) Lineage {
	l := Lineage{Product: rows[0].Product, Yeast: rows[0].Yeast, N: len(rows)}
	for from := 0; from < len(rows); {
		to := from + 1
		for to < len(rows) && rows[to].Generation == rows[from].Generation {
			to++
		}
		same := rows[from:to]
		l.Generations = append(l.Generations, Generation{
			Number: same[0].Generation, N: len(same),
			Apparent: spread(same, apparentOf), Midpoint: spread(same, midpointOf), Rate: spread(same, rateOf),
		})
		from = to
	}
	l.Apparent, l.Midpoint, l.Rate = trend(rows, apparentOf), trend(rows, midpointOf), trend(rows, rateOf)
	return l
}

func spread(rows []*Row, of func(*Row) (float64, bool)) Spread {
	var xs []float64
	for _, r := range rows {
		if x, ok := of(r); ok {
			xs = append(xs, x)
		}
	}
	return SpreadOf(xs)
}

func trend(rows []*Row, of func(*Row) (float64, bool)) Trend {
	var x, y []float64
	for _, r := range rows {
		if value, ok := of(r); ok {
			x, y = append(x, float64(r.Generation)), append(y, value)
		}
	}
	return TrendOf(x, y)
}

// TrendOf returns the trend of finite y against x, which have the same length. The
// interval is slope ± t·s with Student's t of n - 2 and the standard error s of the
// slope; it takes the scatter about the line as normal and the same everywhere.
func TrendOf(x, y []float64) Trend {
	t := Trend{N: len(x), TooFew: true}
	if len(x) < MinTrend || slices.Min(x) == slices.Max(x) {
		return t
	}
	intercept, slope := stat.LinearRegression(x, y, nil, false)
	centre := stat.Mean(x, nil)
	var left, width float64
	for k := range x {
		r := y[k] - intercept - slope*x[k]
		left += r * r
		width += (x[k] - centre) * (x[k] - centre)
	}
	free := float64(len(x) - 2)
	half := distuv.StudentsT{Mu: 0, Sigma: 1, Nu: free}.Quantile(0.975) * math.Sqrt(left/free/width)
	return Trend{N: len(x), Slope: slope, Low: slope - half, High: slope + half}
}
