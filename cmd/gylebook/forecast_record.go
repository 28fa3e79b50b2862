package main

import (
	"gylebook/attenuation"
	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
	"gylebook/tables"
)

// forecastRecord is a forecast for a machine.
func forecastRecord(v journal.View, o outlook.Forecast) tables.Record {
	r := append(foreseenBatch(v, o), tables.Record{
		{Name: "curve", Value: o.Curve.Curve},
		{Name: "cold_start", Value: o.History.Kind.String()},
		{Name: "effective_og_sg_20_20", Value: 1 + o.Course.Batch.OG/1000},
	}...)
	fg, ok := o.FG()
	r = append(r, spread("final_sg_20_20", fg, ok)...)
	abv, ok := o.ABV()
	r = append(r, spread("final_abv_pct_20c", abv, ok)...)
	r = append(r, tables.Field{Name: "abv_method", Value: attenuation.ABVMethods.Default().ID})
	t, _ := o.Terminal() // zero times print as null
	r = append(r, tables.Record{
		{Name: "terminal_at", Value: stampText(t.Median)},
		{Name: "terminal_at_p05", Value: stampText(t.Lo)},
		{Name: "terminal_at_p95", Value: stampText(t.Hi)},
	}...)
	next, ok := nextOf(v, o)
	r = append(r, spread("next_sg_20_20", next, ok)...)
	return append(r, tables.Field{Name: "notes", Value: neutral(o.Notes())})
}

// foreseenBatch is what the batch is and what its forecast rests on.
func foreseenBatch(v journal.View, o outlook.Forecast) tables.Record {
	b := v.Record.Batch
	var last any
	if one := o.Course.Last; one != nil {
		last = stampText(one.Source.TakenAt)
	}
	return tables.Record{
		{Name: "batch", Value: b.ID},
		{Name: "vessel", Value: nilIfEmpty(v.Vessel())},
		{Name: "product", Value: b.Product},
		{Name: "yeast", Value: nilIfEmpty(b.Yeast)},
		{Name: "at", Value: stampText(o.Course.Now)},
		{Name: "readings", Value: o.Curve.N},
		{Name: "last_taken_at", Value: last},
		{Name: "history_batches", Value: o.Curve.History},
		{Name: "history_batch_ids", Value: o.History.Batches},
	}
}

// spread is a median with its 5th and 95th percentile, null where not known.
func spread(name string, i curve.Interval, ok bool) tables.Record {
	given := func(x float64) any {
		if !ok {
			return nil
		}
		return x
	}
	return tables.Record{
		{Name: name, Value: given(i.Median)},
		{Name: name + "_p05", Value: given(i.Lo)},
		{Name: name + "_p95", Value: given(i.Hi)},
	}
}
