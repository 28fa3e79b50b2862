package journal

import (
	"slices"

	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/tempcorr"
)

// Reading parses the gravity again, on the scale that it was read on.
func (t Typed) Reading() (asread.Reading, error) {
	scale, err := gravity.FindScale(t.Scale)
	if err != nil {
		return asread.Reading{}, err
	}
	return asread.ParseReading(t.Text, scale)
}

// Temperature parses the temperature again, in the unit that a bare number meant.
func (t TypedTemp) Temperature() (asread.Temperature, error) {
	return asread.ParseTemperature(t.Text, asread.Unit(t.Unit))
}

func checkTyped(what string, t Typed) error {
	if _, err := t.Reading(); err != nil {
		return wrapf(ErrIncomplete, "%s: %v", what, err)
	}
	return nil
}

func checkTemp(t TypedTemp) error {
	if _, err := t.Temperature(); err != nil {
		return wrapf(ErrIncomplete, "temperature: %v", err)
	}
	return nil
}

// checkNumber accepts "" unless required, else a number in [lo, hi].
func checkNumber(what, text string, required bool, lo, hi float64) error {
	if text == "" && !required {
		return nil
	}
	v, err := asread.ParseNumber(text)
	if err != nil {
		return wrapf(ErrIncomplete, "%s: %v", what, err)
	}
	if x := v.Float(); !(x >= lo && x <= hi) {
		return wrapf(ErrIncomplete, "%s: read %s, wanted %g to %g", what, v, lo, hi)
	}
	return nil
}

// Check implements Body.
func (i Instrument) Check() error {
	if err := first(CheckID("instrument", i.ID), checkText("note", i.Note, false), checkTime("since", i.Since)); err != nil {
		return err
	}
	switch i.Type {
	case Thermometer:
		return nil
	case Hydrometer, Refractometer:
	default:
		return wrapf(ErrIncomplete, "type: read %.40q, wanted %s, %s or %s", i.Type, Hydrometer, Refractometer, Thermometer)
	}
	_, scaleErr := gravity.FindScale(i.Scale)
	_, basisErr := asread.ParsePair(i.Basis)
	_, bodyErr := tempcorr.FindBody(i.Body)
	if i.ReadAt != string(tempcorr.Bottom) && i.ReadAt != string(tempcorr.Top) {
		return wrapf(ErrIncomplete, "meniscus: read %.40q, wanted bottom or top", i.ReadAt)
	}
	return first(
		scaleErr, basisErr, bodyErr,
		checkNumber("division", i.Division, true, 1e-6, 100),
		checkNumber("range", i.RangeLo, false, -100, 2000), checkNumber("range", i.RangeHi, false, -100, 2000),
		checkNumber("maximum error", i.MaxError, false, 0, 100),
		checkNumber("stem diameter, mm", i.StemMM, false, 1, 50), checkNumber("mass, g", i.MassG, false, 1, 2000),
		checkNumber("surface tension, mN/m", i.Tension, false, 10, 100),
	)
}

// Check implements Body.
func (c Certificate) Check() error {
	if err := first(CheckID("instrument", c.Instrument), checkTime("at", c.At), checkText("reference", c.Reference, false)); err != nil {
		return err
	}
	if len(c.Points) == 0 {
		return wrapf(ErrIncomplete, "a certificate needs at least one point")
	}
	last := 0.0
	for i, p := range c.Points {
		if err := first(
			checkNumber("reading", p.Reading, true, -100, 2000),
			checkNumber("correction", p.Correction, true, -100, 100), checkNumber("U", p.U, false, 0, 100),
		); err != nil {
			return err
		}
		v, _ := asread.ParseNumber(p.Reading)
		if i > 0 && v.Float() <= last {
			return wrapf(ErrIncomplete, "certificate readings must ascend: %s after %g", v, last)
		}
		last = v.Float()
	}
	return nil
}

