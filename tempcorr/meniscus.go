package tempcorr

import "math"

const (
	standardGravity = 9.80665 // m/s²
	// Surface tensions in mN/m, beer from memory (42 to 48).
	tensionDrink      = 45.0
	tensionDrinkU     = 3.0
	tensionWater20    = 72.75
	kitTensionPoints  = 2.6 // kit instrument, 24 g on a 6.5 mm stem, adjusted in water (derived)
	labMeniscusPoints = 0.7 // 60 g on a 5 mm stem (derived)
	kitMeniscusPoints = 3.3 // 24 g on a 6.5 mm stem (derived)
)

// MeniscusHeight returns the rise of the liquid on a stem [mm] from the stem's
// diameter [mm], surface tension [mN/m] and density [kg/m³].
// Source: Langberg's formula, from memory.
func MeniscusHeight(stemMM, tension, density float64) float64 {
	d, s := stemMM/1000, tension/1000
	k := density * standardGravity
	// Langberg: h = s/(rho G D) (sqrt(1 + 2 rho G D²/s) - 1)
	return 1000 * s / (k * d) * (math.Sqrt(1+2*k*d*d/s) - 1)
}

// ScaleSlope returns the points of relative density that one mm of stem stands
// for, from stem diameter [mm], mass [g] and the relative density floated in: a
// body of mass m displaces m/rho, and rising by dz it displaces A·dz less.
func ScaleSlope(stemMM, massG, r float64) float64 {
	area := math.Pi / 4 * stemMM * stemMM * 1e-6
	perMetre := area * r * r * 998.2 / (massG / 1000)
	return perMetre // SG per m is points per mm
}

// TensionPoints returns the correction in points for an instrument adjusted for
// one surface tension and floated in another [mN/m]; it is negative when the
// liquid pulls less than the one it was adjusted in. r is the relative density,
// stem diameter in mm, mass in g. Source: balance of forces on the stem.
func TensionPoints(r, stemMM, massG, adjusted, liquid float64) float64 {
	return -1000 * r * math.Pi * stemMM / 1000 * (adjusted - liquid) / 1000 / (massG / 1000 * standardGravity)
}

// meniscusPoints returns the correction [points] for reading at o what is meant
// to be read at the other place, its half-width, and whether it is only assumed.
func (h Hydrometer) meniscusPoints(readAt Meniscus, r float64) (points, halfWidth float64, assumed bool) {
	meant := h.ReadAt
	if meant == "" {
		meant = Bottom
	}
	if readAt == "" || readAt == meant {
		return 0, 0, false
	}
	sign := 1.0 // read at the top, meant for the bottom: reads low
	if readAt == Bottom {
		sign = -1
	}
	if h.StemMM > 0 && h.MassG > 0 {
		rho := r * 998.2
		slope := ScaleSlope(h.StemMM, h.MassG, r)
		rise := func(tension float64) float64 { return slope * MeniscusHeight(h.StemMM, tension, rho) }
		half := (rise(tensionDrink+tensionDrinkU) - rise(tensionDrink-tensionDrinkU)) / 2
		return sign * rise(tensionDrink), half, false
	}
	mid := (kitMeniscusPoints + labMeniscusPoints) / 2
	return sign * mid, (kitMeniscusPoints - labMeniscusPoints) / 2, true
}

// tension returns the surface tension correction [points] and the half-width of
// what is left of it.
func (h Hydrometer) tension(r float64) (points, halfWidth float64) {
	switch {
	case h.InLiquid:
		return 0, 0
	case h.StemMM > 0 && h.MassG > 0 && h.Adjusted > 0:
		rest := math.Abs(TensionPoints(r, h.StemMM, h.MassG, tensionDrinkU, 0))
		return TensionPoints(r, h.StemMM, h.MassG, h.Adjusted, tensionDrink), rest
	case h.StemMM > 0 && h.MassG > 0:
		return 0, math.Abs(TensionPoints(r, h.StemMM, h.MassG, tensionWater20, tensionDrink))
	case h.ID != "":
		return 0, kitTensionPoints
	}
	return 0, 0
}
