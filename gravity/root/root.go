// Package root finds the one zero of a monotone function on a bracket. It is the
// only numerical solver of the formula packages.
package root

import (
	"errors"
	"math"
)

// ErrNoBracket says that the function has the same sign at both ends, so the
// value asked for lies outside what the relation can give.
var ErrNoBracket = errors.New("no solution between the limits")

// maxSteps is far above what bisection alone needs for a float64.
const maxSteps = 200

// Find returns x in [lo, hi] with f(x) = 0 to within tol in x. f returns its
// value and its slope; a Newton step is taken while it stays inside the bracket
// and shrinks it, otherwise the bracket is halved (the safeguarded Newton of
// Dekker and Brent, see Dahlquist & Björck, Numerical Methods, section 6.2).
// It returns ErrNoBracket when f has one sign at both ends or is not a number.
func Find(f func(x float64) (y, slope float64), lo, hi, tol float64) (float64, error) {
	ylo, _ := f(lo)
	yhi, _ := f(hi)
	switch {
	case ylo == 0:
		return lo, nil
	case yhi == 0:
		return hi, nil
	case !(ylo*yhi < 0):
		return 0, ErrNoBracket
	}
	if ylo > 0 {
		lo, hi = hi, lo
	}
	// From here on f(lo) < 0 < f(hi), whichever way lo and hi lie.
	x := (lo + hi) / 2
	for range maxSteps {
		y, slope := f(x)
		if y == 0 {
			return x, nil
		}
		if y < 0 {
			lo = x
		} else {
			hi = x
		}
		next := x - y/slope
		if !between(next, lo, hi) {
			next = (lo + hi) / 2
		}
		if math.Abs(next-x) <= tol {
			return next, nil
		}
		x = next
	}
	return x, nil
}

func between(x, a, b float64) bool {
	return x >= math.Min(a, b) && x <= math.Max(a, b)
}
