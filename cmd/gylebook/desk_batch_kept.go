package main

import (
	"bytes"
	"context"
	"sync"
	"time"

	"gylebook/tables/chart"
	"gylebook/tables/web"
)

// mostBatches is how many batches are kept ready.
const mostBatches = 64

// batchAsOf is the page of a batch as it was reckoned. Whoever asks while that is
// done waits for it.
type batchAsOf struct {
	mu       sync.Mutex
	from     asOf
	page     web.Batch // for everybody: without the form, which differs by operator
	sketch   *picture  // without its curves
	drawings map[kind]*drawing
}

// batch is a batch by its name, as it stands.
func (d *desk) batch(ctx context.Context, name string) (web.Batch, *picture, *batchAsOf, error) {
	if err := d.there(); err != nil {
		return web.Batch{}, nil, nil, err
	}
	slot := d.slot(name)
	slot.mu.Lock()
	defer slot.mu.Unlock()
	err := d.refresh(ctx, slot, name)
	if err != nil && slot.sketch == nil {
		d.forget(name, slot)
	}
	return slot.page, slot.sketch, slot, err
}

// refresh makes the page of a batch if what is there does not hold any more.
func (d *desk) refresh(ctx context.Context, slot *batchAsOf, name string) error {
	journal, err := d.follow(ctx)
	if err != nil {
		return err
	}
	now := d.now()
	if slot.from.holds(journal.bearing(slot.page.Batch), now) {
		return nil
	}
	rec, err := shownBy(ctx, d.store, name)
	if err != nil {
		return noPage(err)
	}
	f, _, err := d.foresight(rec, journal.all, now)
	if err != nil {
		return err
	}
	p, err := sketchOf(ctx, d.store, f, rec)
	if err != nil {
		return err
	}
	answer, err := d.answer(ctx, "", []string{"batch", "show"}, rec.Batch.ID)
	if err != nil {
		return err
	}
	answer.Tables = renamed(answer.Tables, "entries")
	slot.page = web.Batch{
		Batch: rec.Batch.ID, Vessel: vesselOf(rec), Product: rec.Batch.Product, Open: rec.Closed == nil && !rec.Void,
		Answer: answer, CurveText: p.lines,
	}
	if len(p.course.Marks) > 0 {
		slot.page.Curve = "Gravity of " + rec.Batch.ID + " by day; the same in words below"
	}
	slot.sketch, slot.from = &p, asOf{journal.bearing(rec.Batch.ID), now}
	return nil
}

// drawing is a picture in one form. Its curves take a hundred times as long as the
// page around them, so one that is seconds old is shown again, whatever has come
// since; whoever types a reading takes longer than that.
type drawing struct {
	mu   sync.Mutex
	of   *picture // nil before the first
	at   time.Time
	made []byte
}

const drawingRests = 2 * time.Second

// kind is a form of a picture.
type kind struct {
	form  string
	phone bool
}

// draw is the picture in one form, of p unless one was drawn a moment ago.
func (d *drawing) draw(k kind, p *picture) ([]byte, error) {
	d.mu.Lock()
	defer d.mu.Unlock()
	if d.of != nil && (d.of == p || time.Since(d.at) < drawingRests) {
		return d.made, nil
	}
	size := chart.Page
	if k.phone {
		size = chart.Phone
	}
	var out bytes.Buffer
	if err := p.drawn().course.Write(&out, chart.Form(k.form), size); err != nil {
		return nil, err
	}
	d.of, d.at, d.made = p, time.Now(), out.Bytes()
	return d.made, nil
}

// drawing is where the picture of a batch in one form is kept.
func (b *batchAsOf) drawing(k kind) *drawing {
	b.mu.Lock()
	defer b.mu.Unlock()
	if b.drawings[k] == nil {
		if b.drawings == nil {
			b.drawings = map[kind]*drawing{}
		}
		b.drawings[k] = new(drawing)
	}
	return b.drawings[k]
}

// slot is where the batch of a name is kept.
func (d *desk) slot(name string) *batchAsOf {
	d.mu.Lock()
	defer d.mu.Unlock()
	if d.batches[name] == nil {
		if d.batches == nil || len(d.batches) >= mostBatches {
			d.batches = map[string]*batchAsOf{}
		}
		d.batches[name] = new(batchAsOf)
	}
	return d.batches[name]
}

// forget drops the place of a name that no batch has.
func (d *desk) forget(name string, slot *batchAsOf) {
	d.mu.Lock()
	defer d.mu.Unlock()
	if d.batches[name] == slot {
		delete(d.batches, name)
	}
}
