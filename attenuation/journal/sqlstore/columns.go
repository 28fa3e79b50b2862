package sqlstore

import (
	"strings"
	"time"

	"gylebook/attenuation/journal"
)

// table says how the bodies of one kind lie in their typed table. dest and args
// are in the order of columns.
type table[B journal.Body] struct {
	name    string
	columns []string
	dest    func(*B) []any // where a row is scanned to
	args    func(*B) []any // what is inserted
	owner   string         // column of the batch that a row hangs on; "" is batch
	copies  bool           // it holds the entry's recorded_at and operator too
}

// list names the columns with the table's alias before each.
func (t table[B]) list(alias string) string {
	return alias + "." + strings.Join(t.columns, ", "+alias+".")
}

// insert returns the statement that adds the body of an entry, and its arguments.
func (t table[B]) insert(e journal.Entry, b *B) (string, []any) {
	columns, args := []string{"number"}, []any{e.Number}
	if t.copies {
		columns, args = append(columns, "recorded_at", "operator"), append(args, recorded(e.RecordedAt), e.By)
	}
	columns, args = append(columns, t.columns...), append(args, t.args(b)...)
	return "INSERT INTO " + t.name + " (" + strings.Join(columns, ", ") + ") VALUES (?" + strings.Repeat(", ?", len(args)-1) + ")", args
}

func millis(t *time.Time) millisOf { return millisOf{func() time.Time { return *t }} }

// began is the time of a batch that orders it.
func began(b *journal.Batch) time.Time {
	if b.Pitched != nil {
		return *b.Pitched
	}
	return b.Opened
}

var instruments = table[journal.Instrument]{
	name: "instrument",
	columns: []string{
		"id", "type", "scale", "basis", "division", "range_lo", "range_hi", "body", "read_at", "max_error",
		"stem_mm", "mass_g", "tension", "note", "since",
	},
	dest: func(i *journal.Instrument) []any {
		return []any{
			&i.ID, &i.Type, &i.Scale, &i.Basis, &i.Division, &i.RangeLo, &i.RangeHi, &i.Body, &i.ReadAt, &i.MaxError,
			&i.StemMM, &i.MassG, &i.Tension, &i.Note,
			stampOf{&i.Since},
		}
	},
	args: func(i *journal.Instrument) []any {
		return []any{
			i.ID, i.Type, i.Scale, i.Basis, i.Division, i.RangeLo, i.RangeHi, i.Body, i.ReadAt, i.MaxError,
			i.StemMM, i.MassG, i.Tension, i.Note, stamp(i.Since),
		}
	},
}

// The points of a certificate are in a table of their own.
var certificates = table[journal.Certificate]{
	name:    "certificate",
	columns: []string{"instrument", "at", "at_ms", "reference"},
	dest: func(c *journal.Certificate) []any {
		return []any{&c.Instrument, stampOf{&c.At}, millis(&c.At), &c.Reference}
	},
	args: func(c *journal.Certificate) []any {
		return []any{c.Instrument, stamp(c.At), millisecond(c.At), c.Reference}
	},
}

var checks = table[journal.Check]{
	name: "instrument_check",
	columns: []string{
		"instrument", "at", "at_ms", "liquid", "strength", "found_text", "found_scale", "expected_text", "expected_scale",
		"temp_text", "temp_unit", "correction",
	},
	dest: func(c *journal.Check) []any {
		return []any{
			&c.Instrument,
			stampOf{&c.At},
			millis(&c.At), &c.Liquid, &c.Strength, &c.Found.Text, &c.Found.Scale, &c.Expected.Text, &c.Expected.Scale,
			&c.Temp.Text, &c.Temp.Unit, &c.Correction,
		}
	},
	args: func(c *journal.Check) []any {
		return []any{
			c.Instrument, stamp(c.At), millisecond(c.At), c.Liquid, c.Strength, c.Found.Text, c.Found.Scale, c.Expected.Text, c.Expected.Scale,
			c.Temp.Text, c.Temp.Unit, c.Correction,
		}
	},
}

var retirements = table[journal.Retire]{
	name:    "retirement",
	columns: []string{"instrument", "at", "at_ms", "reason"},
	dest: func(r *journal.Retire) []any {
		return []any{&r.Instrument, stampOf{&r.At}, millis(&r.At), &r.Reason}
	},
	args: func(r *journal.Retire) []any {
		return []any{r.Instrument, stamp(r.At), millisecond(r.At), r.Reason}
	},
}

var voids = table[journal.Void]{
	name:    "void_entry",
	columns: []string{"entry", "reason"},
	dest:    func(v *journal.Void) []any { return []any{&v.Entry, &v.Reason} },
	args:    func(v *journal.Void) []any { return []any{v.Entry, v.Reason} },
}
