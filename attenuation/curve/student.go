package curve

import (
	"math"
	"math/rand/v2"

	"gonum.org/v1/gonum/mat"
	"gonum.org/v1/gonum/stat/distmv"
)

// student is a Student t distribution of the parameters of one batch that is asked for
// its density so often that what does not change is worked out once.
type student struct {
	*distmv.StudentsT
	centre   [dims + 1]float64
	lower    [dims + 1][dims + 1]float64 // Cholesky factor of the scale
	free     float64
	constant float64
}

// newStudent returns false for a scale that is not positive definite.
func newStudent(centre []float64, scale *mat.SymDense, free float64, src rand.Source) (*student, bool) {
	const n = dims + 1
	dist, ok := distmv.NewStudentsT(centre, scale, free, src)
	var chol mat.Cholesky
	if !ok || !chol.Factorize(scale) {
		return nil, false
	}
	s := &student{StudentsT: dist, free: free}
	copy(s.centre[:], centre)
	var lower mat.TriDense
	chol.LTo(&lower)
	logDet := 0.0
	for i := range n {
		for j := range i + 1 {
			s.lower[i][j] = lower.At(i, j)
		}
		logDet += math.Log(s.lower[i][i])
	}
	if chol.Cond() > mat.ConditionTolerance {
		logDet = math.NaN() // no digit of a distance would hold
	}
	upper, _ := math.Lgamma((free + n) / 2)
	half, _ := math.Lgamma(free / 2)
	s.constant = upper - half - n/2.0*math.Log(free*math.Pi) - logDet
	return s, true
}

// logProb is the logarithm of the density. The distance is that of the point in units
// of the scale, by forward substitution.
func (s *student) logProb(x []float64) float64 {
	const n = dims + 1
	var z [n]float64
	square := 0.0
	for i := range n {
		v := x[i] - s.centre[i]
		for j := range i {
			v -= s.lower[i][j] * z[j]
		}
		z[i] = v / s.lower[i][i]
		square += z[i] * z[i]
	}
	return s.constant - (s.free+n)/2*math.Log(1+square/s.free)
}
