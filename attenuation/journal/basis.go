package journal

import (
	"slices"
	"time"

	"gylebook/attenuation"
	"gylebook/gravity"
)

// BasisStep is the effective original extract after an event that changes it.
type BasisStep struct {
	At     time.Time
	Number int64         // of the event
	OE     gravity.Plato // % mass; 0 when not known
	SG     gravity.SG    // 20/20, of OE; 0 when not known
	MassKg float64       // of the batch at its original state; 0 when not known
	Why    string        // what was done, or what is missing
	// Broken says that the original extract is lost from here on, until the event
	// that lacks something is voided and entered anew.
	Broken bool
}

// Reasons for which a figure is not given.
const (
	noOG     = "original gravity not known"
	noVolume = "batch volume not known"
)

// OEAt returns the effective original extract [% mass] and its SG 20/20 that count
// for a reading taken at t, or zeros and the reason. An event counts for what is
// taken after it: a sample drawn at the same moment came before.
func (v View) OEAt(t time.Time) (oe gravity.Plato, sg gravity.SG, why string) {
	if v.OG == nil {
		return 0, 0, noOG
	}
	oe, sg = v.OG.Extract, v.OG.SG
	for _, s := range v.Basis {
		if !s.At.Before(t) {
			break
		}
		if s.Broken {
			// The first gap is what has to be closed.
			return 0, 0, s.Why
		}
		oe, sg = s.OE, s.SG
	}
	if oe <= 0 {
		return 0, 0, "original gravity has no extract"
	}
	return oe, sg, ""
}

// changedBetween reports whether an event after a and not after b changed the
// original extract, or should have.
func (v View) changedBetween(a, b time.Time) bool {
	return slices.ContainsFunc(v.Basis, func(s BasisStep) bool { return !s.At.Before(a) && s.At.Before(b) })
}

func eventAt(e Event) time.Time { return e.At }

// steps follows the original extract through the events by mass balance.
func (v *View) steps(book *Book) {
	var now attenuation.Wort
	broken := ""
	v.held = v.amounts(book)
	for _, a := range v.held {
		now = a.wort
		if !a.changes {
			continue
		}
		s := BasisStep{At: a.event.Body.At, Number: a.event.Number, Why: a.event.Body.What}
		var sg gravity.SG
		if a.why == "" && broken == "" && v.OG != nil {
			var err error
			if sg, err = gravity.Fits.Default().Fn.SG(now.Extract); err != nil || gravity.CheckSG(sg) != nil {
				a.why = "what was added cannot be: " + a.event.Body.What
			}
		}
		if a.why != "" && broken == "" {
			broken = a.why
			v.note(NoteBasis, "%s (entry %d): attenuation and alcohol are not known from here on; void it and enter it anew", a.why, a.event.Number)
		}
		switch {
		case broken != "":
			s.Broken, s.Why = true, broken
		case v.OG == nil:
			s.Why = noOG
		default:
			s.OE, s.SG, s.MassKg = now.Extract, sg, now.MassKg
		}
		v.Basis = append(v.Basis, s)
	}
}

// change is one event and what the batch holds after it.
type change struct {
	event   Numbered[Event]
	wort    attenuation.Wort // at the original state; zero when not known
	changes bool             // the original extract
	why     string           // what is missing
}

// amounts follows the batch's amount through all events that are not void.
func (v *View) amounts(book *Book) []change {
	now := v.start()
	var list []change
	for _, e := range ordered(v.Record.Events, eventAt) {
		if e.Void {
			continue
		}
		c := change{event: e, changes: changesExtract(e.Body.What)}
		if c.changes {
			var w attenuation.Wort
			w, c.why = e.Body.addition(book)
			if c.why == "" && v.OG != nil && !now.Known() {
				c.why = noVolume
			}
			if c.why != "" || v.OG == nil {
				now = attenuation.Wort{}
			} else {
				now = now.Add(w)
			}
		} else if e.Body.What != Priming {
			now = lessLoss(now, e.Body.VolumeL)
		}
		c.wort = now
		list = append(list, c)
	}
	return list
}

// start is the batch as it was pitched.
func (v *View) start() attenuation.Wort {
	litres, ok := number(v.Record.Batch.Volume)
	if !ok || v.OG == nil {
		return attenuation.Wort{}
	}
	return attenuation.FromVolume(litres, v.OG.Extract, 20)
}

// amountAt is the batch after every event until t.
func (v *View) amountAt(t time.Time) attenuation.Wort {
	now := v.start()
	for _, c := range v.held {
		if c.event.Body.At.After(t) {
			break
		}
		now = c.wort
	}
	return now
}

// lessLoss takes litres (at 20 °C) away. More than there is leaves nothing known.
func lessLoss(w attenuation.Wort, volume string) attenuation.Wort {
	litres, ok := number(volume)
	if !ok || !w.Known() {
		return w
	}
	lost := attenuation.FromVolume(litres, w.Extract, 20)
	if !(lost.MassKg < w.MassKg) {
		return attenuation.Wort{}
	}
	w.MassKg -= lost.MassKg
	return w
}
