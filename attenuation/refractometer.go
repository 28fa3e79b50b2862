package attenuation

import (
	"fmt"

	"gylebook/gravity"
	"gylebook/gravity/method"
)

// The wort correction factor is a refractometer's reading over the hydrometer's
// °P, the mean over the user's own worts; readings are divided by it. Common
// practice, no source.
const (
	WortCorrectionFactor = 1.04 // the usual value
	WortCorrectionMin    = 1.02
	WortCorrectionMax    = 1.06
)

// RefractometerFunc returns the present gravity, SG 20/20, of a beer of original
// Brix bi and present Brix bf, both °Bx at 20 °C divided by the wort correction
// factor.
type RefractometerFunc func(bi, bf gravity.Plato) gravity.SG

// RefractometerCaution stands beside every value of these relations.
const RefractometerCaution = "alcohol distorts this reading; use a hydrometer for decisions"

// What the ranges of these relations are on. Without a published limit the range
// is what a fermentation can have: apparent attenuation from 0 % to where the
// Balling quotient of about 1.22 leaves no real extract.
const (
	ofAttenuation = "apparent attenuation"
	cubicLimit    = 61.0 // below it Terrill's cubic fails
	nothingLeft   = 122.0
)

func attenuationRange(lo float64) []method.Range {
	return []method.Range{{Of: ofAttenuation, Lo: lo, Hi: nothingLeft, Unit: "%"}}
}

// RefractometerMethods are the relations from two refractometer readings to the
// present gravity, the default first. No published row was found for any.
var RefractometerMethods = method.Set[RefractometerFunc]{
	{Info: method.Info{
		ID: "terrill2011-linear", Kind: "refractometer relation", Name: "Terrill's linear relation",
		Source: method.Source{Author: "Terrill", Year: 2011, Where: "linear relation for finished beer", Status: method.Read},
		Valid:  attenuationRange(cubicLimit),
		Error:  "not stated",
		Check:  method.FormulaOnly,
		Use:    "default; finished beer only, the limit is that of the cubic; " + RefractometerCaution,
	}, Fn: TerrillLinear},
	{Info: method.Info{
		ID: "terrill2011-cubic", Kind: "refractometer relation", Name: "Terrill's cubic relation",
		Source: method.Source{Author: "Terrill", Year: 2011, Where: "cubic relation for finished beer", Status: method.Read},
		Valid:  attenuationRange(cubicLimit),
		Error:  "not stated",
		Check:  method.FormulaOnly,
		Use:    "finished beer only, fails below 61 % apparent attenuation; " + RefractometerCaution,
	}, Fn: TerrillCubic},
	{Info: method.Info{
		ID: "bonham2001", Kind: "refractometer relation", Name: "older cubic relation, attributed to Bonham",
		Source: method.Source{Author: "Bonham", Year: 2001, Where: "by attribution; the formula was read, its origin not reached", Status: method.Quoted},
		Valid:  attenuationRange(0),
		Error:  "not stated",
		Check:  method.FormulaOnly,
		Use:    "comparison and older records, no range was published; " + RefractometerCaution,
	}, Fn: Bonham},
}

// TerrillLinear returns SG 20/20 from original and present Brix (°Bx at 20 °C,
// divided by the wort correction factor); finished beer only.
// Source: Terrill 2011, the linear relation.
func TerrillLinear(bi, bf gravity.Plato) gravity.SG {
	return gravity.SG(1 - 0.00085683*float64(bi) + 0.0034941*float64(bf))
}

// TerrillCubic returns SG 20/20 from original and present Brix (°Bx at 20 °C,
// divided by the wort correction factor); finished beer only, it fails below
// 61 % apparent attenuation. Source: Terrill 2011, the cubic relation.
func TerrillCubic(bi, bf gravity.Plato) gravity.SG {
	i, f := float64(bi), float64(bf)
	return gravity.SG(1 + i*(-0.0044993+i*(0.00027581-i*7.28e-6)) + f*(0.011774+f*(-0.0012717+f*6.3293e-5)))
}

