package sqlstore

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"iter"
	"time"

	"gylebook/attenuation/journal"
)

const entryColumns = "number, recorded_at, operator, kind, digest, chain"

// header is a row of the table entry.
type header struct {
	entry journal.Entry
	kind  journal.Kind
}

func (h *header) dest() []any {
	return []any{&h.entry.Number, recordedOf{&h.entry.RecordedAt}, &h.entry.By, (*string)(&h.kind), &h.entry.Digest, &h.entry.Chain}
}

// reader reads the bodies of one kind. Rows that do not fit are
// journal.ErrTampered.
type reader interface {
	// body returns that of the entry, which is behind those asked before.
	body(ctx context.Context, v *view, e *journal.Entry) (journal.Body, error)
	// rest returns an error when a row is left.
	rest() error
	close()
}

// rowsOf reads the bodies of one kind in order of number.
type rowsOf[B journal.Body] struct {
	rows   *sql.Rows
	number int64
	cur    B
	copied *copied
	dest   []any
	extend func(ctx context.Context, v *view, number int64, b *B) error
}

// copied is what a typed table repeats of its entry.
type copied struct {
	at time.Time
	by string
}

// opener starts a reader: of one entry, or of all when number is 0.
type opener func(ctx context.Context, v *view, number int64) (reader, error)

func open[B journal.Body](t table[B], extend func(context.Context, *view, int64, *B) error) opener {
	return func(ctx context.Context, v *view, number int64) (reader, error) {
		r := &rowsOf[B]{extend: extend}
		r.dest = []any{&r.number}
		query, args := "SELECT t.number, ", []any(nil)
		if t.copies {
			query += "t.recorded_at, t.operator, "
			r.copied = new(copied)
			r.dest = append(r.dest, recordedOf{&r.copied.at}, &r.copied.by)
		}
		r.dest = append(r.dest, t.dest(&r.cur)...)
		query += t.list("t") + " FROM " + t.name + " t"
		if number == 0 {
			query += " ORDER BY t.number"
		} else {
			query, args = query+" WHERE t.number = ?", []any{number}
		}
		rows, err := v.query(ctx, query, args...)
		if err != nil {
			return nil, err
		}
		r.rows = rows
		return r, nil
	}
}

var openers = map[journal.Kind]opener{
	journal.KindInstrument: open(instruments, nil),
	journal.KindCertificate: open(certificates, func(ctx context.Context, v *view, number int64, c *journal.Certificate) (err error) {
		c.Points, err = v.points(ctx, number)
		return err
	}),
	journal.KindCheck:   open(checks, nil),
	journal.KindRetire:  open(retirements, nil),
	journal.KindBatch:   open(batches, nil),
	journal.KindOG:      open(ogs, nil),
	journal.KindLimit:   open(limits, nil),
	journal.KindVolume:  open(volumes, nil),
	journal.KindClose:   open(closes, nil),
	journal.KindReading: open(readings, nil),
	journal.KindEvent:   open(events, nil),
	journal.KindVoid:    open(voids, nil),
}

func (r *rowsOf[B]) close() { _ = r.rows.Close() }

func (r *rowsOf[B]) body(ctx context.Context, v *view, e *journal.Entry) (journal.Body, error) {
	number := e.Number
	if !r.rows.Next() {
		if err := r.rows.Err(); err != nil {
			return nil, err
		}
		return nil, fmt.Errorf("%w: its content is missing", journal.ErrTampered)
	}
	if err := r.rows.Scan(r.dest...); err != nil {
		return nil, fmt.Errorf("%w: %w", journal.ErrTampered, err)
	}
	if r.number < number {
		return nil, fmt.Errorf("%w: before it there is the content of an entry %d that is not", journal.ErrTampered, r.number)
	}
	if r.number > number {
		return nil, fmt.Errorf("%w: its content is missing", journal.ErrTampered)
	}
	if r.copied != nil && (!r.copied.at.Equal(e.RecordedAt) || r.copied.by != e.By) {
		return nil, fmt.Errorf("%w: its content was recorded at another time or by another", journal.ErrTampered)
	}
	if r.extend != nil {
		if err := r.extend(ctx, v, number, &r.cur); err != nil {
			return nil, err
		}
	}
	return r.cur, nil
}

