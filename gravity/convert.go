package gravity

import (
	"gylebook/gravity/method"
	"gylebook/gravity/root"
)

// Modulus of the Baumé scale.
type Modulus float64

// The two moduli in use for liquids heavier than water.
const (
	Modulus145  Modulus = 145   // on SG 20/20
	Modulus1443 Modulus = 144.3 // on SG 15/4
)

// Figures is one gravity on every scale.
type Figures struct {
	SG       SG            // 20/20 °C
	Points   Points        // of SG 20/20
	Extract  Plato         // % mass, by the fit named
	GPL      GramsPerLitre // extract at 20 °C
	Density  Density       // at 20 °C, kg/m³
	Oechsle  float64
	KMW      float64
	Baume    float64
	Twaddell float64
	Long     float64 // lb per barrel
	Notes    []method.Note
}

// Converter turns a value on any scale into every other one.
type Converter struct {
	Fit     method.Entry[Fit]
	Modulus Modulus
}

// NewConverter returns a converter with the default fit and Baumé modulus 145.
func NewConverter() Converter { return Converter{Fits.Default(), Modulus145} }

// Convert returns the figures of v on scale. pair is the reference of a value
// that is a relative density (SG, points, Oechsle, KMW, Baumé, Twaddell); for
// the others it is not used. It returns a *method.RangeError for a value that no
// liquid of the trade has.
//
// A mass share typed is inverted through the fit itself, so 12.00 % stays 12.00
// and its SG is the table's, while its density is the sucrose model's. A density is true: the fit is given it in air.
func (c Converter) Convert(scale Scale, v float64, pair Pair) (Figures, error) {
	fit := c.Fit.Fn
	var f Figures
	var err error
	switch scale {
	case ScalePlato, ScaleBrix:
		f.Extract = Plato(v) + 0 // -0 becomes 0
		f.SG, err = fit.SG(f.Extract)
		f.Density = sps4At20.Density(f.Extract)
	case ScaleGPL:
		f.Extract, err = extractOfGPL(GramsPerLitre(v))
		if err == nil {
			f.SG, err = fit.SG(f.Extract)
			f.Density = sps4At20.Density(f.Extract)
		}
	case ScaleDensity:
		f.Density = Density(v)
		f.SG = SG(f.Density / Kell(20))
		f.Extract = fit.TrueExtract(f.SG)
	default:
		f.SG, err = c.SGOf(scale, v, pair)
		f.Extract = fit.Extract(f.SG)
		f.Density = f.SG.Density20()
	}
	if err != nil {
		return Figures{}, err
	}
	if err := CheckSG(f.SG); err != nil {
		return Figures{}, err
	}
	f.GPL = ExtractGPL(f.Extract, f.Density)
	return f, c.derive(&f)
}

// ConvertFermented is Convert for a liquid of original extract oe [% mass] that
// has fermented: a relative density on a pair other than 20/20 is brought there
// as the fermented mixture instead of as a sucrose solution.
func (c Converter) ConvertFermented(scale Scale, v float64, pair Pair, oe Plato) (Figures, error) {
	fn, relative := RelativeScale(scale, c.Modulus)
	if !relative || pair == Pair2020 && fn.Pair == Pair2020 {
		return c.Convert(scale, v, pair)
	}
	if fn.Pair != Pair2020 {
		pair = fn.Pair
	}
	s, err := Relative{fn.SG(v), pair}.FermentedSG(oe)
	if err != nil {
		return Figures{}, err
	}
	return c.Convert(ScaleSG, float64(s), Pair2020)
}

// derive fills the scales that are formulas of SG.
func (c Converter) derive(f *Figures) error {
	s := float64(f.SG)
	f.Points = f.SG.Points()
	f.Oechsle = pointsOf(s)
	f.KMW = kmwOf(s)
	tw, _ := RelativeScale(ScaleTwaddell, 0)
	f.Twaddell = tw.Of(s)
	f.Long = LongPounds(BallingExtract(f.SG))
	baume, _ := RelativeScale(ScaleBaume, c.Modulus)
	r, err := f.SG.Relative().On(baume.Pair)
	if err != nil {
		return err
	}
	f.Baume = baume.Of(r.Value)
	f.Notes = FitNotes(c.Fit, f.SG)
	return nil
}

// SGOf returns SG 20/20 of a value on a scale that is a relative density or a
// formula of one, read on pair. A Baumé of modulus 144.3 stands on 15/4 whatever
// the pair.
func (c Converter) SGOf(scale Scale, v float64, pair Pair) (SG, error) {
	r := Relative{v, pair}
	if fn, ok := RelativeScale(scale, c.Modulus); ok {
		r.Value = fn.SG(v)
		if fn.Pair != Pair2020 {
			r.Pair = fn.Pair
		}
	}
	if err := CheckSG(SG(r.Value)); err != nil {
		return 0, err
	}
	return r.SG()
}

// extractOfGPL solves P·rho(P)/100 = g for P.
func extractOfGPL(g GramsPerLitre) (Plato, error) {
	x, err := root.Find(func(p float64) (float64, float64) {
		rho := float64(sps4At20.Density(Plato(p)))
		return p*rho/100 - float64(g), rho / 100
	}, -5, 84, 1e-11)
	if err != nil {
		return 0, &method.RangeError{What: "extract", Got: float64(g), Lo: 0, Hi: 1200, Unit: "g/L"}
	}
	return Plato(x), nil
}

// ExtractGPL returns extract in g/L at 20 °C from extract [% mass] and density
// [kg/m³ at 20 °C].
func ExtractGPL(p Plato, rho Density) GramsPerLitre {
	return GramsPerLitre(float64(p) * float64(rho) / 100)
}

// CheckSG returns a *method.RangeError for an SG that no liquid of the trade has.
func CheckSG(s SG) error {
	if s >= MinSG && s <= MaxSG {
		return nil
	}
	return &method.RangeError{What: "specific gravity", Got: float64(s), Lo: float64(MinSG), Hi: float64(MaxSG), Unit: "SG"}
}
