package main

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"gylebook/attenuation/control"
	"gylebook/attenuation/season"
	"gylebook/tables"
)

// charted says how a figure is called and printed.
type charted struct {
	field  string // in records
	head   string // in a table
	name   string // in a line
	places int
}

var chartedAs = map[season.Figure]charted{
	season.Apparent: {"apparent_attenuation_pct", "app. %", "apparent attenuation %", 1},
	season.Real:     {"real_attenuation_pct", "real %", "real attenuation %", 1},
	season.ABV:      {"abv_pct_20c", "% vol", "alcohol % vol", 2},
}

// chartTables have one table a product with limits, and a line for the others.
func chartTables(charts []season.FigureChart, stacked bool) []tables.Table {
	var list []tables.Table
	var few []string
	for len(charts) > 0 {
		n := 1
		for n < len(charts) && charts[n].Product == charts[0].Product {
			n++
		}
		of := charts[:n]
		charts = charts[n:]
		// Who has alcohol has attenuation, so the first chart has the most points.
		if of[0].TooFew() {
			few = append(few, fmt.Sprintf("%s (%d of %d)", of[0].Product, len(of[0].Values), control.MinPoints))
			continue
		}
		list = append(list, chartTable(of, stacked))
	}
	if len(few) > 0 {
		list = append(list, tables.Table{Foot: []string{"too few for limits: " + strings.Join(few, ", ")}})
	}
	return list
}

func chartTable(of []season.FigureChart, stacked bool) tables.Table {
	title := fmt.Sprintf("%s, limits of %d closed batches", of[0].Product, of[0].Closed)
	foot := brokenLines(of, stacked)
	if stacked {
		var lines []string
		for k := range of {
			lines = append(lines, chartLine(&of[k]))
		}
		return linesTable(title, lines, foot)
	}
	t := tables.Table{Title: title, Foot: foot, Columns: []tables.Column{{Head: "figure"}}}
	for _, head := range []string{"n", "centre", "action limits", "warning limits"} {
		t.Columns = append(t.Columns, tables.Column{Head: head, Align: tables.Right})
	}
	for k := range of {
		c := &of[k]
		row := []string{chartedAs[c.Figure].head, strconv.Itoa(len(c.Values)), none, tooFew, none}
		if !c.TooFew() {
			centre, act, warn := limitTexts(c)
			row = append(row[:2], centre, act, warn)
		}
		t.Rows = append(t.Rows, row)
	}
	return t
}

// linesTable is a block of lines, for narrow terminals and screen readers.
func linesTable(title string, lines, foot []string) tables.Table {
	return tables.Table{Title: title, Columns: make([]tables.Column, len(lines)), Rows: [][]string{lines}, Foot: foot}
}

func chartLine(c *season.FigureChart) string {
	name := chartedAs[c.Figure].name
	if c.TooFew() {
		return fmt.Sprintf("%s: too few for limits (%d of %d)", name, len(c.Values), control.MinPoints)
	}
	centre, act, warn := limitTexts(c)
	return fmt.Sprintf("%s: centre %s, action %s, warning %s, n %d", name, centre, act, warn, len(c.Values))
}

func limitTexts(c *season.FigureChart) (centre, act, warn string) {
	places := chartedAs[c.Figure].places
	between := func(lo, hi float64) string { return fixed(lo, places) + " to " + fixed(hi, places) }
	l := c.Chart.Limits
	return fixed(l.Centre, places), between(l.Lower, l.Upper), between(l.LowerWarning, l.UpperWarning)
}

// shownBroken is how many batches out of their limits are named, the newest ones.
const shownBroken = 8

// brokenLines name the batches that break a test, what the tests mean, and how much
// of it is to be expected of nothing.
func brokenLines(of []season.FigureChart, stacked bool) []string {
	most := &of[0]
	broken, seen := brokenBatches(of, stacked)
	var lines []string
	if more := len(broken) - shownBroken; more > 0 {
		lines = append(lines, fmt.Sprintf("%d earlier batches break a test; --json has them", more))
		broken = broken[more:]
	}
	lines = append(lines, broken...)
	for _, n := range seen.Numbers() {
		lines = append(lines, fmt.Sprintf("test %d: %s", n, control.Tests[n-1].Name))
	}
	one := "one of these in a figure"
	if seen == 0 {
		lines = append(lines, "no batch breaks "+testsText(most.Chart.Tests))
		one = "one in a figure"
	}
	if left := of[0].Closed - len(most.Values); left > 0 {
		lines = append(lines, fmt.Sprintf("%d left out: without the figures", left))
	}
	return append(lines, fmt.Sprintf("%s healthy seasons of %d would show %s (%s %%)",
		oftenText(most.FalseAlarms.Share), most.FalseAlarms.N, one, fixed(100*most.FalseAlarms.Share, 0)))
}

// brokenBatches gives a line a batch, in order of pitching, and all tests broken.
func brokenBatches(of []season.FigureChart, stacked bool) (lines []string, seen control.Set) {
	var order []string
	parts := make(map[string][]string) // by batch, "test 1 in app. %"
	for k := range of {
		c := &of[k]
		if c.TooFew() {
			continue
		}
		head := chartedAs[c.Figure].head
		if stacked {
			head = chartedAs[c.Figure].name
		}
		for _, v := range c.Chart.Broken {
			seen |= v.Tests
			id := c.Batches[v.Point]
			if parts[id] == nil {
				order = append(order, id)
			}
			word := testsText(v.Tests) + " in "
			// The same tests in the figure before are said once.
			if last := len(parts[id]) - 1; last >= 0 && strings.HasPrefix(parts[id][last], word) {
				parts[id][last] += ", " + head
				continue
			}
			parts[id] = append(parts[id], word+head)
		}
	}
	place := make(map[string]int, len(of[0].Batches))
	for k, id := range of[0].Batches {
		place[id] = k
	}
	slices.SortStableFunc(order, func(a, b string) int { return place[a] - place[b] })
	for _, id := range order {
		lines = append(lines, id+" breaks "+strings.Join(parts[id], "; "))
	}
	return lines, seen
}

// testsText gives "test 1" or "tests 1, 5".
func testsText(s control.Set) string {
	if len(s.Numbers()) == 1 {
		return "test " + s.String()
	}
	return "tests " + strings.ReplaceAll(s.String(), ",", ", ")
}

// oftenText says a share as one in so many, above a third in tenths.
func oftenText(share float64) string {
	switch {
	case share < 0.001:
		return "fewer than 1 in 1000"
	case share > 0.95:
		return "nearly all"
	case share > 1.0/3:
		return fmt.Sprintf("%.0f in 10", math.Round(10*share))
	}
	return fmt.Sprintf("1 in %.0f", math.Round(1/share))
}
