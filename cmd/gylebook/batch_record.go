package main

import (
	"time"

	"gylebook/attenuation"
	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/tables"
)

// stampText is a time as machines read it, nil when it is zero.
func stampText(t time.Time) any {
	if t.IsZero() {
		return nil
	}
	return t.Format(time.RFC3339)
}

// known is a figure above zero, nil when it is not known.
func known[F ~float64](x F) any {
	if x == 0 {
		return nil
	}
	return float64(x)
}

// batchFigures are the facts and figures of a batch for machines, without its
// notes.
func batchFigures(v journal.View) tables.Record {
	b := v.Record.Batch
	var closed any
	if c := v.Record.Closed; c != nil {
		closed = stampText(c.Body.At)
	}
	r := tables.Record{
		{Name: "batch_id", Value: b.ID},
		{Name: "product", Value: b.Product},
		{Name: "vessel", Value: nilIfEmpty(v.Vessel())},
		{Name: "yeast", Value: nilIfEmpty(b.Yeast)},
		{Name: "yeast_generation", Value: nilIfZero(b.Generation)},
		{Name: "parent_batch_id", Value: nilIfEmpty(b.Parent)},
		{Name: "batch_volume_l", Value: numberOf(v.Record.Volume())},
		{Name: "opened_at", Value: stampText(b.Opened)},
		{Name: "pitched_at", Value: stampText(v.Pitched)},
		{Name: "closed_at", Value: closed},
		{Name: "open", Value: v.Open()},
	}
	r = append(append(r, originalFigures(v)...), presentFigures(v)...)
	return append(r, tables.Field{Name: "void", Value: v.Record.Void}, tables.Field{Name: "void_reason", Value: nilIfEmpty(v.Record.VoidReason)})
}

// originalFigures are those of the original gravity: as read, and effective after
// what was added.
func originalFigures(v journal.View) tables.Record {
	var og, oe, spread any
	n := 0
	if v.OG != nil {
		og, oe, n, spread = float64(v.OG.SG), float64(v.OG.Extract), v.OG.N, 1000*v.OG.Spread
	}
	effective, sg, _ := v.OEAt(forever)
	// Where there are figures, the one that they are reckoned from.
	if last := v.Last(); last != nil {
		effective, sg = last.OE, last.OG
	}
	var limit any
	if v.Limit != nil {
		limit = float64(*v.Limit)
	}
	return tables.Record{
		{Name: "og_sg_20_20", Value: og},
		{Name: "og_extract_pct_mass", Value: oe},
		{Name: "og_readings", Value: n},
		{Name: "og_spread_points", Value: spread},
		{Name: "effective_og_sg_20_20", Value: known(sg)},
		{Name: "effective_og_extract_pct_mass", Value: known(effective)},
		{Name: "limit_apparent_extract_pct_mass", Value: limit},
	}
}

// presentFigures are those of the last reading that counts.
func presentFigures(v journal.View) tables.Record {
	var sg, ae, oe, fall, at, why any
	var a *attenuation.Attenuation
	var alcohol *attenuation.Alcohol
	if last := v.Last(); last != nil {
		sg, ae, oe, at = float64(last.SG), float64(last.Extract), known(last.OE), stampText(last.Source.TakenAt)
		a, alcohol, why = last.Attenuation, last.Alcohol, nilIfEmpty(whyNot(last))
	} else {
		why = "no reading that counts"
	}
	if f, ok := v.Fall24h(); ok {
		fall = f
	}
	r := tables.Record{
		{Name: "last_taken_at", Value: at},
		{Name: "sg_20_20", Value: sg},
		{Name: "apparent_extract_pct_mass", Value: ae},
		{Name: "original_extract_pct_mass", Value: oe},
		{Name: "fall_24h_points", Value: fall},
	}
	r = append(r, attenuationFields(a, alcohol)...)
	var by any
	if alcohol != nil {
		by = attenuation.ABVMethods.Default().ID
	}
	return append(
		r,
		tables.Field{Name: "abv_method", Value: by},
		tables.Field{Name: "limit_difference_pct", Value: limitDifference(v, a)},
		tables.Field{Name: "why", Value: why},
	)
}

// limitDifference is how far the limit of attenuation still is, in points of %.
func limitDifference(v journal.View, a *attenuation.Attenuation) any {
	if a == nil || v.Limit == nil {
		return nil
	}
	return attenuation.LimitDifference(a.OE, a.AE, *v.Limit)
}

// attenuationFields are the figures that need an original gravity, null without.
func attenuationFields(a *attenuation.Attenuation, alcohol *attenuation.Alcohol) tables.Record {
	var re, apparent, real, rdf, abv, abw any
	if a != nil {
		re, apparent, real, rdf = float64(a.RE), a.Apparent, a.Real, a.RDF
	}
	if alcohol != nil {
		abv, abw = float64(alcohol.ABV), number(alcohol.ABW)
	}
	return tables.Record{
		{Name: "real_extract_pct_mass", Value: re},
		{Name: "apparent_attenuation_pct", Value: apparent},
		{Name: "real_attenuation_pct", Value: real},
		{Name: "rdf_pct", Value: rdf},
		{Name: "abv_pct_20c", Value: abv},
		{Name: "abw_pct", Value: abw},
	}
}

// whyNot is the reason for which a figure of a reading is missing, "" when none is.
func whyNot(one *journal.Value) string {
	switch {
	case one.Err != nil:
		return one.Err.Error()
	case one.Attenuation == nil:
		return one.Why
	case one.Alcohol == nil:
		return one.AlcoholWhy
	}
	return ""
}

// numberOf is what a typed number says, nil when none was typed.
func numberOf(text string) any {
	v, err := asread.ParseNumber(text)
	if err != nil {
		return nil
	}
	return v.Float()
}

// nilIfZero is a count, or nothing.
func nilIfZero(n int) any {
	if n == 0 {
		return nil
	}
	return n
}

// plato is an extract as people read it.
func plato(p gravity.Plato) string { return fixed(float64(p), 2) + " °P" }
