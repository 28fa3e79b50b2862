package tempcorr

import (
	"math"

	"gylebook/gravity"
	"gylebook/gravity/method"
)

// Contribution is one line of an uncertainty budget.
type Contribution struct {
	Name        string
	HalfWidth   float64 // of a rectangular distribution, in Unit; for a certificate U (k=2)
	Unit        string
	Sensitivity float64 // change on the scale per Unit
	U           float64 // standard uncertainty on the scale
	Common      bool    // the same for every reading with this instrument
	Why         string
}

// Budget is the combined uncertainty of a corrected value, in the scale of the
// instrument. Source: JCGM 100:2008 (GUM), clauses 4.3.7 and 5.1.2.
type Budget struct {
	Parts    []Contribution
	Standard float64 // u
	Expanded float64 // U = 2u, at least 95 %
	Floor    bool    // raised to what a certified instrument reaches in users' hands
	Record   bool    // the instrument's own error is in it
}

// usersFloor is the smallest expanded uncertainty of a hydrometer in users'
// hands, relative. Source: Aguilera, Wright & Bean 2008, NIST SP 250-78 (number
// from memory): 370 ppm or more.
const usersFloor = 370e-6

// Half-widths of what the models leave over, in points.
const (
	modelSucrose    = 0.09 // largest difference to NBS C440 to 30 %
	modelFermenting = 0.2  // no table; from the liquids' own errors (judged)
	modelLyons      = 1.3  // its largest miss against the sucrose model
)

// thermometerHalfWidth [°C] when nothing better is known (common practice).
const thermometerHalfWidth = 0.5

type widths struct{ meniscus, certificate, tension float64 } // points, scale (k=2), points

// budget lists the contributions and combines them.
func budget(h Hydrometer, o Observation, m method.Entry[Func], mark float64, w widths) (Budget, error) {
	f := h.Float()
	s := Sample{o.T, o.OE}
	slopeR, slopeT, slopeG, err := slopes(f, mark, s, m.Fn)
	if err != nil {
		return Budget{}, err
	}
	point, err := f.shift(mark, 1)
	if err != nil {
		return Budget{}, err
	}
	var b Budget
	rect := func(name, unit string, half, slope float64, common bool, why string) {
		if half > 0 {
			b.Parts = append(b.Parts, Contribution{name, half, unit, slope, math.Abs(slope) * half / math.Sqrt(3), common, why})
		}
	}
	half, why := o.Step/2, "half the last place typed"
	if h.Division > 0 {
		half, why = h.Division/2, "half a division"
	}
	rect("reading", h.Scale.Info().Symbol, half, slopeR, false, why)
	tu := o.TU
	if tu == 0 {
		tu = thermometerHalfWidth
	}
	rect("thermometer", "°C", tu, slopeT, false, "")
	rect("body expansion", "1/K", h.Body.ExpansionU, slopeG, true, h.Body.ID)
	rect("model", "points", modelHalfWidth(m.ID, o.T), point, true, m.ID)
	rect("meniscus", "points", w.meniscus, point*slopeR, true, "")
	rect("surface tension", "points", w.tension, point*slopeR, true, "")
	rect("maximum error", h.Scale.Info().Symbol, h.MaxError, slopeR, true, "of the instrument")
	if w.certificate > 0 {
		b.Parts = append(b.Parts, Contribution{
			"certificate", w.certificate, h.Scale.Info().Symbol, slopeR, math.Abs(slopeR) * w.certificate / 2, true, "U (k=2)",
		})
	}
	var sum float64
	for _, p := range b.Parts {
		sum += p.U * p.U
	}
	b.Standard = math.Sqrt(sum)
	b.Record = h.ID != "" && (h.MaxError > 0 || len(h.Certificate) > 0)
	// The floor is relative to the density, so it grows with it.
	r, err := f.relative(mark)
	if err != nil {
		return Budget{}, err
	}
	if floor := usersFloor * 1000 * r * math.Abs(point); b.Record && 2*b.Standard < floor {
		b.Standard, b.Floor = floor/2, true
	}
	b.Expanded = 2 * b.Standard
	return b, nil
}

// modelHalfWidth returns what the model of a method leaves over at t, in points.
// Above the highest temperature of any published table it grows by a tenth of
// itself per °C (judged).
func modelHalfWidth(id string, t gravity.Celsius) float64 {
	points := map[string]float64{"sucrose": modelSucrose, "fermenting": modelFermenting, "lyons1992": modelLyons}[id]
	return points * (1 + 0.1*max(0, float64(t-gravity.TableCheckedTo)))
}

// slopes returns the change of the corrected value per unit of reading, per °C
// and per 1/K of body expansion, by central differences.
func slopes(f Float, r float64, s Sample, fn Func) (perReading, perCelsius, perExpansion float64, err error) {
	unit, err := f.shift(r, 0.1)
	if err != nil {
		return 0, 0, 0, err
	}
	diff := func(step float64, at func(d float64) (Float, float64, Sample)) float64 {
		if err != nil {
			return 0
		}
		lo, errLo := fn(at(-step))
		hi, errHi := fn(at(step))
		if err = errLo; err == nil {
			err = errHi
		}
		return (hi - lo) / (2 * step)
	}
	perReading = diff(unit, func(d float64) (Float, float64, Sample) { return f, r + d, s })
	// Stay inside the temperatures that the models answer for.
	dt := s
	dt.T = min(max(s.T, MinTemp+0.1), MaxTemp-0.1)
	if s.OE > 0 {
		dt.T = min(dt.T, maxMixture-0.1)
	}
	perCelsius = diff(0.05, func(d float64) (Float, float64, Sample) {
		return f, r, Sample{dt.T + gravity.Celsius(d), s.OE}
	})
	perExpansion = diff(1e-6, func(d float64) (Float, float64, Sample) {
		g := f
		g.Expansion += d
		return g, r, s
	})
	return perReading, perCelsius, perExpansion, err
}
