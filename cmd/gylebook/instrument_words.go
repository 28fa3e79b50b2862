package main

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"gylebook/attenuation/journal"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
	"gylebook/tables"
	"gylebook/tempcorr"
)

// inWords says what to do with readings.
func (one comparison) inWords() string {
	value := shortSigned(one.correction, one.places)
	switch {
	case one.correction > 0:
		return "correction " + value + ": readings are low, add"
	case one.correction < 0:
		return "correction " + value + ": readings are high, subtract"
	}
	return "correction 0: readings are right"
}

// shortSigned is asread.Signed without the zeros that say nothing.
func shortSigned(x float64, places int) string {
	text := asread.Signed(x, places)
	if strings.Contains(text, ".") {
		text = strings.TrimRight(strings.TrimRight(text, "0"), ".")
	}
	return text
}

func (one comparison) sheet(e journal.Entry, h tempcorr.Hydrometer) sheet {
	notes := []method.Note{one.tensionNote(h)}
	rec := entryRecord(e, one.check.Instrument, nil)
	rec = slices.Concat(rec[:len(rec)-1], tables.Record{
		{Name: "liquid", Value: one.check.Liquid},
		{Name: "strength_pct_mass", Value: numberOf(one.check.Strength)},
		{Name: "found", Value: one.found.Value},
		{Name: "read_as", Value: one.found.ReadAs()},
		{Name: "sample_temp_c", Value: float64(one.temp.C)},
		{Name: "expected", Value: one.expected},
		{Name: "correction", Value: one.correction},
		{Name: "scale", Value: h.Scale.String()},
		{Name: "notes", Value: neutral(notes)},
	})
	liquid := "clean water"
	switch one.check.Liquid {
	case journal.InSucrose:
		liquid = "sucrose solution of " + one.check.Strength + " % mass"
	case journal.InDrink:
		liquid = "the drink itself"
	}
	return sheet{
		name: "instrument-check", records: []tables.Record{rec},
		ladder: &tables.Ladder{
			Answer: []string{numberedLine(one.inWords(), e)},
			Rungs: []tables.Rung{
				{Name: "found", Value: fixed(one.found.Value, placesOf(one.found)), Remark: fmt.Sprintf("%s at %s in %s", one.found.ReadAs(), one.temp.ReadAs(), liquid)},
				{Name: "expected", Value: fixed(one.expected, one.places), Remark: one.model(h)},
			},
		},
	}
}

// model says where the expected value comes from.
func (one comparison) model(h tempcorr.Hydrometer) string {
	body := fmt.Sprintf("%s %.0fe-6/K, %s", h.Body.ID, h.Body.Expansion*1e6, h.Basis)
	switch one.check.Liquid {
	case journal.InSucrose:
		return "sucrose model (ICUMSA SPS-4), " + body
	case journal.InDrink:
		return "as typed"
	}
	return "water (Kell), " + body
}

// tensionNote says which liquid the check was made in: what pulls on the stem
// differs between water, wort and a drink.
func (one comparison) tensionNote(h tempcorr.Hydrometer) method.Note {
	if one.check.Liquid == journal.InDrink {
		return method.Note{Code: method.NotCovered, Text: "checked in the drink itself: surface tension is in this correction; in water or plain sugar solution the instrument reads otherwise"}
	}
	const water, drink = 72.75, 45 // mN/m; the drink's from memory, 42 to 48
	stem, mass, of := h.StemMM, h.MassG, "this instrument"
	if stem <= 0 || mass <= 0 {
		stem, mass, of = 6.5, 24, "a kit instrument (24 g, stem of 6.5 mm)"
	}
	points := math.Abs(tempcorr.TensionPoints(1, stem, mass, water, drink))
	return method.Note{Code: method.NotCovered, Text: fmt.Sprintf(
		"checked in %s: a drink that foams pulls less on the stem, where %s reads up to %s points high; a check in the drink itself covers it",
		map[string]string{journal.InWater: "water", journal.InSucrose: "sugar solution"}[one.check.Liquid], of, fixed(points, 1))}
}

// nilIfEmpty is a text, or nothing.
func nilIfEmpty(text string) any {
	if text == "" {
		return nil
	}
	return text
}
