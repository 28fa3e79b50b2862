package exchange

import (
	"context"
	"errors"
	"fmt"
	"slices"
	"strings"

	"gylebook/attenuation/journal"
)

// draft turns a plan into entries, with the journal at hand.
type draft struct {
	p       *plan
	r       journal.Reader
	report  Report
	head    int64
	list    []*journal.InstrumentRecord
	tools   map[string]string // instruments by id: "" or why it cannot be used
	batches map[string]*target
	order   []string            // of batches, as they appear
	vessels map[string][]string // open batches
	fate    []fate              // of the rows
	out     []journal.Body
	used    []string // ids of batches, also void ones
	made    []string // ids of batches
}

// target is a batch that readings go to.
type target struct {
	why  string // it cannot take readings
	made bool
	rows []int32
}

func newDraft(p *plan, r journal.Reader) *draft {
	report := p.report
	report.Refused, report.Notes = slices.Clone(report.Refused), slices.Clone(report.Notes)
	return &draft{
		p: p, r: r, report: report,
		tools: make(map[string]string), batches: make(map[string]*target), fate: make([]fate, len(p.rows)),
	}
}

// bodies returns the entries to be, or ErrRefused.
func (d *draft) bodies(ctx context.Context) ([]journal.Body, error) {
	var err error
	if d.head, _, err = d.r.Head(ctx); err != nil {
		return nil, err
	}
	d.out = make([]journal.Body, 0, len(d.p.rows)+len(d.p.reasons))
	if err := d.instruments(ctx); err != nil {
		return nil, err
	}
	for _, id := range d.p.order {
		if _, err := d.target(ctx, id); err != nil {
			return nil, err
		}
	}
	if err := d.settle(ctx); err != nil {
		return nil, err
	}
	for i := range d.p.rows {
		if i&1023 == 0 && ctx.Err() != nil {
			return nil, ctx.Err()
		}
		if err := d.row(ctx, i); err != nil {
			return nil, err
		}
	}
	if err := d.judge(ctx); err != nil {
		return nil, err
	}
	for i := range d.p.rows {
		d.write(i)
	}
	if err := d.report.err(); err != nil {
		return nil, err
	}
	return d.out, nil
}

// last is the number of the entry that was appended last.
func (d *draft) last() int64 { return d.head + int64(len(d.out)) }

// target finds a batch, or makes it.
func (d *draft) target(ctx context.Context, id string) (*target, error) {
	if t := d.batches[id]; t != nil {
		return t, nil
	}
	t := new(target)
	d.batches[id] = t
	d.order = append(d.order, id)
	rec, err := d.r.Batch(ctx, id)
	switch {
	case errors.Is(err, journal.ErrNotFound):
		return t, d.makeBatch(ctx, id, t)
	case err != nil:
		return nil, err
	case rec.Closed != nil:
		t.why = fmt.Sprintf("batch %s is %v", id, journal.ErrClosed)
	}
	return t, nil
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
	for _, c := range f.conflicts {
		d.report.refuse(c.Line, c.Reason)
	}
	d.report.RefusedCount += f.more
	if err := f.parse(id, d.p.opt.Location); err != nil {
		t.why = fmt.Sprintf("batch %s cannot be made: %v", id, err)
		return nil
	}
	for _, g := range f.ogs {
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
	d.made = append(d.made, id)
	return nil
}

func nearest(id string, ids []string) string {
	near := journal.Nearest(id, ids, 3)
	if len(near) == 0 {
		return ""
	}
	return "; nearest: " + strings.Join(near, ", ")
}

// fate is what becomes of a row.
type fate uint8

const (
	refused fate = iota
	repeated
	accepted
)

// row refuses one row or hands it to its batch.
func (d *draft) row(ctx context.Context, i int) error {
	p := &d.p.rows[i]
	r := p.body.(journal.Reading)
	refuse := func(why string) error {
		d.report.refuse(int(p.line), why)
		return nil
	}
	if r.Batch == "" {
		id, why, err := d.inVessel(ctx, r.Vessel)
		if err != nil {
			return err
		}
		if why != "" {
			return refuse(why)
		}
		r.Batch = id
		p.body = r
	}
	t, err := d.target(ctx, r.Batch)
	if err != nil {
		return err
	}
	if t.why != "" {
		return refuse(t.why)
	}
	if why := d.tools[r.Instrument]; why != "" {
		return refuse(why)
	}
	if err := r.Check(); err != nil {
		return refuse(err.Error())
	}
	if reason, void := d.p.reasons[i]; void {
		if err := (journal.Void{Entry: 1, Reason: reason}).Check(); err != nil {
			return refuse(err.Error())
		}
	}
	d.fate[i] = accepted
	t.rows = append(t.rows, int32(i))
	return nil
}

// write appends the entries of an accepted row.
func (d *draft) write(i int) {
	switch d.fate[i] {
	case repeated:
		d.report.Repeats++
	case accepted:
		d.out = append(d.out, d.p.rows[i].body)
		d.report.Readings++
		if reason, void := d.p.reasons[i]; void {
			d.out = append(d.out, journal.Void{Entry: d.last(), Reason: reason})
			d.report.Voids++
		}
	}
}
