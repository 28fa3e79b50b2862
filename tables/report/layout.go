package report

import (
	"fmt"
	"math"

	"gylebook/tables"
)

// Lengths in points. The page is the part that A4 and Letter have in common.
const (
	millimetre = 72 / 25.4
	margin     = 12 * millimetre
	shorter    = 210*millimetre - 2*margin   // width of A4
	longer     = 279.4*millimetre - 2*margin // length of Letter

	smallest, largest = 14.0, 22.0 // type of rows
	text              = 14.0       // type of words
	leading           = 1.25
	titleSize         = 24.0
	titleLeading      = 1.15
	padding           = 5.0 // at each side of a cell
	rule              = 1.0
	strips            = 20.0           // between two columns of a strip
	inset             = 11.0           // border and padding of the cautions, at each side
	handwriting       = 8 * millimetre // the lowest row for a pen
	written           = 60.0           // its narrowest column
	blocksGap         = 10.0           // between the blocks of the page
	slack             = 6.0            // browsers round lengths
)

// layout is what a card looks like on its page.
type layout struct {
	kind       string // class of the block
	tables     []tables.Table
	size       float64 // of the rows' type
	row, width float64 // height of a row, width of a table
	first      int     // rows before the first group of five
}

// css is the part of the stylesheet that belongs to this card. Only the way up is
// set: the paper is what the printer holds.
func (s layout) css(landscape bool) string {
	way := ""
	if landscape {
		way = "size: landscape; "
	}
	return fmt.Sprintf(`@page { %smargin: 12mm; }
.table table { width: %.1fpt; font-size: %.0fpt; }
tbody tr { height: %.1fpt; }
.table:first-child tbody tr:nth-child(5n+%d) > *, .table + .table tbody tr:nth-child(5n) > * { border-bottom-width: 2px; }
.table tbody tr:last-child > * { border-bottom-width: 3px; }
`, way, s.width, s.size, s.row, s.first)
}

// layOut finds the largest type, from 22 down to 14 pt, in which the card is one
// page.
func (c Card) layOut() (layout, error) {
	given := 0
	for _, there := range []bool{c.Table != nil, c.Strip != nil, c.Sheet != nil} {
		if there {
			given++
		}
	}
	if given != 1 {
		return layout{}, fmt.Errorf("card %q: read %d of table, strip and sheet, wanted one", c.Title, given)
	}
	width, height := shorter, longer
	if c.Landscape {
		width, height = longer, shorter
	}
	height -= c.words(width)
	switch {
	case c.Strip != nil:
		return c.strip(width, height)
	case c.Sheet != nil:
		return c.sheet(width, height)
	}
	return c.table(width, height)
}

// words is the height of everything but the rows and their heads.
func (c Card) words(width float64) float64 {
	h := titleSize*titleLeading*float64(lines(c.Title, titleSize*bold, width)) + slack
	if len(c.Basis) > 0 {
		all := ""
		for _, b := range c.Basis {
			all += " · " + b
		}
		h += blocksGap + text*leading*float64(lines(all, text, width))
	}
	h += blocksGap // above the table
	if len(c.Cautions) > 0 {
		h += blocksGap + 2*inset
		for _, line := range c.Cautions {
			h += text * leading * float64(lines("Caution: "+line, text*bold, width-2*inset))
		}
	}
	return h + blocksGap + text*leading // when it was made
}

func (c Card) tooLarge(rows, columns, fitRows, fitColumns int) error {
	return &TooLarge{Card: c.Title, Rows: rows, Columns: columns, FitRows: max(fitRows, 0), FitColumns: fitColumns, Landscape: c.Landscape}
}

func (c Card) empty(rows, columns int) error {
	return fmt.Errorf("card %q: read %d rows of %d columns, wanted at least one of each", c.Title, rows, columns)
}

// spread is the height of a row when n of them share what there is, within the
// bounds of what reads well.
func spread(height float64, n int, least, most float64) float64 {
	return math.Floor(10*min(max(height/float64(max(n, 1)), least), most)) / 10
}

// least is the height of a row in type of the size.
func least(size float64) float64 { return size*leading + rule }

// deep is how many rows in type of the size stand below their heads.
func deep(height, size float64) int { return max(int((height-least(size))/least(size)), 0) }

// filled is the width of a table: what it wants, and all there is if that is
// nearly so.
func filled(wanted, width float64) float64 {
	if wanted > 0.9*width {
		return width
	}
	return wanted
}
