package main

import (
	"fmt"
	"strings"

	"gylebook/attenuation/journal/exchange"
	"gylebook/gravity/method"
	"gylebook/tables"
)

var importColumns = []string{"line", "kind", "batch_id", "column", "file", "ours", "reason"}

// reportImport prints what an import did, or would do. refused is
// exchange.ErrRefused when nothing was written because of rows that were refused.
func (b *bench) reportImport(r exchange.Report, dry bool, refused error) error {
	s := sheet{name: "import", columns: importColumns, summary: importSummary(r, dry)}
	add := func(values ...any) { s.records = append(s.records, record(importColumns, values)) }
	for _, x := range r.Refused {
		say(b.err, fmt.Sprintf("line %d", x.Line), dataError("", "%s", tables.Clean(x.Reason)))
		add(x.Line, "refused", nil, nil, nil, nil, x.Reason)
	}
	if more := r.RefusedCount - len(r.Refused); more > 0 {
		b.note("note: %d more rows are refused", more)
	}
	note := func(format string, args ...any) {
		s.notes = append(s.notes, method.Note{Code: method.Interpreted, Text: fmt.Sprintf(format, args...)})
	}
	for _, text := range r.Notes {
		note("%s", text)
	}
	for _, x := range r.Repairs {
		add(x.Line, "repaired", nil, x.Column, x.Read, x.As, nil)
		note("line %d: %s %s was taken for %s", x.Line, x.Column, x.Read, x.As)
	}
	if more := r.RepairCount - len(r.Repairs); more > 0 {
		note("%d more cells are repaired", more)
	}
	for _, x := range r.Differences {
		add(x.Line, "differs", x.Batch, x.Column, x.File, nilIfEmpty(x.Ours), nil)
		ours := x.Ours
		if ours == "" {
			ours = none
		}
		note("line %d: %s is %s in the file, %s here", x.Line, x.Column, x.File, ours)
	}
	if more := r.DiffersCount - len(r.Differences); more > 0 {
		note("%d more figures differ", more)
	}
	s.ladder = &tables.Ladder{Answer: []string{importLine(r, dry, refused)}}
	if err := b.print(s); err != nil {
		return err
	}
	if refused != nil {
		return errShown
	}
	return nil
}

// importLine is the import in one line.
func importLine(r exchange.Report, dry bool, refused error) string {
	if refused != nil {
		return fmt.Sprintf("%d of %d rows refused: nothing was written", r.RefusedCount, r.Rows)
	}
	parts := []string{fmt.Sprintf("%d readings of %d rows", r.Readings, r.Rows)}
	if r.Voids > 0 {
		parts = append(parts, fmt.Sprintf("%d of them void", r.Voids))
	}
	if r.Repeats > 0 {
		parts = append(parts, fmt.Sprintf("%d repeats passed over", r.Repeats))
	}
	if n := len(r.Batches); n > 0 {
		parts = append(parts, fmt.Sprintf("batches made: %s", strings.Join(r.Batches, ", ")))
	}
	if n := len(r.Instruments); n > 0 {
		parts = append(parts, fmt.Sprintf("instruments made: %s", strings.Join(r.Instruments, ", ")))
	}
	if r.DiffersCount > 0 {
		parts = append(parts, fmt.Sprintf("%d figures differ", r.DiffersCount))
	}
	if dry {
		parts = append(parts, "nothing was written (dry run)")
	}
	return strings.Join(parts, "; ")
}

func importSummary(r exchange.Report, dry bool) tables.Record {
	var first, last any
	if r.First > 0 {
		first, last = int(r.First), int(r.Last)
	}
	return tables.Record{
		{Name: "dry_run", Value: dry},
		{Name: "rows", Value: r.Rows},
		{Name: "readings", Value: r.Readings},
		{Name: "void", Value: r.Voids},
		{Name: "repeats", Value: r.Repeats},
		{Name: "batches_made", Value: append([]string{}, r.Batches...)},
		{Name: "instruments_made", Value: append([]string{}, r.Instruments...)},
		{Name: "refused", Value: r.RefusedCount},
		{Name: "repaired", Value: r.RepairCount},
		{Name: "differs", Value: r.DiffersCount},
		{Name: "first_entry", Value: first},
		{Name: "last_entry", Value: last},
	}
}
