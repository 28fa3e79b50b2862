package season

import (
	"cmp"
	"slices"

	"gonum.org/v1/gonum/stat"
)

// Group is what the batches of one product and yeast have in common. Its figures
// are those of the closed batches: what an open one has reached is not its end.
type Group struct {
	Product  string
	Yeast    string
	Batches  int // all of them
	Open     int
	Apparent Spread // apparent attenuation, % of the original extract
	Real     Spread // real attenuation, % of the original extract
	ABV      Spread // % vol at 20 °C
	Days     Spread // from pitching to the last fall
}

// Spread is the middle and the width of one figure. N is of those batches that have
// the figure; with none all are zero.
type Spread struct {
	N      int
	Median float64
	Q1, Q3 float64 // quartiles
	Min    float64
	Max    float64
}

// IQR returns the interquartile range.
func (s Spread) IQR() float64 { return s.Q3 - s.Q1 }

// Groups sums up rows by product and yeast, in the order of these. The order of the
// rows does not matter.
func Groups(rows []Row) []Group {
	type key struct{ product, yeast string }
	byKey := make(map[key][]Row)
	for _, r := range rows {
		k := key{r.Product, r.Yeast}
		byKey[k] = append(byKey[k], r)
	}
	groups := make([]Group, 0, len(byKey))
	for k, list := range byKey {
		groups = append(groups, group(k.product, k.yeast, list))
	}
	slices.SortFunc(groups, func(a, b Group) int {
		return cmp.Or(cmp.Compare(a.Product, b.Product), cmp.Compare(a.Yeast, b.Yeast))
	})
	return groups
}

func group(product, yeast string, rows []Row) Group {
	g := Group{Product: product, Yeast: yeast, Batches: len(rows)}
	var apparent, actual, abv, days []float64
	for _, r := range rows {
		if r.Open {
			g.Open++
			continue
		}
		if r.Attenuation != nil {
			apparent = append(apparent, r.Attenuation.Apparent)
			actual = append(actual, r.Attenuation.Real)
		}
		if r.ABV != nil {
			abv = append(abv, float64(*r.ABV))
		}
		if r.Days != nil {
			days = append(days, *r.Days)
		}
	}
	g.Apparent, g.Real, g.ABV, g.Days = SpreadOf(apparent), SpreadOf(actual), SpreadOf(abv), SpreadOf(days)
	return g
}

// SpreadOf returns the spread of finite values; xs is left as it is. Quartiles and
// median are definition 7 of Hyndman & Fan 1996, The American Statistician 50, 361
// (from memory): linear between the values, the ends being the smallest and the
// largest; the median of an even number is the mean of the middle two.
func SpreadOf(xs []float64) Spread {
	if len(xs) == 0 {
		return Spread{}
	}
	sorted := slices.Clone(xs)
	slices.Sort(sorted)
	at := func(p float64) float64 {
		// LinInterp is definition 4, which counts p·n values; definition 7 counts
		// p·(n-1)+1.
		n := float64(len(sorted))
		x := stat.Quantile((p*(n-1)+1)/n, stat.LinInterp, sorted, nil)
		// Interpolating between equal values may leave them by a last digit.
		return min(max(x, sorted[0]), sorted[len(sorted)-1])
	}
	return Spread{
		N: len(sorted), Median: at(0.5), Q1: at(0.25), Q3: at(0.75), Min: sorted[0], Max: sorted[len(sorted)-1],
	}
}
