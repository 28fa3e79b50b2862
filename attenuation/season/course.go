package season

import (
	"math"

	"gylebook/attenuation/journal"
)

// Course is when and how fast a batch fell, from its original gravity at pitching
// to its last reading. Between two readings the fall is taken as even.
type Course struct {
	Midpoint float64 // hours from pitching to half of the fall, lag included
	Rate     float64 // SG points a day over the middle half of the fall
}

// leastFall is how much a batch has to fall for its middle to mean anything, SG.
const leastFall = 0.005

// course returns that of a closed batch whose yeast's generation is known,
// and nil of others. It is nil too where the original extract changed after
// pitching, and where no reading lies in the middle half of the fall.
func (w *walk) course() *Course {
	v := w.view
	if v.Open() || v.Record.Batch.Generation == 0 || v.Pitched.IsZero() || w.last == nil || w.last.Attenuation == nil {
		return nil
	}
	oe, og, _ := v.OEAt(v.Pitched)
	if oe != w.last.OE || float64(og-w.last.SG) < leastFall {
		return nil
	}
	f := fallen{walk: w, from: float64(og), to: float64(w.last.SG), points: []sgAt{{point: point{sg: float64(og)}}}}
	if w.estimate != nil && inOrder(v.Record.Readings) {
		f.estimated()
	} else {
		f.corrected()
	}
	return f.middle()
}

// inOrder reports whether readings are in order of time, and no two of a minute.
func inOrder(readings []journal.Numbered[journal.Reading]) bool {
	for k := 1; k < len(readings); k++ {
		a, b := readings[k-1].Body.TakenAt, readings[k].Body.TakenAt
		if !b.After(a) || sameMinute(a, b) {
			return false
		}
	}
	return true
}

// sgAt is a gravity at its hour after pitching.
type sgAt struct {
	point
	hours float64
}

// fallen is a course in order of time that begins with the original gravity at
// hour 0, and the gravities between which it fell.
type fallen struct {
	walk     *walk
	points   []sgAt
	from, to float64
}

func (f *fallen) add(p point) {
	at := p.reading.TakenAt
	hours, _ := f.walk.view.Elapsed(at)
	if hours > 0 && !at.After(f.walk.last.Source.TakenAt) {
		f.points = append(f.points, sgAt{p, hours})
	}
}

// estimated takes the readings as the estimate gives them, as far as three quarters
// of the fall. Most are never corrected.
func (f *fallen) estimated() {
	readings := f.walk.view.Record.Readings
	for k := range readings {
		r := &readings[k]
		if r.Void || r.Body.Keep != "" {
			continue
		}
		p := point{reading: &f.walk.last.Source, sg: f.to}
		if counts := true; r.Number != f.walk.last.Number {
			if p, counts = f.walk.point(&r.Body); !counts {
				continue
			}
		}
		f.add(p)
		if newest := &f.points[len(f.points)-1]; f.walk.atMost(&newest.point, f.level(0.75)) {
			return
		}
	}
}

// corrected takes every reading as package journal derives it.
func (f *fallen) corrected() {
	plain := *f.walk.book
	plain.Plain = true // no figure here has an uncertainty
	for _, one := range journal.Derive(f.walk.view.Record, &plain).Counting() {
		f.add(point{reading: &one.Source, sg: float64(one.SG)})
	}
}

func (f *fallen) level(part float64) float64 { return f.from - part*(f.from-f.to) }

// middle returns midpoint and rate, nil where no reading tells of them.
func (f *fallen) middle() *Course {
	first, quarter := f.reaches(0.25)
	_, half := f.reaches(0.5)
	last, most := f.reaches(0.75)
	if first == 0 || last <= first {
		return nil
	}
	return &Course{Midpoint: half, Rate: 1000 * (f.from - f.to) / 2 / ((most - quarter) / 24)}
}

// reaches returns the first point at which a part of the fall is over, and the hour
// at which it was; k is 0 when there is none.
func (f *fallen) reaches(part float64) (k int, hours float64) {
	level := f.level(part)
	for k := 1; k < len(f.points); k++ {
		a, b := &f.points[k-1], &f.points[k]
		if f.walk.atMost(&b.point, level) {
			f.walk.sure(&a.point)
			f.walk.sure(&b.point)
			return k, a.hours + (b.hours-a.hours)*(a.sg-level)/(a.sg-b.sg)
		}
	}
	return 0, 0
}

// atMost reports whether a gravity is at a level or below, and sharpens it until
// that is certain.
func (w *walk) atMost(p *point, level float64) bool {
	for {
		over := p.sg - level
		if p.doubt == 0 || math.Abs(over) > p.doubt {
			return over <= 0
		}
		w.sharpen(p)
	}
}

// sure sharpens a gravity for arithmetic.
func (w *walk) sure(p *point) {
	for p.doubt > sharp {
		w.sharpen(p)
	}
}
