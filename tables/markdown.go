package tables

import (
	"bytes"
	"io"
	"strings"

	"github.com/olekukonko/tablewriter/renderer"
	"github.com/olekukonko/tablewriter/tw"
)

// WriteMarkdown writes a pipe table in the form of the GitHub Flavored Markdown
// specification ("Tables (extension)"), with title and foot as paragraphs above
// and below. A line break in a cell becomes <br>; characters that would end the
// cell or vanish into markup are escaped.
func (t Table) WriteMarkdown(w io.Writer) error {
	if err := t.check(); err != nil {
		return err
	}
	t = t.tidy(escape)
	var blocks []string
	if t.Title != "" {
		blocks = append(blocks, t.Title+"\n")
	}
	if len(t.Columns) > 0 {
		body, err := t.render(renderer.NewMarkdown(), tw.PaddingDefault)
		if err != nil {
			return err
		}
		blocks = append(blocks, body)
	}
	for _, line := range t.Foot {
		if line != "" {
			blocks = append(blocks, line+"\n")
		}
	}
	var b bytes.Buffer
	b.WriteString(strings.Join(blocks, "\n"))
	return writeAll(w, b.Bytes())
}

// The backslash is escaped as well: a backslash before an escaped pipe would
// take the escape away.
var markup = strings.NewReplacer(`\`, `\\`, `|`, `\|`, `<`, `\<`, "*", `\*`, "`", "\\`")

// escape makes s one line of Markdown that shows s. Breaks around it go.
func escape(s string) string {
	s = strings.Trim(strings.ReplaceAll(s, "\r\n", "\n"), "\r\n")
	lines := strings.FieldsFunc(s, func(r rune) bool { return r == '\n' || r == '\r' })
	for i, line := range lines {
		lines[i] = markup.Replace(Clean(line))
	}
	return strings.Join(lines, "<br>")
}
