package tempcorr

import (
	"fmt"
	"math"

	"gylebook/gravity"
	"gylebook/gravity/method"
)

// Observation is one reading as it was taken.
type Observation struct {
	Reading float64         // on the instrument's scale
	Step    float64         // one unit of its last typed place, same scale
	T       gravity.Celsius // sample temperature
	TU      float64         // half-width of the thermometer, °C; 0 is 0.5
	ReadAt  Meniscus        // "" is where the scale is meant to be read
	OE      gravity.Plato   // original extract, % mass; 0 when not known
	Method  string          // id of a correction; "" picks by OE
	Plain   bool            // leave the uncertainty budget out, which is most of the work
}

// Result is a corrected reading with every step on its own, in the scale of the
// instrument: Corrected = Reading + Meniscus + Certificate + Tension + Temperature.
type Result struct {
	Reading     float64
	Meniscus    float64
	Certificate float64 // from the certificate
	Tension     float64 // surface tension
	Temperature float64
	Corrected   float64
	SG          gravity.SG    // 20/20
	Extract     gravity.Plato // % mass, apparent when alcohol is present
	Mixture     gravity.Mixture
	Method      method.Info
	Budget      Budget
	Notes       []method.Note
}

// Instrument returns the whole instrument correction, certificate and surface
// tension.
func (r Result) Instrument() float64 { return r.Certificate + r.Tension }

// Correct corrects one observation. Errors: *method.RangeError
// outside 0 to 60 °C and for a reading that no liquid gives, ErrScale, ErrNeedsOG, ErrCertificate,
// *method.UnknownError for the method.
func Correct(h Hydrometer, o Observation) (Result, error) {
	m, err := pick(o)
	if err != nil {
		return Result{}, err
	}
	if err := check(h, o); err != nil {
		return Result{}, err
	}
	res := Result{Reading: o.Reading, Method: m.Info}
	f := h.Float()
	rel, err := f.relative(o.Reading)
	if err != nil {
		return Result{}, err
	}

	// Meniscus, then certificate and surface tension, then temperature: the
	// first is about where the eye was, the second holds at t0.
	points, meniscusU, assumed := h.meniscusPoints(o.ReadAt, rel)
	if res.Meniscus, err = f.shift(o.Reading, points); err != nil {
		return Result{}, err
	}
	seen := o.Reading + res.Meniscus
	cert, certU, notes := h.certificate(seen)
	res.Certificate = cert
	tension, tensionU := h.tension(rel)
	if res.Tension, err = f.shift(seen, tension); err != nil {
		return Result{}, err
	}
	mark := seen + res.Certificate + res.Tension
	s := Sample{o.T, o.OE}
	if res.Corrected, err = m.Fn(f, mark, s); err != nil {
		return Result{}, err
	}
	res.Temperature = res.Corrected - mark
	if err := res.figures(f, mark, s); err != nil {
		return Result{}, err
	}
	res.Notes = append(notes, res.notes(h, o, assumed)...)
	if o.Plain {
		return res, nil
	}
	res.Budget, err = budget(h, o, m, mark, widths{meniscusU, certU, tensionU})
	return res, err
}

// pick chooses the method: the one named, else fermenting when an OE is known.
func pick(o Observation) (method.Entry[Func], error) {
	id := o.Method
	if id == "" && o.OE > 0 {
		id = "fermenting"
	}
	return Methods.Find(id)
}

// check refuses what cannot be corrected.
func check(h Hydrometer, o Observation) error {
	if !(o.T >= MinTemp && o.T <= MaxTemp) {
		return &method.RangeError{
			What: "sample temperature", Got: float64(o.T), Lo: float64(MinTemp), Hi: float64(MaxTemp),
			Unit: "°C", Hint: "cool or warm the sample, then read again",
		}
	}
	if math.IsNaN(o.Reading) || math.IsInf(o.Reading, 0) {
		return &method.RangeError{What: "reading", Got: o.Reading, Lo: float64(gravity.MinSG), Hi: float64(gravity.MaxSG), Unit: "SG"}
	}
	return CheckCertificate(h.Certificate)
}

