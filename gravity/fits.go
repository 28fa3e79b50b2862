package gravity

import (
	"math"

	"gylebook/gravity/method"
	"gylebook/gravity/root"
)

// Fit is a published relation between SG 20/20 °C and extract, both ways.
type Fit struct {
	// Extract returns extract [% mass] at s.
	Extract func(s SG) Plato
	// SG inverts Extract; a *method.RangeError says that no SG gives p.
	SG func(p Plato) (SG, error)
	// InAir says that the fit was made on relative densities weighed in air.
	InAir bool
}

// TrueExtract returns extract [% mass] for a true relative density (a density
// meter, a density typed), which an in-air fit must first be given in air.
func (f Fit) TrueExtract(s SG) Plato {
	if f.InAir {
		s = s.InAir()
	}
	return f.Extract(s)
}

// TrueSG is the inverse of TrueExtract.
func (f Fit) TrueSG(p Plato) (SG, error) {
	s, err := f.SG(p)
	if err == nil && f.InAir {
		s = s.FromAir()
	}
	return s, err
}

// Limits of every fit and scale: outside them no liquid of the trade lies and
// the polynomials mean nothing.
const (
	MinSG SG = 0.95
	MaxSG SG = 1.45
)

const c440 = "NBS C440 Table 114"

// Fits are the published relations between SG and extract, the default first.
// Ranges start below water because a dry ferment's apparent extract is read by
// extending the fit there; that part is extrapolated by convention of the trade.
var Fits = method.Set[Fit]{
	{Info: method.Info{
		ID: "asbc", Kind: "fit", Name: "ASBC polynomial",
		Source: method.Source{Author: "American Society of Brewing Chemists", Where: "Methods of Analysis, fit of Table 1 (20/20 °C, in air)", Status: method.Quoted},
		Valid:  fitRange(0.98, 1.1057), Error: "0.003 °P to 20 °P, 0.006 at 25, 0.025 at 30 against " + c440,
		Check: c440 + ", SG 1.040 statement", Use: "default; wort, beer, cider", Better: "nbs",
	}, Fn: Fit{Extract: ASBC, SG: inverse(ASBC, asbcSlope), InAir: true}},
	{Info: method.Info{
		ID: "nbs", Kind: "fit", Name: "NBS cubic",
		Source: method.Source{Author: "National Bureau of Standards", Year: 1942, Where: "fit of Circular C440, Table 114 (20/20 °C, in air)", Status: method.Quoted},
		Valid:  fitRange(0.98, 1.17874), Error: "0.0017 °Bx for 1..40 °Bx, -0.005 at water, against " + c440,
		Check: c440 + ", SG 1.040 statement", Use: "must, strong wort, honey must", Better: "sps4",
	}, Fn: Fit{Extract: NBS, SG: inverse(NBS, nbsSlope), InAir: true}},
	{Info: method.Info{
		ID: "lincoln", Kind: "fit", Name: "Lincoln quadratic",
		Source: method.Source{Author: "Lincoln", Year: 1987, Where: "Zymurgy (issue from memory)", Status: method.FromMemory},
		Valid:  fitRange(0.98, 1.083), Error: "0.005 °P to 20 °P, -0.033 at 25, -0.43 at 40 against " + c440,
		Check: c440, Use: "inverts by hand as a quadratic", Better: "nbs",
	}, Fn: Fit{Extract: Lincoln, SG: lincolnSG, InAir: true}},
	{Info: method.Info{
		ID: "rational-258", Kind: "fit", Name: "rational form with 258.6",
		Source: method.Source{Where: "in general use, author unknown", Status: method.CommonPractice},
		Valid:  fitRange(0.98, 1.129), Error: "0.015 °P to 30 °P against " + c440,
		Check: c440, Use: "inverts algebraically", Better: "nbs",
	}, Fn: Fit{Extract: Rational258, SG: rational258SG, InAir: true}},
	{Info: method.Info{
		ID: "balling", Kind: "fit", Name: "Balling's hyperbola, 17.5 °C basis, historic",
		Source: method.Source{Author: "Balling", Year: 1865, Where: "Die Bierbrauerei", Status: method.Quoted},
		Valid:  fitRange(0.98, 1.1057), Error: "-0.09 °P at 20 °P, -0.16 at 25 against " + c440,
		Check: c440, Use: "old records; takes the number as it stands", Better: "nbs",
	}, Fn: Fit{Extract: BallingExtract, SG: ballingSG}},
	{Info: method.Info{
		ID: "sps4", Kind: "fit", Name: "sucrose density model inverted at 20 °C",
		Source: method.Source{Author: "ICUMSA", Where: "Methods Book SPS-4, true density at 20 °C", Status: method.Quoted},
		Valid:  fitRange(0.98, 1.43), Error: "0.012 °Bx at 20, 0.018 at 30, 0.022 at 40, 0.033 at 60 against " + c440 + " in air",
		Check: c440 + ", CRC densities", Use: "true relative density; syrups and strong musts",
	}, Fn: Fit{Extract: sps4Extract, SG: sps4SG}},
}

