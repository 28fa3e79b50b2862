package exchange

import (
	"context"
	"errors"
	"fmt"
	"iter"
	"slices"
	"strings"

	"gylebook/attenuation/journal"
)

// draft turns a plan into entries, with the journal at hand.
type draft struct {
	p        *plan
	r        journal.Reader
	report   Report
	head     int64
	list     []*journal.InstrumentRecord
	tools    map[string]string // instruments by id: "" or why it cannot be used
	tooled   []journal.Instrument
	targets  []target            // of the batches of the file
	others   map[string]*target  // further batches, of which only vessels are named
	order    []string            // of those
	vessels  map[string][]string // open batches
	homes    map[string]string   // the batch of rows that name a vessel alone
	housed   map[string]*rowList // those rows, by batch
	used     []string            // ids of batches, also void ones
	repeated []uint64            // a bit for each row that is passed over
	blamed   int64               // the last row that was held for one after it
}

// target is a batch that readings go to.
type target struct {
	why  string // it cannot take readings
	made bool
	bare bool // made without a vessel
}

func newDraft(p *plan, r journal.Reader) *draft {
	report := p.report
	report.Refused, report.Notes = slices.Clone(report.Refused), slices.Clone(report.Notes)
	return &draft{
		p: p, r: r, report: report, tools: make(map[string]string), targets: make([]target, len(p.order)),
		others: make(map[string]*target), homes: make(map[string]string), housed: make(map[string]*rowList),
	}
}

// check looks at every row with the journal at hand, or returns ErrRefused.
func (d *draft) check(ctx context.Context) error {
	var err error
	if d.head, _, err = d.r.Head(ctx); err != nil {
		return err
	}
	if err := d.instruments(ctx); err != nil {
		return err
	}
	for i, id := range d.p.order {
		if err := d.aim(ctx, id, &d.targets[i]); err != nil {
			return err
		}
	}
	if err := d.settle(ctx); err != nil {
		return err
	}
	for _, vessel := range d.p.vessels {
		if err := d.house(ctx, vessel); err != nil {
			return err
		}
	}
	if err := d.judge(ctx); err != nil {
		return err
	}
	return d.report.err()
}

// bodies gives the entries to be, one by one, after check.
func (d *draft) bodies() iter.Seq2[journal.Body, error] {
	return func(yield func(journal.Body, error) bool) {
		number := d.head
		put := func(b journal.Body) bool {
			number++
			return yield(b, nil)
		}
		for _, i := range d.tooled {
			if !put(i) {
				return
			}
		}
		for id := range d.made() {
			o, err := d.opening(id)
			if err != nil {
				yield(nil, err)
				return
			}
			if !put(o.batch) {
				return
			}
			for _, g := range o.ogs {
				if !put(g) {
					return
				}
			}
		}
		c, u := &cursor{s: &d.p.rows}, newUnpacker()
		var row planned
		for place := int64(0); place < d.p.rows.size(); {
			record, end, err := c.at(place)
			if err == nil {
				err = u.unpack(&row, record)
			}
			if err != nil {
				yield(nil, err)
				return
			}
			place = end
			if d.passesOver(row.place) {
				continue
			}
			if row.reading.Batch == "" {
				row.reading.Batch = d.homes[row.reading.Vessel]
			}
			if !put(row.reading) || row.void && !put(journal.Void{Entry: number, Reason: row.reason}) {
				return
			}
		}
	}
}

func (d *draft) passOver(row int) {
	if d.repeated == nil {
		d.repeated = make([]uint64, d.p.kept/64+1)
	}
	d.repeated[row/64] |= 1 << (row % 64)
	d.report.Repeats++
}

func (d *draft) passesOver(row int) bool {
	return d.repeated != nil && d.repeated[row/64]&(1<<(row%64)) != 0
}

// aim finds a batch, or makes it.
func (d *draft) aim(ctx context.Context, id string, t *target) error {
	rec, err := d.r.Batch(ctx, id)
	switch {
	case errors.Is(err, journal.ErrNotFound):
		return d.makeBatch(ctx, id, t)
	case err != nil:
		return err
	case rec.Closed != nil:
		t.why = fmt.Sprintf("batch %s is %v", id, journal.ErrClosed)
	}
	return nil
}

func (d *draft) makeBatch(ctx context.Context, id string, t *target) error {
	if d.used == nil {
		var err error
		if d.used, err = d.r.BatchIDs(ctx); err != nil {
			return err
		}
	}
	f := d.p.batches[id]
	switch {
	case slices.Contains(d.used, id):
		t.why = fmt.Sprintf("batch %s was void, and an id is never used again", id)
		return nil
	case !d.p.opt.Create || f == nil:
		t.why = fmt.Sprintf("batch %s is %v%s", id, journal.ErrNotFound, nearest(id, d.used))
		if !d.p.opt.Create {
			d.report.Lacks = true
		}
		return nil
	}
	if c := d.p.contrary[id]; c != nil {
		for _, r := range c.list {
			d.report.refuse(r.Line, r.Reason)
		}
		d.report.RefusedCount += c.more
	}
	o, err := f.parse(id, d.p.opt.Location)
	if err != nil {
		t.why = fmt.Sprintf("batch %s cannot be made: %v", id, err)
		return nil
	}
	for _, g := range o.ogs {
		if g.Instrument == "" {
			continue
		}
		var u use
		u.add(g.Gravity, g.At)
		if t.why = d.instrument(g.Instrument, &u); t.why != "" {
			return nil
		}
	}
	t.made = true
	d.report.Batches = append(d.report.Batches, id)
	return nil
}

// made runs over the batches that are made, in the order of the file.
func (d *draft) made() iter.Seq2[string, *target] {
	return func(yield func(string, *target) bool) {
		for i, id := range d.p.order {
			if t := &d.targets[i]; t.made && !yield(id, t) {
				return
			}
		}
	}
}

// opening is a batch that is made, after settle.
func (d *draft) opening(id string) (opening, error) {
	f := d.p.batches[id]
	o, err := f.parse(id, d.p.opt.Location)
	if d.targets[f.place].bare {
		o.batch.Vessel = ""
	}
	return o, err
}

func nearest(id string, ids []string) string {
	near := journal.Nearest(id, ids, 3)
	if len(near) == 0 {
		return ""
	}
	return "; nearest: " + strings.Join(near, ", ")
}