// Bonham returns SG 20/20 from original and present Brix (°Bx at 20 °C, divided
// by the wort correction factor); no range was published.
// Source: attributed to Bonham 2001.
func Bonham(bi, bf gravity.Plato) gravity.SG {
	i, f := float64(bi), float64(bf)
	return gravity.SG(1.001843 - i*(0.002318474+i*(7.775e-6+i*3.4e-8)) + f*(0.00574+f*(3.344e-5+f*8.6e-8)))
}

// BrixOrderError says that the present Brix is not below the original one. It
// wraps ErrOrder.
type BrixOrderError struct{ Original, Present gravity.Plato }

func (e *BrixOrderError) Error() string {
	return fmt.Sprintf("present Brix is %.2f, wanted below the original Brix %.2f", float64(e.Present), float64(e.Original))
}

// Unwrap returns ErrOrder.
func (e *BrixOrderError) Unwrap() error { return ErrOrder }

// Hint says what to look at.
func (e *BrixOrderError) Hint() string { return "swapped values, or a wort that has not fermented?" }

// RefractometerEstimate is the present gravity by one relation. SG is void when
// Err is set.
type RefractometerEstimate struct {
	Info    method.Info
	SG      gravity.SG // 20/20
	InRange bool
	Notes   []method.Note // the caution first, then the range
	Err     error         // why there is no value
}

// RefractometerEstimates returns the present gravity by every relation, in the
// order of RefractometerMethods, from original bi and present bf (°Bx at 20 °C,
// divided by the wort correction factor). Every value carries the caution; one
// whose own apparent attenuation, by the default fit with bi as the original
// extract, is outside the relation's range is not InRange and says so.
//
// Err is a *method.RangeError for Brix that no beer has, and a *BrixOrderError
// when bf is not below bi.
func RefractometerEstimates(bi, bf gravity.Plato) []RefractometerEstimate {
	err := checkBrix(bi, bf)
	es := make([]RefractometerEstimate, len(RefractometerMethods))
	for k, m := range RefractometerMethods {
		es[k] = refractometerEstimate(m, bi, bf, err)
	}
	return es
}

func refractometerEstimate(m method.Entry[RefractometerFunc], bi, bf gravity.Plato, err error) RefractometerEstimate {
	e := RefractometerEstimate{Info: m.Info}
	if err != nil {
		e.Err = err
		return e
	}
	s := m.Fn(bi, bf)
	if err := checkSG("present gravity by "+m.ID, s); err != nil {
		e.Err = err
		return e
	}
	e.SG = s
	e.Notes = []method.Note{{Code: method.Caution, Text: RefractometerCaution}}
	r := m.Valid[0]
	aa := float64(100 * (bi - gravity.Fits.Default().Fn.Extract(s)) / bi)
	if e.InRange = r.Contains(aa); !e.InRange {
		e.Notes = append(e.Notes, method.Note{Code: method.OutOfRange, Text: fmt.Sprintf(
			"%s: %s would be %.1f %%, the relation serves %g to %g %%", m.ID, r.Of, aa, r.Lo, r.Hi)})
	}
	return e
}

// maxBrix is above every wort; the polynomials mean nothing there.
const maxBrix gravity.Plato = 60

func checkBrix(bi, bf gravity.Plato) error {
	const hint = "type degrees Brix, such as 12.4"
	if !(bi >= MinExtract && bi <= maxBrix) {
		return &method.RangeError{What: "original Brix", Got: float64(bi), Lo: float64(MinExtract), Hi: float64(maxBrix), Unit: "°Bx", Hint: hint}
	}
	// Alcohol raises the reading above water's, so even a dry beer is not below 0.
	if !(bf >= 0 && bf <= maxBrix) {
		return &method.RangeError{What: "present Brix", Got: float64(bf), Lo: 0, Hi: float64(maxBrix), Unit: "°Bx", Hint: hint}
	}
	if bf >= bi {
		return &BrixOrderError{Original: bi, Present: bf}
	}
	return nil
}
