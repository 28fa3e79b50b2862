package chart

import (
	"fmt"
	"math"
	"strconv"
)

// largest is the greatest number that is drawn: beyond it the labels of an axis
// leave no room for the picture.
const largest = 1e9

// drawable is false for NaN and infinity too.
func drawable(x float64) bool { return math.Abs(x) <= largest }

func checkNumber(what string, x float64) error {
	if !drawable(x) {
		return &InputError{What: what, Read: plain(x), Wanted: fmt.Sprintf("a number from %g to %g", -largest, largest)}
	}
	return nil
}

// checkRising wants numbers that rise, as many of them as of each other list.
func checkRising(what string, x []float64, others ...[]float64) error {
	for _, o := range others {
		if len(o) != len(x) {
			return &InputError{What: what, Read: fmt.Sprintf("%d x and %d y", len(x), len(o)), Wanted: "as many of each"}
		}
	}
	for k := range x {
		at := what + " " + strconv.Itoa(k+1)
		if err := checkNumber(at+": x", x[k]); err != nil {
			return err
		}
		if k > 0 && x[k] <= x[k-1] {
			return &InputError{What: at + ": x", Read: plain(x[k]) + " after " + plain(x[k-1]), Wanted: "x that rises"}
		}
		for _, o := range others {
			if err := checkNumber(at+": y", o[k]); err != nil {
				return err
			}
		}
	}
	return nil
}

func (l *Line) check(what string) error {
	if l == nil {
		return nil
	}
	return checkRising(what, l.X, l.Y)
}

func (b *Band) check(what string) error {
	if b == nil {
		return nil
	}
	if err := checkRising(what, b.X, b.Low, b.High); err != nil {
		return err
	}
	for k := range b.X {
		if b.Low[k] > b.High[k] {
			return &InputError{
				What: fmt.Sprintf("%s %d", what, k+1), Read: "from " + plain(b.Low[k]) + " to " + plain(b.High[k]),
				Wanted: "low below high",
			}
		}
	}
	return nil
}

func (c Course) check() error {
	for k, m := range c.Marks {
		if drawable(m.X) && drawable(m.Y) && drawable(m.U) && m.U >= 0 {
			continue
		}
		at := "mark " + strconv.Itoa(k+1)
		if err := firstError(checkNumber(at+": x", m.X), checkNumber(at+": y", m.Y), checkNumber(at+": uncertainty", m.U)); err != nil {
			return err
		}
		return &InputError{What: at + ": uncertainty", Read: plain(m.U), Wanted: "0 or more"}
	}
	for k, f := range c.Flags {
		if !drawable(f.X) {
			return checkNumber(fmt.Sprintf("flag %d: x", k+1), f.X)
		}
	}
	if c.Limit != nil {
		if err := checkNumber("limit", c.Limit.Y); err != nil {
			return err
		}
	}
	return firstError(c.Fitted.check("fitted line"), c.Median.check("median"),
		c.Forecast.check("forecast"), c.Envelope.check("envelope"))
}

func (c Control) check() error {
	for k, p := range c.Points {
		if !drawable(p.Y) {
			return checkNumber(fmt.Sprintf("point %d", k+1), p.Y)
		}
	}
	if !c.HasLimits {
		return nil
	}
	limits := c.limits()
	for k, l := range limits {
		if err := checkNumber(l.Name, l.Y); err != nil {
			return err
		}
		if k > 0 && l.Y > limits[k-1].Y {
			return &InputError{
				What: l.Name, Read: plain(l.Y) + " above " + limits[k-1].Name + " " + plain(limits[k-1].Y),
				Wanted: "action, warning and centre in this order",
			}
		}
	}
	return nil
}

// limits are the lines of the chart from above.
func (c Control) limits() []Level {
	return []Level{
		{Name: "upper action limit", Y: c.ActionHigh},
		{Name: "upper warning limit", Y: c.WarningHigh},
		{Name: "centre", Y: c.Centre},
		{Name: "lower warning limit", Y: c.WarningLow},
		{Name: "lower action limit", Y: c.ActionLow},
	}
}
