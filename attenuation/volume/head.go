package volume

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"slices"
	"strings"

	"gylebook/tables/dialect"
)

const bom = "\ufeff"

// sampleSize is how much of a file decides its form; a file with quotes gives as
// much as dialect asks for, so that a cut inside quotes is known for one.
const sampleSize = 64 << 10

// head is the beginning of a file: its form and its columns.
type head struct {
	dialect dialect.Dialect
	names   []string
	raw     []byte // the header record without its line end
	lines   int    // line ends up to the first row
	size    int    // bytes up to there
	rest    []byte // what was read beyond
}

// readHead reads the beginning of a file and finds out its form. The columns in
// numeric hold numbers.
func readHead(in io.Reader, numeric []string) (*head, error) {
	sample := make([]byte, sampleSize)
	n, err := io.ReadFull(in, sample)
	if err == nil && bytes.IndexByte(sample, '"') >= 0 {
		var more int
		sample = append(sample, make([]byte, dialect.SampleSize-sampleSize)...)
		more, err = io.ReadFull(in, sample[n:])
		n += more
	}
	if err != nil && !errors.Is(err, io.EOF) && !errors.Is(err, io.ErrUnexpectedEOF) {
		return nil, err
	}
	sample = sample[:n]
	whole := err != nil
	h := &head{}
	first := sample
	if !whole && n < dialect.SampleSize {
		// A record that the sample cuts is no record.
		first = sample[:bytes.LastIndexAny(sample, "\r\n")+1]
	}
	if len(first) == 0 && n > 0 {
		return nil, &FileError{why: fmt.Sprintf("the header is longer than %d bytes", n), hint: "is this a text file with one record a line?"}
	}
	if h.dialect, err = detect(first, numeric); err != nil {
		return nil, err
	}
	rest := sample
	if h.dialect.BOM {
		rest = rest[len(bom):]
	}
	rec := record{comma: byte(h.dialect.Comma)}
	for {
		end := rec.parse(rest)
		if rec.why != "" {
			return nil, &FileError{why: fmt.Sprintf("line %d, the header: %s", h.lines+1, rec.why)}
		}
		h.raw = trimEnd(rest[:end])
		h.lines += lineEnds(rest[:end])
		rest = rest[end:]
		if !rec.blank() || len(rest) == 0 {
			break
		}
	}
	for _, f := range rec.fields {
		h.names = append(h.names, dialect.Strip(strings.TrimSpace(string(f))))
	}
	h.rest, h.size = rest, n-len(rest)
	return h, h.checkNames()
}

// detect is dialect.DetectColumns that also takes a file of one column.
func detect(sample []byte, numeric []string) (dialect.Dialect, error) {
	text := bytes.TrimSpace(bytes.TrimPrefix(sample, []byte(bom)))
	if len(text) == 0 {
		return dialect.Dialect{}, &FileError{why: "the file is empty, wanted a header line with the names of the columns"}
	}
	header := text
	if n := bytes.IndexAny(text, "\r\n"); n >= 0 {
		header = text[:n]
	}
	if !bytes.ContainsAny(header, ",;\t\"") {
		d := dialect.Dialect{Comma: ',', BOM: bytes.HasPrefix(sample, []byte(bom)), CRLF: bytes.Contains(text, []byte("\r\n"))}
		if bytes.IndexByte(text, ',') >= 0 {
			// Nothing is left for it to be but the decimal mark.
			d.Comma, d.Decimal = ';', ','
		}
		return d, nil
	}
	d, err := dialect.DetectColumns(sample, func(name string) bool {
		return slices.Contains(numeric, dialect.Strip(strings.TrimSpace(name)))
	})
	if err != nil {
		return d, &FileError{why: err.Error()}
	}
	return d, nil
}

// checkNames refuses a name that two columns have. Columns without a name are let
// pass: spreadsheets leave them.
func (h *head) checkNames() error {
	for i, name := range h.names {
		if k := slices.Index(h.names[:i], name); k >= 0 && name != "" {
			return &FileError{
				why:  fmt.Sprintf("columns %d and %d are both called %.40q, wanted every name once", k+1, i+1, name),
				hint: "rename one of them",
			}
		}
	}
	return nil
}

// find returns the places of the inputs and sees that no result is there already.
func (h *head) find(p *Plan) ([]int, error) {
	var at []int
	for _, name := range p.Inputs {
		i := slices.Index(h.names, name)
		if i < 0 {
			return nil, &FileError{Missing: name, why: fmt.Sprintf("no column %.40q, those there are %s", name, h.list())}
		}
		at = append(at, i)
	}
	for _, name := range p.Results {
		if slices.Contains(h.names, name) {
			return nil, &FileError{
				why:  fmt.Sprintf("a column %.40q is there already, and so would be a result", name),
				hint: "rename or drop it in the file, or choose other results",
			}
		}
	}
	return at, nil
}

func (h *head) list() string {
	names := make([]string, len(h.names))
	for i, name := range h.names {
		names[i] = fmt.Sprintf("%.40q", name)
	}
	if more := len(names) - 30; more > 0 {
		names = append(names[:30], fmt.Sprintf("and %d more", more))
	}
	return strings.Join(names, ", ")
}

// form is how the rows of this file are written.
func (h *head) form(p *Plan) *form {
	f := &form{comma: byte(h.dialect.Comma), decimal: byte(h.dialect.Decimal), eol: "\n", lines: p.Lines, columns: len(h.names)}
	if h.dialect.CRLF {
		f.eol = "\r\n"
	}
	if !p.Lines {
		return f
	}
	f.eol = "}\n"
	names := slices.Clone(h.names)
	for i, name := range names {
		if name == "" {
			names[i] = fmt.Sprintf("column_%d", i+1)
		}
	}
	for i, name := range append(names, p.Results...) {
		lead := byte(',')
		if i == 0 {
			lead = '{'
		}
		f.names = append(f.names, append(quoteJSON([]byte{lead}, name), ':'))
	}
	return f
}

// header is what stands above the rows: nothing in JSON Lines.
func (h *head) header(p *Plan, f *form) []byte {
	if p.Lines {
		return nil
	}
	var b []byte
	if h.dialect.BOM {
		b = append(b, bom...)
	}
	b = append(b, h.raw...)
	for _, name := range p.Results {
		b = f.cell(append(b, f.comma), name)
	}
	return append(b, f.eol...)
}
