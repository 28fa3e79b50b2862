package main

import (
	"math"

	"github.com/urfave/cli/v2"

	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// degrees are rows of sample temperatures in the unit in use.
type degrees struct {
	span
	unit asread.Unit
}

// degreesOf reads --from, --to and --step over rows that are c in °C, or f in °F.
func (b *bench) degreesOf(ctx *cli.Context, c, f span) (degrees, error) {
	d := degrees{span: c, unit: b.set.units}
	if d.unit == asread.F {
		d.span = f
	}
	var err error
	d.span, err = spanOf(ctx, d.span, func(text string) (float64, error) {
		t, err := b.temperature(text)
		if d.unit == asread.F {
			return t.C.Fahrenheit(), err
		}
		return float64(t.C), err
	})
	return d, err
}

// head is the head of their column.
func (d degrees) head() string { return "°" + string(d.unit) }

// each gives every row as a temperature and as its text.
func (d degrees) each(do func(t gravity.Celsius, text string) error) error {
	return d.span.each(func(v float64) error {
		text := fixed(v, 0)
		if v != math.Trunc(v) {
			text = fixed(v, 1)
		}
		if d.unit == asread.F {
			return do(gravity.FromFahrenheit(v), text)
		}
		return do(gravity.Celsius(v), text)
	})
}
