package curve

import (
	"errors"
	"math"

	"gonum.org/v1/gonum/diff/fd"
	"gonum.org/v1/gonum/mat"
)

// hill is a function to be climbed, with its gradient and a positive definite
// stand-in for minus its curvature (Gauss–Newton).
type hill interface {
	height(x []float64) float64
	slope(x []float64, gradient *mat.VecDense, curvature *mat.SymDense)
}

// climber holds the limits of a climb.
type climber struct {
	rounds  int
	longest []float64 // the largest step of each parameter, nil for any
	gain    float64   // a round that gains less ends the climb
	tries   int       // dampings tried a round
}

// climb goes up from x by damped Gauss–Newton steps (Marquardt 1963, J. Soc.
// Ind. Appl. Math. 11, 431: the diagonal is scaled, so the units of the
// parameters do not matter). It returns the highest point seen, its height and
// the curvature of the last round.
func (c climber) climb(h hill, x []float64) ([]float64, float64, *mat.SymDense) {
	n := len(x)
	x = append([]float64(nil), x...)
	next := make([]float64, n)
	g, step := mat.NewVecDense(n, nil), mat.NewVecDense(n, nil)
	a, damped := mat.NewSymDense(n, nil), mat.NewSymDense(n, nil)
	var chol mat.Cholesky
	f, damping := h.height(x), 1e-2
	for range c.rounds {
		h.slope(x, g, a)
		gained := math.Inf(-1)
		for range c.tries {
			damped.CopySym(a)
			for k := range n {
				damped.SetSym(k, k, a.At(k, k)*(1+damping)+1e-300)
			}
			if chol.Factorize(damped) && solved(&chol, step, g) {
				for k := range n {
					s := step.AtVec(k)
					if c.longest != nil {
						s = clamp(s, -c.longest[k], c.longest[k])
					}
					next[k] = x[k] + s
				}
				if fn := h.height(next); fn > f {
					gained = fn - f
					f = fn
					copy(x, next)
					break
				}
			}
			damping *= 5
		}
		if math.IsInf(gained, -1) {
			break
		}
		damping = math.Max(damping/5, 1e-9)
		if gained < c.gain {
			break
		}
	}
	return x, f, a
}

// solved reports whether the step is usable. A badly conditioned matrix is: the
// climb only takes a step that goes up.
func solved(chol *mat.Cholesky, step, g *mat.VecDense) bool {
	return usableDespite(chol.SolveVecTo(step, g)) && !math.IsNaN(mat.Norm(step, 1))
}

// usableDespite passes the warning that a matrix is badly conditioned: there is
// a result beside it.
func usableDespite(err error) bool {
	var condition mat.Condition
	return err == nil || errors.As(err, &condition)
}

// squares is minus half a sum of squares, with derivatives by differences.
type squares struct {
	residuals func(r, x []float64)
	m         int
	r         []float64
	j         *mat.Dense
}

func (s *squares) height(x []float64) float64 {
	s.residuals(s.r, x)
	sum := 0.0
	for _, r := range s.r {
		sum += r * r
	}
	if math.IsNaN(sum) {
		return math.Inf(-1)
	}
	return -sum / 2
}

func (s *squares) slope(x []float64, g *mat.VecDense, a *mat.SymDense) {
	// The variables are scaled to about 1, so that one difference step suits all.
	size := make([]float64, len(x))
	unit := make([]float64, len(x))
	for k, v := range x {
		size[k] = math.Max(math.Abs(v), 1e-8)
		unit[k] = v / size[k]
	}
	real := make([]float64, len(x))
	fd.Jacobian(s.j, func(r, u []float64) {
		for k := range u {
			real[k] = u[k] * size[k]
		}
		s.residuals(r, real)
	}, unit, &fd.JacobianSettings{Formula: fd.Central})
	for k := range size {
		for i := range s.m {
			s.j.Set(i, k, s.j.At(i, k)/size[k])
		}
	}
	s.residuals(s.r, x)
	g.MulVec(s.j.T(), mat.NewVecDense(s.m, s.r))
	g.ScaleVec(-1, g)
	a.SymOuterK(1, s.j.T())
}

// LeastSquares finds the x that makes the sum of squares of m residuals least,
// from a start, and returns it with that sum. residuals writes them into r.
func LeastSquares(residuals func(r, x []float64), m int, start []float64) (x []float64, sum float64, err error) {
	if m < 1 || len(start) < 1 {
		return nil, 0, errors.New("least squares with no residual or no parameter, wanted at least one of each")
	}
	s := &squares{residuals: residuals, m: m, r: make([]float64, m), j: mat.NewDense(m, len(start), nil)}
	if math.IsInf(s.height(start), -1) {
		return nil, 0, errors.New("least squares: the residuals at the start are not finite, wanted another start")
	}
	x, f, _ := climber{rounds: 500, tries: 25}.climb(s, start)
	return x, -2 * f, nil
}
