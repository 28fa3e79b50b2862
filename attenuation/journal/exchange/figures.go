package exchange

import (
	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/tempcorr"
)

// figureColumns are the columns that follow from what was typed, with the decimals
// they are written to: two beyond what a glass can tell. perDegree is the most that
// a figure changes with a degree of the samples of the reading and of the original
// gravity: water and ferments expand by less than 0.0005 a degree up to 40 °C (OIML
// R 22), 0.01 SG is some 2.6 % mass, and the attenuations are of 5 % mass or more.
var figureColumns = [...]struct {
	name      string
	places    int
	perDegree float64
}{
	{"meniscus_correction_sg", 6, 0},
	{"instrument_correction_sg", 6, 0},
	{"temperature_correction_sg", 6, 0.0005},
	{"sg_20_20", 6, 0.0005},
	{"sg_expanded_uncertainty_k2", 6, 0.00001},
	{"apparent_extract_pct_mass", 4, 0.13},
	{"original_extract_pct_mass", 4, 0.13},
	{"real_extract_pct_mass", 4, 0.13},
	{"apparent_attenuation_pct", 3, 5},
	{"real_attenuation_pct", 3, 5},
	{"abv_pct_20c", 3, 0.15},
}

// Places in figureColumns.
const (
	figMeniscus = iota
	figInstrument
	figTemperature
	figSG
	figUncertainty
	figApparent
	figOriginal
	figReal
	figAttenuation
	figRealAttenuation
	figABV
	figCount
)

func figureIndex(name string) int {
	for i, f := range figureColumns {
		if f.name == name {
			return i
		}
	}
	return -1
}

// figures are the derived values of one reading; known says which are there.
type figures struct {
	value [figCount]float64
	known [figCount]bool
}

func (f *figures) set(i int, v float64) { f.value[i], f.known[i] = v, true }

// text returns a figure as it is written, "" when it is not known.
func (f *figures) text(i int) string {
	if !f.known[i] {
		return ""
	}
	return asread.Fixed(f.value[i], figureColumns[i].places, asread.HalfEven)
}

// figuresOf collects the derived values of v. What cannot be given stays unknown.
func figuresOf(v *journal.Value, book *journal.Book) figures {
	var f figures
	if v.OE > 0 {
		f.set(figOriginal, float64(v.OE))
	}
	if v.Err != nil {
		return f
	}
	f.set(figSG, float64(v.SG))
	f.set(figApparent, float64(v.Extract))
	f.corrections(v, book)
	if a := v.Attenuation; a != nil {
		f.set(figReal, float64(a.RE))
		f.set(figAttenuation, a.Apparent)
		f.set(figRealAttenuation, a.Real)
	}
	if v.Alcohol != nil {
		f.set(figABV, float64(v.Alcohol.ABV))
	}
	return f
}

// corrections turns the steps of the correction, which are in the scale of the
// instrument, into relative density on the instrument's pair.
func (f *figures) corrections(v *journal.Value, book *journal.Book) {
	h, _, err := book.Hydrometer(v.Source.Instrument, v.Source.TakenAt)
	if err != nil {
		return
	}
	if h.ID == "" {
		h.Scale = v.Typed.Scale
	}
	res := v.Result
	steps := [...]float64{res.Reading, res.Meniscus, res.Instrument(), res.Temperature}
	var at [len(steps)]float64 // after each step
	sum := 0.0
	for i, step := range steps {
		sum += step
		r, err := onPair(h, sum)
		if err != nil {
			return
		}
		at[i] = r
	}
	// Half a unit of the last place on either side gives the slope for U.
	d := max(res.Budget.Expanded/2, 1e-6)
	hi, errHi := onPair(h, res.Corrected+d)
	lo, errLo := onPair(h, res.Corrected-d)
	f.set(figMeniscus, at[1]-at[0])
	f.set(figInstrument, at[2]-at[1])
	f.set(figTemperature, at[3]-at[2])
	if errHi == nil && errLo == nil {
		f.set(figUncertainty, (hi-lo)/(2*d)*res.Budget.Expanded)
	}
}

// onPair returns the relative density, on the instrument's pair, of mark v.
func onPair(h tempcorr.Hydrometer, v float64) (float64, error) {
	rho, err := h.Float().MarkDensity(v)
	if err != nil {
		return 0, err
	}
	return gravity.RelativeOf(rho, h.Basis).Value, nil
}
