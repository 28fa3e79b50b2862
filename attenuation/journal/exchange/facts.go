package exchange

import (
	"fmt"
	"strconv"
	"strings"
	"time"

	"gylebook/attenuation/journal"
)

// facts are what the file says about one batch.
type facts struct {
	text      Facts
	own       bool // written by this program
	vessel    string
	first     time.Time // earliest reading
	last      time.Time
	conflicts []Refusal // rows that say otherwise; they matter when the batch is to be made
	more      int       // conflicts beyond MaxListed
	body      journal.Batch
	ogs       []journal.OG
}

// addFacts keeps what a row says about its batch. An empty cell says nothing.
func (p *plan) addFacts(row *Row, r journal.Reading) {
	if r.Batch == "" {
		return
	}
	f := p.batches[r.Batch]
	if f == nil {
		f = &facts{first: r.TakenAt, last: r.TakenAt, own: row.own}
		p.batches[r.Batch] = f
		p.order = append(p.order, r.Batch)
	}
	if r.TakenAt.Before(f.first) {
		f.first = r.TakenAt
	}
	if r.TakenAt.After(f.last) {
		f.last = r.TakenAt
	}
	if f.vessel == "" {
		f.vessel = r.Vessel
	}
	for _, c := range []struct {
		name      string
		had, says *string
	}{
		{colProduct, &f.text.Product, &row.Facts.Product},
		{colPitched, &f.text.Pitched, &row.Facts.Pitched},
		{colOG, &f.text.OG, &row.Facts.OG},
		{colVolume, &f.text.Volume, &row.Facts.Volume},
		{colGeneration, &f.text.Generation, &row.Facts.Generation},
	} {
		switch {
		case *c.says == "" || *c.says == *c.had:
		case *c.had == "":
			*c.had = strings.Clone(*c.says)
		case len(f.conflicts) < MaxListed:
			f.conflicts = append(f.conflicts, Refusal{row.Line, fmt.Sprintf("%s: read %.60q, but %.60q before for batch %s", c.name, *c.says, *c.had, r.Batch), 1})
		default:
			f.more++
		}
	}
}

// parse makes the batch of the cells.
func (f *facts) parse(id string, loc *time.Location) error {
	f.body = journal.Batch{ID: id, Product: f.text.Product, Vessel: f.vessel, Volume: f.text.Volume, Opened: f.first}
	if f.text.Generation != "" {
		n, err := strconv.Atoi(f.text.Generation)
		if err != nil {
			return fmt.Errorf("%s: read %.40q, wanted a whole number", colGeneration, f.text.Generation)
		}
		f.body.Generation = n
	}
	if f.text.Pitched != "" {
		at, err := parseStamp(f.text.Pitched, loc)
		if err != nil {
			return fmt.Errorf("%s: %w", colPitched, err)
		}
		f.body.Pitched = &at
		if at.Before(f.first) {
			f.body.Opened = at
		}
	}
	if err := f.body.Check(); err != nil {
		return err
	}
	var err error
	if f.ogs, err = parseOG(f.text.OG, f.own); err != nil {
		return err
	}
	for i := range f.ogs {
		g := &f.ogs[i]
		g.Batch, g.At = id, f.body.Opened
		if err := g.Check(); err != nil {
			return err
		}
	}
	return nil
}
