package main

import (
	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
	"gylebook/tables"
)

// terminalRecord is the evidence for a machine; its facts are fields of their own,
// so that a table has them too.
func terminalRecord(v journal.View, e outlook.Evidence) tables.Record {
	o, w := e.Forecast, e.Weighed
	r := append(tables.Record{{Name: "word", Value: string(w.State)}, {Name: "since", Value: stampText(e.Since)}}, foreseenBatch(v, o)...)
	for _, f := range e.Facts {
		r = append(r, tables.Field{Name: f.Code + "_met", Value: metOf(f)})
	}
	given := func(ok bool, x float64) any {
		if !ok {
			return nil
		}
		return x
	}
	var sg any
	if one := o.Course.Last; one != nil {
		sg = float64(one.SG)
	}
	fall, half := w.Slope.FSU()
	r = append(r, tables.Record{
		{Name: "sg_20_20", Value: sg},
		{Name: "flat_readings", Value: w.FlatN},
		{Name: "flat_hours", Value: w.FlatHours},
		{Name: "over_2_points_left_probability", Value: given(w.LeftKnown, w.Left)},
		{Name: "watch_since", Value: stampText(o.Course.Since)},
		{Name: "watch_what", Value: nilIfEmpty(o.Course.Added)},
		{Name: "crashed_at", Value: stampText(o.Course.Crashed)},
		{Name: "readings_after_crash", Value: o.Course.Cold},
		{Name: "fall_points_per_day", Value: given(w.SlopeKnown, w.Slope.PerDay)},
		{Name: "not_excluded_points_per_day", Value: given(w.SlopeKnown, w.Slope.NotExcluded)},
		{Name: "fsu", Value: given(w.SlopeKnown, fall)},
		{Name: "fsu_half_width_95", Value: given(w.SlopeKnown, half)},
		{Name: "limit_difference_pct", Value: number(e.LimitDifference)},
		{Name: "above_limit_points", Value: given(w.AboveLimitKnown, w.AboveLimit)},
		{Name: "undetected_points_p95", Value: given(e.LeftKnown, e.Left)},
		{Name: "undetected_co2_g_per_l", Value: given(e.LeftKnown, e.CO2GPL)},
		{Name: "undetected_co2_volumes", Value: given(e.LeftKnown, e.CO2Volumes)},
	}...)
	fg, ok := o.FG()
	r = append(r, spread("final_sg_20_20", fg, ok)...)
	return append(r, tables.Field{Name: "notes", Value: neutral(e.Notes())})
}
