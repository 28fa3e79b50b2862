package tempcorr

import (
	"fmt"

	"gylebook/gravity/method"
)

// Certificate is one calibration point: at Reading add Correction; U is its
// expanded uncertainty (k=2). All in the instrument's scale, at its reference
// temperature.
type Certificate struct{ Reading, Correction, U float64 }

// CheckCertificate returns ErrCertificate when the readings do not ascend.
func CheckCertificate(points []Certificate) error {
	for i := 1; i < len(points); i++ {
		if !(points[i].Reading > points[i-1].Reading) {
			return fmt.Errorf("%w: %g after %g", ErrCertificate, points[i].Reading, points[i-1].Reading)
		}
	}
	return nil
}

// certificate returns the correction and U (k=2) at reading r: linear between
// points, the end value held outside, with a note.
func (h Hydrometer) certificate(r float64) (correction, u float64, notes []method.Note) {
	points := h.Certificate
	if len(points) == 0 {
		return 0, 0, nil
	}
	first, last := points[0], points[len(points)-1]
	if r < first.Reading || r > last.Reading {
		end := first
		if r > last.Reading {
			end = last
		}
		if len(points) > 1 {
			notes = append(notes, method.Note{Code: method.OutOfRange, Text: fmt.Sprintf(
				"reading %g is outside the certificate's %g to %g; its end value %+g is used", r, first.Reading, last.Reading, end.Correction)})
		}
		return end.Correction, end.U, notes
	}
	for i := 1; i < len(points); i++ {
		a, b := points[i-1], points[i]
		if r <= b.Reading {
			x := (r - a.Reading) / (b.Reading - a.Reading)
			return a.Correction + x*(b.Correction-a.Correction), max(a.U, b.U), nil
		}
	}
	return last.Correction, last.U, nil
}
