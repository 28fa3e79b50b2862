package exchange

import (
	"context"
	"errors"
	"io"
	"iter"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/tables/dialect"
)

// Options of an import.
type Options struct {
	DryRun   bool           // report, and write nothing
	Create   bool           // make batches and instruments that are not in the journal
	Location *time.Location // of times without an offset; nil is UTC
	// Scratch makes a file for rows beyond the first megabyte; nil keeps all in memory.
	Scratch func() (Scratch, error)
	// Book makes the book that figures are compared by; nil is journal.NewBook.
	Book func([]*journal.InstrumentRecord) *journal.Book
}

// Import takes the typed columns of a table of readings into the journal, as entries
// of by: all rows or none. Void rows become void readings, suspect ones are kept as
// such, and a row with the batch, the minute and the value of another is passed over.
// Batches and instruments must be in the journal; with Create they are made: an
// instrument as glass on 20/20 in the scale of its readings, with the division that
// most of them were typed to. Of batches that are made in one vessel the newest has
// it, and none when an open batch of the journal is in it; the report says so.
//
// A row is refused, besides, when it was taken before the pitching, is beyond the
// range of its instrument or cannot be corrected. Unless its status says that it was
// kept, it is refused too when it rises over the reading before it or over the
// original gravity with nothing added, falls faster than anything ferments, or is far
// from another of its minute: as a reading that is logged by itself is held.
//
// When rows are refused the error is ErrRefused and the report names them. Other
// errors: those of ReadReadings, of Options.Scratch and of Store.AppendEach. Whatever
// the error, nothing was written. The file is read once. In memory is what is known
// of each batch and where its rows are; the rows themselves are in the scratch file,
// unless they are few.
func Import(ctx context.Context, store journal.Store, by string, now time.Time, file io.Reader, opt Options) (Report, error) {
	p, err := read(ctx, store, by, now, file, opt)
	defer p.rows.close()
	if err != nil {
		return p.report, err
	}
	var report Report
	draft := func(r journal.Reader) (iter.Seq2[journal.Body, error], error) {
		// A draft may be asked for again: it starts from what was read.
		d := newDraft(p, r)
		err := d.check(ctx)
		report = d.report
		if err != nil {
			return nil, err
		}
		return d.bodies(), nil
	}
	if opt.DryRun {
		_, err := draft(store)
		return report, err
	}
	first, last, err := store.AppendEach(ctx, by, now, draft)
	report.First, report.Last = first, last
	return report, err
}

// plan is what was read from the file, before the journal is asked.
type plan struct {
	by          string
	now         time.Time
	opt         Options
	rows        spool
	kept        int  // rows in it
	claimed     bool // some have figures
	batches     map[string]*facts
	order       []string // batches as they appear
	unnamed     map[string]*rowList
	vessels     []string              // of rows that name no batch, as they appear
	contrary    map[string]*conflicts // of batches
	conflicts   int                   // in their lists
	instruments map[string]*use
	used        []string // instruments as they appear
	shared      sharer
	report      Report
}

func read(ctx context.Context, store journal.Reader, by string, now time.Time, file io.Reader, opt Options) (*plan, error) {
	p := &plan{
		by: by, now: now, opt: opt, rows: spool{scratch: opt.Scratch}, shared: make(sharer),
		batches: make(map[string]*facts), unnamed: make(map[string]*rowList), contrary: make(map[string]*conflicts), instruments: make(map[string]*use),
	}
	scales, err := scalesOf(ctx, store)
	if err != nil {
		return p, err
	}
	in, err := ReadReadings(file, ReadOptions{
		Location: opt.Location, Now: now, Scale: func(id string) string { return scales[id] },
	})
	if err != nil {
		return p, err
	}
	var packed []byte
	for row, err := range in.All() {
		if p.report.Rows&1023 == 0 && ctx.Err() != nil {
			return p, ctx.Err()
		}
		p.report.Rows++
		var bad *dialect.Error
		switch {
		case errors.As(err, &bad):
			p.report.refuse(bad.Line, bad.Why)
		case err != nil:
			return p, err
		default:
			if packed, err = p.add(row, packed[:0]); err != nil {
				return p, err
			}
		}
	}
	p.report.Dialect, p.report.Notes, p.shared = in.Dialect, in.Notes, nil
	return p, nil
}

func scalesOf(ctx context.Context, r journal.Reader) (map[string]string, error) {
	list, err := r.Instruments(ctx)
	if err != nil {
		return nil, err
	}
	scales := make(map[string]string, len(list))
	for _, i := range list {
		scales[i.Instrument.ID] = i.Instrument.Scale
	}
	return scales, nil
}

// add keeps a row; buf is room for its short form.
func (p *plan) add(row *Row, buf []byte) ([]byte, error) {
	p.report.repair(row.Repairs)
	kept := planned{reading: row.Reading, reason: row.Reason, place: p.kept, line: row.Line, own: row.own, failed: row.failed, void: row.Void}
	r := &kept.reading
	r.Note = withTaker(r.Note, row.Operator, p.by)
	if c, some := claimOf(row); some {
		kept.claim, p.claimed = c.pack(nil), true
	}
	buf = kept.pack(buf)
	from := p.rows.size()
	if err := p.rows.add(buf); err != nil {
		return buf, err
	}
	p.kept++
	p.rowsOf(row, r).add(from, p.rows.size(), r.TakenAt)
	p.addUse(r)
	return buf, nil
}

// rowsOf is the list that a row belongs on, with what it says about its batch kept.
func (p *plan) rowsOf(row *Row, r *journal.Reading) *rowList {
	if r.Batch != "" {
		return &p.addFacts(row, r).rows
	}
	l := p.unnamed[r.Vessel]
	if l == nil {
		l = new(rowList)
		vessel := p.shared.share(r.Vessel)
		p.unnamed[vessel] = l
		p.vessels = append(p.vessels, vessel)
	}
	return l
}
