package curve

import (
	"cmp"
	"fmt"
	"math"
	"slices"

	"gylebook/attenuation"
	"gylebook/gravity/method"
)

// Limits of the evidence, set by replaying rules on real courses.
const (
	flatHours  = 48.0 // a change of at most a point over at least these
	flatPoints = 1.0
	leftLimit  = 0.10 // probability of more than 2 points left
)

// Watch says which readings count as evidence.
type Watch struct {
	From  float64 // hours since pitching at which hops, fruit or sugar were last added; 0: nothing was
	Crash float64 // hours since pitching at which the batch was cooled; 0: it was not

	// Slow marks yeast that goes on slowly below the usual limit. It defeats the
	// 48 h rule, so the end needs the limit of a forced ferment.
	Slow       bool
	Limit      float64 // gravity in points of a forced ferment
	LimitKnown bool
}

// Evidence is what the readings say about the end.
type Evidence struct {
	State State `json:"state"`

	Unchanged bool    `json:"unchanged"`  // at most 1 point over at least 48 h
	FlatHours float64 `json:"flat_hours"` // the last readings that stay within a point
	FlatN     int     `json:"flat_n"`

	Left      float64 `json:"left"` // probability of more than 2 points left
	LeftKnown bool    `json:"left_known"`

	Slope      Slope `json:"slope"` // of the last readings within a point, of the last two at least
	SlopeKnown bool  `json:"slope_known"`

	AboveLimit      float64 `json:"above_limit"` // last reading less the limit of the forced ferment, points
	AboveLimitKnown bool    `json:"above_limit_known"`

	// Undetected are the points that may still be left (95 %), and the carbon
	// dioxide that they would make in a closed vessel.
	Undetected      float64 `json:"undetected"`
	CO2GPL          float64 `json:"co2_g_per_l"`
	CO2Volumes      float64 `json:"co2_volumes"`
	UndetectedKnown bool    `json:"undetected_known"`

	Forecast Forecast      `json:"forecast"`
	Notes    []method.Note `json:"notes,omitempty"`
}

// Evidence weighs the readings up to now, in hours since pitching. Readings
// before the watch period do not prove the end, readings after a cold crash
// never do: cold yeast stands still.
func (p Prior) Evidence(b Batch, now float64, w Watch) (Evidence, error) {
	if err := w.check(); err != nil {
		return Evidence{}, err
	}
	warm := w.warm(b)
	f, err := p.Forecast(warm, now)
	if err != nil {
		return Evidence{}, err
	}
	e := Evidence{Forecast: f}
	if cold := len(b.Readings) - len(warm.Readings); cold > 0 {
		e.note(method.Interpreted, "%s after the cold crash: no proof of the end", count(cold, "reading"))
	}
	counted := counting(warm.Readings, w.From, now)
	flat := e.flatten(counted)
	e.Left, e.LeftKnown = f.Left(nearEnd)
	if len(counted) > 0 && w.LimitKnown {
		e.AboveLimit, e.AboveLimitKnown = counted[len(counted)-1].Points-w.Limit, true
	}
	if e.Undetected, e.UndetectedKnown = f.mayBeLeft(); e.UndetectedKnown {
		e.CO2GPL, e.CO2Volumes = attenuation.CO2ToCome(e.Undetected)
	}
	e.decide(p, warm, flat, w)
	return e, nil
}

func (w Watch) check() error {
	for _, h := range []struct {
		what string
		at   float64
	}{{"start of the watch period", w.From}, {"time of the cold crash", w.Crash}} {
		if !(h.at >= 0 && h.at <= maxHours) {
			return &method.RangeError{What: h.what, Got: h.at, Lo: 0, Hi: maxHours, Unit: "hours since pitching"}
		}
	}
	if w.LimitKnown && !(w.Limit >= -60 && w.Limit <= 250) {
		return &method.RangeError{What: "limit of the forced ferment", Got: w.Limit, Lo: -60, Hi: 250, Unit: "points"}
	}
	return nil
}

// counting gives the readings of the watch period in order of time.
func counting(readings []Reading, from, now float64) []Reading {
	var out []Reading
	for _, r := range readings {
		if r.Hours >= from && r.Hours <= now {
			out = append(out, r)
		}
	}
	slices.SortStableFunc(out, func(a, b Reading) int {
		return cmp.Or(cmp.Compare(a.Hours, b.Hours), cmp.Compare(a.Points, b.Points))
	})
	return out
}

// flatten finds the last readings that stay within a point, and their slope.
func (e *Evidence) flatten(readings []Reading) []Reading {
	n := len(readings)
	if n == 0 {
		return nil
	}
	i := n - 1
	lo, hi := readings[i].Points, readings[i].Points
	for i > 0 {
		p := readings[i-1].Points
		if math.Max(hi, p)-math.Min(lo, p) > flatPoints+1e-9 {
			break
		}
		i--
		lo, hi = math.Min(lo, p), math.Max(hi, p)
	}
	e.FlatN = n - i
	e.FlatHours = readings[n-1].Hours - readings[i].Hours
	e.Unchanged = e.FlatN >= 2 && e.FlatHours >= flatHours-1e-9
	e.Slope, e.SlopeKnown = SlopeOf(readings[min(i, max(n-2, 0)):])
	return readings[i:]
}

// mayBeLeft is the 95th percentile of the points still to fall.
func (f Forecast) mayBeLeft() (points float64, ok bool) {
	if !f.Curve || len(f.drawn) == 0 {
		return 0, false
	}
	left := figures(f.drawn, func(d *drawn) float64 { return d.at(f.last) - d.fg() })
	return interval(left).Hi, true
}

// Since gives the hour of the first reading from which the curve has said
// without a break that the end is near; ok is false where it does not say so.
// It makes a forecast for every reading on the way back, for which a look at
// many batches has no time.
func (p Prior) Since(b Batch, now float64, w Watch) (hours float64, ok bool) {
	if w.check() != nil {
		return 0, false
	}
	warm := w.warm(b)
	readings := counting(warm.Readings, 0, now)
	for k := len(readings) - 1; k >= 0; k-- {
		f, err := p.Forecast(warm, readings[k].Hours)
		if err != nil {
			return 0, false
		}
		if left, known := f.Left(nearEnd); !known || left >= leftLimit {
			break
		}
		hours, ok = readings[k].Hours, true
	}
	return hours, ok
}

// warm leaves the readings before the cold crash.
func (w Watch) warm(b Batch) Batch {
	if w.Crash > 0 {
		b.Readings = slices.DeleteFunc(slices.Clone(b.Readings), func(r Reading) bool { return r.Hours >= w.Crash })
	}
	return b
}

func (e *Evidence) note(code, format string, args ...any) {
	e.Notes = append(e.Notes, method.Note{Code: code, Text: fmt.Sprintf(format, args...)})
}
