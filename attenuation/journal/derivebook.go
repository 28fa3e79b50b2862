package journal

import (
	"fmt"
	"math"
	"strings"
	"time"

	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
	"gylebook/tempcorr"
)

// Codes of the notes of this package.
const (
	NoteOverdue   = "overdue"   // an instrument not checked for a year
	NoteRetired   = "retired"   // read with an instrument out of use
	NoteReplicate = "replicate" // read again in the same minute
	NoteGassy     = "gassy"     // not degassed
	NoteBasis     = "basis"     // the effective original extract is lost
	NoteUnused    = "unused"    // an entry that could not be used
)

// Book is what figures are derived with besides the batch itself.
type Book struct {
	Instruments map[string]*InstrumentRecord
	ABV         method.Entry[attenuation.ABVFunc]
	// OE tells the original extract of another batch, for blends; nil knows none.
	OE func(batch string) (gravity.Plato, bool)
	// Plain leaves the uncertainty budgets out, for figures over many batches.
	Plain bool
}

// NewBook returns a book of these instruments with the default ABV method.
func NewBook(list []*InstrumentRecord) *Book {
	b := &Book{Instruments: make(map[string]*InstrumentRecord, len(list)), ABV: attenuation.ABVMethods.Default()}
	for _, r := range list {
		if r != nil {
			b.Instruments[r.Instrument.ID] = r
		}
	}
	return b
}

// InstrumentError says that an instrument cannot give what was asked.
type InstrumentError struct {
	ID   string
	Why  string // "not in the journal", "a refractometer, wanted a hydrometer"
	Tip  string
	base error
}

func (e *InstrumentError) Error() string { return fmt.Sprintf("instrument %.40q is %s", e.ID, e.Why) }

// Hint says what to do instead.
func (e *InstrumentError) Hint() string { return e.Tip }

// Unwrap returns ErrNotFound for an unknown instrument.
func (e *InstrumentError) Unwrap() error { return e.base }

func (b *Book) find(id string) (*InstrumentRecord, error) {
	if rec := b.Instruments[id]; rec != nil {
		return rec, nil
	}
	known := make([]string, 0, len(b.Instruments))
	for k := range b.Instruments {
		known = append(known, k)
	}
	tip := "register it with instrument add"
	if like := Nearest(id, known, 3); len(like) > 0 {
		tip = "known are " + strings.Join(like, ", ")
	}
	return nil, &InstrumentError{ID: id, Why: "not in the journal", Tip: tip, base: ErrNotFound}
}

// Hydrometer returns the instrument as it was at a time: its corrections come from
// the latest certificate or check at or before then. "" is a glass 20/20 instrument
// of which nothing else is known; its scale is that of the reading (see
// CorrectTyped). Notes say that the instrument was retired by then, or that it was
// last checked more than a year before. It returns an *InstrumentError, which wraps
// ErrNotFound for an unknown one, or the error of a record that does not parse.
func (b *Book) Hydrometer(id string, at time.Time) (tempcorr.Hydrometer, []method.Note, error) {
	if id == "" {
		return tempcorr.New(gravity.ScaleSG, gravity.Pair2020, tempcorr.Bodies[0]), nil, nil
	}
	rec, err := b.find(id)
	if err != nil {
		return tempcorr.Hydrometer{}, nil, err
	}
	if rec.Instrument.Type != Hydrometer {
		return tempcorr.Hydrometer{}, nil, &InstrumentError{
			ID: id, Why: "a " + rec.Instrument.Type + ", wanted a hydrometer", Tip: "alcohol distorts a refractometer; read a hydrometer",
		}
	}
	h, err := rec.Instrument.hydrometer()
	if err != nil {
		return h, nil, wrapf(err, "instrument %s", id)
	}
	since, err := rec.corrections(&h, at)
	if err != nil {
		return h, nil, wrapf(err, "instrument %s", id)
	}
	var notes []method.Note
	if rec.retiredAt(at) {
		notes = append(notes, method.Note{Code: NoteRetired, Text: fmt.Sprintf("%s was out of use: %s", id, rec.Retired.Body.Reason)})
	}
	if at.After(since.AddDate(1, 0, 0)) {
		notes = append(notes, method.Note{Code: NoteOverdue, Text: fmt.Sprintf("%s was last checked on %s, more than a year before", id, since.Format(time.DateOnly))})
	}
	return h, notes, nil
}

