package selfcheck

import (
	"slices"

	"gylebook/attenuation"
	"gylebook/gravity"
	"gylebook/gravity/method"
	"gylebook/tempcorr"
)

// wrong is one relation and the registries with a relative error in it.
type wrong struct {
	info method.Info
	with func(eps float64) Relations
}

// shifted returns a copy of a set in which the k-th function is another.
func shifted[F any](s method.Set[F], k int, wrap func(F) F) method.Set[F] {
	c := slices.Clone(s)
	c[k].Fn = wrap(c[k].Fn)
	return c
}

// wrongLiquids makes the densities and the refraction wrong: a water by a hundredth
// of the error, the others in what they add to water.
func wrongLiquids() []wrong {
	base := Offered()
	var all []wrong
	add := func(i method.Info, set func(r *Relations, eps float64)) {
		all = append(all, wrong{i, func(eps float64) Relations {
			r := base
			set(&r, eps)
			return r
		}})
	}
	for k, e := range base.Waters {
		// A density: a millionth part is what the rows are good for.
		add(e.Info, func(r *Relations, eps float64) {
			r.Waters = shifted(r.Waters, k, func(f gravity.WaterFunc) gravity.WaterFunc {
				return func(t gravity.Celsius) gravity.Density { return f(t) * gravity.Density(1+eps/100) }
			})
		})
	}
	for k, e := range base.Sucrose {
		add(e.Info, func(r *Relations, eps float64) {
			r.Sucrose = shifted(r.Sucrose, k, func(f gravity.SucroseFunc) gravity.SucroseFunc {
				return func(p gravity.Plato, t gravity.Celsius) gravity.Density {
					return f(0, t) + (f(p, t)-f(0, t))*gravity.Density(1+eps)
				}
			})
		})
	}
	for k, e := range base.Ethanol {
		add(e.Info, func(r *Relations, eps float64) {
			r.Ethanol = shifted(r.Ethanol, k, func(f gravity.EthanolFunc) gravity.EthanolFunc {
				return func(a gravity.MassPct, t gravity.Celsius) gravity.Density {
					return f(0, t) + (f(a, t)-f(0, t))*gravity.Density(1+eps)
				}
			})
		})
	}
	for k, e := range base.Refractions {
		add(e.Info, func(r *Relations, eps float64) {
			r.Refractions = shifted(r.Refractions, k, func(f func(gravity.Plato) float64) func(gravity.Plato) float64 {
				return func(p gravity.Plato) float64 { return f(0) + (f(p)-f(0))*(1+eps) }
			})
		})
	}
	return all
}

// wrongScales makes the fits and the scales wrong, each scale both ways.
func wrongScales() []wrong {
	base := Offered()
	var all []wrong
	add := func(i method.Info, set func(r *Relations, eps float64)) {
		all = append(all, wrong{i, func(eps float64) Relations {
			r := base
			set(&r, eps)
			return r
		}})
	}
	for k, e := range base.Fits {
		add(e.Info, func(r *Relations, eps float64) {
			r.Fits = shifted(r.Fits, k, func(f gravity.Fit) gravity.Fit {
				x := f.Extract
				f.Extract = func(s gravity.SG) gravity.Plato { return x(1 + (s-1)*gravity.SG(1+eps)) }
				back := f.SG
				f.SG = func(p gravity.Plato) (gravity.SG, error) {
					s, err := back(p)
					return 1 + (s-1)/gravity.SG(1+eps), err
				}
				return f
			})
		})
	}
	for k, e := range base.Scales {
		add(e.Info, func(r *Relations, eps float64) {
			r.Scales = shifted(r.Scales, k, func(f gravity.ScaleFn) gravity.ScaleFn {
				sg := f.SG
				f.SG = func(v float64) float64 { return 1 + (sg(v)-1)*(1+eps) }
				return f
			})
		})
		add(e.Info, func(r *Relations, eps float64) {
			r.Scales = shifted(r.Scales, k, func(f gravity.ScaleFn) gravity.ScaleFn {
				of := f.Of
				f.Of = func(s float64) float64 { return of(s) * (1 + eps) }
				return f
			})
		})
	}
	return all
}

// wrongMethods makes the corrections and the alcohol methods wrong.
func wrongMethods() []wrong {
	base := Offered()
	var all []wrong
	add := func(i method.Info, set func(r *Relations, eps float64)) {
		all = append(all, wrong{i, func(eps float64) Relations {
			r := base
			set(&r, eps)
			return r
		}})
	}
	for k, e := range base.Corrections {
		add(e.Info, func(r *Relations, eps float64) {
			r.Corrections = shifted(r.Corrections, k, func(f tempcorr.Func) tempcorr.Func {
				return func(h tempcorr.Float, x float64, s tempcorr.Sample) (float64, error) {
					y, err := f(h, x, s)
					return x + (y-x)*(1+eps), err
				}
			})
		})
	}
	for k, e := range base.RefractometerCorrections {
		add(e.Info, func(r *Relations, eps float64) {
			r.RefractometerCorrections = shifted(r.RefractometerCorrections, k, func(f tempcorr.RefractometerFunc) tempcorr.RefractometerFunc {
				return func(b gravity.Plato, t gravity.Celsius) (gravity.Plato, error) {
					c, err := f(b, t)
					return c * gravity.Plato(1+eps), err
				}
			})
		})
	}
	for k, e := range base.ABV {
		add(e.Info, func(r *Relations, eps float64) {
			r.ABV = shifted(r.ABV, k, func(f attenuation.ABVFunc) attenuation.ABVFunc { return stronger(f, 1+eps) })
		})
	}
	return all
}

// stronger multiplies all that a method gives.
func stronger(f attenuation.ABVFunc, by float64) attenuation.ABVFunc {
	return func(g attenuation.Gravities) (attenuation.Alcohol, error) {
		a, err := f(g)
		a.ABV *= gravity.VolPct(by)
		if a.ABW != nil {
			abw := *a.ABW * gravity.MassPct(by)
			a.ABW = &abw
		}
		if a.RE != nil {
			re := *a.RE * gravity.Plato(by)
			a.RE = &re
		}
		return a, err
	}
}
