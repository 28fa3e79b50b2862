package journal

import (
	"slices"

	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// changesExtract reports whether a kind of event changes the original extract.
// Racking, a move, dry hops and a crash do not; priming counts toward the expected
// strength alone.
func changesExtract(what string) bool {
	return slices.Contains([]string{Sugar, TopUp, Dilution, Blend, Fruit}, what)
}

// number parses a positive number; "" and what does not parse are none.
func number(text string) (float64, bool) {
	if text == "" {
		return 0, false
	}
	v, err := asread.ParseNumber(text)
	return v.Float(), err == nil && v.Float() > 0
}

// addition returns what an event added, at its original state, or what is missing.
// Volumes are at 20 °C. The gravity of a blend is its original gravity; without one
// it is the other batch's. Sugar is 100 % extract unless it has a gravity.
func (e Event) addition(book *Book) (w attenuation.Wort, why string) {
	switch e.What {
	case Sugar:
		return e.sugar()
	case Dilution:
		return e.of(0)
	case Fruit:
		_, mass := number(e.MassKg)
		if extract, ok := e.extract(); ok && mass {
			return e.of(extract)
		}
		return w, "fruit added without mass and gravity"
	case Blend:
		extract, ok := e.extract()
		if !ok && book != nil && book.OE != nil && e.Gravity.Text == "" {
			extract, ok = book.OE(e.From)
		}
		if !ok {
			return w, "blend added, original gravity of " + e.From + " not known"
		}
		return e.of(extract)
	}
	extract, ok := e.extract()
	if !ok {
		return w, e.What + " added without gravity"
	}
	return e.of(extract)
}

// sugar returns sugar or syrup, for an addition and for priming.
func (e Event) sugar() (attenuation.Wort, string) {
	if e.Gravity.Text != "" {
		extract, ok := e.extract()
		if !ok {
			return attenuation.Wort{}, e.What + " added, its gravity cannot be read"
		}
		return e.of(extract)
	}
	kg, ok := number(e.MassKg)
	if !ok {
		return attenuation.Wort{}, e.What + " added without mass"
	}
	return attenuation.Wort{MassKg: kg, Extract: 100}, ""
}

// extract returns the extract of the gravity typed; a mass share stands as it is,
// which takes in syrups beyond the fits.
func (e Event) extract() (gravity.Plato, bool) {
	if e.Gravity.Text == "" {
		return 0, false
	}
	if r, err := e.Gravity.Reading(); err == nil && r.Scale.IsMass() {
		return gravity.Plato(r.Value), true
	}
	f, err := e.Gravity.figures(gravity.Pair2020)
	return f.Extract, err == nil
}

// of returns the mass, else the volume, of what was added with this extract.
func (e Event) of(extract gravity.Plato) (w attenuation.Wort, why string) {
	if kg, ok := number(e.MassKg); ok {
		w = attenuation.Wort{MassKg: kg, Extract: extract}
	} else if litres, ok := number(e.VolumeL); ok {
		w = attenuation.FromVolume(litres, extract, 20)
	} else {
		return w, e.What + " added without mass or volume"
	}
	if !w.Known() {
		return attenuation.Wort{}, e.What + " added, its amount cannot be"
	}
	return w, ""
}