// Check implements Body.
func (c Check) Check() error {
	if !slices.Contains([]string{InWater, InSucrose, InDrink}, c.Liquid) {
		return wrapf(ErrIncomplete, "liquid: read %.40q, wanted %s, %s or %s", c.Liquid, InWater, InSucrose, InDrink)
	}
	return first(
		CheckID("instrument", c.Instrument), checkTime("at", c.At), checkTyped("found", c.Found), checkTyped("expected", c.Expected),
		checkTemp(c.Temp), checkNumber("correction", c.Correction, true, -100, 100),
		checkNumber("strength", c.Strength, c.Liquid == InSucrose, 0, 85),
	)
}

// Check implements Body.
func (r Retire) Check() error {
	return first(CheckID("instrument", r.Instrument), checkTime("at", r.At), checkText("reason", r.Reason, true))
}

// Check implements Body.
func (b Batch) Check() error {
	err := first(
		CheckID("batch", b.ID), checkText("product", b.Product, true), checkText("yeast", b.Yeast, false), checkText("note", b.Note, false),
		checkTime("opened", b.Opened), checkNumber("volume, L", b.Volume, false, 0.001, 1e7),
	)
	if err == nil && b.Vessel != "" {
		err = CheckID("vessel", b.Vessel)
	}
	if err == nil && b.Parent != "" {
		err = CheckID("parent", b.Parent)
	}
	if err == nil && b.Pitched != nil {
		err = checkTime("pitched", *b.Pitched)
	}
	if err == nil && (b.Generation < 0 || b.Generation > 1000) {
		err = wrapf(ErrIncomplete, "generation: read %d, wanted 0 to 1000", b.Generation)
	}
	return err
}

// Check implements Body.
func (o OG) Check() error {
	err := first(CheckID("batch", o.Batch), checkTime("at", o.At), checkTyped("original gravity", o.Gravity))
	if err == nil && o.Temp.Text != "" {
		err = checkTemp(o.Temp)
	}
	return err
}

// Check implements Body.
func (l Limit) Check() error {
	return first(CheckID("batch", l.Batch), checkTime("at", l.At), checkTyped("limit", l.Gravity))
}

// Check implements Body.
func (v Volume) Check() error {
	return first(CheckID("batch", v.Batch), checkTime("at", v.At), checkNumber("volume, L", v.Volume, true, 0.001, 1e7))
}

// Check implements Body.
func (c Close) Check() error {
	return first(CheckID("batch", c.Batch), checkTime("at", c.At), checkText("note", c.Note, false))
}

// Check implements Body.
func (r Reading) Check() error {
	if r.Quality != Exact && r.Quality != Estimated {
		return wrapf(ErrIncomplete, "time quality: read %.40q, wanted %s or %s", r.Quality, Exact, Estimated)
	}
	return first(
		CheckID("batch", r.Batch), checkTime("taken at", r.TakenAt), checkTyped("reading", r.Gravity), checkTemp(r.Temp),
		checkText("note", r.Note, false), checkText("reason", r.Keep, false),
	)
}

// Check implements Body.
func (e Event) Check() error {
	if !slices.Contains(EventKinds, e.What) {
		return wrapf(ErrIncomplete, "event: read %.40q, wanted one of %v", e.What, EventKinds)
	}
	err := first(
		CheckID("batch", e.Batch), checkTime("at", e.At), checkText("note", e.Note, false),
		checkNumber("mass, kg", e.MassKg, false, 1e-6, 1e7), checkNumber("volume, L", e.VolumeL, false, 1e-6, 1e7),
	)
	if err == nil && e.Gravity.Text != "" {
		err = checkTyped("gravity", e.Gravity)
	}
	if err == nil && e.What == Blend {
		err = CheckID("batch blended in", e.From)
	}
	if err == nil && (e.What == Move || e.Vessel != "") {
		err = CheckID("vessel", e.Vessel)
	}
	return err
}

// Check implements Body.
func (v Void) Check() error {
	if v.Entry < 1 {
		return wrapf(ErrIncomplete, "entry: read %d, wanted a number from 1", v.Entry)
	}
	return checkText("reason", v.Reason, true)
}
