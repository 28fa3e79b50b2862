package report

import (
	"strings"

	"gylebook/tables"
	"gylebook/tables/page"
)

// printed has true minus signs before numbers: on paper they are read from a step
// away, and nobody copies them.
func printed(t tables.Table) tables.Table {
	rows := make([][]string, len(t.Rows))
	for i, row := range t.Rows {
		rows[i] = make([]string, len(row))
		for j, cell := range row {
			if rest, ok := strings.CutPrefix(cell, "-"); ok && rest != "" && rest[0] >= '0' && rest[0] <= '9' {
				cell = "−" + rest
			}
			rows[i][j] = page.Text(cell)
		}
	}
	t.Rows = rows
	return t
}

// widths is the width of each column's widest text, in units of the size of type.
// Heads and first cells are bold.
func widths(t tables.Table) []float64 {
	var columns []float64
	see := func(i int, s string, factor float64) {
		for i >= len(columns) {
			columns = append(columns, 0)
		}
		columns[i] = max(columns[i], em(page.Text(s))*factor)
	}
	for i, c := range t.Columns {
		see(i, c.Head, bold)
	}
	for _, row := range t.Rows {
		for i, cell := range row {
			factor := 1.0
			if i == 0 {
				factor = bold
			}
			see(i, cell, factor)
		}
	}
	return columns
}

// group is the number of rows between two stronger rules.
const group = 5

// firstRound is the number of rows before the first whose first cell ends in 0
// or 5, for there the eye looks for a rule; 0 if there is none among the first.
func firstRound(rows [][]string) int {
	for i, row := range rows {
		if i == group {
			break
		}
		if len(row) > 0 && (strings.HasSuffix(row[0], "0") || strings.HasSuffix(row[0], "5")) {
			return i
		}
	}
	return 0
}

// parts cuts rows into the fewest columns of at most fit rows, as even as whole
// groups allow; where they do not, groups are torn. There are at most across, and
// the rows fit into these.
func parts(rows [][]string, fit, across int) [][][]string {
	cut := func(first, down int) [][][]string {
		var out [][][]string
		for from, to := 0, first; from < len(rows); from, to = to, to+down {
			out = append(out, rows[from:min(to, len(rows))])
		}
		return out
	}
	for n := 1; n <= across; n++ {
		before := firstRound(rows)
		groups := (len(rows) - before + group - 1) / group
		if before > 0 {
			groups++
		}
		down := (groups + n - 1) / n * group
		first := down
		if before > 0 {
			first += before - group
		}
		if down <= fit {
			return cut(first, down)
		}
	}
	even := (len(rows) + across - 1) / across
	return cut(even, even)
}

// longest is the number of rows of the longest part.
func longest(parts [][][]string) int {
	n := 0
	for _, rows := range parts {
		n = max(n, len(rows))
	}
	return n
}
