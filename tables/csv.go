package tables

import (
	"bytes"
	"encoding/csv"
	"fmt"
	"io"
	"regexp"
	"strconv"
	"strings"
	"sync"
)

// WriteCSV writes the records as RFC 4180 CSV with "\n" line ends. The header
// holds the names of the first record, or Columns when there are no records;
// with neither, nothing is written. Cells are found by name: one that a record
// lacks stays empty, a name that the header lacks is an error, and nothing is
// written. Numbers keep full precision; notes and lists are joined with "; ".
//
// Text that a spreadsheet would run as a formula (leading = + - @, tab or
// carriage return) gets a leading apostrophe, unless it is a plain number such
// as -0.5.
func (d Document) WriteCSV(w io.Writer) error {
	header := d.Columns
	if len(d.Records) > 0 {
		header = d.Records[0].names()
	}
	if len(header) == 0 {
		return nil
	}
	var b bytes.Buffer
	cw := csv.NewWriter(&b)
	row := make([]string, len(header))
	for i, name := range header {
		row[i] = guard(name)
	}
	if err := csvRow(&b, cw, row); err != nil {
		return err
	}
	for i, r := range d.Records {
		if err := fill(row, header, r); err != nil {
			return fmt.Errorf("record %d: %w", i+1, err)
		}
		if err := csvRow(&b, cw, row); err != nil {
			return err
		}
	}
	cw.Flush()
	if err := cw.Error(); err != nil {
		return err
	}
	return writeAll(w, b.Bytes())
}

// csvRow writes one row. encoding/csv writes a lone empty cell as an empty line,
// which readers skip, so that one is quoted here.
func csvRow(b *bytes.Buffer, cw *csv.Writer, row []string) error {
	if len(row) == 1 && row[0] == "" {
		cw.Flush()
		b.WriteString("\"\"\n")
		return cw.Error()
	}
	return cw.Write(row)
}

// fill puts the cells of r under the names of header.
func fill(row, header []string, r Record) error {
	if err := r.check(); err != nil {
		return err
	}
	found := 0
	for i, name := range header {
		f := Field{Name: name}
		switch {
		case i < len(r) && r[i].Name == name: // the usual case: same order
			f = r[i]
			found++
		case r.has(name):
			f.Value = r.Get(name)
			found++
		}
		cell, err := csvCell(f)
		if err != nil {
			return err
		}
		row[i] = cell
	}
	if found == len(r) {
		return nil
	}
	known := make(map[string]bool, len(header))
	for _, name := range header {
		known[name] = true
	}
	for _, f := range r {
		if !known[f.Name] {
			return fmt.Errorf("field %q has no column, wanted one of %s", f.Name, strings.Join(header, ", "))
		}
	}
	return nil
}

func csvCell(f Field) (string, error) {
	switch v := plain(f.Value).(type) {
	case nil:
		return "", nil
	case string:
		return guard(v), nil
	case bool:
		return strconv.FormatBool(v), nil
	case int:
		return strconv.Itoa(v), nil
	case float64:
		return number(v), nil
	case []Note:
		return guard(texts(v)), nil
	case []string:
		return guard(strings.Join(v, "; ")), nil
	}
	return "", errValue(f)
}

var signedNumber = sync.OnceValue(func() *regexp.Regexp { return regexp.MustCompile(`^[+-][0-9]+([.,][0-9]+)?$`) })

// guard keeps a spreadsheet from running a text cell as a formula.
func guard(s string) string {
	if s == "" || !strings.ContainsRune("=+-@\t\r", rune(s[0])) || signedNumber().MatchString(s) {
		return s
	}
	return "'" + s
}
