package demo

import "gylebook/attenuation/journal"

// deed is something done to a batch.
type deed struct {
	batch     string
	day, hour int // days after pitching, by the clock
	event     journal.Event
	trueKg    float64 // sugar that truly went in when nobody wrote it down
}

var deeds = []deed{
	{batch: "LB-01", day: 5, hour: 15, event: dryHops("2.5")},
	{batch: "LB-02", day: 5, hour: 15, event: dryHops("2.5")},
	{batch: "LB-06", day: 5, hour: 14, event: dryHops("3")},
	{batch: "LB-08", day: 5, hour: 15, event: dryHops("3")},
	{batch: "LB-10", day: 5, hour: 15, event: dryHops("3")},
	{batch: "LB-12", day: 5, hour: 15, event: dryHops("3")},
	{batch: "LB-14", day: 5, hour: 15, event: dryHops("3")},
	{batch: "LB-16", day: 6, hour: 15, event: dryHops("3")},
	{batch: "LB-01", day: 9, hour: 16, event: crash},
	{batch: "LB-03", day: 9, hour: 16, event: crash},
	{batch: "LB-06", day: 9, hour: 16, event: crash},
	{batch: "LB-10", day: 9, hour: 15, event: crash},
	{batch: "LB-12", day: 9, hour: 16, event: crash},
	{batch: "LB-13", day: 9, hour: 16, event: crash},
	{batch: "NP-02", day: 16, hour: 15, event: crash},

	{batch: "LB-07", day: 1, hour: 10, event: journal.Event{
		What: journal.Dilution, VolumeL: "40", Note: "boiled hard, original gravity high; boiled water, cooled",
	}},
	{batch: "LB-09", day: 13, hour: 9, event: journal.Event{What: journal.Priming, MassKg: "2.4", Note: "casks"}},
	{batch: "LB-13", day: 13, hour: 9, event: journal.Event{What: journal.Priming, MassKg: "2.4", Note: "casks"}},

	{batch: "NP-03", day: 3, hour: 15, event: journal.Event{What: journal.Sugar, Note: "dark sugar, nobody weighed it"}, trueKg: 9},
	{batch: "NP-04", day: 2, hour: 15, event: journal.Event{What: journal.Sugar, MassKg: "8.5", Note: "dark sugar"}},
	{batch: "NP-01", day: 14, hour: 14, event: journal.Event{What: journal.Racking, VolumeL: "25", Note: "off the yeast"}},

	{batch: "HC-02", day: 6, hour: 14, event: journal.Event{What: journal.Sugar, MassKg: "15", Note: "white sugar, for strength"}},
	{batch: "HC-01", day: 30, hour: 14, event: journal.Event{What: journal.Racking, VolumeL: "40", Note: "off the lees"}},
	{batch: "HC-04", day: 30, hour: 14, event: journal.Event{What: journal.Racking, VolumeL: "35", Note: "off the lees"}},
	{batch: "OD-03", day: 23, hour: 14, event: journal.Event{
		What: journal.Blend, VolumeL: "200", From: "HC-03", Gravity: journal.Typed{Text: "1.050", Scale: "sg"},
		Note: "OG of HC-03",
	}},
	{batch: "OD-02", day: 26, hour: 14, event: journal.Event{What: journal.Racking, VolumeL: "45", Note: "off the lees"}},

	{batch: "MM-01", day: 40, hour: 14, event: journal.Event{What: journal.Move, Vessel: "FV3", Note: "to the cool end"}},
	{batch: "MM-02", day: 9, hour: 14, event: journal.Event{
		What: journal.TopUp, VolumeL: "30", Gravity: journal.Typed{Text: "1.0920", Scale: "sg"}, Note: "kept back at pitching",
	}},
	{batch: "MM-03", day: 12, hour: 14, event: journal.Event{What: journal.Sugar, MassKg: "12", Note: "second feed, dry weight"}},
}

var crash = journal.Event{What: journal.Crash, Note: "to 6 °C"}

func dryHops(kg string) journal.Event { return journal.Event{What: journal.DryHop, MassKg: kg} }

// slip is a reading that was typed wrongly, voided and entered anew.
type slip struct {
	batch  string
	number int // of the batch's readings, from 0
	typed  string
	temp   string // "" when that was right
	reason string
}

var slips = []slip{
	{"LB-02", 2, "1.091", "", "digits swapped"},
	{"LB-05", 6, "1.041", "", "reading of T3"},
	{"LB-08", 4, "1.020", "61F", "temperature of the room"},
	{"LB-12", 3, "1.002", "", "stem misread"},
	{"NP-02", 5, "6.7P", "", "reading of yesterday"},
	{"HC-01", 4, "1.054", "", "digits swapped"},
	{"HC-05", 3, "1.014", "", "reading of T2"},
	{"OD-01", 7, "1.070", "", "digits swapped"},
	{"MM-04", 5, "18.4P", "", "reading of the day before pitching, copied again"},
}

// kept are readings that are kept as suspect: a batch's reading that shows so many
// SG too much, and why it was kept.
var kept = []struct {
	batch  string
	number int
	high   float64
	reason string
}{
	{"LB-10", 9, 0.004, "foam on the stem, no time for a second sample"},
	{"HC-04", 10, 0.003, "sample taken from the bottom valve, lees in it"},
}

// refracted are readings of a fermenting batch by refractometer, before the
// hydrometer of the same round.
var refracted = []struct {
	batch  string
	number int
	typed  string
}{
	{"LB-06", 2, "7.8Bx"},
	{"HC-02", 5, "8.6Bx"},
}
