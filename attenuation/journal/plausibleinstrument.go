package journal

import (
	"fmt"
	"time"

	"gylebook/gravity/method"
	"gylebook/tempcorr"
)

// instrument refuses an instrument that cannot have given the reading. ok is false
// for a refractometer, whose readings of a ferment stay a type of their own.
func (s Situation) instrument(r Reading, notes []method.Note) (_ []method.Note, _ *Hold, ok bool) {
	if r.Instrument == "" {
		return notes, nil, true
	}
	final := func(code string, err error) ([]method.Note, *Hold, bool) {
		return nil, &Hold{Code: code, Text: err.Error(), Tip: hintOf(err), Final: true}, false
	}
	rec, err := s.Book.find(r.Instrument)
	if err != nil {
		return final(HoldInstrument, err)
	}
	if rec.retiredAt(r.TakenAt) {
		return nil, &Hold{
			Code: HoldRetired, Final: true, Tip: "name another instrument with --instrument",
			Text: fmt.Sprintf("instrument %s was taken out of use on %s: %s", r.Instrument, rec.Retired.Body.At.Format(time.DateOnly), rec.Retired.Body.Reason),
		}, false
	}
	if rec.Instrument.Type == Refractometer {
		text := "alcohol distorts this reading; use a hydrometer for decisions"
		return append(notes, method.Note{Code: method.Caution, Text: text}), nil, false
	}
	h, _, err := s.Book.Hydrometer(r.Instrument, r.TakenAt)
	if err != nil {
		return final(HoldInstrument, err)
	}
	hold := rec.Instrument.outOfRange(h, r)
	return notes, hold, hold == nil
}

// outOfRange returns a hold for a reading that the instrument's scale does not have.
func (i Instrument) outOfRange(h tempcorr.Hydrometer, r Reading) *Hold {
	typed, err := r.Gravity.Reading()
	if err != nil {
		return nil
	}
	v, step, err := onScale(h, typed)
	if err != nil {
		return nil
	}
	var n numbers
	lo, hi := n.read(i.RangeLo), n.read(i.RangeHi)
	if n.err != nil {
		return nil
	}
	// A reading taken over from another scale is only as exact as its last place.
	slack := 1e-9
	if typed.Scale != h.Scale {
		slack = step / 2
	}
	if (i.RangeLo == "" || v >= lo-slack) && (i.RangeHi == "" || v <= hi+slack) {
		return nil
	}
	return &Hold{
		Code: HoldOutOfRange, Final: true, Tip: "check the reading, or name the instrument that was used with --instrument",
		Text: fmt.Sprintf("read %s, wanted %s to %s on %s", typed.ReadAs(), orOpen(i.RangeLo), orOpen(i.RangeHi), i.ID),
	}
}

func orOpen(text string) string {
	if text == "" {
		return "anything"
	}
	return text
}
