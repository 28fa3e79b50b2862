package main

import (
	"fmt"
	"strings"

	"gylebook/attenuation/journal"
	"gylebook/tables"
)

// narrow reports whether a terminal is too narrow for a table.
func (b *bench) narrow() bool {
	return b.set.width < 60 && b.set.format == tables.Text && !b.set.plain
}

// narrowEntries are the lines of a batch for a narrow terminal: a reading or a deed in
// one, what else is to be known of it in the next.
func narrowEntries(v journal.View) []string {
	var out []string
	for _, l := range lines(v) {
		// read, temperature, SG, fall in 24 h, apparent attenuation, who
		text := fmt.Sprintf("#%d %s", l.number, l.at.Format("01-02 15:04"))
		if l.cells[0] == "" {
			out = append(out, text+"  "+l.remark)
			continue
		}
		text += "  SG " + l.cells[2]
		if l.cells[3] != none {
			text += "  24 h " + l.cells[3]
		}
		if l.cells[4] != none {
			text += "  app. " + l.cells[4] + " %"
		}
		out = append(out, text)
		if l.remark != "" {
			out = append(out, "  "+l.remark)
		}
	}
	return out
}

// narrowBatches is a batch in two lines for a narrow terminal.
func narrowBatches(rows [][]string, width int) []string {
	var out []string
	for _, r := range rows {
		// batch, vessel, product, pitched, OG, last, app. %, state
		first := strings.Join(strings.Fields(r[1]+" "+r[0]), " ")
		out = append(
			out, clip(first+"  "+r[2], width-tables.Width(r[7])-2)+"  "+r[7],
			clip("  "+r[3]+"  OG "+r[4]+"  last "+r[5]+"  app. "+r[6]+" %", width),
		)
	}
	return out
}
