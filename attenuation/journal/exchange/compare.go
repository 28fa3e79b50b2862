package exchange

import (
	"context"
	"math"
	"slices"

	"gylebook/attenuation/journal"
)

// atOnce is how many readings of a batch are derived together, or a few more, so
// that memory stays flat for a batch of any length.
const atOnce = 512

type numbered = journal.Numbered[journal.Reading]

// judge finds repeats, refuses what cannot be whatever the order of the rows, and
// lists where the file has other figures than those reckoned here, batch by batch.
func (d *draft) judge(ctx context.Context) error {
	newBook := d.p.opt.Book
	if newBook == nil {
		newBook = journal.NewBook
	}
	book := newBook(d.list)
	book.Plain = len(d.p.claims) == 0 // nothing to compare an uncertainty with
	for _, id := range d.order {
		t := d.batches[id]
		if len(t.rows) == 0 {
			continue
		}
		rec, err := d.record(ctx, id, t)
		if err != nil {
			return err
		}
		d.repeats(t, rec)
		for _, i := range t.rows {
			if d.fate[i] == accepted {
				rec.Readings = append(rec.Readings, d.numbered(int(i)))
			}
		}
		t.rows = nil
		all := inTime(rec.Readings)
		series := journal.NewSeries(rec, book)
		for len(all) > 0 {
			if err := ctx.Err(); err != nil {
				return err
			}
			n := minuteEnd(all, atOnce)
			rec.Readings, all = all[:n], all[n:]
			d.judgeSome(series, rec, book)
		}
	}
	return nil
}

// minuteEnd returns n, or so many more that readings of one minute stay together,
// for their mean is used.
func minuteEnd(all []numbered, n int) int {
	if n >= len(all) {
		return len(all)
	}
	for n < len(all) && floorMinute(all[n].Body.TakenAt) == floorMinute(all[n-1].Body.TakenAt) {
		n++
	}
	return n
}

// numbered is a row as it would be read back. Its number stands for its place: the
// entries are numbered when it is known which rows are accepted, in the same order.
func (d *draft) numbered(i int) numbered {
	reason, void := d.p.reasons[i]
	return numbered{
		Number: d.last() + 1 + int64(i), RecordedAt: d.p.now, By: d.p.by, Body: d.p.rows[i].body.(journal.Reading), Void: void, VoidReason: reason,
	}
}

// record returns a copy of the batch, or the batch that is to be made.
func (d *draft) record(ctx context.Context, id string, t *target) (*journal.Record, error) {
	if !t.made {
		rec, err := d.r.Batch(ctx, id)
		if err != nil {
			return nil, err
		}
		own := *rec
		own.Readings = slices.Clone(own.Readings)
		return &own, nil
	}
	f := d.p.batches[id]
	rec := &journal.Record{Batch: f.body}
	for _, g := range f.ogs {
		rec.OGs = append(rec.OGs, journal.Numbered[journal.OG]{RecordedAt: d.p.now, By: d.p.by, Body: g})
	}
	return rec, nil
}

func (d *draft) judgeSome(series *journal.Series, rec *journal.Record, book *journal.Book) {
	view := journal.Derive(rec, book)
	first := d.last() + 1
	for i := range view.Values {
		v := &view.Values[i]
		fresh := v.Number >= first
		if hold, number := series.Next(view, v, fresh); hold != nil {
			d.hold(int(number-first), hold)
		}
		if !fresh {
			continue
		}
		row := &d.p.rows[v.Number-first]
		if row.claim >= 0 {
			ours, c := figuresOf(v, book), unpackClaim(d.p.claims[row.claim:])
			d.compareRow(row, rec.Batch.ID, &c, &ours)
		}
	}
}

// hold refuses a row. One that could not be corrected may be told as such, or kept.
func (d *draft) hold(i int, h *journal.Hold) {
	row := &d.p.rows[i]
	if h.Code == journal.HoldUncorrected && (row.failed || row.body.(journal.Reading).Keep != "") {
		return
	}
	d.fate[i] = refused
	why := h.Text
	if h.Code == journal.HoldRise {
		why += "; status " + statusSuspect + " with a " + colReason + " keeps it"
	}
	d.report.refuse(int(row.line), why)
}

func (d *draft) compareRow(row *planned, batch string, c *claim, ours *figures) {
	line := int(row.line)
	unsure := row.unsure()
	for i := range figureColumns {
		if c.places[i] == absent || ours.known[i] && !c.differs(i, ours.value[i], unsure) {
			continue
		}
		d.report.DiffersCount++
		if !d.report.listsDifference(line) {
			continue // a file of another hand may differ in every cell
		}
		d.report.differ(Difference{line, batch, figureColumns[i].name, c.text(i), ours.text(i)})
	}
}

// unsure is what our own table leaves open of a temperature [°C]: one typed in °F
// is rounded in it.
func (p *planned) unsure() float64 {
	if !p.own {
		return 0
	}
	t, err := p.body.(journal.Reading).Temp.Temperature()
	if err != nil || t.Typed.Places() < finer {
		return 0
	}
	return math.Pow10(-t.Typed.Places()) / 2
}
