package cause

import (
	"slices"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/season"
)

// course is the apparent attenuation of a batch by hours after pitching.
type course struct {
	hours, apparent []float64
	temp            float64 // mean °C of the samples while it fell
	temps           int     // how many
	rest            float64 // hours to the last fall; 0 when not known
}

func courseOf(v journal.View) course {
	var c course
	list := v.Counting()
	at, _, rested := season.LastFall(list)
	if rested {
		c.rest, _ = v.Elapsed(at)
	}
	sum := 0.0
	for _, one := range list {
		h, ok := v.Elapsed(one.Source.TakenAt)
		if !ok || h < 0 {
			continue
		}
		if !chilled(v, one) && !(rested && one.Source.TakenAt.After(at)) {
			sum += float64(one.Temp.C)
			c.temps++
		}
		if one.Attenuation == nil {
			continue
		}
		if len(c.hours) == 0 && h > 0 {
			c.hours, c.apparent = append(c.hours, 0), append(c.apparent, 0)
		}
		if n := len(c.hours); n > 0 && h <= c.hours[n-1] {
			continue
		}
		c.hours, c.apparent = append(c.hours, h), append(c.apparent, one.Attenuation.Apparent)
	}
	if c.temps > 0 {
		c.temp = sum / float64(c.temps)
	}
	return c
}

// chilled reports whether the tank was crashed before a reading.
func chilled(v journal.View, one *journal.Value) bool {
	return slices.ContainsFunc(v.Record.Events, func(e journal.Numbered[journal.Event]) bool {
		return !e.Void && e.Body.What == journal.Crash && e.Body.At.Before(one.Source.TakenAt)
	})
}

// at returns the attenuation at hours after pitching, on straight lines between
// the readings: none at pitching, and the last one ever after. Without a reading
// ok is false.
func (c course) at(hours float64) (apparent float64, ok bool) {
	n := len(c.hours)
	if n == 0 {
		return 0, false
	}
	k, _ := slices.BinarySearch(c.hours, hours)
	switch k {
	case 0:
		return c.apparent[0], true
	case n:
		return c.apparent[n-1], true
	}
	share := (hours - c.hours[k-1]) / (c.hours[k] - c.hours[k-1])
	return c.apparent[k-1] + share*(c.apparent[k]-c.apparent[k-1]), true
}

// crossing returns when the attenuation came to a level first, on straight lines,
// and the time between the readings around it.
func (c course) crossing(level float64) (hours, between float64, ok bool) {
	for k := 1; k < len(c.hours); k++ {
		a, b := c.apparent[k-1], c.apparent[k]
		if a < level && b >= level {
			between = c.hours[k] - c.hours[k-1]
			return c.hours[k-1] + between*(level-a)/(b-a), between, true
		}
	}
	return 0, 0, false
}

// peersAt returns the attenuations of the peers at hours after pitching.
func (q *question) peersAt(hours float64) []float64 {
	var list []float64
	for _, p := range q.peers {
		if a, ok := p.course.at(hours); ok && !p.view.Pitched.IsZero() {
			list = append(list, a)
		}
	}
	return list
}

// peersMove returns how far the median of the peers moves from one time to
// another; ok is false with too few of them.
func (q *question) peersMove(from, to float64) (points float64, ok bool) {
	a, b := q.peersAt(from), q.peersAt(to)
	if len(a) < fewest {
		return 0, false
	}
	ma, _ := middle(a)
	mb, _ := middle(b)
	return mb - ma, true
}
