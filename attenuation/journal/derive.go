package journal

import (
	"cmp"
	"fmt"
	"slices"
	"time"

	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
	"gylebook/tempcorr"
)

// Value is one reading, corrected. SG and Extract are what figures are made of.
type Value struct {
	Number     int64
	By         string
	Void       bool
	VoidReason string
	Source     Reading // as typed
	Typed      asread.Reading
	Temp       asread.Temperature
	Result     tempcorr.Result
	SG         gravity.SG    // 20/20, the mean of the replicates where there are any
	Extract    gravity.Plato // apparent, % mass, of SG
	OE         gravity.Plato // effective original extract at its time, % mass; 0 unknown
	OG         gravity.SG    // of OE, 20/20; 0 unknown
	// Attenuation is nil when it cannot be given; Why says the reason.
	Attenuation *attenuation.Attenuation
	Why         string
	// Alcohol is by the book's method, nil when it cannot be given; AlcoholWhy says
	// the reason.
	Alcohol    *attenuation.Alcohol
	AlcoholWhy string
	Suspect    bool // kept against doubt
	Mean       bool // one of several readings in the same minute, whose mean is used
	Replicates int  // how many there are; 0 when it stands alone
	Notes      []method.Note
	Err        error // could not be corrected
}

// Counts reports whether figures may be made of the value: it is not void, not
// suspect, and could be corrected.
func (v *Value) Counts() bool { return !v.Void && !v.Suspect && v.Err == nil }

// View is a batch with everything that is derived from it.
type View struct {
	Record *Record
	OG     *OriginalGravity // nil when not known
	Basis  []BasisStep      // in time order
	Limit  *gravity.Plato   // apparent extract of the forced ferment, % mass
	Values []Value          // in time order, void ones included
	// Pitched is when fermentation began: as entered, else the first reading that
	// is not void; zero when not known.
	Pitched time.Time
	// Primed is when priming was added first; zero when it was not. A conditioned
	// product counts at its expected strength.
	Primed time.Time
	Notes  []method.Note

	abv  method.Entry[attenuation.ABVFunc]
	held []change // after each event
}

// Derive corrects every reading of a batch and gives its figures. What cannot be
// given is nil with a reason; it never fails as a whole. A nil book knows no
// instruments.
func Derive(rec *Record, book *Book) View { return derive(rec, book, span{}) }

// DeriveLast is Derive with the readings of the newest n minutes that count, and
// what lies between them; the others are left out, not corrected. Everything else
// is as in Derive.
func DeriveLast(rec *Record, book *Book, n int) View {
	return derive(rec, book, span{last: max(0, n), limited: true})
}

// span narrows the readings that are corrected.
type span struct {
	limited bool
	last    int       // the newest minutes that count
	until   time.Time // readings taken later are left out; zero is no end
}

func derive(rec *Record, book *Book, s span) View {
	if book == nil {
		book = NewBook(nil)
	}
	v := View{Record: rec, abv: book.ABV}
	if v.abv.Fn == nil {
		v.abv = attenuation.ABVMethods.Default()
	}
	if rec == nil {
		return v
	}
	readings := ordered(rec.Readings, func(r Reading) time.Time { return r.TakenAt })
	v.original(book)
	v.steps(book)
	v.limit()
	v.dates(readings)
	v.values(book, readings, s)
	v.replicates()
	for k := range v.Values {
		v.figures(&v.Values[k])
	}
	return v
}

// ordered returns list in the order of its own time, then of the number, whatever
// order it came in.
func ordered[B any](list []Numbered[B], at func(B) time.Time) []Numbered[B] {
	byTime := func(a, b Numbered[B]) int {
		return cmp.Or(at(a.Body).Compare(at(b.Body)), cmp.Compare(a.Number, b.Number))
	}
	if slices.IsSortedFunc(list, byTime) {
		return list
	}
	list = slices.Clone(list)
	slices.SortStableFunc(list, byTime)
	return list
}

func (v *View) note(code, format string, args ...any) {
	v.Notes = append(v.Notes, method.Note{Code: code, Text: fmt.Sprintf(format, args...)})
}

// limit takes the newest forced ferment that is not void.
func (v *View) limit() {
	for _, l := range ordered(v.Record.Limits, func(l Limit) time.Time { return l.At }) {
		if l.Void {
			continue
		}
		f, err := l.Body.Gravity.figures(gravity.Pair2020)
		if err != nil {
			v.note(NoteUnused, "limit of attenuation (entry %d) not used: %v", l.Number, err)
			continue
		}
		v.Limit = &f.Extract
	}
}

// figures converts a gravity that needs no correction.
func (t Typed) figures(pair gravity.Pair) (gravity.Figures, error) {
	r, err := t.Reading()
	if err != nil {
		return gravity.Figures{}, err
	}
	f, err := gravity.NewConverter().Convert(r.Scale, r.Value, pair)
	if err == nil && !finite(float64(f.SG), float64(f.Extract)) {
		err = gravity.CheckSG(f.SG)
	}
	return f, err
}

// dates finds when the batch was pitched and when it was primed.
func (v *View) dates(readings []Numbered[Reading]) {
	if p := v.Record.Batch.Pitched; p != nil {
		v.Pitched = *p
	} else if k := slices.IndexFunc(readings, func(r Numbered[Reading]) bool { return !r.Void }); k >= 0 {
		v.Pitched = readings[k].Body.TakenAt
	}
	for _, e := range v.Record.Events {
		if !e.Void && e.Body.What == Priming && (v.Primed.IsZero() || e.Body.At.Before(v.Primed)) {
			v.Primed = e.Body.At
		}
	}
}
