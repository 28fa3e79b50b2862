package tables

import (
	"bytes"
	"io"
	"strings"
)

// Rung is one step of a ladder: its name, its value and what to know about it.
type Rung struct{ Name, Value, Remark string }

// Ladder is an answer with the steps that lead to it: what was typed, what it
// means, what comes of it.
type Ladder struct {
	Answer []string // parts of the first line, the largest thing first
	Rungs  []Rung
	Lines  []string // free lines below, each wrapped
}

// minRemark is the width below which a column of remarks is not worth having.
const minRemark = 20

// WriteText writes the answer, a blank line and the rungs in three columns. Below
// 60 columns it is stacked.
func (l Ladder) WriteText(w io.Writer, width int) error {
	l = l.tidy()
	if width < narrow {
		return l.stack(w, width)
	}
	var b bytes.Buffer
	// Parts that do not fit on one line together stand on one each.
	if line := strings.Join(l.Answer, "   "); Width(line) <= width {
		b.WriteString(line + "\n")
	} else {
		for _, part := range l.Answer {
			hang(&b, part, width)
		}
	}
	if len(l.Rungs) > 0 {
		b.WriteByte('\n')
	}
	name, value := 0, 0
	for _, r := range l.Rungs {
		name = max(name, Width(r.Name))
		value = max(value, Width(signed(r.Value)))
	}
	if width < 2+name+2+value+3+minRemark {
		return l.stack(w, width)
	}
	for _, r := range l.Rungs {
		left := "  " + pad(r.Name, name) + "  " + signed(r.Value)
		if r.Remark == "" {
			b.WriteString(strings.TrimRight(left, " ") + "\n")
			continue
		}
		column := 2 + name + 2 + value + 3
		for i, part := range Wrap(r.Remark, max(width-column, 20)) {
			if i > 0 {
				left = ""
			}
			b.WriteString(pad(left, column) + part + "\n")
		}
	}
	for i, line := range l.Lines {
		if i == 0 {
			b.WriteByte('\n')
		}
		parts := []string{line} // what fits keeps its own columns
		if Width(line) > width-2*gap {
			parts = Wrap(line, max(width-2*gap, 1))
		}
		for j, part := range parts {
			b.WriteString(strings.Repeat(" ", gap*min(j+1, 2)) + part + "\n")
		}
	}
	return writeAll(w, b.Bytes())
}

// WriteStacked writes the answer and one `name: value` line a rung, for screen
// readers and narrow terminals.
func (l Ladder) WriteStacked(w io.Writer) error { return l.tidy().stack(w, 0) }

func (l Ladder) stack(w io.Writer, width int) error {
	var b bytes.Buffer
	for _, part := range l.Answer {
		hang(&b, part, width)
	}
	for _, r := range l.Rungs {
		line := r.Name + ": " + r.Value
		if r.Remark != "" {
			line += ", " + r.Remark
		}
		hang(&b, line, width)
	}
	for _, line := range l.Lines {
		hang(&b, line, width)
	}
	return writeAll(w, b.Bytes())
}

// WriteMarkdown writes the answer in bold, the rungs as a table and the free
// lines as a list.
func (l Ladder) WriteMarkdown(w io.Writer) error {
	t := Table{Columns: []Column{{"step", Left}, {"value", Right}, {"remark", Left}}}
	for _, r := range l.Rungs {
		t.Rows = append(t.Rows, []string{r.Name, r.Value, r.Remark})
	}
	var b bytes.Buffer
	b.WriteString("**" + escape(strings.Join(l.Answer, ", ")) + "**\n\n")
	if err := t.WriteMarkdown(&b); err != nil {
		return err
	}
	for i, line := range l.Lines {
		if i == 0 {
			b.WriteByte('\n')
		}
		b.WriteString("- " + escape(line) + "\n")
	}
	return writeAll(w, b.Bytes())
}

// tidy cleans every text for a terminal.
func (l Ladder) tidy() Ladder {
	clean := func(lines []string) []string {
		out := make([]string, len(lines))
		for i, s := range lines {
			out[i] = Clean(s)
		}
		return out
	}
	t := Ladder{Answer: clean(l.Answer), Lines: clean(l.Lines), Rungs: make([]Rung, len(l.Rungs))}
	for i, r := range l.Rungs {
		t.Rungs[i] = Rung{Clean(r.Name), Clean(r.Value), Clean(r.Remark)}
	}
	return t
}

// signed keeps one column for the sign, so that digits stand below digits.
func signed(value string) string {
	if strings.HasPrefix(value, "+") || strings.HasPrefix(value, "-") {
		return value
	}
	return " " + value
}

// pad fills s with spaces to width display columns.
func pad(s string, width int) string {
	return s + strings.Repeat(" ", max(0, width-Width(s)))
}
