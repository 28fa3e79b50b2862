package tables

import (
	"bytes"
	"fmt"
	"io"
	"strings"

	"github.com/olekukonko/tablewriter"
	"github.com/olekukonko/tablewriter/renderer"
	"github.com/olekukonko/tablewriter/tw"
)

// Align says where the cells of a column stand.
type Align int

// The alignments. Words stand left, numbers right.
const (
	Left Align = iota
	Right
)

// Column is the head and the alignment of one column.
type Column struct {
	Head  string
	Align Align
}

// Table is a table for people. Cells are text, ready as they stand.
type Table struct {
	Columns []Column
	Rows    [][]string // a short row is filled up, a long one is an error
	Title   string     // optional line above
	Foot    []string   // optional lines below
}

const (
	narrow = 60 // columns below which a table is hard to read
	gap    = 2  // spaces between two columns
)

// WriteText writes the table for a terminal of width columns: heads, one thin
// line, rows, no box (heads alone when there are no rows). Below 60 columns, or when the table is wider than width,
// it writes the stacked form of [Table.WriteStacked], wrapped at width. Title
// and foot are wrapped, and every cell goes through [Clean].
func (t Table) WriteText(w io.Writer, width int) error {
	if err := t.check(); err != nil {
		return err
	}
	t = t.tidy(Clean)
	if width < narrow || len(t.Columns) == 0 || t.natural() > width {
		return writeAll(w, t.stack(width))
	}
	body, err := t.render(renderer.NewBlueprint(tw.Rendition{
		Borders: tw.BorderNone,
		Symbols: quiet(),
		Settings: tw.Settings{
			Lines:      tw.Lines{ShowTop: tw.Off, ShowBottom: tw.Off, ShowHeaderLine: tw.On, ShowFooterLine: tw.Off},
			Separators: tw.Separators{BetweenRows: tw.Off, BetweenColumns: tw.On},
		},
	}), tw.PaddingNone)
	if err != nil {
		return err
	}
	var b bytes.Buffer
	if t.Title != "" {
		b.WriteString(strings.Join(Wrap(t.Title, width), "\n") + "\n\n")
	}
	for line := range strings.Lines(body) {
		b.WriteString(strings.TrimRight(line, " \n") + "\n")
	}
	if len(t.Foot) > 0 {
		b.WriteByte('\n')
	}
	writeFoot(&b, t.Foot, width)
	return writeAll(w, b.Bytes())
}

// quiet draws nothing but the line under the heads; the column "line" is the gap.
func quiet() tw.Symbols {
	space := strings.Repeat(" ", gap)
	return tw.NewSymbolCustom("quiet").WithRow("-").WithColumn(space).WithCenter(space)
}

// render lets tablewriter lay out heads and rows. It drops the errors of the
// writer, hence the buffer.
func (t Table) render(r tw.Renderer, padding tw.Padding) (string, error) {
	var b bytes.Buffer
	aligns := make(tw.Alignment, len(t.Columns))
	heads := make([]string, len(t.Columns))
	for i, c := range t.Columns {
		aligns[i], heads[i] = tw.AlignLeft, c.Head
		if c.Align == Right {
			aligns[i] = tw.AlignRight
		}
	}
	out := tablewriter.NewTable(&b,
		tablewriter.WithRenderer(r),
		tablewriter.WithHeaderAutoFormat(tw.Off),
		tablewriter.WithHeaderAutoWrap(tw.WrapNone),
		tablewriter.WithRowAutoWrap(tw.WrapNone),
		tablewriter.WithTrimSpace(tw.Off),
		tablewriter.WithTrimLine(tw.Off),
		tablewriter.WithPadding(padding),
		tablewriter.WithAlignment(aligns),
	)
	out.Header(heads)
	for i, row := range t.Rows {
		if err := out.Append(row); err != nil {
			return "", fmt.Errorf("table row %d: %w", i+1, err)
		}
	}
	if err := out.Render(); err != nil {
		return "", fmt.Errorf("table: %w", err)
	}
	return b.String(), nil
}

// natural is the width the table takes when nothing is wrapped. tablewriter
// gives a column without text one column.
func (t Table) natural() int {
	total := gap * (len(t.Columns) - 1)
	for i, c := range t.Columns {
		widest := max(1, Width(c.Head))
		for _, row := range t.Rows {
			widest = max(widest, Width(row[i]))
		}
		total += widest
	}
	return total
}

func (t Table) check() error {
	for i, row := range t.Rows {
		if len(row) > len(t.Columns) {
			return fmt.Errorf("table row %d has %d cells, wanted at most %d", i+1, len(row), len(t.Columns))
		}
	}
	return nil
}

// tidy returns a copy with every text passed through f and short rows filled up.
func (t Table) tidy(f func(string) string) Table {
	n := Table{
		Columns: make([]Column, len(t.Columns)),
		Rows:    make([][]string, len(t.Rows)),
		Title:   f(t.Title),
		Foot:    make([]string, len(t.Foot)),
	}
	for i, c := range t.Columns {
		n.Columns[i] = Column{Head: f(c.Head), Align: c.Align}
	}
	for i, row := range t.Rows {
		n.Rows[i] = make([]string, len(t.Columns))
		for j, cell := range row {
			n.Rows[i][j] = f(cell)
		}
	}
	for i, line := range t.Foot {
		n.Foot[i] = f(line)
	}
	return n
}
