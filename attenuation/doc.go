// Package attenuation turns two gravities, before and after fermentation, into
// extract, alcohol and attenuation: the alcohol by every published method with
// its range, apparent and real attenuation on a stated basis, the strength that
// a rule lets one declare, and how sure all of it is.
//
// Conventions: OE, AE and RE are original, apparent and real extract in % by
// mass, ABW is ethanol in % by mass, ABV ethanol in % by volume at 20 °C, OG and
// FG are SG 20/20 °C. Alcohol by mass becomes alcohol by volume through the
// density of the liquid, FG times water of 998.2 kg/m³, over ethanol of
// 789.24 kg/m³.
package attenuation
