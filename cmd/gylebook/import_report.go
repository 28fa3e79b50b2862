package main

import (
	"fmt"
	"strings"

	"gylebook/attenuation/journal/exchange"
	"gylebook/gravity/method"
	"gylebook/tables"
)

var importColumns = []string{"line", "kind", "batch_id", "column", "file", "ours", "reason", "rows"}

// reportImport prints what an import did, or would do. refused is
// exchange.ErrRefused when nothing was written because of rows that were refused.
func (b *bench) reportImport(r exchange.Report, dry bool, refused error) error {
	s := sheet{name: "import", columns: importColumns, summary: importSummary(r, dry)}
	add := func(values ...any) { s.records = append(s.records, record(importColumns, values)) }
	text := b.set.format != tables.JSON && b.set.format != tables.CSV
	if text {
		b.note("note: %s", exchange.Caveat)
	} else {
		s.notes = append(s.notes, method.Note{Code: method.Caution, Text: exchange.Caveat})
	}
	more := r.RefusedCount
	for _, x := range r.Refused {
		prefix, reason := fmt.Sprintf("line %d", x.Line), tables.Clean(x.Reason)
		if x.Rows > 1 {
			prefix, reason = "", fmt.Sprintf("%s: %d rows, first line %d", reason, x.Rows, x.Line)
		}
		say(b.err, prefix, dataError("", "%s", reason))
		add(x.Line, "refused", nil, nil, nil, nil, x.Reason, x.Rows)
		more -= x.Rows
	}
	if more > 0 {
		b.note("note: %s refused", count(more, "more row is", "more rows are"))
	}
	if r.Lacks {
		tell(b.err, "hint: --create makes batches and instruments that are not in the journal")
	}
	note := func(format string, args ...any) {
		s.notes = append(s.notes, method.Note{Code: method.Interpreted, Text: fmt.Sprintf(format, args...)})
	}
	for _, text := range r.Notes {
		note("%s", text)
	}
	for _, x := range r.Repairs {
		add(x.Line, "repaired", nil, x.Column, x.Read, x.As, nil, 1)
		note("line %d: %s %s was taken for %s", x.Line, x.Column, x.Read, x.As)
	}
	if more := r.RepairCount - len(r.Repairs); more > 0 {
		note("%s repaired", count(more, "more cell is", "more cells are"))
	}
	for _, x := range r.Differences {
		add(x.Line, "differs", x.Batch, x.Column, x.File, nilIfEmpty(x.Ours), nil, 1)
		ours := x.Ours
		if ours == "" {
			ours = none
		}
		note("line %d: %s is %s in the file, %s here", x.Line, x.Column, x.File, ours)
	}
	if more := r.DiffersCount - len(r.Differences); more > 0 {
		note("%s", count(more, "more figure differs", "more figures differ"))
	}
	s.ladder = &tables.Ladder{Answer: []string{importLine(r, dry, refused)}}
	if r.First > 0 {
		s.ladder.Answer = append(s.ladder.Answer, numberedRange(r.First, r.Last))
	}
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
		return fmt.Sprintf("%d of %s refused: nothing was written", r.RefusedCount, count(r.Rows, "row", "rows"))
	}
	parts := []string{fmt.Sprintf("%s of %s", count(r.Readings, "reading", "readings"), count(r.Rows, "row", "rows"))}
	if r.Voids > 0 {
		parts = append(parts, fmt.Sprintf("%d of them void", r.Voids))
	}
	if r.Repeats > 0 {
		parts = append(parts, count(r.Repeats, "repeat", "repeats")+" passed over")
	}
	if len(r.Batches) > 0 {
		parts = append(parts, madeList("batch", "batches", r.Batches))
	}
	if len(r.Instruments) > 0 {
		parts = append(parts, madeList("instrument", "instruments", r.Instruments))
	}
	if r.DiffersCount > 0 {
		parts = append(parts, count(r.DiffersCount, "figure differs", "figures differ"))
	}
	if dry {
		parts = append(parts, "nothing was written (dry run)")
	}
	return strings.Join(parts, "; ")
}

// numberedRange are the numbers of the entries from first to last, as a line about
// them ends.
func numberedRange(first, last int64) string {
	if first == last {
		return fmt.Sprintf("#%d", first)
	}
	return fmt.Sprintf("#%d to #%d", first, last)
}

// madeList names what was made: all of a few, the first of many.
func madeList(one, more string, ids []string) string {
	const named = 8
	if len(ids) == 1 {
		return one + " made: " + ids[0]
	}
	if len(ids) <= named {
		return more + " made: " + strings.Join(ids, ", ")
	}
	return fmt.Sprintf("%d %s made: %s and %d more", len(ids), more, strings.Join(ids[:named], ", "), len(ids)-named)
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
