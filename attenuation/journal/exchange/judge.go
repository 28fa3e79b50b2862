package exchange

import (
	"context"

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
	book.Plain = !d.p.claimed // nothing to compare an uncertainty with
	c, u := &cursor{s: &d.p.rows}, newUnpacker()
	for i, id := range d.p.order {
		rows := []*rowList{&d.p.batches[id].rows}
		if l := d.housed[id]; l != nil {
			rows = append(rows, l)
		}
		if err := d.judgeBatch(ctx, id, &d.targets[i], rows, book, c, u); err != nil {
			return err
		}
	}
	for _, id := range d.order {
		if err := d.judgeBatch(ctx, id, d.others[id], []*rowList{d.housed[id]}, book, c, u); err != nil {
			return err
		}
	}
	return nil
}

func (d *draft) judgeBatch(ctx context.Context, id string, t *target, rows []*rowList, book *journal.Book, c *cursor, u *unpacker) error {
	if t.why != "" {
		return d.refuseAll(rows, t.why, c, u)
	}
	rec, err := d.record(ctx, id, t)
	if err != nil {
		return err
	}
	here := inTime(rec.Readings)
	own := *rec
	s := stretch{d: d, rec: &own, series: journal.NewSeries(&own, book), book: book}
	known := repeats{here: here}
	var row planned
	for record, err := range byTime(c, rows) {
		if err == nil {
			err = u.unpack(&row, record)
		}
		if err == nil {
			err = ctx.Err()
		}
		if err != nil {
			return err
		}
		row.reading.Batch = id
		if why := d.unfit(&row); why != "" {
			d.report.refuse(row.line, why)
			continue
		}
		if known.found(&row) {
			d.passOver(row.place)
			continue
		}
		for len(here) > 0 && !here[0].Body.TakenAt.After(row.reading.TakenAt) {
			s.add(here[0], planned{})
			here = here[1:]
		}
		d.report.Readings++
		if row.void {
			d.report.Voids++
		}
		s.add(d.numbered(&row), row)
	}
	for _, one := range here {
		if err := ctx.Err(); err != nil {
			return err
		}
		s.add(one, planned{})
	}
	s.judge()
	return nil
}

func (d *draft) refuseAll(rows []*rowList, why string, c *cursor, u *unpacker) error {
	var row planned
	for _, l := range rows {
		for at, err := range l.each(c) {
			if err == nil {
				err = u.unpack(&row, at.record)
			}
			if err != nil {
				return err
			}
			d.report.refuse(row.line, why)
		}
	}
	return nil
}

// unfit returns why a row cannot be an entry, whatever the others are.
func (d *draft) unfit(row *planned) string {
	if why := d.tools[row.reading.Instrument]; why != "" {
		return why
	}
	err := row.reading.Check()
	if err == nil && row.void {
		err = (journal.Void{Entry: 1, Reason: row.reason}).Check()
	}
	if err != nil {
		return err.Error()
	}
	return ""
}

// numbered is a row as it would be read back. Its number stands for its line: the
// entries are numbered when it is known which rows are accepted, in the same order.
func (d *draft) numbered(row *planned) numbered {
	return numbered{
		Number: d.head + int64(row.line), RecordedAt: d.p.now, By: d.p.by, Body: row.reading, Void: row.void, VoidReason: row.reason,
	}
}

// record returns the batch, or the one that is to be made.
func (d *draft) record(ctx context.Context, id string, t *target) (*journal.Record, error) {
	if !t.made {
		return d.r.Batch(ctx, id)
	}
	o, err := d.opening(id)
	rec := &journal.Record{Batch: o.batch}
	for _, g := range o.ogs {
		rec.OGs = append(rec.OGs, journal.Numbered[journal.OG]{RecordedAt: d.p.now, By: d.p.by, Body: g})
	}
	return rec, err
}

// stretch is some readings of a batch, in time.
type stretch struct {
	d      *draft
	rec    *journal.Record
	series *journal.Series
	book   *journal.Book
	some   []numbered
	rows   []planned // of those that are fresh
}

// add takes one reading more. When there are enough they are judged first, but
// those of one minute stay together, for their mean is used.
func (s *stretch) add(one numbered, row planned) {
	n := len(s.some)
	if n >= atOnce && floorMinute(one.Body.TakenAt) != floorMinute(s.some[n-1].Body.TakenAt) {
		s.judge()
	}
	if row.claim != nil {
		row.claim = append([]byte(nil), row.claim...)
	}
	s.some, s.rows = append(s.some, one), append(s.rows, row)
}

// judge goes over the stretch and begins another.
func (s *stretch) judge() {
	s.rec.Readings = s.some
	view := journal.Derive(s.rec, s.book)
	for i := range view.Values {
		v := &view.Values[i]
		fresh := v.Number > s.d.head
		if hold, number := s.series.Next(view, v, fresh); hold != nil {
			s.d.hold(number, hold, &s.rows[i])
		}
		if row := &s.rows[i]; fresh && row.claim != nil {
			ours, c := figuresOf(v, s.book), unpackClaim(row.claim)
			s.d.compareRow(row, s.rec.Batch.ID, &c, &ours)
		}
	}
	s.some, s.rows = s.some[:0], s.rows[:0]
}

// hold refuses the fresh reading with a number: row, or one before it that row
// stands over. One that could not be corrected may be told as such, or kept.
func (d *draft) hold(number int64, h *journal.Hold, row *planned) {
	if h.Code == journal.HoldUncorrected && (row.failed || row.reading.Keep != "") {
		return
	}
	if number == d.blamed {
		return // by another reading of the same minute
	}
	d.blamed = number
	d.report.Readings--
	why := h.Text
	if !h.Final {
		why += "; status " + statusSuspect + " with a " + colReason + " keeps it"
	}
	d.report.refuse(int(number-d.head), why)
}
