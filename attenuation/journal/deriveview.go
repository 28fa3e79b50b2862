package journal

import (
	"errors"
	"time"

	"gylebook/attenuation"
	"gylebook/gravity"
)

// ErrPrimed says that a rule does not take the strength before priming.
var ErrPrimed = errors.New(primedReason)

// Open reports whether the batch is open.
func (v View) Open() bool { return v.Record != nil && v.Record.Closed == nil && !v.Record.Void }

// Last returns the newest value that counts, nil when there is none. Of the
// replicates of one minute it is the one entered last; their mean is in it.
func (v View) Last() *Value {
	for k := len(v.Values) - 1; k >= 0; k-- {
		if v.Values[k].Counts() {
			return &v.Values[k]
		}
	}
	return nil
}

// Counting returns one value a minute that counts, in time order.
func (v View) Counting() []*Value {
	var list []*Value
	for k := range v.Values {
		one := &v.Values[k]
		if !one.Counts() {
			continue
		}
		if last := len(list) - 1; last >= 0 && minute(list[last].Source.TakenAt).Equal(minute(one.Source.TakenAt)) {
			list[last] = one
			continue
		}
		list = append(list, one)
	}
	return list
}

// shortest is the shortest time between two readings that a daily rate is made
// of: over less, the half point of a reading becomes many points a day (judged).
const shortest = 6 * time.Hour

// Fall24h returns the fall of SG 20/20, in points in 24 h, between the last reading
// that counts and the newest one at least six hours before it. ok is false without
// such a pair, or with an addition between the two.
func (v View) Fall24h() (points float64, ok bool) {
	list := v.Counting()
	if len(list) < 2 {
		return 0, false
	}
	b := list[len(list)-1]
	for k := len(list) - 2; k >= 0; k-- {
		a := list[k]
		between := b.Source.TakenAt.Sub(a.Source.TakenAt)
		if between < shortest {
			continue
		}
		if v.changedBetween(a.Source.TakenAt, b.Source.TakenAt) {
			return 0, false
		}
		return 1000 * float64(a.SG-b.SG) / (between.Hours() / 24), true
	}
	return 0, false
}

// Vessel returns where the batch is, after its moves; "" when not known.
func (v View) Vessel() string {
	if v.Record == nil {
		return ""
	}
	vessel := v.Record.Batch.Vessel
	for _, e := range ordered(v.Record.Events, eventAt) {
		if !e.Void && e.Body.Vessel != "" && (e.Body.What == Move || e.Body.What == Racking) {
			vessel = e.Body.Vessel
		}
	}
	return vessel
}

// Elapsed returns the hours from pitching to t, by the clock that never changes;
// ok is false when pitching is not known.
func (v View) Elapsed(t time.Time) (hours float64, ok bool) {
	if v.Pitched.IsZero() || t.IsZero() {
		return 0, false
	}
	return t.Sub(v.Pitched).Hours(), true
}

// Days is Elapsed in days.
func (v View) Days(t time.Time) (days float64, ok bool) {
	h, ok := v.Elapsed(t)
	return h / 24, ok
}

// CheckRule returns ErrPrimed when the rule takes the expected strength of a
// conditioned product and the batch was primed.
func (v View) CheckRule(r attenuation.Rule) error {
	if r.ID == ukDuty && !v.Primed.IsZero() {
		return ErrPrimed
	}
	return nil
}

// ErrNoStrength says that the expected strength cannot be given, wrapped with the
// reason.
var ErrNoStrength = errors.New("no expected strength")

// ExpectedABV returns the strength [% vol at 20 °C] that the batch reaches when all
// its priming has fermented, by the Balling balance from the last value before the
// priming; without priming it is the last value's own. Sugar counts in full; the
// extract of a priming wort too, as an upper bound. It returns ErrNoStrength.
func (v View) ExpectedABV() (gravity.VolPct, error) {
	var last *Value
	for _, one := range v.Counting() {
		if v.Primed.IsZero() || !one.Source.TakenAt.After(v.Primed) {
			last = one
		}
	}
	if last == nil {
		return 0, wrapf(ErrNoStrength, "no reading before the priming")
	}
	if last.Attenuation == nil {
		return 0, wrapf(ErrNoStrength, "%s", last.Why)
	}
	if v.Primed.IsZero() {
		return last.Attenuation.ABV, nil
	}
	var sum attenuation.Wort
	for _, e := range ordered(v.Record.Events, eventAt) {
		if e.Void || e.Body.What != Priming {
			continue
		}
		w, why := e.Body.sugar()
		if why != "" {
			return 0, wrapf(ErrNoStrength, "%s", why)
		}
		sum = sum.Add(w)
	}
	w := v.AmountAt(v.Primed)
	if !w.Known() {
		return 0, wrapf(ErrNoStrength, "%s", noVolume)
	}
	a, err := attenuation.PrimedStrength(w, *last.Attenuation, last.SG, sum)
	if err != nil {
		return 0, wrapf(ErrNoStrength, "%v", err)
	}
	return a.ABV, nil
}
