package sqlstore

import (
	"strings"
	"time"

	"gylebook/attenuation/journal"
)

// selection says which batches are meant, in which order, and how much of what hangs
// on them.
type selection struct {
	from  string // tables, the first decides the order
	where string
	order string
	args  []any
	void  bool // void batches too, with the reason
	last  int  // so many of the newest readings of each; 0 is all, noReadings none
	lean  bool // only what figures are made of; not who entered it and when
	moves bool // of what hangs on them the events alone
}

const noReadings = -1

const notVoid = "NOT EXISTS (SELECT 1 FROM void_entry x WHERE x.entry = b.number)"

var (
	byID     = selection{from: "batch b", where: "b.id = ? AND " + notVoid, order: "b.id"}
	openOnes = selection{from: "open_batch o CROSS JOIN batch b", where: "b.id = o.batch AND " + notVoid, order: "o.vessel, o.batch"}
)

func selectionOf(f journal.Filter) selection {
	s := selection{from: "batch b", order: "b.product, b.began_ms, b.id", lean: f.Lean}
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
		began := "b.began_ms"
		if f.Product == "" {
			began = "+" + began // not by the index of this alone: all would have to be sorted
		}
		where = append(where, began+" >= ? AND "+began+" < ?")
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

// recordSQL reads the batches, and in further columns what hangs on them.
func (s selection) recordSQL(hung []string) string {
	columns := []string{"b.number", batches.list("b")}
	if s.void {
		columns = append(columns, "(SELECT x.reason FROM void_entry x WHERE x.entry = b.number)")
	}
	return "SELECT " + strings.Join(append(columns, hung...), ", ") + " FROM " + s.from + " WHERE " + s.where + " ORDER BY " + s.order
}

// newest bounds readings to the newest of a batch. The least time stands for no
// bound: that of a batch with fewer, or whose first reading tells when it began.
const newest = `c.taken_ms >= CASE WHEN b.pitched IS NULL THEN -9223372036854775807 ELSE
	COALESCE((SELECT r.taken_ms FROM reading r WHERE r.batch = b.id ORDER BY r.taken_ms DESC LIMIT 1 OFFSET ?), -9223372036854775807) END`
