package main

import (
	"time"

	"gylebook/attenuation/journal"
	"gylebook/gravity/method"
	"gylebook/tables"
)

// Words for the state of a reading.
const (
	statusOK          = "ok"
	statusVoid        = "void"
	statusSuspect     = "suspect"
	statusUncorrected = "uncorrected"
)

// statusOf says whether a reading counts, and if not, why.
func statusOf(one *journal.Value) (status, reason string) {
	switch {
	case one.Void:
		return statusVoid, one.VoidReason
	case one.Suspect:
		return statusSuspect, one.Source.Keep
	case one.Err != nil:
		return statusUncorrected, one.Err.Error()
	}
	return statusOK, whyNot(one)
}

// valueRecord is one reading for machines: as typed, every step of its correction
// in its scale, and what follows from it.
func valueRecord(v journal.View, one *journal.Value, notes []method.Note) tables.Record {
	src := one.Source
	status, reason := statusOf(one)
	var elapsed any
	if h, ok := v.Elapsed(src.TakenAt); ok {
		elapsed = h
	}
	var entry any
	if one.Number != unwritten {
		entry = int(one.Number)
	}
	r := tables.Record{
		{Name: "entry", Value: entry},
		{Name: "batch_id", Value: v.Record.Batch.ID},
		{Name: "vessel", Value: nilIfEmpty(src.Vessel)},
		{Name: "taken_at", Value: stampText(src.TakenAt)},
		{Name: "time_quality", Value: src.Quality},
		{Name: "elapsed_h", Value: elapsed},
		{Name: "input", Value: src.Gravity.Text},
		{Name: "read_as", Value: one.Typed.ReadAs()},
		{Name: "scale", Value: src.Gravity.Scale},
		{Name: "sample_temp_c", Value: float64(one.Temp.C)},
		{Name: "degassed", Value: !src.Gassy},
		{Name: "instrument_id", Value: nilIfEmpty(src.Instrument)},
	}
	r = append(r, correctionFields(one)...)
	r = append(r, tables.Record{
		{Name: "fall_points", Value: nil},
		{Name: "fall_hours", Value: nil},
		{Name: "fall_24h_points", Value: nil},
	}...)
	if f, ok := fallTo(v, one); ok {
		r = set(r, "fall_points", f.points)
		r = set(r, "fall_hours", f.hours)
		r = set(r, "fall_24h_points", 24*f.points/f.hours)
	}
	r = append(r, tables.Field{Name: "original_extract_pct_mass", Value: known(one.OE)})
	r = append(r, attenuationFields(one.Attenuation, one.Alcohol)...)
	return append(r, tables.Record{
		{Name: "status", Value: status},
		{Name: "reason", Value: nilIfEmpty(reason)},
		{Name: "note", Value: nilIfEmpty(src.Note)},
		{Name: "operator", Value: one.By},
		{Name: "notes", Value: neutral(append(append([]method.Note{}, one.Notes...), notes...))},
	}...)
}

// correctionFields are the steps of the correction, null where it failed.
func correctionFields(one *journal.Value) tables.Record {
	names := []string{
		"method", "reading", "meniscus_correction", "instrument_correction", "temperature_correction", "corrected",
		"expanded_uncertainty_k2", "sg_20_20", "apparent_extract_pct_mass", "replicates",
	}
	values := make([]any, len(names))
	if one.Err == nil {
		res := one.Result
		values = []any{
			res.Method.ID, res.Reading, res.Meniscus, res.Instrument(), res.Temperature, res.Corrected,
			res.Budget.Expanded, float64(one.SG), float64(one.Extract), max(1, one.Replicates),
		}
	}
	return record(names, values)
}

// set gives a field that is there another value.
func set(r tables.Record, name string, value any) tables.Record {
	for k := range r {
		if r[k].Name == name {
			r[k].Value = value
		}
	}
	return r
}

// fall is how far the gravity came down since the reading before.
type fall struct{ points, hours float64 }

// fallTo is the fall to one from the minute before it that counts; none across an
// addition.
func fallTo(v journal.View, one *journal.Value) (fall, bool) {
	if !one.Counts() {
		return fall{}, false
	}
	var before *journal.Value
	for _, other := range v.Counting() {
		if !other.Source.TakenAt.Truncate(time.Minute).Before(one.Source.TakenAt.Truncate(time.Minute)) {
			break
		}
		before = other
	}
	if before == nil || before.OE != one.OE {
		return fall{}, false
	}
	return fall{
		points: 1000 * float64(before.SG-one.SG),
		hours:  one.Source.TakenAt.Sub(before.Source.TakenAt).Hours(),
	}, true
}
