package sqlstore

import (
	"cmp"
	"context"
	"database/sql"
	"slices"
	"time"

	"gylebook/attenuation/journal"
)

// bundle is what hangs on a batch and is of one kind. It comes in a column of the
// batch's own row, packed: a row a batch is several times faster than a row a reading.
type bundle[B journal.Body] struct {
	table table[B]
	at    func(*B) time.Time // its own time
	sel   selection
	text  sql.NullString // of the batch that was scanned last
	cur   journal.Numbered[B]
	dest  []any
}

func newBundle[B journal.Body](s selection, t table[B], at func(*B) time.Time) *bundle[B] {
	b := &bundle[B]{table: t, at: at, sel: s}
	b.dest = []any{&b.cur.Number, voidOf{&b.cur.Void, &b.cur.VoidReason}}
	if !s.lean {
		b.dest = append(b.dest, recordedOf{&b.cur.RecordedAt}, &b.cur.By)
	}
	b.dest = append(b.dest, t.dest(&b.cur.Body)...)
	return b
}

// columns are the expressions for dest.
func (b *bundle[B]) columns() []string {
	list := []string{"c.number", voidness}
	switch {
	case b.sel.lean:
	case b.table.copies:
		list = append(list, "c.recorded_at", "c.operator")
	default:
		list = append(list, "e.recorded_at", "e.operator")
	}
	for _, name := range b.table.columns {
		list = append(list, "c."+name)
	}
	return list
}

// expression is the column of the batch's row, and the arguments in it.
func (b *bundle[B]) expression() (string, []any) {
	tables, on, args := b.rows()
	return "(SELECT " + packedRows(b.columns()) + " FROM " + tables + " WHERE " + on + ")", args
}

// rows are the tables of what hangs on a batch b, and on what they are joined. The
// joins are written in the order in which they are to run.
func (b *bundle[B]) rows() (tables, on string, args []any) {
	t, owner := b.table, "batch"
	tables = t.name + " c"
	if !t.copies && !b.sel.lean {
		tables, on = tables+" CROSS JOIN entry e", " AND e.number = c.number"
	}
	if t.owner != "" {
		// What a void batch took over was not taken.
		owner = t.owner
		on += " AND c." + owner + " <> '' AND NOT EXISTS (SELECT 1 FROM batch t CROSS JOIN void_entry y WHERE t.id = c.batch AND y.entry = t.number)"
	}
	if t.name == readings.name && b.sel.last > 0 {
		// A bound on the key, so that the rows before it are not touched.
		on, args = on+" AND "+newest, []any{b.sel.last - 1}
	}
	return tables + " LEFT JOIN void_entry x ON x.entry = c.number", "c." + owner + " = b.id" + on, args
}

// take returns what hangs on the batch that was scanned last, in the order of its
// own time, then number. A nil bundle has nothing.
func (b *bundle[B]) take(ctx context.Context, v *view, id string) ([]journal.Numbered[B], error) {
	if b == nil || !b.text.Valid {
		return nil, nil
	}
	var list []journal.Numbered[B]
	err := unpackRows(b.text.String, b.dest, func(n int) { list = slices.Grow(list, n) }, func() { list = append(list, b.cur) })
	if err != nil {
		// Row by row there is no divider that a text could hold, and an error has a
		// number.
		if list, err = b.again(ctx, v, id); err != nil {
			return nil, err
		}
	}
	b.order(list)
	return list, nil
}

// order sorts a list that is in order as a rule: only neighbours are compared then,
// and none is moved.
func (b *bundle[B]) order(list []journal.Numbered[B]) {
	before := func(x, y *journal.Numbered[B]) int {
		return cmp.Or(b.at(&x.Body).Compare(b.at(&y.Body)), cmp.Compare(x.Number, y.Number))
	}
	for k := 1; k < len(list); k++ {
		if before(&list[k-1], &list[k]) > 0 {
			slices.SortFunc(list, func(x, y journal.Numbered[B]) int { return before(&x, &y) })
			return
		}
	}
}

// again reads what hangs on a batch row by row.
func (b *bundle[B]) again(ctx context.Context, v *view, id string) ([]journal.Numbered[B], error) {
	tables, on, args := b.rows()
	var list []journal.Numbered[B]
	var n journal.Numbered[B]
	var void string
	query := "SELECT c.number, " + voidness + " FROM batch b CROSS JOIN " + tables + " WHERE " + on + " AND b.id = ?"
	err := v.each(ctx, query, append(args, id), []any{&n.Number, &void}, func() error {
		if err := unpackColumn(void, voidOf{&n.Void, &n.VoidReason}); err != nil {
			return err
		}
		list = append(list, n)
		return nil
	})
	if err != nil {
		return nil, err
	}
	for k := range list {
		e, err := v.Entry(ctx, list[k].Number)
		if err != nil {
			return nil, err
		}
		list[k].RecordedAt, list[k].By = e.RecordedAt, e.By
		list[k].Body, _ = e.Body.(B)
	}
	return list, nil
}
