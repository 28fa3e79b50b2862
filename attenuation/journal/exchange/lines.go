package exchange

import (
	"bufio"
	"bytes"
	"context"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"iter"
	"unicode/utf8"

	"gylebook/attenuation/journal"
)

// MaxLine is the longest line of JSON Lines read, in bytes.
const MaxLine = 1 << 20

// WriteLines writes every entry of the journal, one a line, and returns how many.
// Each is verified on the way: a copy of a damaged journal would pass for a good
// one. The error is journal.ErrTampered, that of r or of w.
func WriteLines(ctx context.Context, w io.Writer, r journal.Reader) (int64, error) {
	out := bufio.NewWriterSize(w, 64<<10)
	var n int64
	chain := ""
	for e, err := range r.Entries(ctx) {
		if err != nil {
			return n, err
		}
		if err := e.Verify(chain); err != nil {
			return n, err
		}
		chain = e.Chain
		line, err := json.Marshal(e)
		if err != nil {
			return n, err
		}
		if _, err := out.Write(append(line, '\n')); err != nil {
			return n, err
		}
		n++
	}
	return n, out.Flush()
}

// ReadLines runs over the entries of JSON Lines; it suits Store.Restore, which
// verifies them. It ends at the first line that is no entry, that has a field which
// this program does not know or that is longer than MaxLine; the error names the
// line. Empty lines are passed over.
func ReadLines(r io.Reader) iter.Seq2[journal.Entry, error] {
	return func(yield func(journal.Entry, error) bool) {
		in := bufio.NewReaderSize(r, 64<<10)
		for number := 1; ; number++ {
			line, err := readLine(in)
			if errors.Is(err, io.EOF) {
				return
			}
			var e journal.Entry
			if err == nil {
				if line = bytes.TrimSpace(line); len(line) == 0 {
					continue
				}
				e, err = parseLine(line)
			}
			if err != nil {
				yield(journal.Entry{}, fmt.Errorf("line %d: %w", number, err))
				return
			}
			if !yield(e, nil) {
				return
			}
		}
	}
}

// readLine returns the next line; io.EOF when there is none.
func readLine(in *bufio.Reader) ([]byte, error) {
	var line []byte
	for {
		part, err := in.ReadSlice('\n')
		line = append(line, part...)
		switch {
		case len(line) > MaxLine+1:
			return nil, fmt.Errorf("longer than %d bytes, wanted one entry a line", MaxLine)
		case err == nil:
			return line, nil
		case errors.Is(err, bufio.ErrBufferFull):
		case errors.Is(err, io.EOF) && len(line) > 0:
			return line, nil
		default:
			return nil, err
		}
	}
}

func parseLine(line []byte) (journal.Entry, error) {
	var e journal.Entry
	if !utf8.Valid(line) {
		return e, errors.New("text is not UTF-8")
	}
	if err := json.Unmarshal(line, &e); err != nil {
		return e, fmt.Errorf("not an entry of a journal: %w", err)
	}
	ours, err := json.Marshal(e)
	if err != nil || bytes.Equal(ours, line) {
		return e, err
	}
	// Other spacing is no fault. What differs otherwise is either unknown to this
	// program, or changes the digest.
	var given, known any
	if err := json.Unmarshal(line, &given); err != nil {
		return e, err
	}
	if err := json.Unmarshal(ours, &known); err != nil {
		return e, err
	}
	if err := unknown("", given, known); err != nil {
		return journal.Entry{}, err
	}
	return e, nil
}

// unknown returns an error for a field of given that known lacks.
func unknown(path string, given, known any) error {
	switch g := given.(type) {
	case map[string]any:
		k, ok := known.(map[string]any)
		if !ok {
			return fmt.Errorf("field %q: wanted no object", path)
		}
		for name, v := range g {
			at := name
			if path != "" {
				at = path + "." + name
			}
			ours, ok := k[name]
			if !ok {
				return fmt.Errorf("unknown field %.80q: written by a newer version?", at)
			}
			if err := unknown(at, v, ours); err != nil {
				return err
			}
		}
	case []any:
		k, ok := known.([]any)
		if !ok || len(k) != len(g) {
			return fmt.Errorf("field %q: wanted no list", path)
		}
		for i := range g {
			if err := unknown(path, g[i], k[i]); err != nil {
				return err
			}
		}
	}
	return nil
}
