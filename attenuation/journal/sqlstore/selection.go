package sqlstore

import (
	"strings"
	"time"

	"gylebook/attenuation/journal"
)

// selection says which batches are meant and in which order. Every statement that
// reads them, or what hangs on them, takes the same one, so that the results run
// side by side.
type selection struct {
	from  string // tables, the first decides the order
	where string
	order string
	args  []any
	void  bool // void batches too, with the reason
	last  int  // so many of the newest readings of each; 0 is all, noReadings none
}

const noReadings = -1

const notVoid = "NOT EXISTS (SELECT 1 FROM void_entry x WHERE x.entry = b.number)"

var (
	byID     = selection{from: "batch b", where: "b.id = ? AND " + notVoid, order: "b.id"}
	openOnes = selection{from: "open_batch o CROSS JOIN batch b", where: "b.id = o.batch AND " + notVoid, order: "o.vessel, o.batch"}
)

func selectionOf(f journal.Filter) selection {
	s := selection{from: "batch b", order: "b.product, b.began_ms, b.id"}
	where := []string{notVoid}
	if s.void = f.Void; f.Void {
		where[0] = "1"
	}
	if f.Batch != "" {
		where, s.args = append(where, "b.id = ?"), append(s.args, f.Batch)
	}
	if f.Product != "" {
		where, s.args = append(where, "b.product = ?"), append(s.args, f.Product)
	}
	if f.Yeast != "" {
		where, s.args = append(where, "b.yeast = ?"), append(s.args, f.Yeast)
	}
	if f.Year != 0 {
		where = append(where, "b.began_ms >= ? AND b.began_ms < ?")
		s.args = append(s.args, newYear(f.Year), newYear(f.Year+1))
	}
	if f.Open {
		where = append(where, "EXISTS (SELECT 1 FROM open_batch o WHERE o.batch = b.id)")
	}
	if f.Closed {
		where = append(where, "NOT EXISTS (SELECT 1 FROM open_batch o WHERE o.batch = b.id)")
	}
	s.where = strings.Join(where, " AND ")
	return s
}

// finishedOnes are the batches of a product and a yeast closed before a time, the one
// that began last first: the index is run backwards.
func finishedOnes(product, yeast string, before time.Time) selection {
	return selection{
		from: "batch b",
		where: notVoid + " AND b.product = ? AND b.yeast = ? AND EXISTS (SELECT 1 FROM batch_close k WHERE k.batch = b.id AND k.at_ms < ?" +
			" AND NOT EXISTS (SELECT 1 FROM void_entry y WHERE y.entry = k.number))",
		order: "b.product DESC, b.began_ms DESC, b.id DESC",
		args:  []any{product, yeast, millisecond(before)},
	}
}

func newYear(y int) int64 { return time.Date(y, 1, 1, 0, 0, 0, 0, time.UTC).UnixMilli() }

func (s selection) batchSQL() string {
	reason := ""
	if s.void {
		reason = ", (SELECT x.reason FROM void_entry x WHERE x.entry = b.number)"
	}
	return "SELECT b.number, " + batches.list("b") + reason + " FROM " + s.from + " WHERE " + s.where + " ORDER BY " + s.order
}

// childSQL reads what hangs on the batches, in their order. The joins are written
// in the order in which they are to run. Within a batch the rows are sorted later:
// to sort them here too, all their columns would go through a sorter.
func childSQL[B journal.Body](s selection, t table[B]) (query string, args []any) {
	columns := strings.Split(t.list("c"), ", ")
	entry, join, on := "c", "", ""
	if !t.copies {
		entry, join, on = "e", " CROSS JOIN entry e", " AND e.number = c.number"
	}
	where, args := s.where, s.args
	owner := "batch"
	if t.owner != "" {
		// What a void batch took over was not taken.
		owner = t.owner
		on += " AND c." + owner + " <> '' AND NOT EXISTS (SELECT 1 FROM batch t CROSS JOIN void_entry y WHERE t.id = c.batch AND y.entry = t.number)"
	}
	switch {
	case t.name != readings.name:
	case s.last == noReadings:
		where = "1 = 0 AND " + where
	case s.last > 0:
		// A bound on the key, so that the rows before it are not touched.
		where, args = newest+" AND "+where, append([]any{s.last - 1}, args...)
	}
	return "SELECT c.number, x.reason, " + packed(append([]string{entry + ".recorded_at", entry + ".operator"}, columns...)) +
		" FROM " + s.from + " CROSS JOIN " + t.name + " c" + join + " LEFT JOIN void_entry x ON x.entry = c.number" +
		" WHERE c." + owner + " = b.id" + on + " AND " + where +
		" ORDER BY " + s.order, args
}

// newest bounds readings to the newest of a batch. The least time stands for no
// bound: that of a batch with fewer, or whose first reading tells when it began.
const newest = `c.taken_ms >= CASE WHEN b.pitched IS NULL THEN -9223372036854775807 ELSE
	COALESCE((SELECT r.taken_ms FROM reading r WHERE r.batch = b.id ORDER BY r.taken_ms DESC LIMIT 1 OFFSET ?), -9223372036854775807) END`
