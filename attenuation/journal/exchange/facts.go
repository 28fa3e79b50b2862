package exchange

import (
	"fmt"
	"strconv"
	"strings"
	"time"

	"gylebook/attenuation/journal"
)

// facts are what the file says about one batch. There is one for each batch of the
// file, so they are small.
type facts struct {
	text   Facts
	vessel string
	first  time.Time // earliest reading
	last   int64     // the latest, in seconds of Unix time
	place  int       // among the batches of the file
	rows   rowList
	own    bool // written by this program
}

// conflicts are rows that say otherwise about one batch than those before; they
// matter when the batch is to be made.
type conflicts struct {
	list []Refusal
	more int // further ones
}

// mostContrary is how many conflicts are kept of all batches together, besides the
// first of each.
const mostContrary = 4096

// addFacts keeps what a row says about its batch. An empty cell says nothing.
func (p *plan) addFacts(row *Row, r *journal.Reading) *facts {
	f := p.batches[r.Batch]
	if f == nil {
		f = &facts{first: r.TakenAt, last: r.TakenAt.Unix(), place: len(p.order), own: row.own}
		id := strings.Clone(r.Batch)
		p.batches[id] = f
		p.order = append(p.order, id)
	}
	if r.TakenAt.Before(f.first) {
		f.first = r.TakenAt
	}
	f.last = max(f.last, r.TakenAt.Unix())
	if f.vessel == "" {
		f.vessel = p.shared.share(r.Vessel)
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
			*c.had = p.shared.share(*c.says)
		default:
			p.contradicts(r.Batch, Refusal{row.Line, fmt.Sprintf("%s: read %.60q, but %.60q before for batch %s", c.name, *c.says, *c.had, r.Batch), 1})
		}
	}
	return f
}

func (p *plan) contradicts(batch string, r Refusal) {
	c := p.contrary[batch]
	if c == nil {
		c = new(conflicts)
		p.contrary[strings.Clone(batch)] = c
	}
	if len(c.list) > 0 && (len(c.list) == MaxListed || p.conflicts == mostContrary) {
		c.more++
		return
	}
	c.list = append(c.list, r)
	p.conflicts++
}

// opened is when a batch that is made began.
func (f *facts) opened(loc *time.Location) time.Time {
	if at, err := parseStamp(f.text.Pitched, loc); err == nil && at.Before(f.first) {
		return at
	}
	return f.first
}

// opening is a batch that is to be made, with its original gravities.
type opening struct {
	batch journal.Batch
	ogs   []journal.OG
}

// parse makes the batch of the cells.
func (f *facts) parse(id string, loc *time.Location) (opening, error) {
	o := opening{batch: journal.Batch{ID: id, Product: f.text.Product, Vessel: f.vessel, Volume: f.text.Volume, Opened: f.opened(loc)}}
	if f.text.Generation != "" {
		n, err := strconv.Atoi(f.text.Generation)
		if err != nil {
			return o, fmt.Errorf("%s: read %.40q, wanted a whole number", colGeneration, f.text.Generation)
		}
		o.batch.Generation = n
	}
	if f.text.Pitched != "" {
		at, err := parseStamp(f.text.Pitched, loc)
		if err != nil {
			return o, fmt.Errorf("%s: %w", colPitched, err)
		}
		o.batch.Pitched = &at
	}
	if err := o.batch.Check(); err != nil {
		return o, err
	}
	var err error
	if o.ogs, err = parseOG(f.text.OG, f.own); err != nil {
		return o, err
	}
	for i := range o.ogs {
		g := &o.ogs[i]
		g.Batch, g.At = id, o.batch.Opened
		if err := g.Check(); err != nil {
			return o, err
		}
	}
	return o, nil
}
