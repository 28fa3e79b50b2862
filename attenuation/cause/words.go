package cause

import (
	"fmt"
	"math"
	"strings"
	"time"

	"gylebook/gravity/asread"
)

func one(x float64) string    { return asread.Fixed(x, 1, asread.HalfEven) }
func signed(x float64) string { return asread.Signed(x, 1) }
func day(t time.Time) string  { return t.Format(time.DateOnly) }

// counted is "1 batch" or "3 batches".
func counted(n int, single, plural string) string {
	if n == 1 {
		return "1 " + single
	}
	return fmt.Sprintf("%d %s", n, plural)
}

// lack says that there are too few.
func lack(n, want int, single, plural string) string {
	if n == 0 {
		return fmt.Sprintf("no %s, wanted %d", single, want)
	}
	return fmt.Sprintf("%s, wanted %d", counted(n, single, plural), want)
}

func sentences(parts ...string) string {
	kept := parts[:0:0]
	for _, p := range parts {
		if p != "" {
			kept = append(kept, p)
		}
	}
	return strings.Join(kept, "; ")
}

// explained fills what a hypothesis explains; figures that are not finite are
// none.
func (h *Hypothesis) explained(points, u float64) {
	if !finite(points, u) {
		h.Why = "the figures cannot be computed"
		return
	}
	h.Explains, h.U = &points, &u
}

// nothing says that a cause was looked for and not found.
func (h *Hypothesis) nothing() { h.Explains = new(float64) }

func quadrature(xs ...float64) float64 {
	sum := 0.0
	for _, x := range xs {
		sum += x * x
	}
	return math.Sqrt(sum)
}

func ratio(x float64) string { return asread.Fixed(x, 2, asread.HalfEven) }

func asHours(h float64) string { return asread.Fixed(h, 0, asread.HalfEven) }
