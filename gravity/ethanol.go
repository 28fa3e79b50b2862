package gravity

import "gylebook/gravity/method"

// EthanolFunc returns the density [kg/m³] of ethanol–water, a [% mass ethanol], t [°C].
type EthanolFunc func(a MassPct, t Celsius) Density

// EthanolDensities are the density models of ethanol–water mixtures.
var EthanolDensities = method.Set[EthanolFunc]{
	{Info: method.Info{
		ID: "oiml-r22", Kind: "ethanol density", Name: "density of ethanol-water mixtures",
		Source: method.Source{Author: "OIML R 22", Year: 1973, Where: "International alcoholometric tables; Directive 76/766/EEC", Status: method.Read},
		Valid:  []method.Range{{Of: "ethanol", Lo: 0, Hi: 100, Unit: "% mass"}, {Of: "temperature", Lo: -20, Hi: 40, Unit: "°C"}},
		Error:  "rms 3e-5 SG against the USP alcoholometric table",
		Check:  "USP 29 alcoholometric table, GOST example",
		Use:    "ethanol and water without extract",
	}, Fn: EthanolDensity},
}

// PureEthanol20 is the density of ethanol at 20 °C [kg/m³], OIML R 22.
const PureEthanol20 Density = 789.24

// The coefficients of OIML R 22 (1973). A1–A5 and B1–B4 were read in Directive
// 76/766/EEC; the others come from transcriptions.
var (
	r22A = [12]float64{
		9.982012300e2, -1.929769495e2, 3.891238958e2, -1.668103923e3, 1.352215441e4, -8.829278388e4,
		3.062874042e5, -6.138381234e5, 7.470172998e5, -5.478461354e5, 2.234460334e5, -3.903285426e4,
	}
	r22B = [6]float64{-2.0618513e-1, -5.2682542e-3, 3.6130013e-5, -3.8957702e-7, 7.1693540e-9, -9.9739231e-11}
	// r22C[i][k-1] multiplies p^k (t-20)^(i+1).
	r22C = [5][11]float64{
		{
			1.693443461530087e-1, -1.046914743455169e1, 7.196353469546523e1, -7.047478054272792e2, 3.924090430035045e3,
			-1.210164659068747e4, 2.248646550400788e4, -2.605562982188164e4, 1.852373922069467e4, -7.420201433430137e3, 1.285617841998974e3,
		},
		{
			-1.193013005057010e-2, 2.517399633803461e-1, -2.170575700536993, 1.353034988843029e1, -5.029988758547014e1,
			1.096355666577570e2, -1.422753946421155e2, 1.080435942856230e2, -4.414153236817392e1, 7.442971530188783,
		},
		{
			-6.802995733503803e-4, 1.876837790289664e-2, -2.002561813734156e-1, 1.022992966719220, -2.895696483903638,
			4.810060584300675, -4.672147440794683, 2.458043105903461, -5.411227621436812e-1,
		},
		{4.075376675622027e-6, -8.763058573471110e-6, 6.515031360099368e-6, -1.515784836987210e-6},
		{-2.788074354782409e-8, 1.345612883493354e-8},
	}
)

// EthanolIsotherm is the ethanol–water model at one temperature: a polynomial
// in the mass fraction of ethanol.
type EthanolIsotherm struct {
	T Celsius
	c [12]float64 // c[0] is water, kg/m³
}

// EthanolAt returns the model at t [°C].
func EthanolAt(t Celsius) EthanolIsotherm {
	iso := EthanolIsotherm{T: t, c: r22A}
	d := float64(t) - 20
	power := 1.0
	for _, b := range r22B {
		power *= d
		iso.c[0] += b * power
	}
	for k := range 11 {
		iso.c[k+1] += d * (r22C[0][k] + d*(r22C[1][k]+d*(r22C[2][k]+d*(r22C[3][k]+d*r22C[4][k]))))
	}
	return iso
}

// Coefficients returns the twelve coefficients of the powers of the mass fraction
// at this temperature, water [kg/m³] first.
func (e *EthanolIsotherm) Coefficients() []float64 { return append([]float64(nil), e.c[:]...) }

// Water returns the density of water of the same model [kg/m³].
func (e *EthanolIsotherm) Water() Density { return Density(e.c[0]) }

// Density returns the density [kg/m³] at a [% mass ethanol].
// OIML R 22 (1973), the general formula, collected in powers of p.
func (e *EthanolIsotherm) Density(a MassPct) Density {
	p := float64(a) / 100
	y := e.c[11]
	for k := 10; k >= 0; k-- {
		y = y*p + e.c[k]
	}
	return Density(y)
}

// EthanolDensity returns the density [kg/m³] of ethanol–water with a [% mass
// ethanol] at t [°C]; 0 to 100 %, -20 to 40 °C. Source: OIML R 22 (1973).
func EthanolDensity(a MassPct, t Celsius) Density {
	iso := EthanolAt(t)
	return iso.Density(a)
}

// VolumePercent returns the ethanol content by volume at 20 °C [% vol] of an
// ethanol–water mixture of a [% mass]. Source: OIML R 22 (1973), definition of
// alcoholic strength by volume.
func VolumePercent(a MassPct) VolPct {
	iso := EthanolAt(20)
	return VolPct(float64(a) * float64(iso.Density(a)/iso.Density(100)))
}
