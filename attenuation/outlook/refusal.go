package outlook

import (
	"errors"
	"fmt"
	"slices"
	"time"

	"gylebook/attenuation/journal"
)

// Reasons for which a batch has no forecast.
var (
	ErrNoOG  = errors.New("no original gravity")
	ErrBasis = errors.New("basis of the original gravity broken")
)

// Refusal says that a batch has no forecast. It wraps ErrNoOG or ErrBasis.
type Refusal struct {
	Batch string
	Why   string
	Tip   string
	Of    error
}

func (r *Refusal) Error() string { return fmt.Sprintf("no forecast for %s: %s", r.Batch, r.Why) }

// Hint says what to do first.
func (r *Refusal) Hint() string { return r.Tip }

// Unwrap returns the kind of reason.
func (r *Refusal) Unwrap() error { return r.Of }

// Limits of an original gravity, in points.
const (
	leastOG = 1.0
	mostOG  = 250.0
)

// original returns the effective original gravity at a time, in points.
func original(v journal.View, at time.Time) (points float64, refused *Refusal) {
	id := v.Record.Batch.ID
	_, sg, why := v.OEAt(at)
	points = 1000 * (float64(sg) - 1)
	switch {
	case v.OG == nil:
		return 0, &Refusal{id, why, "batch og " + id + " GRAVITY enters it", ErrNoOG}
	case why != "":
		tip := "void what lacks something and enter it anew"
		if k := slices.IndexFunc(v.Basis, func(s journal.BasisStep) bool { return s.Broken }); k >= 0 {
			tip = fmt.Sprintf("void %d --reason TEXT, then enter it anew with what is missing", v.Basis[k].Number)
		}
		return 0, &Refusal{id, why, tip, ErrBasis}
	case !(points >= leastOG && points <= mostOG):
		return 0, &Refusal{id, fmt.Sprintf("read an original gravity of %.4f, wanted 1.001 to 1.250", float64(sg)), "check it with batch show " + id, ErrNoOG}
	}
	return points, nil
}
