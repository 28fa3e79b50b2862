package curve

import (
	"math"
	"math/rand/v2"

	"gonum.org/v1/gonum/mat"
)

// dims is the number of parameters that batches share; the offset of the
// original gravity belongs to one batch.
const dims = 4

// The normal-inverse-Wishart prior before any batch: as much as a fifth of a
// batch about the centre, and six degrees of freedom about the spread.
const (
	kappa0  = 0.2
	nu0     = 6.0
	maxFree = 5.0 // degrees of freedom shown outwards: the tails stay heavy

	shrinkCorrelations = 10.0 // batches at which half of a correlation is believed
)

// Prior is what is known of a batch before its first reading: a Student t
// distribution of the four parameters. Make one with NewPrior; it is not
// changed afterwards and may be shared.
type Prior struct {
	Kind     Kind
	Tau      float64 // error of the curve, points, from the residuals of the finished batches
	finished []Fitted
	centre   [dims]float64
	spread   *mat.SymDense // scale matrix of the t distribution
	precise  [dims][dims]float64
	free     float64 // its degrees of freedom
	late     float64 // logarithm of how late the end comes against the curve
}

// NewPrior takes the cold start of the kind and adds every finished batch. A
// batch whose parameters are not finite is left out.
func NewPrior(kind Kind, finished []Fitted) Prior {
	p := Prior{Kind: kind, Tau: coldTau}
	var thetas []float64
	for _, f := range finished {
		if f.usable() {
			p.finished = append(p.finished, f)
			v := f.Params.vector()
			thetas = append(thetas, v[:dims]...)
		}
	}
	p.spreadOf(thetas)
	p.Tau = tauOf(p.finished)
	p.late = lateOf(p.finished)
	return p
}

// History is the number of finished batches in the prior.
func (p Prior) History() int { return len(p.finished) }

// spreadOf makes the predictive distribution of the next batch from the
// parameters of the finished ones, dims numbers each (Gelman et al. 2013,
// section 3.6).
func (p *Prior) spreadOf(thetas []float64) {
	start := p.Kind.coldStart()
	n := float64(len(thetas) / dims)
	// The scale before any batch is such that the predictive covariance, that of
	// a t distribution of free0 degrees of freedom, is the spread squared.
	free0 := nu0 - dims + 1
	psi := mat.NewSymDense(dims, nil)
	for k, sd := range start.spread {
		psi.SetSym(k, k, sd*sd*kappa0*(free0-2)/(kappa0+1))
	}
	p.centre = start.centre
	if n > 0 {
		x := mat.NewDense(int(n), dims, thetas)
		off := mat.NewVecDense(dims, nil)
		for k := range dims {
			v := start.spread[k] * start.spread[k] * kappa0 / (kappa0 + 1) // worth one batch
			mean := robustMean(mat.Col(nil, k, x), v)
			off.SetVec(k, mean-start.centre[k])
			p.centre[k] = (kappa0*start.centre[k] + n*mean) / (kappa0 + n)
			for i := range int(n) { // the scatter keeps the odd ones whole: they may come again
				x.Set(i, k, x.At(i, k)-mean)
			}
		}
		for i := range int(n) {
			psi.SymRankOne(psi, 1, x.RowView(i))
		}
		psi.SymRankOne(psi, kappa0*n/(kappa0+n), off)
	}
	free := nu0 + n - dims + 1
	psi.ScaleSym((kappa0+n+1)/((kappa0+n)*free), psi)
	// Correlations of a few batches are chance: they are shrunk towards none.
	for i := range dims {
		for j := range i {
			psi.SetSym(i, j, psi.At(i, j)*n/(n+shrinkCorrelations))
		}
	}
	if free > maxFree { // keeps the covariance
		psi.ScaleSym(free/(free-2)*(maxFree-2)/maxFree, psi)
		free = maxFree
	}
	p.spread, p.free = psi, free
	var chol mat.Cholesky
	var inverse mat.SymDense
	// The scale is positive definite by its first term, so this does not fail.
	if chol.Factorize(psi) && usableDespite(chol.InverseTo(&inverse)) {
		for i := range dims {
			for j := range dims {
				p.precise[i][j] = inverse.At(i, j)
			}
		}
	}
}

// quadratic is the squared distance from the centre in units of the scale.
func (p Prior) quadratic(x []float64) float64 {
	q := 0.0
	for i := range dims {
		di := x[i] - p.centre[i]
		for j := range dims {
			q += di * p.precise[i][j] * (x[j] - p.centre[j])
		}
	}
	return q
}

// logDensity is the logarithm of the density, without its constant.
func (p Prior) logDensity(x []float64) float64 {
	return -0.5 * (p.free + dims) * math.Log1p(p.quadratic(x)/p.free)
}

// wide gives the proposal that has the shape of the prior, with the spread of
// the original gravity as its fifth dimension.
func (p Prior) wide(sdOG float64, src rand.Source) (*student, bool) {
	scale := mat.NewSymDense(dims+1, nil)
	for i := range dims {
		for j := range i + 1 {
			scale.SetSym(i, j, p.spread.At(i, j))
		}
	}
	scale.SetSym(dims, dims, math.Max(sdOG*sdOG, 1e-12))
	centre := append(append([]float64(nil), p.centre[:]...), 0)
	return newStudent(centre, scale, p.free, src)
}

// Centre gives the parameters at the middle of the prior.
func (p Prior) Centre() Params {
	if p.spread == nil {
		p = NewPrior(p.Kind, nil)
	}
	return Params{AA: p.centre[0], LnT50: p.centre[1], Phi: p.centre[2], LnS: p.centre[3]}
}
