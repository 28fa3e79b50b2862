package exchange

import (
	"context"
	"errors"
	"fmt"
	"slices"
	"strings"
	"time"

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
	seen    map[key]struct{}
	out     []journal.Body
	used    []string // ids of batches, also void ones
}

// target is a batch that readings go to.
type target struct {
	number int
	why    string // it cannot take readings
	made   bool
	rows   []int32
}

// key is what makes a row a repeat of another. Void readings are repeats of void
// ones only.
type key struct {
	batch  int
	minute int64
	value  float64
	scale  int8
	void   bool
}

func newDraft(p *plan, r journal.Reader) *draft {
	report := p.report
	report.Refused, report.Notes = slices.Clone(report.Refused), slices.Clone(report.Notes)
	return &draft{
		p: p, r: r, report: report,
		tools: make(map[string]string), batches: make(map[string]*target), seen: make(map[key]struct{}, len(p.rows)),
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
	numbers := make([]int64, len(d.p.rows)) // of the entries; 0: none
	for i := range d.p.rows {
		if i&1023 == 0 && ctx.Err() != nil {
			return nil, ctx.Err()
		}
		if numbers[i], err = d.row(ctx, i); err != nil {
			return nil, err
		}
	}
	if err := d.compare(ctx, numbers); err != nil {
		return nil, err
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
	t := &target{number: len(d.batches)}
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
	for _, n := range rec.Readings {
		if k, ok := keyOf(t, n.Body, n.Void); ok {
			d.seen[k] = struct{}{}
		}
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
	d.out = append(d.out, f.body)
	for _, g := range f.ogs {
		d.out = append(d.out, g)
	}
	return nil
}

func nearest(id string, ids []string) string {
	near := journal.Nearest(id, ids, 3)
	if len(near) == 0 {
		return ""
	}
	return "; nearest: " + strings.Join(near, ", ")
}

// row accepts or refuses one row and returns the number of its entry.
func (d *draft) row(ctx context.Context, i int) (int64, error) {
	p := &d.p.rows[i]
	r := p.body.(journal.Reading)
	refuse := func(why string) (int64, error) {
		d.report.refuse(int(p.line), why)
		return 0, nil
	}
	if r.Batch == "" {
		id, why, err := d.inVessel(ctx, r.Vessel)
		if err != nil {
			return 0, err
		}
		if why != "" {
			return refuse(why)
		}
		r.Batch = id
		p.body = r
	}
	t, err := d.target(ctx, r.Batch)
	if err != nil {
		return 0, err
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
	reason, void := d.p.reasons[i]
	k, ok := keyOf(t, r, void)
	if _, repeat := d.seen[k]; ok && repeat {
		d.report.Repeats++
		return 0, nil
	}
	d.seen[k] = struct{}{}
	d.out = append(d.out, p.body)
	d.report.Readings++
	number := d.last()
	if void {
		v := journal.Void{Entry: number, Reason: reason}
		if err := v.Check(); err != nil {
			return refuse(err.Error())
		}
		d.out = append(d.out, v)
		d.report.Voids++
	}
	if len(d.p.claims) > 0 {
		t.rows = append(t.rows, int32(i))
	}
	return number, nil
}

func keyOf(t *target, r journal.Reading, void bool) (key, bool) {
	g, err := r.Gravity.Reading()
	if err != nil {
		return key{}, false
	}
	return key{t.number, floorMinute(r.TakenAt), g.Value, int8(g.Scale), void}, true
}

func floorMinute(t time.Time) int64 {
	s := t.Unix()
	return (s - ((s%60)+60)%60) / 60
}
