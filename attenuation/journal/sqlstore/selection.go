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
}

const notVoid = "NOT EXISTS (SELECT 1 FROM void_entry x WHERE x.entry = b.number)"

var (
	byID     = selection{from: "batch b", where: "b.id = ? AND " + notVoid, order: "b.id"}
	openOnes = selection{from: "open_batch o CROSS JOIN batch b", where: "b.id = o.batch AND " + notVoid, order: "o.vessel, o.batch"}
)

func selectionOf(f journal.Filter) selection {
	s := selection{from: "batch b", order: "b.product, b.began_ms, b.id"}
	where := []string{notVoid}
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

func newYear(y int) int64 { return time.Date(y, 1, 1, 0, 0, 0, 0, time.UTC).UnixMilli() }

func (s selection) batchSQL() string {
	return "SELECT b.number, " + batches.list("b") + " FROM " + s.from + " WHERE " + s.where + " ORDER BY " + s.order
}

// childSQL reads what hangs on the batches, in their order. The joins are written
// in the order in which they are to run. Within a batch the rows are sorted later:
// to sort them here too, all their columns would go through a sorter.
func childSQL[B journal.Body](s selection, t table[B]) string {
	columns := strings.Split(t.list("c"), ", ")
	entry, join, on := "c", "", ""
	if !t.copies {
		entry, join, on = "e", " CROSS JOIN entry e", " AND e.number = c.number"
	}
	return "SELECT c.number, x.reason, " + packed(append([]string{entry + ".recorded_at", entry + ".operator"}, columns...)) +
		" FROM " + s.from + " CROSS JOIN " + t.name + " c" + join + " LEFT JOIN void_entry x ON x.entry = c.number" +
		" WHERE c.batch = b.id" + on + " AND " + s.where +
		" ORDER BY " + s.order
}
