package exchange

import (
	"fmt"
	"slices"
	"strings"

	"gylebook/tables/dialect"
)

// Schema is the version of the table of readings.
const Schema = "1"

// Columns of the table of readings, in order.
const (
	colNumber     = "reading_id"
	colBatch      = "batch_id"
	colVessel     = "vessel"
	colTaken      = "taken_at"
	colQuality    = "time_quality"
	colElapsed    = "elapsed_h"
	colText       = "entered_text"
	colScale      = "entered_scale"
	colTemp       = "sample_temp_c"
	colDegassed   = "degassed"
	colInstrument = "instrument_id"
	colABVMethod  = "abv_method"
	colGeneration = "yeast_generation"
	colStatus     = "status"
	colReason     = "reason"
	colOperator   = "operator"
	colSchema     = "schema_version"
	colProduct    = "product"
	colPitched    = "pitched_at"
	colOG         = "og_text"
	colVolume     = "batch_volume_l"
	colNote       = "note" // read, not written
)

// Columns returns the names of the table of readings in order.
func Columns() []string {
	out := []string{
		colNumber, colBatch, colVessel, colTaken, colQuality, colElapsed, colText, colScale, colTemp, colDegassed, colInstrument,
	}
	for _, f := range figureColumns {
		out = append(out, f.name)
	}
	return append(out, colABVMethod, colGeneration, colStatus, colReason, colOperator, colSchema, colProduct, colPitched, colOG, colVolume)
}

// numeric reports whether the cells of a column begin with a number that may have
// decimals.
func numeric(name string) bool {
	name = columnName(name)
	switch name {
	case colElapsed, colText, colTemp, colOG, colVolume:
		return true
	}
	return figureIndex(name) >= 0
}

func columnName(header string) string { return strings.ToLower(strings.TrimSpace(header)) }

// Values of status.
const (
	statusOK          = "ok"
	statusVoid        = "void"
	statusSuspect     = "suspect"     // kept against doubt
	statusUncorrected = "uncorrected" // could not be corrected; reason says why
)

// Profile is a form in which the table of readings is written.
type Profile string

// The profiles. All are UTF-8 with CR LF.
const (
	Standard      Profile = "standard"       // comma, decimal point, no byte order mark
	SpreadsheetEU Profile = "spreadsheet-eu" // semicolon, decimal comma, byte order mark
	Tab           Profile = "tab"            // tab, decimal point, no byte order mark
)

// Profiles lists the profiles in the order of help.
func Profiles() []Profile { return []Profile{Standard, SpreadsheetEU, Tab} }

// ParseProfile reads the name of a profile. An unknown one is an error that lists
// the known ones.
func ParseProfile(name string) (Profile, error) {
	p := Profile(strings.ToLower(strings.TrimSpace(name)))
	if slices.Contains(Profiles(), p) {
		return p, nil
	}
	return "", fmt.Errorf("unknown profile %.40q, known: %s, %s, %s", name, Standard, SpreadsheetEU, Tab)
}

// Dialect returns the form of the profile.
func (p Profile) Dialect() dialect.Dialect {
	switch p {
	case SpreadsheetEU:
		return dialect.Dialect{Comma: ';', Decimal: ',', BOM: true, CRLF: true}
	case Tab:
		return dialect.Dialect{Comma: '\t', Decimal: '.', CRLF: true}
	}
	return dialect.Dialect{Comma: ',', Decimal: '.', CRLF: true}
}