func (r *rowsOf[B]) rest() error {
	if !r.rows.Next() {
		return r.rows.Err()
	}
	if err := r.rows.Scan(r.dest...); err != nil && r.number == 0 {
		return fmt.Errorf("after the last entry: %w", journal.ErrTampered)
	}
	return fmt.Errorf("entry %d: %w: its content is there, the entry is not", r.number, journal.ErrTampered)
}

// Entries implements journal.Reader. The typed tables are read side by side.
func (v *view) Entries(ctx context.Context) iter.Seq2[journal.Entry, error] {
	return func(yield func(journal.Entry, error) bool) {
		readers := make(map[journal.Kind]reader)
		defer func() {
			for _, r := range readers {
				r.close()
			}
		}()
		var h header
		dest := h.dest()
		rows, err := v.query(ctx, "SELECT "+entryColumns+" FROM entry ORDER BY number")
		if err != nil {
			yield(journal.Entry{}, err)
			return
		}
		defer rows.Close()
		for rows.Next() {
			e, err := v.complete(ctx, rows.Scan(dest...), &h, readers)
			if err != nil {
				yield(journal.Entry{}, err)
				return
			}
			if !yield(e, nil) {
				return
			}
		}
		if err := errors.Join(rows.Err(), v.leftOver(ctx, readers)); err != nil {
			yield(journal.Entry{}, err)
		}
	}
}

// complete adds the body to a header that was scanned with the result scanErr.
func (v *view) complete(ctx context.Context, scanErr error, h *header, readers map[journal.Kind]reader) (journal.Entry, error) {
	number := h.entry.Number
	if err := ctx.Err(); err != nil {
		return journal.Entry{}, err
	}
	if scanErr != nil {
		return journal.Entry{}, fmt.Errorf("entry %d: %w: %w", number, journal.ErrTampered, scanErr)
	}
	r, err := v.readerOf(ctx, h.kind, readers)
	if err == nil {
		h.entry.Body, err = r.body(ctx, v, &h.entry)
	}
	if err != nil {
		return journal.Entry{}, fmt.Errorf("entry %d: %w", number, err)
	}
	return h.entry, nil
}

func (v *view) readerOf(ctx context.Context, kind journal.Kind, readers map[journal.Kind]reader) (reader, error) {
	if r, ok := readers[kind]; ok {
		return r, nil
	}
	start, ok := openers[kind]
	if !ok {
		return nil, fmt.Errorf("%w: kind %.40q", journal.ErrTampered, string(kind))
	}
	r, err := start(ctx, v, 0)
	if err == nil {
		readers[kind] = r
	}
	return r, err
}

// leftOver names content that hangs on no entry.
func (v *view) leftOver(ctx context.Context, readers map[journal.Kind]reader) error {
	for kind := range openers {
		if kind == journal.KindVolume && v.version < volumesFrom {
			continue
		}
		r, err := v.readerOf(ctx, kind, readers)
		if err != nil {
			return err
		}
		if err := r.rest(); err != nil {
			return err
		}
	}
	return nil
}

// Entry implements journal.Reader.
func (v *view) Entry(ctx context.Context, number int64) (journal.Entry, error) {
	var h header
	err := v.one(ctx, "SELECT "+entryColumns+" FROM entry WHERE number = ?", []any{number}, h.dest()...)
	switch {
	case errors.Is(err, sql.ErrNoRows):
		return journal.Entry{}, fmt.Errorf("entry %d: %w", number, journal.ErrNotFound)
	case err != nil && h.entry.Number == number:
		return journal.Entry{}, fmt.Errorf("entry %d: %w: %w", number, journal.ErrTampered, err)
	case err != nil:
		return journal.Entry{}, err
	}
	start, ok := openers[h.kind]
	if !ok {
		return journal.Entry{}, fmt.Errorf("entry %d: %w: kind %.40q", number, journal.ErrTampered, string(h.kind))
	}
	r, err := start(ctx, v, number)
	if err != nil {
		return journal.Entry{}, err
	}
	defer r.close()
	if h.entry.Body, err = r.body(ctx, v, &h.entry); err != nil {
		return journal.Entry{}, fmt.Errorf("entry %d: %w", number, err)
	}
	return h.entry, nil
}
