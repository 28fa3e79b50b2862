package selfcheck

import (
	"fmt"

	"gylebook/testdata/published"
)

// checks says who reads which file. Every file has one reader.
var checks = map[string]func(Relations, *tally){
	"balling_1865_example":           ballingExample,
	"brews_usda1917":                 brews,
	"ethanol_points":                 ethanolPoints,
	"ethanol_usp29":                  ethanolTable,
	"extract_g_per_l_2020":           extractPerLitre,
	"hydrometer_temp_bigelow1923_t8": bigelow,
	"hydrometer_temp_lyons1992":      lyons,
	"individuals_chart":              individualsChart,
	"must_oiv_as2_02_t2":             must,
	"refractometer_temp_crc":         refractometerTable("refractometer-crc"),
	"refractometer_temp_oiv":         refractometerTable("refractometer-oiv"),
	"scale_points":                   scalePoints,
	"scales_gnu_units":               gnuUnits,
	"sucrose_crc_20c":                sucroseCRC,
	"sucrose_density_15_20c":         sucrose1520,
	"sucrose_nbs_c440_t114":          c440,
	"uk_beer_duty_factors":           dutyBands,
	"water_iapws95":                  waterTable,
	"water_points":                   waterPoints,
	"worked_examples":                workedExamples,
}

// Run recomputes the published rows of every file with the relations given. The
// outcomes come in the order of the files, always the same. An error says that a
// row could not be read, that a file has no reader or that a registry lacks a
// relation which a file is for; a relation that misses is no error but an Outcome
// that has not passed.
func Run(r Relations) ([]Outcome, error) {
	files, err := published.All()
	if err != nil {
		return nil, err
	}
	var outcomes []Outcome
	for _, f := range files {
		check, ok := checks[f.Name]
		if !ok {
			return nil, fmt.Errorf("published file %s is read by no check", f.Name)
		}
		t := &tally{file: f}
		check(r, t)
		if t.err != nil {
			return nil, t.err
		}
		if len(t.outcomes) == 0 {
			return nil, fmt.Errorf("published file %s compares nothing", f.Name)
		}
		for _, o := range t.outcomes {
			outcomes = append(outcomes, *o)
		}
	}
	return outcomes, nil
}
