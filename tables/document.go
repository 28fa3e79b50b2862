package tables

import (
	"bytes"
	"encoding/json"
	"fmt"
	"io"
	"strconv"
	"strings"
)

// Document is what one command prints in machine form.
type Document struct {
	Schema      string   // name and version of the form, "gylebook.correct/1"
	GeneratedAt string   // RFC 3339, given by the caller
	Columns     []string // CSV header when there are no records
	Records     []Record
	Summary     Record // nil = absent
	Notes       []Note // on the document as a whole
}

// WriteJSON writes one JSON object (RFC 8259) with the keys schema,
// generated_at, records, summary (if not nil) and notes in this order, two
// spaces deep, closed by a newline. Numbers keep full precision, what has no
// value is null, lists without entries are []. Characters that could steer a
// terminal are escaped. A value of a foreign type or a name standing twice is an
// error, and nothing is written.
func (d Document) WriteJSON(w io.Writer) error {
	var b bytes.Buffer
	b.WriteString(`{"schema":` + quote(d.Schema) + `,"generated_at":` + quote(d.GeneratedAt) + `,"records":[`)
	for i, r := range d.Records {
		if i > 0 {
			b.WriteByte(',')
		}
		if err := jsonRecord(&b, r); err != nil {
			return fmt.Errorf("record %d: %w", i+1, err)
		}
	}
	b.WriteByte(']')
	if d.Summary != nil {
		b.WriteString(`,"summary":`)
		if err := jsonRecord(&b, d.Summary); err != nil {
			return fmt.Errorf("summary: %w", err)
		}
	}
	b.WriteString(`,"notes":`)
	jsonNotes(&b, d.Notes)
	b.WriteByte('}')

	var out bytes.Buffer
	if err := json.Indent(&out, b.Bytes(), "", "  "); err != nil {
		return fmt.Errorf("indenting json: %w", err)
	}
	out.WriteByte('\n')
	return writeAll(w, out.Bytes())
}

func jsonRecord(b *bytes.Buffer, r Record) error {
	if err := r.check(); err != nil {
		return err
	}
	b.WriteByte('{')
	for i, f := range r {
		if i > 0 {
			b.WriteByte(',')
		}
		b.WriteString(quote(f.Name) + ":")
		if err := jsonValue(b, f); err != nil {
			return err
		}
	}
	b.WriteByte('}')
	return nil
}

func jsonValue(b *bytes.Buffer, f Field) error {
	switch v := plain(f.Value).(type) {
	case nil:
		b.WriteString("null")
	case string:
		b.WriteString(quote(v))
	case bool:
		b.WriteString(strconv.FormatBool(v))
	case int:
		b.WriteString(strconv.Itoa(v))
	case float64:
		b.WriteString(number(v))
	case []Note:
		jsonNotes(b, v)
	case []string:
		parts := make([]string, len(v))
		for i, s := range v {
			parts[i] = quote(s)
		}
		b.WriteString("[" + strings.Join(parts, ",") + "]")
	case []Record:
		return jsonRecords(b, f.Name, v)
	default:
		return errValue(f)
	}
	return nil
}

// jsonRecords writes the records that stand inside the field called name.
func jsonRecords(b *bytes.Buffer, name string, records []Record) error {
	b.WriteByte('[')
	for i, r := range records {
		if i > 0 {
			b.WriteByte(',')
		}
		if err := jsonRecord(b, r); err != nil {
			return fmt.Errorf("%s %d: %w", name, i+1, err)
		}
	}
	b.WriteByte(']')
	return nil
}

func jsonNotes(b *bytes.Buffer, notes []Note) {
	b.WriteByte('[')
	for i, n := range notes {
		if i > 0 {
			b.WriteByte(',')
		}
		b.WriteString(`{"code":` + quote(n.Code) + `,"text":` + quote(n.Text) + "}")
	}
	b.WriteByte(']')
}

// quote writes a JSON string. HTML characters stay as they are; what is not
// UTF-8 becomes U+FFFD, which is what range yields for it.
func quote(s string) string {
	var b strings.Builder
	b.WriteByte('"')
	for _, r := range s {
		switch {
		case r == '"' || r == '\\':
			b.WriteByte('\\')
			b.WriteRune(r)
		case r == '\n':
			b.WriteString(`\n`)
		case r == '\r':
			b.WriteString(`\r`)
		case r == '\t':
			b.WriteString(`\t`)
		case steers(r) || r == '\u2028' || r == '\u2029':
			// The last two end a line in JavaScript before ES2019.
			fmt.Fprintf(&b, `\u%04x`, r)
		default:
			b.WriteRune(r)
		}
	}
	b.WriteByte('"')
	return b.String()
}
