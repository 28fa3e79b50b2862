package main

import (
	"io"
	"maps"
	"slices"
	"time"

	"gylebook/gravity/asread"
	"gylebook/gravity/method"
	"gylebook/tables"
)

// sheet is what a command prints: the same facts for a machine and for a person.
type sheet struct {
	name    string   // of the command, for the schema
	columns []string // CSV header when there are no records
	records []tables.Record
	summary tables.Record
	notes   []method.Note // of the whole run, and cautions
	reasons []method.Note // why a value is null; a person sees the dash
	ladder  *tables.Ladder
	more    []*tables.Ladder // further blocks like the first
	tables  []tables.Table
	explain []string
	logged  *logged // the reading that it is about, nil for none
}

// print writes s in the format asked for. Notes go to stderr, save in JSON,
// which holds them.
func (b *bench) print(s sheet) error {
	if b.take != nil {
		s.notes = slices.Concat(b.notes, s.notes)
		b.take(s)
		return nil
	}
	switch b.set.format {
	case tables.JSON, tables.CSV:
		d := tables.Document{
			Schema: "gylebook." + s.name + "/1", GeneratedAt: b.set.now.UTC().Format(time.RFC3339),
			Columns: s.columns, Records: s.records, Summary: s.summary, Notes: neutral(slices.Concat(b.notes, s.reasons, s.notes)),
		}
		if b.set.format == tables.JSON {
			if b.set.explain {
				for _, line := range s.explain {
					d.Notes = append(d.Notes, tables.Note{Code: "explain", Text: line})
				}
			}
			return d.WriteJSON(b.out)
		}
		if err := d.WriteCSV(b.out); err != nil {
			return err
		}
	default:
		if err := b.printText(s); err != nil {
			return err
		}
	}
	b.printNotes(s)
	return nil
}

func (b *bench) printText(s sheet) error {
	first := true
	gap := func() error {
		if first {
			first = false
			return nil
		}
		_, err := io.WriteString(b.out, "\n")
		return err
	}
	if s.ladder != nil {
		l := *s.ladder
		if b.set.explain {
			l.Lines = append(l.Lines, s.explain...)
		}
		if err := gap(); err != nil {
			return err
		}
		if err := b.write(l); err != nil {
			return err
		}
	}
	for _, l := range s.more {
		if err := gap(); err != nil {
			return err
		}
		if err := b.write(*l); err != nil {
			return err
		}
	}
	for _, t := range s.tables {
		if err := gap(); err != nil {
			return err
		}
		if err := b.write(t); err != nil {
			return err
		}
	}
	// Without a ladder to stand under, the steps stand by themselves.
	if s.ladder == nil && b.set.explain && len(s.explain) > 0 {
		if err := gap(); err != nil {
			return err
		}
		return b.write(tables.Ladder{Answer: []string{"steps"}, Lines: s.explain})
	}
	return nil
}

// writer is a ladder or a table.
type writer interface {
	WriteText(w io.Writer, width int) error
	WriteStacked(w io.Writer) error
	WriteMarkdown(w io.Writer) error
}

func (b *bench) write(w writer) error {
	switch {
	case b.set.format == tables.Markdown:
		return w.WriteMarkdown(b.out)
	case b.set.plain:
		return w.WriteStacked(b.out)
	}
	return w.WriteText(b.out, b.set.width)
}

// printNotes puts every note on stderr once: those of the records, then those of
// the run, cautions last.
func (b *bench) printNotes(s sheet) {
	seen, ofCode := map[string]bool{}, map[string]int{}
	show := func(n tables.Note) {
		if seen[n.Text] {
			return
		}
		seen[n.Text] = true
		// Many of one kind, from many values: a few stand for all.
		ofCode[n.Code]++
		if ofCode[n.Code] > maxOfCode && n.Code != method.Caution {
			return
		}
		kind := "note"
		if n.Code == method.Caution {
			kind = "caution"
		}
		for i, line := range tables.Wrap(kind+": "+tables.Clean(n.Text), max(b.set.width-2, 40)) {
			if i > 0 {
				line = "  " + line
			}
			b.note("%s", line)
		}
	}
	for _, r := range s.records {
		if notes, ok := r.Get("notes").([]tables.Note); ok {
			for _, n := range notes {
				show(n)
			}
		}
	}
	for _, n := range neutral(slices.Concat(b.notes, s.notes)) {
		show(n)
	}
	for _, code := range slices.Sorted(maps.Keys(ofCode)) {
		if more := ofCode[code] - maxOfCode; more > 0 && code != method.Caution {
			b.note("note: %d more like it (%s); --json or --csv shows each", more, code)
		}
	}
}

// maxOfCode is how many notes of one kind are shown.
const maxOfCode = 4

// neutral turns the notes of the packages below into those of package tables.
func neutral(notes []method.Note) []tables.Note {
	out := make([]tables.Note, len(notes))
	for i, n := range notes {
		out[i] = tables.Note(n)
	}
	return out
}

// fixed prints x for people: half to even, no -0.00.
func fixed(x float64, places int) string { return asread.Fixed(x, places, asread.HalfEven) }

// lineFields are what a record ends with when its values came as a line of stdin:
// without them it could not be told which line it belongs to.
func (b *bench) lineFields(names []string, extra ...string) []string {
	if !b.lines {
		return names
	}
	return append(slices.Clone(names), extra...)
}

// number is a pointer for a field that may be unknown.
func number[F ~float64](p *F) any {
	if p == nil {
		return nil
	}
	return float64(*p)
}

// asSigned prints one decimal with its sign.
func asSigned(x float64) string { return asread.Signed(x, 1) }
