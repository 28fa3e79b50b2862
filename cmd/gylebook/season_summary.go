package main

import (
	"gylebook/attenuation/control"
	"gylebook/attenuation/season"
	"gylebook/tables"
)

// seasonSummary is what a season comes to, for machines.
func seasonSummary(rows []season.Row, tests control.Set) tables.Record {
	groups, charts, lineages := []tables.Record{}, []tables.Record{}, []tables.Record{}
	for _, g := range season.Groups(rows) {
		groups = append(groups, groupRecord(g))
	}
	for _, c := range season.Charts(rows, tests) {
		charts = append(charts, chartRecord(&c, tests))
	}
	for _, l := range season.Lineages(rows) {
		lineages = append(lineages, lineageRecord(l))
	}
	return tables.Record{
		{Name: "groups", Value: groups}, {Name: "charts", Value: charts}, {Name: "generations", Value: lineages},
	}
}

// chartRecord is one chart. With too few points its lines are null.
func chartRecord(c *season.FigureChart, tests control.Set) tables.Record {
	var l control.Limits
	broken, wide := []tables.Record{}, []string{}
	if !c.TooFew() {
		l = c.Chart.Limits
		for _, v := range c.Chart.Broken {
			broken = append(broken, tables.Record{
				{Name: "batch_id", Value: c.Batches[v.Point]},
				{Name: "value", Value: c.Values[v.Point]},
				{Name: "tests", Value: v.Tests.String()},
			})
		}
		for _, k := range c.Chart.Wide {
			wide = append(wide, c.Batches[k])
		}
	}
	given := func(x float64) any {
		if c.TooFew() {
			return nil
		}
		return x
	}
	return tables.Record{
		{Name: "product", Value: c.Product},
		{Name: "figure", Value: chartedAs[c.Figure].field},
		{Name: "closed", Value: c.Closed},
		{Name: "n", Value: len(c.Values)},
		{Name: "left_out", Value: c.LeftOut},
		{Name: "too_few", Value: c.TooFew()},
		{Name: "centre", Value: given(l.Centre)},
		{Name: "lower_action", Value: given(l.Lower)},
		{Name: "upper_action", Value: given(l.Upper)},
		{Name: "lower_warning", Value: given(l.LowerWarning)},
		{Name: "upper_warning", Value: given(l.UpperWarning)},
		{Name: "mean_moving_range", Value: given(l.MeanRange)},
		{Name: "moving_range_action", Value: given(l.RangeLimit)},
		{Name: "moving_range_warning", Value: given(l.RangeWarning)},
		{Name: "tests", Value: tests.String()},
		{Name: "false_alarm_rate", Value: given(c.FalseAlarms.Share)},
		{Name: "false_alarm_rate_sd", Value: given(c.FalseAlarms.Error)},
		{Name: "out_of_limits", Value: broken},
		{Name: "moving_range_out_of_limits", Value: wide},
	}
}

// lineageRecord is the generations of one product and yeast.
func lineageRecord(l season.Lineage) tables.Record {
	fields := []struct {
		name  string
		of    func(season.Generation) season.Spread
		trend season.Trend
	}{
		{"apparent_attenuation_pct", func(g season.Generation) season.Spread { return g.Apparent }, l.Apparent},
		{"hours_to_half_fall", func(g season.Generation) season.Spread { return g.Midpoint }, l.Midpoint},
		{"rate_points_per_day", func(g season.Generation) season.Spread { return g.Rate }, l.Rate},
	}
	var each []tables.Record
	for _, g := range l.Generations {
		rec := tables.Record{{Name: "generation", Value: g.Number}, {Name: "batches", Value: g.N}}
		for _, f := range fields {
			s := f.of(g)
			var median any
			if s.N > 0 {
				median = s.Median
			}
			rec = append(rec, tables.Record{{Name: f.name + "_n", Value: s.N}, {Name: f.name + "_median", Value: median}}...)
		}
		each = append(each, rec)
	}
	rec := tables.Record{
		{Name: "product", Value: l.Product},
		{Name: "yeast", Value: nilIfEmpty(l.Yeast)},
		{Name: "batches", Value: l.N},
		{Name: "by_generation", Value: each},
	}
	for _, f := range fields {
		t := f.trend
		given := func(x float64) any {
			if t.TooFew {
				return nil
			}
			return x
		}
		rec = append(rec, tables.Record{
			{Name: f.name + "_n", Value: t.N},
			{Name: f.name + "_slope", Value: given(t.Slope)},
			{Name: f.name + "_slope_low", Value: given(t.Low)},
			{Name: f.name + "_slope_high", Value: given(t.High)},
		}...)
	}
	return rec
}