// relative returns the relative density of mark v over the pair's water.
func (f Float) relative(v float64) (float64, error) {
	rho, err := f.MarkDensity(v)
	if err != nil {
		return 0, err
	}
	r := float64(rho / gravity.Kell(f.Basis.Water))
	return r, gravity.CheckSG(gravity.SG(r))
}

// figures fills SG 20/20 and extract from the corrected value.
func (res *Result) figures(f Float, mark float64, s Sample) error {
	c := gravity.NewConverter()
	c.Modulus = f.modulus()
	if res.Method.ID == "fermenting" {
		_, m, err := ferment(f, mark, s)
		if err != nil {
			return err
		}
		res.Mixture = m
	}
	rho, err := f.MarkDensity(res.Corrected)
	if err != nil {
		return err
	}
	if f.Scale.IsMass() {
		res.Extract = gravity.Plato(res.Corrected)
		res.SG, err = c.Fit.Fn.SG(res.Extract)
		return err
	}
	r := gravity.RelativeOf(rho, f.Basis)
	if res.Mixture.Alcohol > 0 && f.Basis != gravity.Pair2020 {
		res.SG = gravity.SG(r.MixtureOn(gravity.Pair2020, res.Mixture).Value)
	} else if res.SG, err = r.SG(); err != nil {
		return err
	}
	if f.Scale == gravity.ScaleDensity {
		res.Extract = c.Fit.Fn.TrueExtract(res.SG)
	} else {
		res.Extract = c.Fit.Fn.Extract(res.SG)
	}
	return gravity.CheckSG(res.SG)
}

// sweetAlcohol [% mass] is where a liquid outside Tabarié's band is worth a note.
// Every wort passes through real extracts above 5 % while it ferments; with less
// alcohol the ratio of densities hardly feels it (judged).
const sweetAlcohol gravity.MassPct = 8

// notes collects what travels with the value.
func (res *Result) notes(h Hydrometer, o Observation, meniscusAssumed bool) []method.Note {
	var notes []method.Note
	add := func(code, text string) { notes = append(notes, method.Note{Code: code, Text: text}) }
	switch {
	case o.T > 40:
		add(method.HotSample, fmt.Sprintf("sample at %.1f °C: cool it below 30 °C and read again; the correction is weak here", float64(o.T)))
	case o.T < 10 || o.T > 30:
		add(method.OutOfRange, fmt.Sprintf("sample at %.1f °C: best between 15 and 25 °C", float64(o.T)))
	}
	if res.Method.ID == "sucrose" && o.T > gravity.TableCheckedTo {
		add(method.Extrapolated, fmt.Sprintf("model, not table-checked above %.0f °C", float64(gravity.TableCheckedTo)))
	}
	if res.Method.ID == "sucrose" && o.OE <= 0 && res.SG < 1 {
		add(method.Extrapolated, "below SG 1.000 the sucrose model is extrapolated; give the OG with --og")
	}
	if res.Method.ID == "fermenting" {
		if res.Mixture.Alcohol == 0 {
			add(method.NoAlcohol, "the corrected value is not below the original gravity: corrected as unfermented; wrong tank, or an original gravity in another scale (12P)?")
		} else if res.Mixture.Alcohol >= sweetAlcohol {
			notes = append(notes, gravity.TabarieInfo.InRange(float64(res.Mixture.Extract), float64(res.Mixture.Alcohol))...)
		}
	}
	if res.Method.ID == "lyons1992" {
		if h.Basis != gravity.Pair1515 {
			add(method.OtherBasis, "lyons1992 is for a 59 °F (15 °C) instrument; this basis is "+h.Basis.String())
		}
		add(method.NotCovered, "lyons1992 knows no liquid but water and no glass: for comparison only")
	}
	if meniscusAssumed {
		add(method.Assumed, "meniscus: stem and mass are not known, halfway between a laboratory instrument (0.7 point) and a kit one (3.3 points)")
	}
	return append(notes, gravity.FitNotes(gravity.Fits.Default(), res.SG)...)
}
