package tables

import (
	"bytes"
	"io"
	"strings"
)

// WriteStacked writes one block a row, a line `name: value` a cell and a blank
// line between blocks: for narrow terminals, for screen readers and for grep.
// Lines are not wrapped. A cell without text keeps its name, a column without a
// head shows the value alone.
func (t Table) WriteStacked(w io.Writer) error {
	if err := t.check(); err != nil {
		return err
	}
	return writeAll(w, t.tidy(Clean).stack(0))
}

// stack builds the stacked form of a tidy table, wrapped at width if it is
// positive. What is carried over stands two columns in.
func (t Table) stack(width int) []byte {
	var blocks [][]byte
	add := func(b bytes.Buffer) {
		if b.Len() > 0 {
			blocks = append(blocks, b.Bytes())
		}
	}
	if t.Title != "" {
		blocks = append(blocks, []byte(strings.Join(Wrap(t.Title, width), "\n")+"\n"))
	}
	for _, row := range t.Rows {
		var b bytes.Buffer
		for i, c := range t.Columns {
			line := strings.TrimSpace(row[i])
			if c.Head != "" {
				line = strings.TrimSpace(c.Head) + ": " + line
			}
			hang(&b, line, width)
		}
		add(b)
	}
	var foot bytes.Buffer
	writeFoot(&foot, t.Foot, width)
	add(foot)
	return bytes.Join(blocks, []byte("\n"))
}

// hang writes line, carried over two columns in. A line that fits keeps its
// inner spaces; an empty one is left out, it would look like the end of a block.
func hang(b *bytes.Buffer, line string, width int) {
	line = strings.TrimRight(line, " ")
	if line == "" {
		return
	}
	if width < 1 || Width(line) <= width {
		b.WriteString(line + "\n")
		return
	}
	for i, part := range Wrap(line, max(width-gap, 1)) {
		if i > 0 {
			b.WriteString(strings.Repeat(" ", gap))
		}
		b.WriteString(part + "\n")
	}
}

func writeFoot(b *bytes.Buffer, foot []string, width int) {
	for _, line := range foot {
		b.WriteString(strings.Join(Wrap(line, width), "\n") + "\n")
	}
}
