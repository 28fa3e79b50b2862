package dialect

import (
	"errors"
	"fmt"
	"io"
	"reflect"
	"runtime"
	"strings"
	"testing"
)

// all reads every record as "line:field|field" and every error as its text.
func all(r *Reader) []string {
	var out []string
	for {
		rec, err := r.Read()
		switch {
		case errors.Is(err, io.EOF):
			return out
		case err != nil:
			out = append(out, err.Error())
		default:
			out = append(out, fmt.Sprintf("%d:%s", rec.Line, strings.Join(rec.Fields, "|")))
		}
	}
}

func TestReader(t *testing.T) {
	for _, c := range []struct {
		name, file string
		want       []string
	}{
		{"any line end", "a,b\r\nc,d\ne,f\rg,h", []string{"1:a|b", "2:c|d", "3:e|f", "4:g|h"}},
		{"quoted line ends count as lines and stay", "a,\"x\r\ny\nz\"\nc,d\n", []string{"1:a|x\r\ny\nz", "4:c|d"}},
		{"doubled quotes", `a,"say ""so"""` + "\n", []string{`1:a|say "so"`}},
		{"empty lines are passed over", "a,b\n\n\r\nc,d\n\n", []string{"1:a|b", "4:c|d"}},
		{"empty cells", ",\n\"\",\n", []string{"1:|", "2:|"}},
		{"a byte order mark", "\ufeffa,b\n", []string{"1:a|b"}},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got := all(NewReader(strings.NewReader(c.file), Dialect{Comma: ','})); !reflect.DeepEqual(got, c.want) {
				t.Errorf("%q, wanted %q", got, c.want)
			}
		})
	}
}

// One bad record is named, and the records after it are read.
func TestReaderNamesTheLine(t *testing.T) {
	for _, c := range []struct{ name, row, says string }{
		{"NUL", "x,\x00", "NUL"},
		{"not UTF-8", "x,\xff", "UTF-8"},
		{"too few", "x", "1 fields, wanted 2"},
		{"too many", "x,y,z", "3 fields, wanted 2"},
		{"quote inside", `x,5" pipe`, "quote inside"},
		{"text behind a quote", `x,"y"z`, "behind a closing quote"},
		{"too long", "x," + strings.Repeat("y", MaxRecord), "more than 1048576 bytes"},
	} {
		t.Run(c.name, func(t *testing.T) {
			got := all(NewReader(strings.NewReader("a,b\n"+c.row+"\nc,d\n"), Dialect{Comma: ','}))
			if len(got) != 3 || !strings.HasPrefix(got[1], "line 2: ") || !strings.Contains(got[1], c.says) || got[2] != "3:c|d" {
				t.Errorf("%.300q, wanted line 2 with %q, then line 3", got, c.says)
			}
		})
	}
}

func TestReaderOpenQuote(t *testing.T) {
	got := all(NewReader(strings.NewReader("a,b\n\"c,d\ne,f\n"), Dialect{Comma: ','}))
	if len(got) != 2 || !strings.HasPrefix(got[1], "line 2: a quote is left open") {
		t.Errorf("%q, wanted the line on which the quote stands", got)
	}
}

func TestReaderFailingFile(t *testing.T) {
	broken := errors.New("disk gone")
	r := NewReader(io.MultiReader(strings.NewReader("a,b\nc"), failing{broken}), Dialect{Comma: ','})
	if _, err := r.Read(); err != nil {
		t.Fatal(err)
	}
	if _, err := r.Read(); !errors.Is(err, broken) {
		t.Errorf("%v, wanted the file's own error", err)
	}
}

type failing struct{ err error }

func (f failing) Read([]byte) (int, error) { return 0, f.err }

// endless gives the same bytes again and again, n bytes in all.
type endless struct {
	text string
	at   int
	n    int
}

func (e *endless) Read(p []byte) (int, error) {
	if e.n <= 0 {
		return 0, io.EOF
	}
	k := 0
	for k < len(p) && k < e.n {
		c := copy(p[k:], e.text[e.at:])
		e.at = (e.at + c) % len(e.text)
		k += c
	}
	k = min(k, e.n)
	e.n -= k
	return k, nil
}

// A quote that is never closed may swallow the file, but not the memory.
func TestReaderMemoryIsFlat(t *testing.T) {
	for _, text := range []string{"\"never closed,", "a,b\n", ",,,,,,,,"} {
		var before, after runtime.MemStats
		r := NewReader(&endless{text: text, n: 16 << 20}, Dialect{Comma: ','})
		runtime.GC()
		runtime.ReadMemStats(&before)
		for {
			if _, err := r.Read(); errors.Is(err, io.EOF) {
				break
			}
		}
		runtime.GC()
		runtime.ReadMemStats(&after)
		// The longest record, its places and its fields: 1 MB, 8 MB and 16 MB at most.
		if grew := int64(after.HeapAlloc) - int64(before.HeapAlloc); grew > 26<<20 {
			t.Errorf("%.8q: the heap grew by %d bytes over 16 MB", text, grew)
		}
		runtime.KeepAlive(r)
	}
}

func BenchmarkReader(b *testing.B) {
	const row = "1,B-1,T4,2026-10-24T12:00:00+02:00,exact,12.50,1.0480,sg,18.0,yes,H1,0.000000\r\n"
	b.SetBytes(int64(len(row)))
	b.ReportAllocs()
	r := NewReader(&endless{text: row, n: len(row) * b.N}, Dialect{Comma: ','})
	for range b.N {
		if _, err := r.Read(); err != nil {
			b.Fatal(err)
		}
	}
}
