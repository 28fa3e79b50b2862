package demo

import "time"

// The yeasts, and how they work. Invented, of a size that gives ales that are done
// in a week, ciders in three and meads in six.
var (
	houseAle   = uptake{growth: 0.13, rate: 0.030, start: 0.06, lag: 8}
	ciderYeast = uptake{growth: 0.08, rate: 0.010, start: 0.05, lag: 16}
	meadYeast  = uptake{growth: 0.06, rate: 0.0055, start: 0.05, lag: 24}
	coldAle    = uptake{growth: 0.07, rate: 0.014, start: 0.06, lag: 18}
)

const (
	ale, cider, mead = "house ale", "cider yeast", "mead yeast"

	bitter, porter = "Lane Bitter", "Night Porter"
	harvest, dry   = "Harvest Cider", "Orchard Dry"
	meadow         = "Meadow Mead"
)

// kind is what the batches of one product have in common.
type kind struct {
	yeast  string
	works  uptake
	og, fg float64 // usual, SG
	volume string  // L
	warm   float64 // °C of a sample
	days   []int   // after pitching on which it is read
	twice  int     // first days on which it is read in the afternoon too
	stays  int     // days until it is closed
}

var kinds = map[string]kind{
	bitter:  {ale, houseAle, 1.0420, 1.0090, "1000", 19, []int{1, 2, 3, 4, 5, 6, 7, 8, 10, 12}, 3, 13},
	porter:  {ale, houseAle, 1.0560, 1.0140, "1000", 19.5, []int{1, 2, 3, 4, 5, 6, 7, 8, 9, 11, 13, 15, 18}, 3, 19},
	harvest: {cider, ciderYeast, 1.0500, 0.9990, "1500", 16, []int{1, 2, 3, 5, 7, 9, 11, 14, 17, 20, 24, 28, 32, 36, 41}, 0, 43},
	dry:     {cider, ciderYeast, 1.0480, 0.9970, "1500", 15, []int{1, 2, 4, 6, 8, 10, 12, 15, 18, 21, 25, 29, 33, 38}, 0, 40},
	meadow:  {mead, meadYeast, 1.0920, 1.0080, "600", 21, []int{1, 2, 3, 5, 7, 10, 13, 16, 20, 25, 30, 36, 42, 50, 58, 66}, 0, 68},
}

// planned is one batch.
type planned struct {
	id, product, vessel string
	month               time.Month
	day                 int
	gen                 int
	parent              string
	hydrometer          string
	limit               string  // SG at which a forced ferment ended
	stuck               float64 // SG above the usual end at which it stops
	cold                bool    // cold tank
}

const stuckBy = 0.006

