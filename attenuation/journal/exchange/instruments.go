package exchange

import (
	"context"
	"fmt"
	"slices"
	"strconv"
	"strings"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/tempcorr"
)

// use is how the file uses one instrument.
type use struct {
	scale string
	mixed bool // more than one scale
	since time.Time
	steps map[string]int // one unit of the last place typed, by how often it was
}

func (u *use) add(g journal.Typed, at time.Time) {
	if u.steps == nil {
		u.scale, u.since, u.steps = strings.Clone(g.Scale), at, make(map[string]int)
	}
	if at.Before(u.since) {
		u.since = at
	}
	u.mixed = u.mixed || u.scale != g.Scale
	if typed, err := g.Reading(); err == nil {
		u.steps[strconv.FormatFloat(typed.Step, 'f', -1, 64)]++
	}
}

func (p *plan) addUse(r *journal.Reading) {
	if r.Instrument == "" {
		return
	}
	u := p.instruments[r.Instrument]
	if u == nil {
		u = new(use)
		id := strings.Clone(r.Instrument)
		p.instruments[id] = u
		p.used = append(p.used, id)
	}
	u.add(r.Gravity, r.TakenAt)
}

// body returns an instrument of which the file tells no more than this.
func (u *use) body(id string) (journal.Instrument, error) {
	if u.mixed {
		return journal.Instrument{}, fmt.Errorf("instrument %s has readings on more than one scale and cannot be made from them: add it first", id)
	}
	division, most := "", 0
	for step, n := range u.steps {
		// Of two as frequent the coarser, which has fewer digits, claims less.
		if n > most || n == most && len(step) < len(division) {
			division, most = step, n
		}
	}
	i := journal.Instrument{
		ID: id, Type: journal.Hydrometer, Scale: u.scale, Basis: gravity.Pair2020.String(), Division: division,
		Body: tempcorr.Bodies[0].ID, ReadAt: string(tempcorr.Bottom), Since: u.since, Note: "made by import, from its readings",
	}
	return i, i.Check()
}

// instruments looks up those of the journal.
func (d *draft) instruments(ctx context.Context) error {
	list, err := d.r.Instruments(ctx)
	if err != nil {
		return err
	}
	d.list = slices.Clone(list)
	for _, i := range list {
		d.tools[i.Instrument.ID] = ""
		if i.Retired != nil {
			d.tools[i.Instrument.ID] = fmt.Sprintf("instrument %s is %v", i.Instrument.ID, journal.ErrRetired)
		}
	}
	for _, id := range d.p.used {
		d.instrument(id, d.p.instruments[id])
	}
	return nil
}

// instrument returns why an instrument cannot be used, "" when it can. With Create
// one that is not in the journal is made.
func (d *draft) instrument(id string, u *use) string {
	if why, ok := d.tools[id]; ok {
		return why
	}
	if !d.p.opt.Create {
		known := make([]string, 0, len(d.list))
		for _, i := range d.list {
			known = append(known, i.Instrument.ID)
		}
		d.tools[id] = fmt.Sprintf("instrument %s is %v%s", id, journal.ErrNotFound, nearest(id, known))
		d.report.Lacks = true
		return d.tools[id]
	}
	body, err := u.body(id)
	if err != nil {
		d.tools[id] = err.Error()
		return d.tools[id]
	}
	d.tools[id] = ""
	d.report.Instruments = append(d.report.Instruments, id)
	d.tooled = append(d.tooled, body)
	d.list = append(d.list, &journal.InstrumentRecord{Instrument: body, Number: d.head + int64(len(d.tooled))})
	return ""
}
