package main

import (
	"strings"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/tables"
)

// instrumentRecord is an instrument for machines, with the correction in force.
func instrumentRecord(rec *journal.InstrumentRecord, at time.Time) tables.Record {
	i := rec.Instrument
	var correction, since, retired, reason any
	if text, t := inForce(rec, at); !t.IsZero() {
		correction, since = numberOf(text), stampText(t) // null for more than one point
	}
	if rec.Retired != nil {
		retired, reason = stampText(rec.Retired.Body.At), rec.Retired.Body.Reason
	}
	return tables.Record{
		{Name: "instrument_id", Value: i.ID},
		{Name: "type", Value: i.Type},
		{Name: "scale", Value: nilIfEmpty(i.Scale)},
		{Name: "basis", Value: nilIfEmpty(i.Basis)},
		{Name: "division", Value: numberOf(i.Division)},
		{Name: "range_lo", Value: numberOf(i.RangeLo)},
		{Name: "range_hi", Value: numberOf(i.RangeHi)},
		{Name: "body", Value: nilIfEmpty(i.Body)},
		{Name: "read_at", Value: nilIfEmpty(i.ReadAt)},
		{Name: "max_error", Value: numberOf(i.MaxError)},
		{Name: "stem_mm", Value: numberOf(i.StemMM)},
		{Name: "mass_g", Value: numberOf(i.MassG)},
		{Name: "surface_tension_mn_m", Value: numberOf(i.Tension)},
		{Name: "since", Value: stampText(i.Since)},
		{Name: "correction", Value: correction},
		{Name: "correction_since", Value: since},
		{Name: "retired_at", Value: retired},
		{Name: "retired_reason", Value: reason},
		{Name: "note", Value: nilIfEmpty(i.Note)},
	}
}

// historyFields are the certificates and checks of an instrument.
func historyFields(rec *journal.InstrumentRecord) tables.Record {
	var certificates, checks []tables.Record
	for _, x := range rec.Certificates {
		var points []string
		for _, p := range x.Body.Points {
			points = append(points, strings.TrimSuffix(p.Reading+" "+p.Correction+" "+p.U, " "))
		}
		certificates = append(certificates, tables.Record{
			{Name: "entry", Value: int(x.Number)},
			{Name: "at", Value: stampText(x.Body.At)},
			{Name: "reference", Value: nilIfEmpty(x.Body.Reference)},
			{Name: "points", Value: points},
			{Name: "operator", Value: x.By},
		})
	}
	for _, x := range rec.Checks {
		checks = append(checks, tables.Record{
			{Name: "entry", Value: int(x.Number)},
			{Name: "at", Value: stampText(x.Body.At)},
			{Name: "liquid", Value: x.Body.Liquid},
			{Name: "strength_pct_mass", Value: numberOf(x.Body.Strength)},
			{Name: "found", Value: x.Body.Found.Text},
			{Name: "expected", Value: x.Body.Expected.Text},
			{Name: "temp", Value: x.Body.Temp.Text},
			{Name: "correction", Value: numberOf(x.Body.Correction)},
			{Name: "operator", Value: x.By},
		})
	}
	return tables.Record{{Name: "certificates", Value: certificates}, {Name: "checks", Value: checks}}
}
