package published

import (
	"bytes"
	"encoding/csv"
	"errors"
	"fmt"
	"io"
	"strings"
	"unicode/utf8"
)

// The columns that every file has beside the published ones.
const (
	colTol = "tol"
	colWhy = "why"
)

// Parse reads one file: the head, the column names and the rows. Source, status,
// the columns tol and why, and at least one row are required. Every error names
// the file and the line.
func Parse(name string, data []byte) (*File, error) {
	f := &File{Name: name}
	if !utf8.Valid(data) {
		return nil, f.errorf(1, "not UTF-8 text")
	}
	body, bodyLine, err := f.head(data)
	if err != nil {
		return nil, err
	}
	r := csv.NewReader(bytes.NewReader(body))
	for {
		cells, err := r.Read()
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			return nil, f.csvError(err, bodyLine)
		}
		line, _ := r.FieldPos(0)
		line += bodyLine - 1
		if f.Columns == nil {
			err = f.setColumns(line, cells)
		} else {
			err = f.addRow(line, cells)
		}
		if err != nil {
			return nil, err
		}
	}
	switch {
	case f.Columns == nil:
		return nil, f.errorf(bodyLine, "no column names, wanted a line of them after the head")
	case len(f.Rows) == 0:
		return nil, f.errorf(bodyLine, "no rows, wanted one at least")
	}
	return f, nil
}

// head reads the lines that begin with "#" and returns the rest of the data
// with the number of its first line.
func (f *File) head(data []byte) (body []byte, line int, err error) {
	line = 1
	for ; len(data) > 0 && data[0] == '#'; line++ {
		text, rest, _ := bytes.Cut(data, []byte("\n"))
		if err := f.setHead(line, string(text[1:])); err != nil {
			return nil, 0, err
		}
		data = rest
	}
	switch {
	case f.Source == "":
		return nil, 0, f.errorf(line, "the head has no source, wanted \"# source: …\"")
	case f.Status == "":
		return nil, 0, f.errorf(line, "the head has no status, wanted \"# status: …\"")
	}
	return data, line, nil
}

// setHead takes one line of the head, without its "#".
func (f *File) setHead(line int, text string) error {
	key, value, ok := strings.Cut(text, ":")
	key, value = strings.TrimSpace(key), strings.TrimSpace(value)
	if !ok || value == "" {
		return f.errorf(line, "head line %.40q, wanted \"# key: value\"", text)
	}
	var field *string
	switch key {
	case "source":
		field = &f.Source
	case "status":
		field = &f.Status
	case "units":
		field = &f.Units
	case "note":
		f.Notes = append(f.Notes, value)
		return nil
	default:
		return f.errorf(line, "head key %.40q, wanted source, status, units or note", key)
	}
	if *field != "" {
		return f.errorf(line, "a second %s, wanted one", key)
	}
	*field = value
	return nil
}

func (f *File) setColumns(line int, names []string) error {
	f.Columns = names
	for i, n := range names {
		if n == "" || n != strings.TrimSpace(n) {
			return f.errorf(line, "column name %q, wanted a name without spaces around it", n)
		}
		if f.column(n) != i {
			return f.errorf(line, "a second column %q, wanted one", n)
		}
	}
	for _, n := range []string{colTol, colWhy} {
		if f.column(n) < 0 {
			return f.errorf(line, "no column %q, wanted tol and why in every file", n)
		}
	}
	return nil
}

// addRow keeps a row after looking at the form of its tolerances. The csv reader
// has made sure that it has as many cells as there are columns.
func (f *File) addRow(line int, cells []string) error {
	for i, c := range cells {
		if c != strings.TrimSpace(c) {
			return f.errorf(line, "%s is %q, wanted no spaces around it", f.Columns[i], c)
		}
	}
	row := Row{Line: line, file: f, cells: cells}
	if _, err := row.tolerances(); err != nil {
		return err
	}
	f.Rows = append(f.Rows, row)
	return nil
}

// csvError counts the lines of the head in.
func (f *File) csvError(err error, bodyLine int) error {
	var p *csv.ParseError
	if errors.As(err, &p) {
		return f.errorf(p.Line+bodyLine-1, "%w", p.Err)
	}
	return f.errorf(bodyLine, "%w", err)
}

func (f *File) errorf(line int, format string, args ...any) error {
	return fmt.Errorf("%s.csv line %d: %w", f.Name, line, fmt.Errorf(format, args...))
}
