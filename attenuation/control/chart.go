package control

import "math"

// Violation is a point that completes the pattern of one test or more.
type Violation struct {
	Point int // index, from 0
	Tests Set
}

// Chart is what an individuals and moving-range chart shows of its points.
type Chart struct {
	Limits
	N      int
	TooFew bool        // fewer than MinPoints: the limits are computed but not worth showing
	Tests  Set         // looked for
	Broken []Violation // in the order of the points
	// Wide are the points whose step from the point before is beyond the limit of
	// the moving range.
	Wide []int
}

// Individuals returns the chart of points in their order, with limits drawn from
// them. The errors are those of LimitsFrom.
func Individuals(points []float64, tests Set) (Chart, error) {
	l, err := LimitsFrom(points)
	if err != nil {
		return Chart{}, err
	}
	c := Chart{Limits: l, N: len(points), TooFew: len(points) < MinPoints, Tests: tests, Broken: l.Judge(points, tests)}
	for k := 1; k < len(points); k++ {
		if l.wide(points[k] - points[k-1]) {
			c.Wide = append(c.Wide, k)
		}
	}
	return c, nil
}

// wide leaves the last bits out of it, so that equal points are never wide.
func (l Limits) wide(step float64) bool {
	return math.Abs(step) > l.RangeLimit+slack*l.Sigma()
}

// Judge looks for the tests in points against these limits. Where there is no
// scatter nothing is out of the ordinary, and there are no violations.
func (l Limits) Judge(points []float64, tests Set) []Violation {
	z := l.standard(points, nil)
	if z == nil {
		return nil
	}
	var broken []Violation
	for k := range z {
		var at Set
		for _, n := range tests.Numbers() {
			if Tests[n-1].Fn(z, k) {
				at |= Of(n)
			}
		}
		if at != 0 {
			broken = append(broken, Violation{Point: k, Tests: at})
		}
	}
	return broken
}

// standard returns the points in standard deviations from the centre, in the room
// of z when that is large enough; nil when there is no scatter.
func (l Limits) standard(points, z []float64) []float64 {
	sigma := l.Sigma()
	if !(sigma > 0) {
		return nil
	}
	z = z[:0]
	for _, x := range points {
		z = append(z, (x-l.Centre)/sigma)
	}
	return z
}
