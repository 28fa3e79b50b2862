package selfcheck

import (
	"gylebook/attenuation"
	"gylebook/attenuation/control"
	"gylebook/gravity"
	"gylebook/gravity/method"
	"gylebook/tempcorr"
)

// Relations is every registry that is checked; a test hands in a changed copy.
type Relations struct {
	Waters                   method.Set[gravity.WaterFunc]
	Sucrose                  method.Set[gravity.SucroseFunc]
	Ethanol                  method.Set[gravity.EthanolFunc]
	Fits                     method.Set[gravity.Fit]
	Scales                   method.Set[gravity.ScaleFn]
	Refractions              method.Set[func(p gravity.Plato) float64]
	Corrections              method.Set[tempcorr.Func]
	RefractometerCorrections method.Set[tempcorr.RefractometerFunc]
	ABV                      method.Set[attenuation.ABVFunc]
	Refractometer            method.Set[attenuation.RefractometerFunc]
}

// Offered returns the registries of the program.
func Offered() Relations {
	return Relations{
		Waters:                   gravity.Waters,
		Sucrose:                  gravity.SucroseDensities,
		Ethanol:                  gravity.EthanolDensities,
		Fits:                     gravity.Fits,
		Scales:                   gravity.ScaleRelations,
		Refractions:              gravity.Refractions,
		Corrections:              tempcorr.Methods,
		RefractometerCorrections: tempcorr.RefractometerMethods,
		ABV:                      attenuation.ABVMethods,
		Refractometer:            attenuation.RefractometerMethods,
	}
}

// Infos lists the provenance of every relation: the registries in order, each
// followed by the single formulas of the same matter.
func (r Relations) Infos() []method.Info {
	var infos []method.Info
	for _, more := range [][]method.Info{
		r.Waters.Infos(), r.Sucrose.Infos(), r.Ethanol.Infos(),
		{gravity.TabarieInfo},
		r.Fits.Infos(), r.Scales.Infos(), r.Refractions.Infos(), gravity.FormulaInfos,
		r.Corrections.Infos(), r.RefractometerCorrections.Infos(), tempcorr.FormulaInfos,
		r.ABV.Infos(), r.Refractometer.Infos(), attenuation.FormulaInfos,
		control.FormulaInfos, control.Tests.Infos(),
	} {
		infos = append(infos, more...)
	}
	return infos
}
