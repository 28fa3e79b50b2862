package journal

import (
	"fmt"
	"math"
	"slices"

	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/gravity/method"
	"gylebook/tempcorr"
)

// onScale returns a typed reading and its step on the instrument's own scale. A
// glass with more than one scale may be read on either: the mark for the same
// density is meant.
func onScale(h tempcorr.Hydrometer, typed asread.Reading) (value, step float64, err error) {
	if typed.Scale == h.Scale || typed.Scale.IsMass() && h.Scale.IsMass() {
		return typed.Value, typed.Step, nil
	}
	from := h.Float()
	from.Scale = typed.Scale
	mark := func(v float64) (float64, error) {
		rho, err := from.MarkDensity(v)
		if err != nil {
			return 0, err
		}
		return h.Float().Mark(rho)
	}
	value, err = mark(typed.Value)
	if err != nil {
		return 0, 0, err
	}
	next, err := mark(typed.Value + typed.Step)
	return value, math.Abs(next - value), err
}

// CorrectTyped corrects a reading as typed, taken with h at the place of the
// meniscus that h is meant to be read at, by tempcorr.Correct. An instrument
// without an id takes the scale of the reading. A named one read on another scale
// than its own (a glass may carry two) is corrected on its own, with a note. With
// oe [% mass] above 0 the liquid is a fermenting one; above 40 °C, where that model
// ends, it is taken for a sucrose solution, with a note. The errors are those of
// tempcorr.Correct.
func CorrectTyped(h tempcorr.Hydrometer, typed asread.Reading, temp asread.Temperature, oe gravity.Plato) (tempcorr.Result, []method.Note, error) {
	return correctTyped(h, typed, temp, oe, false)
}

func correctTyped(h tempcorr.Hydrometer, typed asread.Reading, temp asread.Temperature, oe gravity.Plato, plain bool) (tempcorr.Result, []method.Note, error) {
	if h.ID == "" {
		h.Scale = typed.Scale
	}
	var notes []method.Note
	value, step, err := onScale(h, typed)
	if err != nil {
		return tempcorr.Result{}, nil, err
	}
	if typed.Scale != h.Scale {
		notes = append(notes, method.Note{Code: method.Interpreted, Text: fmt.Sprintf(
			"%s on %s, whose scale is %s: taken as %s", typed.ReadAs(), h.ID, h.Scale.Info().Name,
			asread.Fixed(value, h.Scale.Info().Decimals, asread.HalfEven))})
	}
	o := tempcorr.Observation{Reading: value, Step: step, T: temp.C, OE: oe, Plain: plain}
	if oe > 0 && temp.C > fermentingTo {
		o.OE = 0
		notes = append(notes, method.Note{Code: method.HotSample, Text: "above 40 °C the fermenting model ends: corrected as a sucrose solution"})
	}
	res, err := tempcorr.Correct(h, o)
	if err == nil && !finite(float64(res.SG), float64(res.Extract), res.Corrected, res.Budget.Expanded) {
		err = &method.RangeError{What: "corrected value", Got: math.NaN(), Lo: float64(gravity.MinSG), Hi: float64(gravity.MaxSG), Unit: "SG"}
	}
	return res, notes, err
}

// fermentingTo is where OIML R 22, and with it the fermenting model, ends.
const fermentingTo gravity.Celsius = 40

func finite(xs ...float64) bool {
	return !slices.ContainsFunc(xs, func(x float64) bool { return math.IsNaN(x) || math.IsInf(x, 0) })
}
