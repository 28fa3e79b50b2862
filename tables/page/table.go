package page

import (
	"html/template"
	"strings"

	"gylebook/tables"
)

var tablePage = Parsed("table", `<div class="table{{with .Size}} {{.}}{{end}}">
<div class="scroll"{{if .Region}} role="region" tabindex="0" aria-label="{{.Name}}"{{end}}>
<table>
<caption{{if not .Title}} class="unseen"{{end}}><span>{{.Name}}</span></caption>
<thead>
<tr>
{{- range .Heads}}{{if .Text}}<th scope="col"{{with .Class}} class="{{.}}"{{end}}>{{.Text}}</th>{{else}}<td></td>{{end}}{{end -}}
</tr>
</thead>
<tbody>
{{- range .Rows}}
<tr>
{{- range .}}{{if .Head}}<th scope="row"{{with .Class}} class="{{.}}"{{end}}>{{.Text}}</th>{{else}}<td{{with .Class}} class="{{.}}"{{end}}>{{.Text}}</td>{{end}}{{end -}}
</tr>
{{- end}}
</tbody>
</table>
</div>
{{- range .Foot}}
<p class="foot">{{.}}</p>
{{- end}}
</div>
`)

// Widths in characters, as [tables.Width] counts them with two between columns.
const (
	narrowest = 36  // what a telephone of 360 px shows without scrolling
	upright   = 84  // what a page of paper takes at full size
	small     = 108 // what it takes in small type
	sideways  = 170 // what it takes on its side
	longCell  = 28  // a text above this is wrapped
)

type cell struct {
	Text, Class string
	Head        bool
}

// Table is a table with its title as the caption, its column heads and the first
// cell of each row as heads of their column and row. Numbers stand right, a wide
// table scrolls in a region of its own that the keyboard reaches. A table without a
// title gets a caption made of its heads, for screen readers only. Short rows
// are filled up; cells beyond the last head are kept under empty heads.
func Table(t tables.Table) template.HTML {
	var d struct {
		Title, Name, Size string
		Region            bool
		Heads             []cell
		Rows              [][]cell
		Foot              []string
	}
	columns := columnsOf(t)
	total := 0
	var names []string
	for _, c := range columns {
		d.Heads = append(d.Heads, cell{Text: c.head, Class: c.class()})
		total += c.least() + 2
		if c.head != "" {
			names = append(names, c.head)
		}
	}
	for _, row := range t.Rows {
		cells := make([]cell, len(columns))
		for i, c := range columns {
			cells[i].Class = c.class()
			if i < len(row) {
				cells[i].Text = Text(row[i])
			}
			cells[i].Head = i == 0 && cells[i].Text != ""
		}
		d.Rows = append(d.Rows, cells)
	}
	d.Region = total-2 > narrowest
	switch {
	case total-2 > sideways:
		d.Size = "broadest"
	case total-2 > small:
		d.Size = "widest"
	case total-2 > upright:
		d.Size = "wide"
	}
	if d.Title = strings.TrimSpace(Text(t.Title)); d.Title != "" {
		d.Name = d.Title
	} else if d.Name = strings.Join(names, ", "); d.Name == "" {
		d.Name = "table without heads"
	}
	d.Foot = Texts(t.Foot)
	return fill(tablePage, d)
}

type column struct {
	head  string
	right bool
	width int // of the widest cell or head
}

// class is what the stylesheet calls the cells of c.
func (c column) class() string {
	switch {
	case c.right:
		return "num"
	case c.width > longCell:
		return "long"
	}
	return ""
}

// least is the width in characters that c needs: a long text is wrapped.
func (c column) least() int {
	if c.class() == "long" {
		return longCell
	}
	return c.width
}

func columnsOf(t tables.Table) []column {
	columns := make([]column, len(t.Columns))
	for i, c := range t.Columns {
		head := strings.TrimSpace(Text(c.Head))
		columns[i] = column{head: head, right: c.Align == tables.Right, width: tables.Width(head)}
	}
	for _, row := range t.Rows {
		for i, text := range row {
			if i == len(columns) {
				columns = append(columns, column{})
			}
			columns[i].width = max(columns[i].width, tables.Width(Text(text)))
		}
	}
	return columns
}
