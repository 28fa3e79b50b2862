package season

import (
	"cmp"
	"slices"

	"gylebook/attenuation/control"
)

// Figure is what a control chart follows.
type Figure int

// The figures, in the order in which they are shown.
const (
	Apparent Figure = iota // attenuation, % of the original extract
	Real                   // attenuation, % of the original extract
	ABV                    // % vol at 20 °C
	figures
)

// of returns the figure of a batch; ok is false when it has none.
func (f Figure) of(r *Row) (x float64, ok bool) {
	switch {
	case f == ABV && r.ABV != nil:
		return float64(*r.ABV), true
	case f == ABV || r.Attenuation == nil:
		return 0, false
	case f == Real:
		return r.Attenuation.Real, true
	}
	return r.Attenuation.Apparent, true
}

// FigureChart is the individuals chart of one figure of one product: its closed
// batches in the order of pitching.
type FigureChart struct {
	Product string
	Figure  Figure
	Closed  int       // closed batches of the product
	LeftOut int       // of them without the figure, as the basis is broken
	Batches []string  // of the points
	Values  []float64 // of the points
	// Chart is nil when the points have none: fewer than two.
	Chart *control.Chart
	// FalseAlarms is how often as many healthy batches would show something; zero
	// when there are too few for limits.
	FalseAlarms control.Rate
}

// TooFew reports whether there are too few points for limits.
func (c *FigureChart) TooFew() bool { return c.Chart == nil || c.Chart.TooFew }

// Charts returns three charts a product, in the order of the products and of the
// figures. The order of the rows does not matter.
func Charts(rows []Row, tests control.Set) []FigureChart {
	var closed []*Row
	for k := range rows {
		if !rows[k].Open {
			closed = append(closed, &rows[k])
		}
	}
	slices.SortFunc(closed, func(a, b *Row) int {
		return cmp.Or(cmp.Compare(a.Product, b.Product), a.Pitched.Compare(b.Pitched), cmp.Compare(a.Batch, b.Batch))
	})
	var charts []FigureChart
	var healthy control.Healthy
	for len(closed) > 0 {
		n := 1
		for n < len(closed) && closed[n].Product == closed[0].Product {
			n++
		}
		for f := range figures {
			charts = append(charts, figureChart(closed[:n], f, tests, &healthy))
		}
		closed = closed[n:]
	}
	return charts
}

// figureChart draws one chart of batches in order.
func figureChart(batches []*Row, f Figure, tests control.Set, healthy *control.Healthy) FigureChart {
	c := FigureChart{Product: batches[0].Product, Figure: f, Closed: len(batches)}
	for _, r := range batches {
		x, ok := f.of(r)
		if !ok {
			c.LeftOut++
			continue
		}
		c.Batches, c.Values = append(c.Batches, r.Batch), append(c.Values, x)
	}
	// The figures are finite, so only fewer than two points have no chart.
	if chart, err := control.Individuals(c.Values, tests); err == nil {
		c.Chart = &chart
	}
	if !c.TooFew() {
		c.FalseAlarms = healthy.Rate(len(c.Values), tests)
	}
	return c
}
