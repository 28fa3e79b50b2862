package main

import (
	"fmt"
	"math"
	"strings"
	"time"

	"gylebook/gravity/method"
	"gylebook/tables"
)

var todayColumns = []string{
	"batch", "vessel", "product", "day", "hours_since_reading", "sg_20_20", "fall_24h_points",
	"apparent_attenuation_pct", "abv_pct_20c", "word", "forecast_word", "next_sg_20_20", "notes",
}

func (b *bench) todaySheet(list []standing, at time.Time) sheet {
	s := sheet{name: "today", columns: todayColumns}
	attend := 0
	for _, one := range list {
		if one.rank < inCourse {
			attend++
		}
		s.records = append(s.records, one.record(b.set.format == tables.JSON || b.set.format == tables.CSV))
		for _, n := range one.notes {
			s.explain = append(s.explain, one.view.Record.Batch.ID+": "+n.Text)
		}
	}
	first, when := fmt.Sprintf("%d open; %d late, rising or standing high", len(list), attend), at.Format("Mon 2 Jan 2006 15:04")
	title := first + "; " + when
	table, fits := todayTable(list, title, b.set.width)
	switch {
	case len(list) == 0:
		s.ladder = &tables.Ladder{Answer: []string{title}}
	case !fits && b.set.format == tables.Text && !b.set.plain:
		room := b.set.width
		if room >= 60 {
			room -= 4 // a ladder that is not stacked sets its lines in
		}
		s.ladder = &tables.Ladder{Answer: []string{first, when}, Lines: narrowLines(list, room)}
	default:
		s.tables = []tables.Table{table}
	}
	return s
}

// record is one batch for a machine. Notes of every batch would bury the table
// that a person reads, so they are left to machines and to --explain.
func (s standing) record(withNotes bool) tables.Record {
	batch := s.view.Record.Batch
	values := []any{batch.ID, s.vessel, batch.Product, nil, number(s.hours), nil, number(s.fall), nil, nil, s.word, nilIfEmpty(s.state), number(s.next), []tables.Note{}}
	if s.days != nil {
		values[3] = int(math.Floor(*s.days))
	}
	notes := s.notes
	if v := s.last; v != nil {
		values[5] = float64(v.SG)
		if v.Attenuation != nil {
			values[7] = v.Attenuation.Apparent
		} else if v.Why != "" {
			notes = append(notes, method.Note{Code: "unknown", Text: "no attenuation: " + v.Why})
		}
		if v.Alcohol != nil {
			values[8] = float64(v.Alcohol.ABV)
		}
	}
	if withNotes {
		values[12] = neutral(notes)
	}
	return record(todayColumns, values)
}

// cells are the columns of the table, in the order of todayHeads.
func (s standing) cells() []string {
	dash := func(p *float64, places int) string {
		if p == nil {
			return "—"
		}
		return fixed(*p, places)
	}
	cells := []string{s.vessel, s.view.Record.Batch.Product, "—", dash(s.hours, 0), "—", dash(s.fall, 1), "—", s.symbol + " " + s.word, dash(s.next, 4)}
	if s.vessel == "" {
		cells[0] = s.view.Record.Batch.ID
	}
	if s.days != nil {
		cells[2] = fixed(math.Floor(*s.days), 0)
	}
	if v := s.last; v != nil {
		cells[4] = fixed(float64(v.SG), 4)
		if v.Attenuation != nil {
			cells[6] = fixed(v.Attenuation.Apparent, 0)
		}
	}
	return cells
}

// todayTable is a line a batch; fits is false when it is wider than width.
func todayTable(list []standing, title string, width int) (t tables.Table, fits bool) {
	right := func(head string) tables.Column { return tables.Column{Head: head, Align: tables.Right} }
	t = tables.Table{
		Title: title,
		Columns: []tables.Column{
			{Head: "vessel"}, {Head: "product"}, right("day"), right("h"), right("SG"), right("fall"), right("app."), {Head: "word"}, right("next"),
		},
		Foot: []string{"h: hours since the last reading; fall: points in 24 h; app.: % apparent", "attenuation; next: the gravity expected now, by the forecast"},
	}
	for _, one := range list {
		t.Rows = append(t.Rows, one.cells())
	}
	return t, squeeze(&t, width, 1, 0)
}

// squeeze cuts the cells of some columns, the first one first, until the table
// fits width, and reports whether it does. Eight columns of each are left.
func squeeze(t *tables.Table, width int, columns ...int) (fits bool) {
	const least, gap = 8, 2
	widths := make([]int, len(t.Columns))
	total := gap * (len(t.Columns) - 1)
	for i, c := range t.Columns {
		widths[i] = tables.Width(c.Head)
		for _, row := range t.Rows {
			widths[i] = max(widths[i], tables.Width(tables.Clean(row[i])))
		}
		total += widths[i]
	}
	for _, i := range columns {
		keep := max(min(widths[i], least), widths[i]-max(0, total-width))
		total -= widths[i] - keep
		for _, row := range t.Rows {
			row[i] = clip(row[i], keep)
		}
	}
	return total <= width
}

// clip cuts text to width columns, with an ellipsis at the end of what was cut.
func clip(text string, width int) string {
	text = tables.Clean(text)
	if tables.Width(text) <= width {
		return text
	}
	cut := ""
	for _, r := range text {
		if tables.Width(cut+string(r)) > width-1 {
			break
		}
		cut += string(r)
	}
	return strings.TrimRight(cut, " ") + "…"
}

// narrowLines is one line a batch for a narrow terminal: what is left of the line
// holds the product.
func narrowLines(list []standing, width int) []string {
	var lines []string
	vessel, word := 0, 0
	for _, one := range list {
		cells := one.cells()
		vessel, word = max(vessel, tables.Width(clip(cells[0], 8))), max(word, tables.Width(cells[7]))
	}
	for _, one := range list {
		c := one.cells()
		line := padTo(clip(c[0], 8), vessel) + "  " + padTo(c[4], 6) + "  " + padTo(c[7], word)
		if room := width - tables.Width(line) - 2; room >= 4 {
			line += "  " + clip(c[1], room)
		}
		lines = append(lines, clip(line, width))
	}
	return lines
}

func padTo(text string, width int) string {
	return text + strings.Repeat(" ", max(0, width-tables.Width(text)))
}
