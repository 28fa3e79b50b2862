// Package gravity holds the scales a hydrometer is read on and the liquids it
// floats in: typed quantities, the published fits between specific gravity and
// extract, the densities of water, sucrose solution and ethanol–water, the
// Balling balance and the fermenting mixture.
//
// Conventions: temperatures in °C on ITS-90, densities in kg/m³ at 101 325 Pa,
// shares by mass in %. A bare SG is true relative density 20/20 °C; any other
// reference travels as a Relative with its pair. Each liquid model keeps its own
// water, and a relative density is always formed with the water of the same
// model.
package gravity