func fitRange(lo, hi float64) []method.Range {
	return []method.Range{{Of: "SG", Lo: lo, Hi: hi, Unit: "20/20"}}
}

// FitNotes returns the notes that a value carries when it was converted with e:
// outside the fitted range, with the fit that would serve.
func FitNotes(e method.Entry[Fit], s SG) []method.Note { return e.InRange(float64(s)) }

// ASBC returns extract [°P] at SG 20/20 s (in air); 0.003 °P to 20 °P.
// Source: ASBC Methods of Analysis. (A copy with 1114.14 for 1111.14, and one
// with 135.977 for 135.997, circulate: at water the fit must give about 0.)
func ASBC(s SG) Plato {
	x := float64(s)
	return Plato(-616.868 + x*(1111.14+x*(-630.272+x*135.997)))
}

func asbcSlope(x float64) float64 { return 1111.14 + x*(-2*630.272+x*3*135.997) }

// NBS returns extract [°Bx] at SG 20/20 s (in air); 0.0017 °Bx for 1 to 40 °Bx.
// Source: fit of NBS Circular C440 (1942), Table 114.
func NBS(s SG) Plato {
	x := float64(s)
	return Plato(-669.5622 + x*(1262.7794+x*(-775.6821+x*182.4601)))
}

func nbsSlope(x float64) float64 { return 1262.7794 + x*(-2*775.6821+x*3*182.4601) }

// Lincoln returns extract [°P] at SG 20/20 s; 0.005 °P to 20 °P.
func Lincoln(s SG) Plato {
	x := float64(s)
	return Plato((463 - 205*x) * (x - 1))
}

func lincolnSG(p Plato) (SG, error) {
	// 205 S² − 668 S + 463 + P = 0
	return within(p, (668-math.Sqrt(668*668-820*(463+float64(p))))/410, Lincoln)
}

// Rational258 returns extract [°P] at SG 20/20 s; 0.015 °P to 30 °P.
func Rational258(s SG) Plato {
	d := float64(s) - 1
	return Plato(258.6 * d / (1 + 227.1/258.2*d))
}

func rational258SG(p Plato) (SG, error) {
	x := float64(p)
	return within(p, 1+x/(258.6-227.1*x/258.2), Rational258)
}

// BallingExtract returns extract [°Balling] by 260 (1 − 1/S), on the 17.5 °C
// basis of its time; −0.16 at 25. Source: Balling 1865.
func BallingExtract(s SG) Plato { return Plato(260 * (1 - 1/float64(s))) }

func ballingSG(p Plato) (SG, error) {
	return within(p, 260/(260-float64(p)), BallingExtract)
}

// sps4At20 is the sucrose model at 20 °C, which every true conversion uses.
var sps4At20 = SucroseAt(20)

func sps4Extract(s SG) Plato {
	p, err := sps4At20.Extract(Density(s) * sps4At20.Water())
	if err != nil {
		// Beyond the model's ends the nearest end is returned; MinSG and MaxSG
		// keep every checked value far inside.
		if s < 1 {
			return 100 * minSucrose
		}
		return 100 * maxSucrose
	}
	return p
}

func sps4SG(p Plato) (SG, error) {
	// Far outside, the polynomial comes back to densities that liquids have.
	if !(p >= 100*minSucrose && p <= 100*maxSucrose) {
		return 0, extractError(p, sps4Extract)
	}
	return within(p, float64(sps4At20.Density(p)/sps4At20.Water()), sps4Extract)
}

// inverse returns the inverse of a polynomial fit by bracketed root finding,
// tolerance 1e-12 SG.
func inverse(f func(SG) Plato, slope func(float64) float64) func(Plato) (SG, error) {
	return func(p Plato) (SG, error) {
		s, err := root.Find(func(x float64) (float64, float64) {
			return float64(f(SG(x)) - p), slope(x)
		}, float64(MinSG), float64(MaxSG), 1e-12)
		if err != nil {
			return 0, extractError(p, f)
		}
		return SG(s), nil
	}
}

// within refuses an algebraic inverse outside the limits that all fits share.
func within(p Plato, s float64, f func(SG) Plato) (SG, error) {
	if !(s >= float64(MinSG) && s <= float64(MaxSG)) {
		return 0, extractError(p, f)
	}
	return SG(s), nil
}

func extractError(p Plato, f func(SG) Plato) error {
	return &method.RangeError{
		What: "extract", Got: float64(p), Unit: "% mass",
		Lo: math.Ceil(float64(f(MinSG))), Hi: math.Floor(float64(f(MaxSG))),
	}
}
