package tables

import (
	"io"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func sample() Table {
	return Table{
		Title:   "Hydrometer 4",
		Columns: []Column{{"batch", Left}, {"extract g/L", Right}, {"note", Left}},
		Rows: [][]string{
			{"pale 12", "9.5", "a|b"},
			{"Würze 酒", "124.25"},
		},
		Foot: []string{"At 20 °C."},
	}
}

// Column widths: "Würze 酒" is 5 + 1 + 2 = 8, "extract g/L" is 11, "note" 4, two
// spaces between; no line ends in a space. Heads stand as given.
func TestWriteText(t *testing.T) {
	want := "Hydrometer 4\n" +
		"\n" +
		"batch     extract g/L  note\n" +
		"--------  -----------  ----\n" +
		"pale 12           9.5  a|b\n" +
		"Würze 酒       124.25\n" +
		"\n" +
		"At 20 °C.\n"
	write := func(w io.Writer) error { return sample().WriteText(w, 80) }
	same(t, render(t, write), want)
	write = func(w io.Writer) error { return sample().WriteText(w, 60) }
	same(t, render(t, write), want)
}

const stacked = `Hydrometer 4

batch: pale 12
extract g/L: 9.5
note: a|b

batch: Würze 酒
extract g/L: 124.25
note:

At 20 °C.
`

func TestWriteStacked(t *testing.T) {
	same(t, render(t, sample().WriteStacked), stacked)
	// One column short of a table, and a width that nobody knows.
	for _, width := range []int{59, 0, -1} {
		same(t, render(t, func(w io.Writer) error { return sample().WriteText(w, width) }), stacked)
	}
}

// The natural width decides: 30 + 2 + 48 = 80 fits 80, one more does not.
func TestWriteTextTooWide(t *testing.T) {
	table := Table{
		Columns: []Column{{"a", Left}, {"b", Left}},
		Rows:    [][]string{{strings.Repeat("x", 30), strings.Repeat("y", 48)}},
	}
	write := func(w io.Writer) error { return table.WriteText(w, 80) }
	want := "a" + strings.Repeat(" ", 31) + "b\n" +
		strings.Repeat("-", 30) + "  " + strings.Repeat("-", 48) + "\n" +
		strings.Repeat("x", 30) + "  " + strings.Repeat("y", 48) + "\n"
	same(t, render(t, write), want)
	table.Rows[0][1] += "y"
	want = "a: " + strings.Repeat("x", 30) + "\nb: " + strings.Repeat("y", 49) + "\n"
	same(t, render(t, write), want)
}

// A column without any text takes one column: 1 + 2 + 77 = 80, and 78 is one too
// many.
func TestWriteTextEmptyColumn(t *testing.T) {
	table := Table{Columns: []Column{{"", Left}, {"", Right}}, Rows: [][]string{{"", strings.Repeat("x", 77)}}}
	write := func(w io.Writer) error { return table.WriteText(w, 80) }
	same(t, render(t, write), "\n-  "+strings.Repeat("-", 77)+"\n   "+strings.Repeat("x", 77)+"\n")
	table.Rows[0][1] += "x"
	same(t, render(t, write), strings.Repeat("x", 78)+"\n")
}

// What is carried over stands two columns in, and lines end by column 20:
// "note: the reading" is 17 and " lies" would make 22.
func TestWriteTextCarriesOver(t *testing.T) {
	table := Table{
		Columns: []Column{{"note", Left}, {"", Left}},
		Rows:    [][]string{{"the reading lies outside", "alone"}},
		Foot:    []string{"one two three four five"},
	}
	same(t, render(t, func(w io.Writer) error { return table.WriteText(w, 20) }), `note: the reading
  lies outside
alone

one two three four
five
`)
}

// Without rows there is nothing to divide the heads from, so no line.
func TestWriteTextNoRows(t *testing.T) {
	table := Table{Columns: []Column{{"batch", Left}, {"og", Right}}}
	same(t, render(t, func(w io.Writer) error { return table.WriteText(w, 80) }), "batch  og\n")
	same(t, render(t, table.WriteStacked), "")
	same(t, render(t, table.WriteMarkdown), "| batch | og |\n|:------|---:|\n")
}

func TestWriteTextNoColumns(t *testing.T) {
	table := Table{Title: "Nothing yet", Foot: []string{"none found"}}
	for _, write := range []func(io.Writer) error{
		func(w io.Writer) error { return table.WriteText(w, 80) }, table.WriteStacked, table.WriteMarkdown,
	} {
		same(t, render(t, write), "Nothing yet\n\nnone found\n")
	}
}

func TestWriteTextDisarmsTerminal(t *testing.T) {
	table := Table{Title: "\x1b[31mred", Columns: []Column{{"a\tb", Left}}, Rows: [][]string{{"x\u202ey\nz\u009b"}}}
	same(t, render(t, func(w io.Writer) error { return table.WriteText(w, 80) }), "[31mred\n\na b\n----\nxy z\n")
}

func TestLongRowIsRefused(t *testing.T) {
	table := Table{Columns: []Column{{"og", Right}}, Rows: [][]string{{"1"}, {"1", "2"}}}
	for _, write := range []func(io.Writer) error{
		func(w io.Writer) error { return table.WriteText(w, 80) }, table.WriteStacked, table.WriteMarkdown,
	} {
		var b strings.Builder
		err := write(&b)
		if want := "table row 2 has 2 cells, wanted at most 1"; err == nil || err.Error() != want || b.Len() > 0 {
			t.Errorf("error %v after %q, want %s", err, b.String(), want)
		}
	}
}

// GitHub Flavored Markdown, "Tables (extension)": a pipe in a cell is escaped.
// Widths are those of the escaped text: `a\|b` is 4, `1<br>2` is 6.
func TestWriteMarkdown(t *testing.T) {
	table := sample()
	table.Rows = append(table.Rows, []string{`\|`, "1\r\n2", "<b>\n"})
	same(t, render(t, table.WriteMarkdown), `Hydrometer 4

| batch    | extract g/L | note |
|:---------|------------:|:-----|
| pale 12  |         9.5 | a\|b |
| Würze 酒 |      124.25 |      |
| \\\|     |      1<br>2 | \<b> |

At 20 °C.
`)
}

// Whatever the text and the width: no line is wider than the terminal or ends in
// a space, and a table keeps every row on its line.
func TestWriteTextAnyText(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		table := Table{Title: anyText().Draw(t, "title"), Foot: []string{anyText().Draw(t, "foot")}}
		cols := rapid.IntRange(1, 4).Draw(t, "cols")
		for range cols {
			table.Columns = append(table.Columns, Column{anyText().Draw(t, "head"), Align(rapid.IntRange(0, 1).Draw(t, "align"))})
		}
		for range rapid.IntRange(0, 4).Draw(t, "rows") {
			row := make([]string, rapid.IntRange(0, cols).Draw(t, "cells"))
			for i := range row {
				row[i] = anyText().Draw(t, "cell")
			}
			table.Rows = append(table.Rows, row)
		}
		width := rapid.IntRange(8, 200).Draw(t, "width")
		var b strings.Builder
		if err := table.WriteText(&b, width); err != nil {
			t.Fatal(err)
		}
		for line := range strings.Lines(b.String()) {
			line = strings.TrimSuffix(line, "\n")
			if Width(line) > width || strings.HasSuffix(line, " ") || Clean(line) != line {
				t.Fatalf("width %d: line %q of %q", width, line, b.String())
			}
		}
		tidy := table.tidy(Clean)
		if width >= narrow && tidy.natural() <= width && len(tidy.Rows) > 0 {
			table.Title, table.Foot, b = "", nil, strings.Builder{}
			if err := table.WriteText(&b, width); err != nil {
				t.Fatal(err)
			}
			if got, want := strings.Count(b.String(), "\n"), len(table.Rows)+2; got != want {
				t.Fatalf("%d lines, want %d: %q", got, want, b.String())
			}
		}
		b.Reset()
		if err := (Table{Columns: table.Columns, Rows: table.Rows}).WriteMarkdown(&b); err != nil {
			t.Fatal(err)
		}
		if got, want := strings.Count(b.String(), "\n"), len(table.Rows)+2; got != want {
			t.Fatalf("%d lines of Markdown, want %d: %q", got, want, b.String())
		}
		for line := range strings.Lines(b.String()) {
			line = strings.NewReplacer(`\\`, "", `\|`, "").Replace(line)
			if got := strings.Count(line, "|"); got != cols+1 {
				t.Fatalf("%d bare pipes, want %d: %q", got, cols+1, line)
			}
		}
	})
}