func (rec *InstrumentRecord) retiredAt(at time.Time) bool {
	return rec.Retired != nil && !at.Before(rec.Retired.Body.At)
}

// numbers reads texts in turn, "" as 0, and keeps the first error.
type numbers struct{ err error }

func (n *numbers) read(text string) float64 {
	if text == "" || n.err != nil {
		return 0
	}
	v, err := asread.ParseNumber(text)
	n.err = err
	return v.Float()
}

func (i Instrument) hydrometer() (tempcorr.Hydrometer, error) {
	scale, err := gravity.FindScale(i.Scale)
	if err != nil {
		return tempcorr.Hydrometer{}, err
	}
	basis, err := asread.ParsePair(i.Basis)
	if err != nil {
		return tempcorr.Hydrometer{}, err
	}
	body, err := tempcorr.FindBody(i.Body)
	if err != nil {
		return tempcorr.Hydrometer{}, err
	}
	var n numbers
	h := tempcorr.Hydrometer{
		ID: i.ID, Scale: scale, Basis: basis, Body: body, ReadAt: tempcorr.Meniscus(i.ReadAt),
		Division: n.read(i.Division), MaxError: n.read(i.MaxError),
		StemMM: n.read(i.StemMM), MassG: n.read(i.MassG), Adjusted: n.read(i.Tension),
	}
	return h, n.err
}

// corrections fills the certificate in force at a time and returns when it was
// made; without one, when the instrument came into use. Of two at the same moment
// the one entered later holds.
func (rec *InstrumentRecord) corrections(h *tempcorr.Hydrometer, at time.Time) (time.Time, error) {
	since, number := rec.Instrument.Since, int64(-1)
	later := func(t time.Time, n int64) bool {
		return !t.After(at) && (number < 0 || t.After(since) || t.Equal(since) && n > number)
	}
	var cert *Certificate
	var check *Check
	for k := range rec.Certificates {
		if c := &rec.Certificates[k]; !c.Void && later(c.Body.At, c.Number) {
			since, number, cert = c.Body.At, c.Number, &c.Body
		}
	}
	for k := range rec.Checks {
		if c := &rec.Checks[k]; !c.Void && later(c.Body.At, c.Number) {
			since, number, cert, check = c.Body.At, c.Number, nil, &c.Body
		}
	}
	var err error
	switch {
	case check != nil:
		h.InLiquid = check.Liquid == InDrink
		h.Certificate, err = check.point(*h)
	case cert != nil:
		var n numbers
		for _, p := range cert.Points {
			h.Certificate = append(h.Certificate, tempcorr.Certificate{Reading: n.read(p.Reading), Correction: n.read(p.Correction), U: n.read(p.U)})
		}
		err = n.err
	}
	return since, err
}

// point is a check as one calibration point. Its U (k=2) is what the resolution of
// the instrument leaves, and that of the value it was compared with in the drink.
func (c Check) point(h tempcorr.Hydrometer) ([]tempcorr.Certificate, error) {
	found, err := c.Found.Reading()
	if err != nil {
		return nil, err
	}
	at, step, err := onScale(h, found)
	if err != nil {
		return nil, err
	}
	if h.Division > 0 {
		step = h.Division
	}
	sum := step * step
	if c.Liquid == InDrink {
		expected, err := c.Expected.Reading()
		if err != nil {
			return nil, err
		}
		_, s, err := onScale(h, expected)
		if err != nil {
			return nil, err
		}
		sum += s * s
	}
	var n numbers
	// Rectangular over one division each: half of it over √3, twice (k = 2).
	point := tempcorr.Certificate{Reading: at, Correction: n.read(c.Correction), U: math.Sqrt(sum) / math.Sqrt(3)}
	return []tempcorr.Certificate{point}, n.err
}
