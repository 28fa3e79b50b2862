package main

import (
	"fmt"
	"strings"

	"gylebook/attenuation/control"
	"gylebook/attenuation/season"
	"gylebook/tables/chart"
)

// axes of the figures of a season.
var figureAxes = map[season.Figure]string{
	season.Apparent: "apparent attenuation, %",
	season.Real:     "real attenuation, %",
	season.ABV:      "alcohol, % vol at 20 °C",
}

// controlPicture draws one figure of one product and tells what it shows.
func controlPicture(c *season.FigureChart, generations map[string]int) (chart.Control, []string) {
	p := chart.Control{Title: c.Product, XLabel: "closed batches in the order of pitching", YLabel: figureAxes[c.Figure]}
	broken := map[int]control.Set{}
	if c.Chart != nil && !c.TooFew() {
		l := c.Chart.Limits
		p.HasLimits = true
		p.Centre, p.WarningLow, p.WarningHigh, p.ActionLow, p.ActionHigh = l.Centre, l.LowerWarning, l.UpperWarning, l.Lower, l.Upper
		for _, v := range c.Chart.Broken {
			broken[v.Point] = v.Tests
		}
	}
	for k, y := range c.Values {
		id := c.Batches[k]
		p.Points = append(p.Points, chart.Individual{Label: id, Y: y, Group: generations[id], Flagged: broken[k] != 0})
	}
	return p, controlLines(c, broken)
}

func controlLines(c *season.FigureChart, broken map[int]control.Set) []string {
	shown := chartedAs[c.Figure]
	if len(c.Values) == 0 {
		return []string{"No closed batch with this figure."}
	}
	lo, hi := 0, 0
	for k, y := range c.Values {
		if y < c.Values[lo] {
			lo = k
		}
		if y > c.Values[hi] {
			hi = k
		}
	}
	lines := []string{fmt.Sprintf("%s of %s, by batch: lowest %s (%s), highest %s (%s).", counted(len(c.Values), "point"), c.Product,
		fixed(c.Values[lo], shown.places), c.Batches[lo], fixed(c.Values[hi], shown.places), c.Batches[hi])}
	if c.TooFew() {
		return append(lines, fmt.Sprintf("Too few for limits (%d of %d).", len(c.Values), control.MinPoints))
	}
	centre, act, warn := limitTexts(c)
	lines = append(lines, fmt.Sprintf("Centre %s, action limits %s, warning limits %s.", centre, act, warn))
	var named []string
	for k, id := range c.Batches {
		if broken[k] != 0 {
			named = append(named, id+" ("+testsText(broken[k])+")")
		}
	}
	if len(named) == 0 {
		return append(lines, "No batch breaks a test.")
	}
	return append(lines, "Ringed: "+strings.Join(named, "; ")+".")
}
