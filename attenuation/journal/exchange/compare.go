package exchange

import (
	"cmp"
	"context"
	"slices"

	"gylebook/attenuation/journal"
)

// atOnce is how many readings of a batch are derived together, or a few more, so
// that memory stays flat for a batch of any length.
const atOnce = 4096

type numbered = journal.Numbered[journal.Reading]

// compare reckons the derived figures of the accepted rows and lists where the file
// has others.
func (d *draft) compare(ctx context.Context, numbers []int64) error {
	if len(d.p.claims) == 0 {
		return nil
	}
	newBook := d.p.opt.Book
	if newBook == nil {
		newBook = journal.NewBook
	}
	book := newBook(d.list)
	for _, id := range d.order {
		t := d.batches[id]
		if len(t.rows) == 0 {
			continue
		}
		rec, err := d.record(ctx, id, t)
		if err != nil {
			return err
		}
		rows := make(map[int64]int32, len(t.rows)) // by number of entry
		for _, i := range t.rows {
			rows[numbers[i]] = i
			rec.Readings = append(rec.Readings, d.numbered(int(i), numbers[i]))
		}
		all := rec.Readings
		slices.SortFunc(all, func(a, b numbered) int {
			return cmp.Or(a.Body.TakenAt.Compare(b.Body.TakenAt), cmp.Compare(a.Number, b.Number))
		})
		for len(all) > 0 {
			if err := ctx.Err(); err != nil {
				return err
			}
			n := minuteEnd(all, atOnce)
			rec.Readings, all = all[:n], all[n:]
			d.compareSome(rec, rows, book)
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

func (d *draft) numbered(i int, number int64) numbered {
	reason, void := d.p.reasons[i]
	return numbered{
		Number: number, RecordedAt: d.p.now, By: d.p.by, Body: d.p.rows[i].body.(journal.Reading), Void: void, VoidReason: reason,
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

func (d *draft) compareSome(rec *journal.Record, rows map[int64]int32, book *journal.Book) {
	view := journal.Derive(rec, book)
	for i := range view.Values {
		v := &view.Values[i]
		if place, ok := rows[v.Number]; ok && d.p.rows[place].claim >= 0 {
			row := d.p.rows[place]
			ours := figuresOf(v, book)
			d.compareRow(int(row.line), rec.Batch.ID, &d.p.claims[row.claim], &ours)
		}
	}
}

func (d *draft) compareRow(line int, batch string, c *claim, ours *figures) {
	for i := range figureColumns {
		if c.places[i] == absent || ours.known[i] && !c.differs(i, ours.value[i]) {
			continue
		}
		d.report.DiffersCount++
		if !d.report.listsDifference(line) {
			continue // a file of another hand may differ in every cell
		}
		d.report.differ(Difference{line, batch, figureColumns[i].name, c.text(i), ours.text(i)})
	}
}
