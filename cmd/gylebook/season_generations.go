package main

import (
	"cmp"
	"fmt"
	"strconv"
	"strings"

	"gylebook/attenuation/season"
	"gylebook/tables"
)

// generationFigure is one figure followed through the generations.
type generationFigure struct {
	name, unit string // "half", "h"
	of         func(season.Generation) season.Spread
	trend      func(season.Lineage) season.Trend
}

var generationFigures = []generationFigure{
	{"app. %", "%", func(g season.Generation) season.Spread { return g.Apparent }, func(l season.Lineage) season.Trend { return l.Apparent }},
	{"half", "h", func(g season.Generation) season.Spread { return g.Midpoint }, func(l season.Lineage) season.Trend { return l.Midpoint }},
	{"points/day", "points/day", func(g season.Generation) season.Spread { return g.Rate }, func(l season.Lineage) season.Trend { return l.Rate }},
}

// generationTables show the yeasts of which more than one generation was used.
func generationTables(all []season.Lineage, width int, stacked bool) []tables.Table {
	var used []season.Lineage
	for _, l := range all {
		if len(l.Generations) > 1 {
			used = append(used, l)
		}
	}
	if len(used) == 0 {
		return nil
	}
	foot := append([]string{
		"medians of the closed batches; half: hours from pitching to half of the fall",
		"points/day over the middle half; slope: change a generation ± 95 %",
	}, trendLines(used)...)
	if stacked {
		var list []tables.Table
		for k, l := range used {
			t := linesTable(lineageName(l)+", generations", generationLines(l), nil)
			if k == len(used)-1 {
				t.Foot = foot
			}
			list = append(list, t)
		}
		return list
	}
	t := tables.Table{
		Title: "yeast generations", Foot: foot,
		Columns: []tables.Column{{Head: "product"}, {Head: "yeast"}, {Head: "gen."}, {Head: "n"}, {Head: "app. %"}, {Head: "half h"}, {Head: "points/day"}},
	}
	for k := 2; k < len(t.Columns); k++ {
		t.Columns[k].Align = tables.Right
	}
	for _, l := range used {
		product, yeast := l.Product, cmp.Or(l.Yeast, none)
		for _, g := range l.Generations {
			row := []string{product, yeast, strconv.Itoa(g.Number), strconv.Itoa(g.Apparent.N)}
			for _, f := range generationFigures {
				row = append(row, medianText(f.of(g)))
			}
			t.Rows = append(t.Rows, row)
			product, yeast = "", ""
		}
		row := []string{"", "", "slope", strconv.Itoa(l.Apparent.N)}
		for _, f := range generationFigures {
			row = append(row, slopeText(f.trend(l)))
		}
		t.Rows = append(t.Rows, row)
	}
	squeeze(&t, width, 0, 1)
	return []tables.Table{t}
}

func lineageName(l season.Lineage) string {
	return strings.TrimSuffix(l.Product+", "+l.Yeast, ", ")
}

// generationLines have a line a generation, and one for the slopes.
func generationLines(l season.Lineage) []string {
	line := func(head string, n int, of func(generationFigure) string) string {
		line := fmt.Sprintf("%s: n %d", head, n)
		for _, f := range generationFigures {
			switch text := of(f); {
			case text == none || text == tooFew:
				line += ", " + f.name + " " + text
			case f.unit == "h":
				line += ", " + f.name + " " + text + " h"
			default:
				line += ", " + text + " " + f.unit
			}
		}
		return line
	}
	var lines []string
	for _, g := range l.Generations {
		lines = append(lines, line("generation "+strconv.Itoa(g.Number), g.Apparent.N, func(f generationFigure) string { return medianText(f.of(g)) }))
	}
	return append(lines, line("slope", l.Apparent.N, func(f generationFigure) string { return slopeText(f.trend(l)) }))
}

func medianText(s season.Spread) string {
	if s.N == 0 {
		return none
	}
	return fixed(s.Median, 1)
}

const tooFew = "too few"

func slopeText(t season.Trend) string {
	if t.TooFew {
		return tooFew
	}
	return asSigned(t.Slope) + " ± " + fixed((t.High-t.Low)/2, 1)
}

// trendLines name the trends that are shown. Where none is, they say so once.
func trendLines(used []season.Lineage) []string {
	var lines []string
	judged := false
	for _, l := range used {
		for _, f := range generationFigures {
			t := f.trend(l)
			judged = judged || !t.TooFew
			if word := map[int]string{-1: "falls", 1: "rises"}[t.Direction()]; word != "" {
				lines = append(lines, fmt.Sprintf("%s: %s %s with the generation", lineageName(l), f.name, word))
			}
		}
	}
	if lines == nil && judged {
		lines = []string{"no trend shown: every interval holds zero"}
	}
	return lines
}
