package exchange

import (
	"context"
	"errors"
	"io"
	"math"
	"slices"
	"strings"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/tables/dialect"
)

// Options of an import.
type Options struct {
	DryRun   bool           // report, and write nothing
	Create   bool           // make batches and instruments that are not in the journal
	Location *time.Location // of times without an offset; nil is UTC
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
// range of its instrument or cannot be corrected, and when it rises over the reading
// before it with nothing added, unless its status says that it was kept.
//
// When rows are refused the error is ErrRefused and the report names them. Other
// errors: those of ReadReadings and of Store.Append. Whatever the error, nothing was
// written. In memory are the entries to be and the digits of the file's derived
// figures, packed; the text is not.
func Import(ctx context.Context, store journal.Store, by string, now time.Time, file io.Reader, opt Options) (Report, error) {
	p, err := read(ctx, store, by, now, file, opt)
	if err != nil {
		return p.report, err
	}
	var report Report
	draft := func(r journal.Reader) ([]journal.Body, error) {
		// A draft may be asked for again: it starts from what was read.
		d := newDraft(p, r)
		bodies, err := d.bodies(ctx)
		report = d.report
		return bodies, err
	}
	if opt.DryRun {
		_, err := draft(store)
		return report, err
	}
	entries, err := store.Append(ctx, by, now, draft)
	if err == nil && len(entries) > 0 {
		report.First, report.Last = entries[0].Number, entries[len(entries)-1].Number
	}
	return report, err
}

// plan is what was read from the file, before the journal is asked.
type plan struct {
	by      string
	now     time.Time
	opt     Options
	rows    []planned
	claims  []byte         // packed
	reasons map[int]string // of void rows, by place in rows
	batches map[string]*facts
	order   []string // batches as they appear
	uses    map[string]*use
	used    []string // instruments as they appear
	texts   map[string]string
	report  Report
}

// planned is one row. Its body is boxed once and goes into the journal as it is.
type planned struct {
	body   journal.Body // a journal.Reading
	line   int32
	claim  int32 // place in claims, -1: none
	own    bool  // written by this program
	failed bool  // status says that it could not be corrected
}

func read(ctx context.Context, store journal.Reader, by string, now time.Time, file io.Reader, opt Options) (*plan, error) {
	p := &plan{
		by: by, now: now, opt: opt,
		reasons: make(map[int]string), batches: make(map[string]*facts), uses: make(map[string]*use), texts: make(map[string]string),
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
			p.add(row)
		}
	}
	p.report.Dialect, p.report.Notes, p.texts = in.Dialect, in.Notes, nil
	p.rows, p.claims = slices.Clip(p.rows), slices.Clip(p.claims)
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

// add keeps a row.
func (p *plan) add(row *Row) {
	p.report.repair(row.Repairs)
	r := row.Reading
	r.Note = withTaker(r.Note, row.Operator, p.by)
	for _, s := range []*string{
		&r.Batch, &r.Vessel, &r.Quality, &r.Gravity.Text, &r.Gravity.Scale, &r.Temp.Text, &r.Temp.Unit, &r.Instrument, &r.Keep, &r.Note,
	} {
		*s = p.intern(*s)
	}
	kept := planned{line: int32(row.Line), claim: -1, own: row.own, failed: row.failed}
	if c, some := claimOf(row); some && len(p.claims) < math.MaxInt32 {
		kept.claim = int32(len(p.claims))
		p.claims = c.pack(p.claims)
	}
	kept.body = r
	p.addFacts(row, r)
	p.addUse(r)
	if row.Void {
		p.reasons[len(p.rows)] = p.intern(row.Reason)
	}
	p.rows = append(p.rows, kept)
}

// intern returns one copy of a text that comes again and again. A cell is part of
// the string of its whole row, which what is kept must not hold.
func (p *plan) intern(s string) string {
	if one, ok := p.texts[s]; ok {
		return one
	}
	s = strings.Clone(s)
	if len(p.texts) < 1<<16 {
		p.texts[s] = s
	}
	return s
}
