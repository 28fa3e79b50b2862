package report

import (
	"fmt"

	"gylebook/tables"
	"gylebook/tables/page"
)

// table lays out c.Table.
func (c Card) table(width, height float64) (layout, error) {
	t := printed(*c.Table)
	if len(t.Rows) < 1 || len(t.Columns) < 1 {
		return layout{}, c.empty(len(t.Rows), len(t.Columns))
	}
	if t.Title != "" {
		height -= text*leading*float64(lines(t.Title, text*bold, width)) + blocksGap/2
	}
	for _, line := range page.Texts(t.Foot) {
		height -= text*leading*float64(lines(line, text, width)) + blocksGap/2
	}
	columns := widths(t)
	var total float64
	var fitRows, fitColumns int
	for size := largest; size >= smallest; size-- {
		total, fitColumns = 0, 0
		for _, w := range columns {
			if total += w*size + 2*padding; total <= width {
				fitColumns++
			}
		}
		fitRows = deep(height, size)
		if len(t.Rows) <= fitRows && total <= width {
			return layout{
				kind: "chart", tables: []tables.Table{t}, size: size, first: firstRound(t.Rows),
				row:   spread(height-least(size), len(t.Rows), least(size), 1.9*size),
				width: filled(1.5*total, width),
			}, nil
		}
	}
	return layout{}, c.tooLarge(len(t.Rows), len(columns), fitRows, fitColumns)
}

// strip lays out c.Strip in the fewest columns that hold it. Only the first may
// begin within a group of five rows.
func (c Card) strip(width, height float64) (layout, error) {
	t := tables.Table{Columns: []tables.Column{{Head: c.Strip.Left, Align: tables.Right}, {Head: c.Strip.Right, Align: tables.Right}}}
	for _, pair := range c.Strip.Rows {
		t.Rows = append(t.Rows, []string{pair[0], pair[1]})
	}
	t = printed(t)
	columns, n := widths(t), len(t.Rows)
	if n < 1 {
		return layout{}, c.empty(n, 2)
	}
	var across, fit int
	for size := largest; size >= smallest; size-- {
		one := (columns[0]+columns[1])*size + 4*padding
		fit = deep(height, size)
		across = int((width + strips) / (one + strips))
		if n > across*fit {
			continue
		}
		parts := parts(t.Rows, fit, across)
		s := layout{
			kind: "strip", size: size, first: firstRound(t.Rows),
			row:   spread(height-least(size), longest(parts), least(size), 1.9*size),
			width: filled(1.3*one, (width-strips*float64(len(parts)-1))/float64(len(parts))),
		}
		for _, rows := range parts {
			part := t
			part.Rows = rows
			part.Title = fmt.Sprintf("%s and %s, %s to %s", c.Strip.Left, c.Strip.Right, rows[0][0], rows[len(rows)-1][0])
			s.tables = append(s.tables, part)
		}
		return s, nil
	}
	return layout{}, c.tooLarge(n, 2, across*fit, 2*min(across, 1))
}

// sheet lays out c.Sheet: its type stays small, its rows are for handwriting.
func (c Card) sheet(width, height float64) (layout, error) {
	t := tables.Table{Title: "Columns of " + c.Title}
	total, fitColumns := 0.0, 0
	for _, name := range c.Sheet.Columns {
		t.Columns = append(t.Columns, tables.Column{Head: name})
		if total += max(em(page.Text(name))*smallest*bold+2*padding, written); total <= width {
			fitColumns++
		}
	}
	height -= least(smallest) + 4
	fitRows := int(height / handwriting)
	rows, columns := c.Sheet.Rows, len(c.Sheet.Columns)
	switch {
	case rows < 1 || columns < 1:
		return layout{}, c.empty(rows, columns)
	case rows > fitRows || total > width:
		return layout{}, c.tooLarge(rows, columns, fitRows, fitColumns)
	}
	for range rows {
		t.Rows = append(t.Rows, make([]string, columns))
	}
	return layout{
		kind: "sheet", tables: []tables.Table{t}, size: smallest, width: width,
		row: spread(height, rows, handwriting, 1.5*handwriting),
	}, nil
}
