package demo

import (
	"fmt"
	"math/rand/v2"
	"slices"
	"strconv"
	"time"

	"gylebook/attenuation"
	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// item is an entry to come, at the time it is entered.
type item struct {
	at   time.Time
	body journal.Body
	// fixes is set on a void: it is about the item just before it.
	fixes bool
	// sg is the true gravity of a reading, 0 for everything else.
	sg gravity.SG
}

// writer makes the entries of one batch.
type writer struct {
	planned
	kind
	rng     *rand.Rand
	pitched time.Time
	brew    brew
	items   []item
}

// brewed returns the entries of batch number k of the season.
func brewed(k int) ([]item, error) {
	p := season[k]
	w := &writer{planned: p, kind: kinds[p.product], rng: rand.New(rand.NewPCG(2026, uint64(k)))}
	if p.cold {
		w.works, w.warm, w.stays = coldAle, 12, 22
		w.days = append(slices.Clone(w.days), 14, 16, 18, 20)
	}
	w.pitched = local(p.month, p.day, 13, 5*w.rng.IntN(12))
	if err := w.fill(); err != nil {
		return nil, fmt.Errorf("%s: %w", p.id, err)
	}
	if err := w.open(); err != nil {
		return nil, fmt.Errorf("%s: %w", p.id, err)
	}
	if err := w.readings(); err != nil {
		return nil, fmt.Errorf("%s: %w", p.id, err)
	}
	w.rest()
	return w.items, nil
}

func (w *writer) add(at time.Time, b journal.Body) { w.items = append(w.items, item{at: at, body: b}) }

// clock returns a time of the cellar's clock on a day after pitching.
func (w *writer) clock(day, hour, minute int) time.Time {
	return local(w.pitched.Month(), w.pitched.Day()+day, hour, minute)
}

// fill puts into the brew what truly goes in, from the pitch on.
func (w *writer) fill() error {
	fit := gravity.Fits.Default().Fn
	og := w.og + 0.0006*w.rng.NormFloat64()
	fg := w.fg + 0.0004*w.rng.NormFloat64() + w.stuck
	if w.hasDilution() {
		og += 0.0018 // boiled hard
	}
	litres, err := strconv.ParseFloat(w.volume, 64)
	if err != nil {
		return err
	}
	left := w.works.left()
	wort := attenuation.FromVolume(litres, fit.Extract(gravity.SG(og)), 20)
	w.brew.parts = []part{{from: w.pitched, wort: wort, final: fit.Extract(gravity.SG(fg)), left: left}}
	for _, d := range deeds {
		if d.batch != w.id {
			continue
		}
		p := part{from: w.clock(d.day, d.hour, 0), left: left}
		kg, _ := strconv.ParseFloat(d.event.MassKg, 64) // "" is none
		vol, _ := strconv.ParseFloat(d.event.VolumeL, 64)
		switch d.event.What {
		case journal.Sugar:
			p.wort, p.final = attenuation.Wort{MassKg: kg + d.trueKg, Extract: 100}, sugarFinal
		case journal.Dilution:
			p.wort = attenuation.FromVolume(vol, 0, 20)
		case journal.TopUp, journal.Blend:
			r, err := asread.ParseReading(d.event.Gravity.Text, gravity.ScaleSG)
			if err != nil {
				return err
			}
			p.wort = attenuation.FromVolume(vol, fit.Extract(gravity.SG(r.Value)), 20)
			p.final = fit.Extract(gravity.SG(w.fg))
			if d.event.What == journal.Blend { // fermented out already
				p.left, p.final = nil, fit.Extract(gravity.SG(kinds[harvest].fg))
			}
		default:
			continue
		}
		w.brew.parts = append(w.brew.parts, p)
	}
	return nil
}

func (w *writer) hasDilution() bool {
	return slices.ContainsFunc(deeds, func(d deed) bool { return d.batch == w.id && d.event.What == journal.Dilution })
}

// instrument is what the batch is read with at a time.
func (w *writer) instrument(at time.Time) string {
	if w.hydrometer == old && !at.Before(broke) {
		return brewery
	}
	return w.hydrometer
}

// open writes the batch and its original gravity, which is read in the brewhouse.
func (w *writer) open() error {
	pitched := w.pitched
	w.add(pitched.Add(4*time.Minute), journal.Batch{
		ID: w.id, Product: w.product, Vessel: w.vessel, Volume: w.volume, Yeast: w.yeast, Generation: w.gen,
		Parent: w.parent, Pitched: &pitched, Opened: pitched,
	})
	id := w.instrument(pitched)
	if id == cellar {
		id = brewery
	}
	operator := onDuty(pitched)
	for n := range 2 {
		at := pitched.Add(time.Duration(15*n-40) * time.Minute)
		og := journal.OG{Batch: w.id, At: at, Instrument: id}
		oe := w.brew.parts[0].wort.Extract
		if n == 1 && w.product == harvest {
			og.Instrument = optical
			og.Gravity = journal.Typed{Text: fmt.Sprintf("%.1fBx", onto(float64(oe), 5)), Scale: "brix"}
		} else {
			h := truth(id, at)
			sg, err := gravity.Fits.Default().Fn.SG(oe)
			if err != nil {
				return err
			}
			og.Temp = journal.TypedTemp{Text: temperature(w.warm+1+w.rng.Float64(), operator), Unit: "C"}
			r, err := w.read(h.ID, at, sg, 0, og.Temp)
			if err != nil {
				return err
			}
			og.Gravity = journal.Typed{Text: typed(h, r, operator, w.rng), Scale: h.Scale.String()}
		}
		w.add(pitched.Add(time.Duration(6+2*n)*time.Minute), og)
	}
	if w.limit != "" {
		at := w.clock(4, 11, 30)
		w.add(at.Add(5*time.Minute), journal.Limit{Batch: w.id, At: at, Gravity: journal.Typed{Text: w.limit, Scale: "sg"}})
	}
	return nil
}

// read is what an instrument shows, with what the eye adds to it.
func (w *writer) read(id string, at time.Time, sg gravity.SG, oe gravity.Plato, temp journal.TypedTemp) (float64, error) {
	t, err := temp.Temperature()
	if err != nil {
		return 0, err
	}
	h := truth(id, at)
	r, err := shown(h, sg, t.C, oe)
	eye := 0.2 * division
	if h.Scale.IsMass() {
		eye = 0.02
	}
	return r + eye*w.rng.NormFloat64(), err
}

// rest writes the events and the end.
func (w *writer) rest() {
	for _, d := range deeds {
		if d.batch != w.id {
			continue
		}
		e := d.event
		e.Batch, e.At = w.id, w.clock(d.day, d.hour, 0)
		w.add(e.At.Add(3*time.Minute), e)
	}
	closed := w.clock(w.stays, 11, 0)
	note := ""
	if w.stuck > 0 {
		note = "stuck, fresh yeast did nothing; to the blending tank"
	}
	w.add(closed.Add(2*time.Minute), journal.Close{Batch: w.id, At: closed, Note: note})
}
