package gravity

import "gylebook/gravity/method"

// WaterFunc returns the density [kg/m³] of air-free water at t [°C], 101 325 Pa.
type WaterFunc func(t Celsius) Density

// Waters are the water densities. The first is the recommended reference; the
// second is the water term of the sucrose model.
var Waters = method.Set[WaterFunc]{
	{Info: method.Info{
		ID: "tanaka2001", Kind: "water", Name: "density of water",
		Source: method.Source{Author: "Tanaka et al.", Year: 2001, Where: "Metrologia 38, 301", Status: method.Read},
		Valid:  []method.Range{{Of: "temperature", Lo: 0, Hi: 40, Unit: "°C"}},
		Error:  "within 0.0012 kg/m³ of IAPWS-95",
		Check:  "IAPWS-95 and quoted values",
		Use:    "reference density of water", Better: "kell-its90",
	}, Fn: Tanaka},
	{Info: method.Info{
		ID: "kell-its90", Kind: "water", Name: "density of water, ITS-90 form of Kell",
		Source: method.Source{Author: "Bettin & Spieweck", Year: 1990, Where: "PTB-Mitteilungen 100, 195 (page from memory)", Status: method.Quoted},
		Valid:  []method.Range{{Of: "temperature", Lo: 0, Hi: 100, Unit: "°C"}},
		Error:  "within 0.0058 kg/m³ of IAPWS-95 up to 99 °C",
		Check:  "IAPWS-95",
		Use:    "the water term of the sucrose model sps4",
	}, Fn: Kell},
}

// Tanaka returns the density of air-free water [kg/m³] at t [°C], 0 to 40 °C,
// 101 325 Pa; stated uncertainty below 0.001 kg/m³.
// Source: Tanaka, Girard, Davis, Peuto & Bignell 2001, Metrologia 38, 301.
func Tanaka(t Celsius) Density {
	const a1, a2, a3, a4, a5 = -3.983035, 301.797, 522528.9, 69.34881, 999.974950
	x := float64(t)
	// Tanaka et al. (2001), eq. 1
	return Density(a5 * (1 - (x+a1)*(x+a1)*(x+a2)/(a3*(x+a4))))
}

// Kell returns the density of water [kg/m³] at t [°C], 0 to 100 °C, 101 325 Pa,
// in the ITS-90 form that belongs to ICUMSA SPS-4; within 0.0058 kg/m³ of
// IAPWS-95. Source: Bettin & Spieweck 1990.
func Kell(t Celsius) Density {
	x := float64(t)
	n := 999.83952 + x*(16.952577+x*(-7.9905127e-3+x*(-46.241757e-6+x*(105.84601e-9-x*281.03006e-12))))
	return Density(n / (1 + 16.887236e-3*x))
}
