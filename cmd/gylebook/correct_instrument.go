package main

import (
	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/method"
	"gylebook/tempcorr"
)

// named is an instrument of the journal as it is now.
type named struct {
	hydrometer tempcorr.Hydrometer
	how        string // where its correction comes from
	notes      []method.Note
}

// nameInstrument takes basis, body, meniscus and scale from the instrument named
// with --instrument, unless they are given.
func (b *bench) nameInstrument(c *cli.Context, r *reader) error {
	id := c.String("instrument")
	if id == "" {
		return nil
	}
	return b.withJournal(c.Context, func(s journal.Store) error {
		rec, err := instrumentBy(c.Context, s, id)
		if err != nil {
			return err
		}
		h, notes, err := journal.NewBook([]*journal.InstrumentRecord{rec}).Hydrometer(id, b.set.now)
		if err != nil {
			return err
		}
		if c.IsSet("basis") {
			h.Basis = r.basis
		}
		if c.IsSet("body") {
			h.Body = r.body
		}
		if !c.IsSet("meniscus") {
			r.meniscus = h.ReadAt
		}
		if !c.IsSet("scale") {
			b.set.scale = h.Scale
		}
		r.basis, r.body = h.Basis, h.Body
		r.named = &named{hydrometer: h, how: id + ", " + howCorrected(rec, h), notes: notes}
		return nil
	})
}

// howCorrected says where the correction in force of an instrument comes from.
func howCorrected(rec *journal.InstrumentRecord, h tempcorr.Hydrometer) string {
	if len(h.Certificate) == 0 {
		return "never checked"
	}
	text := ""
	for _, d := range history(rec) {
		if d.correction != "" {
			text = d.kind + " of " + day(d.at)
		}
	}
	return text
}

// hydrometer is the instrument that a reading on scale was taken with. One that is
// named has a scale of its own.
func (r reader) hydrometer(typed string, scale gravity.Scale) (tempcorr.Hydrometer, error) {
	if r.named == nil {
		return tempcorr.New(scale, r.basis, r.body), nil
	}
	h := r.named.hydrometer
	if scale != h.Scale && !(scale.IsMass() && h.Scale.IsMass()) {
		return h, dataError("leave --instrument out, or type what "+h.ID+" showed", "read %s, wanted %s, the scale of %s", typed, h.Scale.Info().Name, h.ID)
	}
	return h, nil
}

// certificateRemark says where the correction of the instrument comes from.
func (r reader) certificateRemark() string {
	if r.named == nil {
		return "no instrument named"
	}
	return r.named.how
}

// covers says whether the instrument's own error is in U.
func covers(record bool) string {
	if record {
		return "instrument error included"
	}
	return "instrument error not included"
}
