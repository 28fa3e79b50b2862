package main

import (
	"cmp"

	"gylebook/attenuation"
	"gylebook/attenuation/season"
	"gylebook/tables"
)

// seasonRecord is one batch for machines; figures have the names that they have
// with the batch itself.
func seasonRecord(r season.Row) tables.Record {
	rec := tables.Record{
		{Name: "batch_id", Value: r.Batch},
		{Name: "product", Value: r.Product},
		{Name: "vessel", Value: nilIfEmpty(r.Vessel)},
		{Name: "yeast", Value: nilIfEmpty(r.Yeast)},
		{Name: "yeast_generation", Value: nilIfZero(r.Generation)},
		{Name: "parent_batch_id", Value: nilIfEmpty(r.Parent)},
		{Name: "pitched_at", Value: stampText(r.Pitched)},
		{Name: "open", Value: r.Open},
		{Name: "readings", Value: r.Readings},
		{Name: "last_taken_at", Value: stampText(r.LastAt)},
		{Name: "days_to_last_fall", Value: number(r.Days)},
		{Name: "effective_og_sg_20_20", Value: known(r.OG)},
		{Name: "original_extract_pct_mass", Value: known(r.OE)},
		{Name: "sg_20_20", Value: known(r.SG)},
		{Name: "apparent_extract_pct_mass", Value: nil},
	}
	if !r.LastAt.IsZero() {
		rec = set(rec, "apparent_extract_pct_mass", float64(r.AE))
	}
	a := attenuation.Attenuation{}
	if r.Attenuation != nil {
		a = *r.Attenuation
	}
	var by any
	if r.ABV != nil {
		by = r.Method
	}
	given := func(x float64) any {
		if r.Attenuation == nil {
			return nil
		}
		return x
	}
	return append(rec, tables.Record{
		{Name: "real_extract_pct_mass", Value: given(float64(a.RE))},
		{Name: "apparent_attenuation_pct", Value: given(a.Apparent)},
		{Name: "real_attenuation_pct", Value: given(a.Real)},
		{Name: "rdf_pct", Value: given(a.RDF)},
		{Name: "abv_pct_20c", Value: number(r.ABV)},
		{Name: "abv_method", Value: by},
		{Name: "limit_difference_pct", Value: number(r.LimitDifference)},
		{Name: "why", Value: nilIfEmpty(cmp.Or(r.Why, r.ABVWhy))},
	}...)
}

// groupRecord is one product and yeast for machines.
func groupRecord(g season.Group) tables.Record {
	rec := tables.Record{
		{Name: "product", Value: g.Product},
		{Name: "yeast", Value: nilIfEmpty(g.Yeast)},
		{Name: "batches", Value: g.Batches},
		{Name: "open", Value: g.Open},
	}
	for _, one := range []struct {
		name string
		s    season.Spread
	}{
		{"apparent_attenuation_pct", g.Apparent},
		{"real_attenuation_pct", g.Real},
		{"abv_pct_20c", g.ABV},
		{"days_to_last_fall", g.Days},
	} {
		rec = append(rec, tables.Field{Name: one.name + "_n", Value: one.s.N})
		for _, f := range []struct {
			name  string
			value float64
		}{{"median", one.s.Median}, {"q1", one.s.Q1}, {"q3", one.s.Q3}, {"min", one.s.Min}, {"max", one.s.Max}} {
			var value any
			if one.s.N > 0 {
				value = f.value
			}
			rec = append(rec, tables.Field{Name: one.name + "_" + f.name, Value: value})
		}
	}
	return rec
}
