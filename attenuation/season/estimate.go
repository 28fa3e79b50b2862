package season

import (
	"math"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/tempcorr"
)

// estimate gives the gravity of readings near one that was corrected: with the same
// instrument under the same calibration, in a liquid of the same original extract,
// at about its temperature. Reading and temperature then act nearly apart: what
// temperature adds is a parabola through three corrections of the same mark.
type estimate struct {
	from      *journal.Value
	known     *texts
	since     time.Time // calibration in force from then on
	perScale  float64   // SG by one unit of the instrument's scale
	slope     float64   // of the parabola at the known temperature, SG/°C
	curvature float64   // half its second derivative, SG/°C²
	fn        tempcorr.Func
	float     tempcorr.Float
	mark      float64 // of the known reading, on the instrument's scale
}

const (
	reachC = 6.0 // °C to either side

	// The doubt of an estimate, larger than it was ever found to be off between 0
	// and 40 °C, at original extracts of 5 to 30 % mass and down to SG 0.99: a part
	// for the parabola and a share of the distance between the readings.
	doubtSG    = 4e-5
	doubtShare = 0.06

	sharp = 1e-9 // SG, for a correction made on its own
)

// estimateFrom returns nil when every reading has to be corrected.
func estimateFrom(last *journal.Value, book *journal.Book, known *texts) *estimate {
	if last == nil || last.Mean {
		return nil
	}
	h, _, err := book.Hydrometer(last.Source.Instrument, last.Source.TakenAt)
	if err != nil {
		return nil
	}
	scale := last.Typed.Scale
	if h.ID != "" && h.Scale != scale || scale != gravity.ScaleSG && !scale.IsMass() || len(h.Certificate) > 1 || h.Adjusted > 0 {
		return nil
	}
	h.Scale = scale
	e := &estimate{from: last, known: known, perScale: 1}
	if scale.IsMass() {
		fit := gravity.Fits.Default().Fn
		lo, errLo := fit.SG(last.Result.Extract - 0.1)
		hi, errHi := fit.SG(last.Result.Extract + 0.1)
		if errLo != nil || errHi != nil {
			return nil
		}
		e.perScale = float64(hi-lo) / 0.2
	}
	if !e.parabola(h) {
		return nil
	}
	if rec := book.Instruments[h.ID]; rec != nil {
		for _, c := range rec.Certificates {
			e.calibrated(c.Body.At)
		}
		for _, c := range rec.Checks {
			e.calibrated(c.Body.At)
		}
	}
	return e
}

// calibrated keeps the newest calibration up to the known reading.
func (e *estimate) calibrated(at time.Time) {
	if !at.After(e.from.Source.TakenAt) && at.After(e.since) {
		e.since = at
	}
}

// parabola corrects the known mark at two more temperatures.
func (e *estimate) parabola(h tempcorr.Hydrometer) bool {
	m, err := tempcorr.Methods.Find(e.from.Result.Method.ID)
	if err != nil {
		return false
	}
	r := e.from.Result
	e.fn, e.float, e.mark = m.Fn, h.Float(), r.Reading+r.Meniscus+r.Instrument()
	at := func(t gravity.Celsius) (float64, bool) {
		v, err := e.fn(e.float, e.mark, tempcorr.Sample{T: t, OE: e.from.OE})
		return (v - r.Corrected) * e.perScale, err == nil
	}
	t := e.from.Temp.C
	if t < reachC || t > 40-reachC {
		return false
	}
	below, okBelow := at(t - reachC)
	above, okAbove := at(t + reachC)
	e.slope, e.curvature = (above-below)/(2*reachC), (above+below)/(2*reachC*reachC)
	return okBelow && okAbove
}

// of returns the estimated SG 20/20 of a reading and its doubt; ok is false for a
// reading that has to be corrected.
func (e *estimate) of(v journal.View, r *journal.Reading) (sg, doubt float64, ok bool) {
	if e == nil || r.Instrument != e.from.Source.Instrument || r.TakenAt.Before(e.since) {
		return 0, 0, false
	}
	if oe, _, _ := v.OEAt(r.TakenAt); oe != e.from.OE {
		return 0, 0, false
	}
	typed, temp, err := e.known.read(r)
	if err != nil || typed.Scale != e.from.Typed.Scale {
		return 0, 0, false
	}
	dt := float64(temp.C - e.from.Temp.C)
	if math.Abs(dt) > reachC {
		return 0, 0, false
	}
	dr := (typed.Value - e.from.Typed.Value) * e.perScale
	sg = float64(e.from.SG) + dr + dt*(e.slope+dt*e.curvature)
	return sg, doubtSG + doubtShare*math.Abs(dr), true
}

// sharper returns the SG 20/20 of a reading that of has estimated, by the
// correction alone; ok is false on a scale that needs more than that.
func (e *estimate) sharper(r *journal.Reading) (sg float64, ok bool) {
	if e == nil || e.float.Scale != gravity.ScaleSG || e.float.Basis != gravity.Pair2020 {
		return 0, false
	}
	typed, temp, err := e.known.read(r)
	if err != nil {
		return 0, false
	}
	mark := e.mark + typed.Value - e.from.Typed.Value
	v, err := e.fn(e.float, mark, tempcorr.Sample{T: temp.C, OE: e.from.OE})
	return float64(e.from.SG) + v - e.from.Result.Corrected, err == nil
}