var season = []planned{
	{id: "LB-01", product: bitter, vessel: "T1", month: time.January, day: 13, gen: 1, hydrometer: old, limit: "1.0075"},
	{id: "LB-02", product: bitter, vessel: "T2", month: time.January, day: 27, gen: 2, parent: "LB-01", hydrometer: brewery},
	{id: "LB-03", product: bitter, vessel: "T1", month: time.February, day: 10, gen: 3, parent: "LB-02", hydrometer: cellar, limit: "1.0080"},
	{id: "LB-04", product: bitter, vessel: "T2", month: time.March, day: 3, gen: 4, parent: "LB-03", hydrometer: old},
	{id: "LB-05", product: bitter, vessel: "T1", month: time.March, day: 24, gen: 5, parent: "LB-04", hydrometer: brewery, limit: "1.0080", stuck: stuckBy},
	{id: "LB-06", product: bitter, vessel: "T2", month: time.April, day: 14, gen: 1, hydrometer: brewery, limit: "1.0080"},
	{id: "LB-07", product: bitter, vessel: "T1", month: time.May, day: 5, gen: 2, parent: "LB-06", hydrometer: brewery},
	{id: "LB-08", product: bitter, vessel: "T2", month: time.May, day: 26, gen: 3, parent: "LB-07", hydrometer: brewery},
	{id: "LB-09", product: bitter, vessel: "T1", month: time.June, day: 9, gen: 4, parent: "LB-08", hydrometer: cellar, limit: "1.0080"},
	{id: "LB-10", product: bitter, vessel: "T2", month: time.June, day: 30, gen: 5, parent: "LB-09", hydrometer: brewery},
	{id: "LB-11", product: bitter, vessel: "T1", month: time.July, day: 21, gen: 1, hydrometer: cellar},
	{id: "LB-12", product: bitter, vessel: "T2", month: time.August, day: 18, gen: 2, parent: "LB-11", hydrometer: brewery, limit: "1.0080"},
	{id: "LB-13", product: bitter, vessel: "T1", month: time.September, day: 15, gen: 3, parent: "LB-12", hydrometer: cellar},
	{id: "LB-14", product: bitter, vessel: "T2", month: time.October, day: 13, gen: 4, parent: "LB-13", hydrometer: cellar},
	{id: "LB-15", product: bitter, vessel: "T1", month: time.October, day: 27, gen: 5, parent: "LB-14", hydrometer: brewery, cold: true},
	{id: "LB-16", product: bitter, vessel: "T2", month: time.November, day: 17, gen: 1, hydrometer: brewery, limit: "1.0080"},
	{id: "LB-17", product: bitter, vessel: "T1", month: time.November, day: 24, gen: 2, parent: "LB-16", hydrometer: cellar},

	{id: "NP-01", product: porter, vessel: "T3", month: time.January, day: 20, gen: 2, parent: "LB-01", hydrometer: plato},
	{id: "NP-02", product: porter, vessel: "T4", month: time.March, day: 10, gen: 4, parent: "LB-03", hydrometer: plato, limit: "1.0130"},
	{id: "NP-03", product: porter, vessel: "T3", month: time.May, day: 12, gen: 2, parent: "LB-06", hydrometer: plato},
	{id: "NP-04", product: porter, vessel: "T4", month: time.September, day: 29, gen: 3, parent: "LB-12", hydrometer: plato},
	{id: "NP-05", product: porter, vessel: "T3", month: time.November, day: 10, gen: 5, parent: "LB-14", hydrometer: plato},

	{id: "HC-01", product: harvest, vessel: "T5", month: time.January, day: 15, gen: 1, hydrometer: brewery},
	{id: "HC-02", product: harvest, vessel: "T6", month: time.March, day: 5, gen: 1, hydrometer: brewery},
	{id: "HC-03", product: harvest, vessel: "T5", month: time.July, day: 2, gen: 1, hydrometer: cellar},
	{id: "HC-04", product: harvest, vessel: "T6", month: time.September, day: 8, gen: 1, hydrometer: brewery},
	{id: "HC-05", product: harvest, vessel: "T5", month: time.October, day: 20, gen: 1, hydrometer: brewery},
	{id: "HC-06", product: harvest, vessel: "T6", month: time.November, day: 3, gen: 2, parent: "HC-04", hydrometer: cellar},

	{id: "OD-01", product: dry, vessel: "T7", month: time.February, day: 3, gen: 1, hydrometer: cellar},
	{id: "OD-02", product: dry, vessel: "T8", month: time.April, day: 21, gen: 1, hydrometer: brewery},
	{id: "OD-03", product: dry, vessel: "T7", month: time.July, day: 20, gen: 1, hydrometer: brewery},
	{id: "OD-04", product: dry, vessel: "T8", month: time.October, day: 30, gen: 1, hydrometer: brewery},

	{id: "MM-01", product: meadow, vessel: "FV1", month: time.January, day: 22, gen: 1, hydrometer: plato},
	{id: "MM-02", product: meadow, vessel: "FV2", month: time.April, day: 8, gen: 1, hydrometer: plato},
	{id: "MM-03", product: meadow, vessel: "FV1", month: time.June, day: 25, gen: 1, hydrometer: plato},
	{id: "MM-04", product: meadow, vessel: "FV2", month: time.October, day: 8, gen: 1, hydrometer: plato},
}
