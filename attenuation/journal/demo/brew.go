package demo

import (
	"math"
	"time"

	"gylebook/attenuation"
	"gylebook/gravity"
)

// uptake is how one yeast works: cells grow to what the liquid carries, and take
// up sugar in proportion to their number while there is enough of it.
type uptake struct {
	growth float64 // 1/h
	rate   float64 // share of the sugar that a full crop takes up in an hour
	start  float64 // pitched crop, share of the full one
	lag    float64 // h
}

const (
	scarce = 0.15 // share of sugar left at which uptake has halved
	steps  = 4    // an hour
)

// left returns the share of fermentable sugar left after each whole hour, for
// twice as long as any batch stays.
func (u uptake) left() []float64 {
	const hours = 24 * 150
	out := make([]float64, hours+1)
	x, s := u.start, 1.0
	for h := range out {
		out[h] = s
		for k := range steps {
			t := float64(h) + float64(k)/steps
			feed := s / (s + scarce)
			grown := u.growth * (1 - math.Exp(-t/u.lag)) * x * (1 - x) * feed
			s -= u.rate * x * feed / steps
			x += grown / steps
		}
		s = max(s, 0)
	}
	return out
}

// part is an amount of liquid or sugar that went into a batch at a time.
type part struct {
	from  time.Time
	wort  attenuation.Wort
	final gravity.Plato // apparent extract when it has fermented out
	left  []float64     // share of its sugar left, by hours after from
}

// ae is the part's apparent extract at a time.
func (p part) ae(at time.Time) gravity.Plato {
	h := at.Sub(p.from).Hours()
	if len(p.left) == 0 {
		return p.final
	}
	i := min(max(int(h), 0), len(p.left)-2)
	f := min(max(h-float64(i), 0), 1)
	s := p.left[i]*(1-f) + p.left[i+1]*f
	return p.final + gravity.Plato(s)*(p.wort.Extract-p.final)
}

// brew is what is truly in a batch.
type brew struct{ parts []part }

// at returns the true original extract and apparent gravity at a time. Both are
// weighted by mass over what had gone in by then.
func (b brew) at(at time.Time) (oe gravity.Plato, sg gravity.SG, err error) {
	var mass, o, a float64
	for _, p := range b.parts {
		if p.from.After(at) {
			continue
		}
		mass += p.wort.MassKg
		o += p.wort.MassKg * float64(p.wort.Extract)
		a += p.wort.MassKg * float64(p.ae(at))
	}
	sg, err = gravity.Fits.Default().Fn.SG(gravity.Plato(a / mass))
	return gravity.Plato(o / mass), sg, err
}

// sugarFinal is the apparent extract of 100 parts of sugar that fermented out in
// a liquid of usual strength: the Balling quotient is 1.22 + 0.001 OE, here of
// 12 °P, and what it takes off beyond the sugar shows as less than none.
const sugarFinal gravity.Plato = 100 - 123.2
