package journal

import (
	"fmt"
	"slices"
	"strings"
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
			v.note(NoteBasis, "%s (entry %d): attenuation and alcohol are not known from here on; %s", a.why, a.event.Number, v.remedy(a))
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
	now, missing := v.start(), noVolume
	var list []change
	for _, e := range ordered(slices.Concat(v.Record.Events, v.given()), eventAt) {
		if e.Void {
			continue
		}
		out := e.Body.From != "" && e.Body.From == v.Record.Batch.ID && e.Body.Batch != e.Body.From
		c := change{event: e, changes: !out && changesExtract(e.Body.What)}
		if out {
			now, missing = less(now, e.Body.VolumeL, e.Body.MassKg, missing)
		} else if c.changes {
			var w attenuation.Wort
			w, c.why = e.Body.addition(book)
			if c.why == "" && v.OG != nil && !now.Known() {
				c.why = missing
			}
			if c.why != "" || v.OG == nil {
				now = attenuation.Wort{}
			} else {
				now = now.Add(w)
			}
		} else if e.Body.What != Priming {
			now, missing = less(now, e.Body.VolumeL, "", missing)
		}
		c.wort = now
		list = append(list, c)
	}
	return list
}

// start is the batch as it was pitched.
func (v *View) start() attenuation.Wort {
	litres, ok := number(v.Record.Volume())
	if !ok || v.OG == nil {
		return attenuation.Wort{}
	}
	return attenuation.FromVolume(litres, v.OG.Extract, 20)
}

// remedy is what closes a gap.
func (v *View) remedy(a change) string {
	anew := fmt.Sprintf("type gylebook void %d --reason TEXT and enter it anew", a.event.Number)
	switch _, mass := number(a.event.Body.MassKg); {
	case a.why == noVolume:
		return "type gylebook batch volume " + v.Record.Batch.ID + " 100L, with its own volume"
	case strings.HasSuffix(a.why, "without mass"):
		return anew + " with --mass"
	case strings.HasSuffix(a.why, "without mass and gravity") && !mass:
		return anew + " with --mass and --gravity"
	case strings.HasSuffix(a.why, "without mass or volume"):
		return anew + " with --volume"
	case strings.HasSuffix(a.why, "gravity"), a.event.Body.What == Blend:
		return anew + " with --gravity"
	}
	return anew
}

// AmountAt returns the batch after every event until t, at its original state; the
// zero Wort when its volume is not known.
func (v View) AmountAt(t time.Time) attenuation.Wort {
	now := v.start()
	for _, c := range v.held {
		if c.event.Body.At.After(t) {
			break
		}
		now = c.wort
	}
	return now
}

// given are the blends of this batch into others.
func (v *View) given() []Numbered[Event] {
	return slices.DeleteFunc(slices.Clone(v.Record.Given), func(e Numbered[Event]) bool { return e.Body.Batch == v.Record.Batch.ID })
}

// overdrawn is why a batch of which more was taken than it held is not known.
const overdrawn = "more taken out than was left"

// less takes a mass, else litres at 20 °C, away. More than there is leaves nothing
// known, and says so in place of what was missing before.
func less(w attenuation.Wort, volume, mass, missing string) (attenuation.Wort, string) {
	if !w.Known() {
		return w, missing
	}
	lost, ok := number(mass)
	if !ok {
		litres, given := number(volume)
		if !given {
			return w, missing
		}
		lost = attenuation.FromVolume(litres, w.Extract, 20).MassKg
	}
	if !(lost < w.MassKg) {
		return attenuation.Wort{}, overdrawn
	}
	w.MassKg -= lost
	return w, missing
}
