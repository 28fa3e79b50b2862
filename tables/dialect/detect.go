package dialect

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"strings"
)

// SampleSize is how much of a file is worth giving to Detect.
const SampleSize = 256 << 10

// ErrMixed says that a file is not in one form.
var ErrMixed = errors.New("mixed forms")

// ErrEmpty says that there is no header.
var ErrEmpty = errors.New("no header line")

// Detect finds the form of a file from its beginning. Columns that hold nothing but
// numbers decide the decimal mark. A mixture is refused with what was seen:
// ErrMixed.
func Detect(sample []byte) (Dialect, error) { return DetectColumns(sample, nil) }

// DetectColumns is Detect for a file whose columns of numbers are known by the name
// in the header; a cell of them counts when it begins with a number. A nil function
// leaves the choice to the cells.
func DetectColumns(sample []byte, numeric func(name string) bool) (Dialect, error) {
	d := Dialect{BOM: bytes.HasPrefix(sample, []byte(bom))}
	type try struct {
		comma   rune
		records []Record
		even    bool // every record has as many fields as the header
	}
	var tries []try
	seen := false
	for _, comma := range separators {
		records, whole := sampleRecords(sample, comma)
		// With a separator that is not the file's, a file in quotes has no record.
		seen = seen || len(records) > 0
		if len(records) > 0 && len(records[0].Fields) > 1 {
			tries = append(tries, try{comma, records, whole && even(records)})
		}
	}
	switch len(tries) {
	case 0:
		if !seen {
			return d, ErrEmpty
		}
		return d, fmt.Errorf("%w: line 1 has one column, wanted columns separated by comma, semicolon or tab", ErrEmpty)
	case 1:
	default:
		var fits []try
		for _, t := range tries {
			if t.even {
				fits = append(fits, t)
			}
		}
		if len(fits) != 1 {
			return d, fmt.Errorf("%w: the header holds both %s and %s, wanted one separator", ErrMixed, name(tries[0].comma), name(tries[1].comma))
		}
		tries = fits
	}
	found := tries[0]
	d.Comma = found.comma
	d.CRLF = crlf(sample)
	if err := strangers(sample, found.comma, found.records); err != nil {
		return d, err
	}
	mark, err := decimal(found.records, numeric)
	d.Decimal = mark
	return d, err
}

// sampleRecords splits the sample; a last record that the sample cuts short is left
// out, unless it is the only one. whole is false when a record could not be read.
func sampleRecords(sample []byte, comma rune) (out []Record, whole bool) {
	r := NewReader(bytes.NewReader(sample), Dialect{Comma: comma})
	r.ragged = true
	whole = true
	for {
		rec, err := r.Read()
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			whole = false
			continue
		}
		rec.Fields = append([]string(nil), rec.Fields...)
		out = append(out, rec)
	}
	if len(out) > 1 && !bytes.HasSuffix(sample, []byte("\n")) && len(sample) >= SampleSize {
		out = out[:len(out)-1]
	}
	return out, whole
}

func even(records []Record) bool {
	for _, r := range records {
		if len(r.Fields) != len(records[0].Fields) {
			return false
		}
	}
	return true
}

// strangers refuses a record that only another separator splits like the header.
func strangers(sample []byte, comma rune, records []Record) error {
	columns := len(records[0].Fields)
	var odd []int
	for _, r := range records {
		if len(r.Fields) != columns {
			odd = append(odd, r.Line)
		}
	}
	if len(odd) == 0 {
		return nil
	}
	for _, other := range separators {
		if other == comma {
			continue
		}
		others, _ := sampleRecords(sample, other)
		for _, r := range others {
			if r.Line == odd[0] && len(r.Fields) == columns {
				return fmt.Errorf("%w: line 1 is separated by %s, line %d by %s", ErrMixed, name(comma), r.Line, name(other))
			}
		}
	}
	return nil // a record with a cell too many or too few is the Reader's to name
}

type seen struct {
	line   int
	column string
	cell   string
}

// decimal returns the one decimal mark of all columns of numbers.
func decimal(records []Record, numeric func(string) bool) (rune, error) {
	header := records[0].Fields
	first := make(map[rune]seen)
	for i, column := range header {
		if numeric != nil && !numeric(column) || numeric == nil && !numbersOnly(records[1:], i) {
			continue
		}
		for _, r := range records[1:] {
			if i >= len(r.Fields) {
				continue
			}
			cell := Strip(r.Fields[i])
			mark, _ := Mark(cell)
			if _, ok := first[mark]; mark != 0 && !ok {
				first[mark] = seen{r.Line, column, cell}
			}
		}
	}
	point, comma := first['.'], first[',']
	switch {
	case point.line != 0 && comma.line != 0:
		return 0, fmt.Errorf("%w: line %d has %s %.40q with a decimal point, line %d has %s %.40q with a decimal comma, wanted one mark",
			ErrMixed, point.line, strings.TrimSpace(point.column), point.cell, comma.line, strings.TrimSpace(comma.column), comma.cell)
	case comma.line != 0:
		return ',', nil
	case point.line != 0:
		return '.', nil
	}
	return 0, nil
}

func numbersOnly(records []Record, i int) bool {
	for _, r := range records {
		if i >= len(r.Fields) || strings.TrimSpace(r.Fields[i]) == "" {
			continue
		}
		if _, all := Mark(r.Fields[i]); !all {
			return false
		}
	}
	return true
}

// crlf reports whether the first line end is CR LF.
func crlf(sample []byte) bool {
	i := bytes.IndexAny(sample, "\r\n")
	return i >= 0 && sample[i] == '\r' && i+1 < len(sample) && sample[i+1] == '\n'
}
