package season

import (
	"time"

	"gylebook/attenuation"
	"gylebook/attenuation/journal"
	"gylebook/gravity"
)

// Row is one batch of a season. A figure that is not known is nil, or zero where
// zero cannot be meant; Why says the reason.
type Row struct {
	Batch      string
	Product    string
	Yeast      string
	Generation int // 0 when not known
	Parent     string
	Vessel     string // where it is, or was at the end
	Pitched    time.Time
	Open       bool
	Readings   int       // that are neither void, nor kept as suspect, nor by refractometer
	LastAt     time.Time // of the last reading that counts; zero when there is none
	// Days from pitching to the last fall; see LastFall.
	Days *float64

	OG gravity.SG    // effective at the last reading, 20/20; 0 when not known
	OE gravity.Plato // of OG, % mass
	SG gravity.SG    // last, 20/20
	AE gravity.Plato // of SG, % mass
	// Attenuation of the last reading that counts, nil when it cannot be given.
	Attenuation *attenuation.Attenuation
	Why         string // for which attenuation is nil
	ABV         *gravity.VolPct
	ABVWhy      string // for which ABV is nil
	Method      string // id of the ABV method
	// LimitDifference is how many points of % the apparent attenuation lies below
	// its limit; nil without a forced ferment.
	LimitDifference *float64
	// Course is of closed batches whose generation is known; else nil.
	Course *Course
}

// noReading is why a batch that was never read has no figures.
const noReading = "no reading that counts"

// Of returns the row of one batch. A nil book knows no instruments.
func Of(rec *journal.Record, book *journal.Book) Row { return rowOf(rec, book, newTexts()) }

func rowOf(rec *journal.Record, book *journal.Book, known *texts) Row {
	b := rec.Batch
	row := Row{
		Batch: b.ID, Product: b.Product, Yeast: b.Yeast, Generation: b.Generation, Parent: b.Parent,
		Open: rec.Closed == nil, Readings: counted(rec, book), Method: abvMethod(book),
	}
	v := journal.DeriveLast(rec, book, 1)
	row.Vessel, row.Pitched = v.Vessel(), v.Pitched
	last := v.Last()
	if last == nil {
		row.Why, row.ABVWhy = noReading, noReading
		return row
	}
	row.LastAt = last.Source.TakenAt
	row.SG, row.AE, row.OG, row.OE = last.SG, last.Extract, last.OG, last.OE
	row.Attenuation, row.Why = last.Attenuation, last.Why
	if last.Alcohol != nil {
		row.ABV = &last.Alcohol.ABV
	}
	row.ABVWhy = last.AlcoholWhy
	if v.Limit != nil && last.Attenuation != nil {
		d := attenuation.LimitDifference(last.OE, last.Extract, *v.Limit)
		row.LimitDifference = &d
	}
	w := newWalk(v, book, known)
	row.Course = w.course()
	if fall, ok := w.fell(); ok {
		if days, ok := v.Days(fall); ok {
			row.Days = &days
		}
	}
	return row
}

func abvMethod(book *journal.Book) string {
	if book == nil || book.ABV.Fn == nil {
		return attenuation.ABVMethods.Default().ID
	}
	return book.ABV.ID
}

func counted(rec *journal.Record, book *journal.Book) int {
	n := 0
	for k := range rec.Readings {
		r := &rec.Readings[k]
		if !r.Void && r.Body.Keep == "" && !byRefractometer(book, r.Body.Instrument) {
			n++
		}
	}
	return n
}

func byRefractometer(book *journal.Book, id string) bool {
	if book == nil || id == "" {
		return false
	}
	rec := book.Instruments[id]
	return rec != nil && rec.Instrument.Type == journal.Refractometer
}
