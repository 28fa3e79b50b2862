package curve

import (
	"errors"
	"fmt"
	"math"
	"slices"

	"gylebook/gravity/method"
)

// Reading is one gravity of a batch.
type Reading struct {
	Hours    float64 // since pitching; before it, the reading is set aside
	Points   float64 // 1000·(SG-1), corrected, -60..250
	U        float64 // standard uncertainty in points; 0 means not known, 0.5 is taken
	Division float64 // smallest division of the instrument in points; 0 means not known
}

// Batch is what is known of one batch.
type Batch struct {
	OG       float64 // original gravity in points, 1..250
	UOG      float64 // its standard uncertainty in points; 0 means not known, 0.5 is taken
	Readings []Reading
}

// Limits of what is taken.
const (
	usualU    = 0.5    // points, an ordinary hydrometer read once
	leastU    = 1e-3   // points
	maxU      = 50.0   // points
	sameVisit = 0.5    // hours within which readings are one visit
	maxBins   = 40     // readings a fit uses
	maxHours  = 100000 // eleven years
)

// ErrNoOG says that a batch has no usable original gravity. Without it a fall
// has no start and no figure is given.
var ErrNoOG = errors.New("no original gravity, wanted 1 to 250 points; enter the original gravity of the batch first")

// ErrNoReadings says that a fit was asked of too few readings.
var ErrNoReadings = errors.New("too few readings for a fit, wanted at least 3 after pitching")

// check refuses what is not a number or no gravity.
func (b Batch) check() error {
	if !(b.OG >= 1 && b.OG <= 250) {
		return ErrNoOG
	}
	if !(b.UOG >= 0 && b.UOG <= maxU) {
		return &method.RangeError{What: "uncertainty of the original gravity", Got: b.UOG, Lo: 0, Hi: maxU, Unit: "points"}
	}
	for _, r := range b.Readings {
		switch {
		case !(math.Abs(r.Hours) <= maxHours):
			return &method.RangeError{What: "time of a reading", Got: r.Hours, Lo: -maxHours, Hi: maxHours, Unit: "hours since pitching"}
		case !(r.Points >= -60 && r.Points <= 250):
			return &method.RangeError{What: "gravity of a reading", Got: r.Points, Lo: -60, Hi: 250, Unit: "points"}
		case !(r.U >= 0 && r.U <= maxU):
			return &method.RangeError{What: "uncertainty of a reading", Got: r.U, Lo: 0, Hi: maxU, Unit: "points"}
		case !(r.Division >= 0 && r.Division <= maxU):
			return &method.RangeError{What: "division of a reading", Got: r.Division, Lo: 0, Hi: maxU, Unit: "points"}
		}
	}
	return nil
}

// uncertainOG is the uncertainty of the original gravity.
func (b Batch) uncertainOG() float64 {
	if b.UOG == 0 {
		return usualU
	}
	return math.Max(b.UOG, leastU)
}

// usable gives the readings up to a time as a fit takes them: in order of time,
// those of one visit made one, a logger's thousands binned. The readings
// themselves stay as they are.
func (b Batch) usable(now float64) ([]Reading, []method.Note) {
	var out []Reading
	var notes []method.Note
	early, late, unsure := 0, 0, 0
	for _, r := range b.Readings {
		switch {
		case r.Hours < 0:
			early++
		case r.Hours > now:
			late++
		default:
			if r.U == 0 {
				unsure++
				r.U = usualU
			}
			r.U = math.Max(r.U, leastU)
			out = append(out, r)
		}
	}
	if early > 0 {
		notes = append(notes, method.Note{Code: method.Interpreted, Text: fmt.Sprintf("%s before pitching set aside", count(early, "reading"))})
	}
	if late > 0 {
		notes = append(notes, method.Note{Code: method.Interpreted, Text: fmt.Sprintf("%s after the moment asked about set aside", count(late, "reading"))})
	}
	if unsure > 0 {
		notes = append(notes, method.Note{Code: method.Assumed, Text: fmt.Sprintf("%s without an uncertainty, 0.5 points taken", count(unsure, "reading"))})
	}
	slices.SortStableFunc(out, func(a, b Reading) int {
		if a.Hours != b.Hours {
			return cmpFloat(a.Hours, b.Hours)
		}
		return cmpFloat(a.Points, b.Points) // the order they were typed in does not matter
	})
	out = grouped(out, sameVisit, true)
	if n := len(out); n > maxBins {
		out = grouped(out, (out[n-1].Hours-out[0].Hours)/maxBins, false)
		notes = append(notes, method.Note{Code: method.Interpreted, Text: fmt.Sprintf("%d readings binned to %d by their medians", n, len(out))})
	}
	return out, notes
}

// grouped makes one reading of all that lie within a width of the first: the
// median gravity at the mean time. Its uncertainty is that of one reading,
// since an instrument's error does not average away; where readings of one
// visit disagree, it is half of what they differ by, if that is more.
func grouped(in []Reading, width float64, visit bool) []Reading {
	var out []Reading
	for i := 0; i < len(in); {
		j := i + 1
		for j < len(in) && in[j].Hours-in[i].Hours < width {
			j++
		}
		out = append(out, merged(in[i:j], visit))
		i = j
	}
	return out
}

func merged(in []Reading, visit bool) Reading {
	if len(in) == 1 {
		return in[0]
	}
	points := make([]float64, len(in))
	m := Reading{}
	for k, r := range in {
		points[k] = r.Points
		m.Hours += r.Hours / float64(len(in))
		m.U = math.Max(m.U, r.U)
		m.Division = math.Max(m.Division, r.Division)
	}
	slices.Sort(points)
	n := len(points)
	m.Points = (points[n/2] + points[(n-1)/2]) / 2
	if visit {
		m.U = math.Max(m.U, (points[n-1]-points[0])/2)
	}
	return m
}

func cmpFloat(a, b float64) int {
	switch {
	case a < b:
		return -1
	case a > b:
		return 1
	}
	return 0
}

// count gives "1 reading" and "3 readings".
func count(n int, what string) string {
	if n == 1 {
		return "1 " + what
	}
	return fmt.Sprintf("%d %ss", n, what)
}
