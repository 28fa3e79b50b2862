package curve

import (
	"math"
	"math/rand/v2"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/stat"
)

// Sizes of the importance sampling.
const (
	proposals   = 600
	kept        = 800
	maxRounds   = 3
	enoughESS   = 0.3  // share of the proposals
	mainShare   = 0.85 // of the proposals that lie about the top
	mainFree    = 4.0
	firstWiden  = 1.5
	secondWiden = 1.3
)

// The seed is fixed: a forecast is a figure, not an experiment.
const seed1, seed2 = 0x67796c65, 0x626f6f6b

func source() *rand.PCG { return rand.NewPCG(seed1, seed2) }

// draws gives equally weighted parameters from the posterior and the effective
// size of the sample they come from (Kong 1992). The proposal is a Student t
// about the top with the curvature there (Laplace), and a part shaped like the
// prior, which guards against a top that is narrower than what lies around it.
func (p *posterior) draws(top []float64, curvature *mat.SymDense, src *rand.PCG) ([]*drawn, float64) {
	centre, scale := top, inverse(curvature)
	scale.ScaleSym(firstWiden, scale)
	wide, ok := p.prior.wide(p.sdOG, src)
	if !ok {
		return []*drawn{newDrawn(top, p.og)}, 1
	}
	var xs [][]float64
	var weights []float64
	ess := 0.0
	for range maxRounds {
		near, ok := newStudent(centre, scale, mainFree, src)
		if !ok { // the curvature was no use, the prior alone proposes
			near = wide
		}
		xs, weights = p.round(near, wide)
		ess = effective(weights)
		if !(ess > 0) { // no proposal describes a fermentation
			return []*drawn{newDrawn(top, p.og)}, 1
		}
		if ess > enoughESS*proposals {
			break
		}
		centre, scale = moments(xs, weights)
		scale.ScaleSym(secondWiden, scale)
	}
	return resampled(xs, weights, p.og, rand.New(src).Float64()), ess
}

// round draws the proposals and weighs each by what it should have been drawn
// with.
func (p *posterior) round(near, wide *student) ([][]float64, []float64) {
	xs := make([][]float64, proposals)
	logs := make([]float64, proposals)
	space := make([]float64, proposals*(dims+1))
	most := math.Inf(-1)
	for i := range xs {
		from := near
		if float64(i) >= mainShare*proposals {
			from = wide
		}
		x := from.Rand(space[i*(dims+1) : (i+1)*(dims+1)])
		xs[i], logs[i] = x, p.height(x)
		if math.IsInf(logs[i], -1) {
			continue
		}
		a := math.Log(mainShare) + near.logProb(x)
		b := math.Log(1-mainShare) + wide.logProb(x)
		logs[i] -= math.Max(a, b) + math.Log1p(math.Exp(-math.Abs(a-b)))
		most = math.Max(most, logs[i])
	}
	total := 0.0
	for i := range logs {
		logs[i] = math.Exp(logs[i] - most)
		total += logs[i]
	}
	for i := range logs {
		logs[i] /= total
	}
	return xs, logs
}

func effective(weights []float64) float64 {
	sum := 0.0
	for _, w := range weights {
		sum += w * w
	}
	return 1 / sum
}

// moments gives the weighted mean and covariance.
func moments(xs [][]float64, weights []float64) ([]float64, *mat.SymDense) {
	n := len(xs[0])
	x := mat.NewDense(len(xs), n, nil)
	scaled := make([]float64, len(weights))
	for i := range xs {
		x.SetRow(i, xs[i])
		scaled[i] = weights[i] * float64(len(weights))
	}
	mean := make([]float64, n)
	for k := range n {
		mean[k] = stat.Mean(mat.Col(nil, k, x), scaled)
	}
	cov := mat.NewSymDense(n, nil)
	stat.CovarianceMatrix(cov, x, scaled)
	for k := range n {
		cov.SetSym(k, k, cov.At(k, k)+1e-9)
	}
	return mean, cov
}

// resampled takes points at equal steps of the cumulated weight (systematic
// resampling), from one uniform number.
func resampled(xs [][]float64, weights []float64, og, u float64) []*drawn {
	out := make([]*drawn, 0, kept)
	i, sum := 0, weights[0]
	var now *drawn
	from := -1
	for k := range kept {
		at := (u + float64(k)) / kept
		for sum < at && i < len(xs)-1 {
			i++
			sum += weights[i]
		}
		if from != i {
			now, from = newDrawn(xs[i], og), i
		}
		out = append(out, now)
	}
	return out
}

// inverse of a curvature; one that has none gives a small round matrix, from
// which the later rounds recover.
func inverse(a *mat.SymDense) *mat.SymDense {
	n := a.SymmetricDim()
	var chol mat.Cholesky
	out := mat.NewSymDense(n, nil)
	if chol.Factorize(a) && usableDespite(chol.InverseTo(out)) {
		return out
	}
	for k := range n {
		out.SetSym(k, k, 0.01)
	}
	return out
}
