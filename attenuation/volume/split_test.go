package volume

import (
	"bytes"
	"errors"
	"io"
	"maps"
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"gylebook/tables/dialect"
)

// cells are texts that make trouble when rows are cut.
var cells = rapid.SampledFrom([]string{
	"", "a", "12", "bad", "°", "\"\"", "\"x\"", "\"x\ny\"", "\"x\r\ny\"", "\"x,y\"", "\"say \"\"so\"\"\"", "5\" pipe", "\"x\"y", "\"x\"y\"z\"",
	"\x00", "\xff", " ", "\"", "\"a\"\"", "x\ry",
})

var files = rapid.Custom(func(t *rapid.T) string {
	var b strings.Builder
	eol := rapid.SampledFrom([]string{"\n", "\r\n", "\r"}).Draw(t, "line end")
	b.WriteString("a,b,c" + eol)
	for range rapid.IntRange(0, 30).Draw(t, "rows") {
		for i := range rapid.SampledFrom([]int{3, 3, 3, 3, 1, 2, 5}).Draw(t, "fields") {
			if i > 0 {
				b.WriteByte(',')
			}
			b.WriteString(cells.Draw(t, "cell"))
		}
		b.WriteString(eol)
	}
	return strings.TrimSuffix(b.String(), rapid.SampledFrom([]string{"", eol}).Draw(t, "last line end"))
})

// Whatever the size of the pieces, of the reads and the number of workers, the
// output is the same.
func TestPiecesMakeNoDifference(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		file := files.Draw(t, "file")
		p := lengthPlan()
		p.Lines = rapid.Bool().Draw(t, "JSON Lines")
		want, wantSum := runOf(t, strings.NewReader(file), p)
		p.chunk = rapid.IntRange(1, 40).Draw(t, "chunk")
		p.Workers = rapid.IntRange(1, 4).Draw(t, "workers")
		got, sum := runOf(t, drip{strings.NewReader(file), rapid.IntRange(1, 50).Draw(t, "read")}, p)
		if got != want {
			t.Fatalf("%q, wanted %q", got, want)
		}
		if sum.Rows != wantSum.Rows || sum.Refused != wantSum.Refused || (sum.First == nil) != (wantSum.First == nil) {
			t.Fatalf("%+v, wanted %+v", sum, wantSum)
		}
		if sum.First != nil && sum.First.Line != wantSum.First.Line {
			t.Fatalf("line %d, wanted %d", sum.First.Line, wantSum.First.Line)
		}
	})
}

// The rows are those of package dialect, with the same cells and the same faults on
// the same lines.
func TestRecordsAreThoseOfDialect(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) { compareWithDialect(t, files.Draw(t, "file")) })
}

type fatal interface {
	Fatalf(format string, args ...any)
	Helper()
}

func compareWithDialect(t fatal, file string) {
	t.Helper()
	r := dialect.NewReader(strings.NewReader(file), dialect.Dialect{Comma: ','})
	rec := record{comma: ','}
	b := []byte(strings.TrimPrefix(file, bom))
	line, columns := 1, 0
	for {
		want, wantErr := r.Read()
		var end int
		for {
			if len(b) == 0 {
				break
			}
			end = rec.parse(b)
			if !rec.blank() {
				break
			}
			line += lineEnds(b[:end])
			b = b[end:]
		}
		if errors.Is(wantErr, io.EOF) {
			if len(b) > 0 {
				t.Fatalf("%q is left over", b)
			}
			return
		}
		if len(b) == 0 {
			t.Fatalf("no record, wanted %v, %v", want, wantErr)
		}
		if line != want.Line {
			t.Fatalf("line %d, wanted %d", line, want.Line)
		}
		if columns == 0 && rec.why == "" {
			columns = len(rec.fields)
		}
		broken := rec.why != "" || len(rec.fields) != columns
		if broken != (wantErr != nil) {
			t.Fatalf("line %d: %q with %d fields, wanted %v", line, rec.why, len(rec.fields), wantErr)
		}
		if !broken && string(bytes.Join(rec.fields, []byte("|"))) != strings.Join(want.Fields, "|") {
			t.Fatalf("line %d: %q, wanted %q", line, rec.fields, want.Fields)
		}
		if raw := trimEnd(b[:end]); simple(raw) && bytes.IndexByte(raw, '\r') < 0 && !broken {
			simply := record{comma: ','}
			simply.cut(raw)
			if !bytes.Equal(bytes.Join(simply.fields, []byte("|")), bytes.Join(rec.fields, []byte("|"))) {
				t.Fatalf("line %d cut in two ways: %q and %q", line, simply.fields, rec.fields)
			}
		}
		line += lineEnds(b[:end])
		b = b[end:]
	}
}

// The splitter ends records where the parser does.
func FuzzSplit(f *testing.F) {
	for _, s := range []string{
		"a,b\nc,d\n", "a,\"b\nc\"\r\nd,e", "\"a\"\"\n\"\n", "a\rb\r\nc\r", "5\" x\n\"\n\"\n", "\"x\"y\"\n\"z\n", "\"\r\"\r\r\n", ",\",\"\n",
	} {
		f.Add([]byte(s), uint8(3))
	}
	f.Fuzz(func(t *testing.T, b []byte, size uint8) {
		compareWithDialect(t, string(b))
		rec := record{comma: ','}
		ends := map[int]bool{}
		for at := 0; at < len(b); {
			at += rec.parse(b[at:])
			// A CR at the end may be half a line end, and counts as none.
			if c := b[at-1]; !rec.open && (c == '\n' || c == '\r' && at < len(b)) {
				ends[at] = true
			}
		}
		check := func(how string, end int) {
			if len(ends) > 0 && !ends[end] || len(ends) == 0 && end != 0 {
				t.Fatalf("%s a record ends at %d, wanted one of %v of %q", how, end, ends, b)
			}
		}
		check("at once", (&splitter{comma: ','}).last(b))
		if end := (&splitter{comma: ','}).first(b); len(ends) > 0 && end != slices.Min(slices.Collect(maps.Keys(ends))) {
			t.Fatalf("the first record ends at %d, wanted the first of %v of %q", end, ends, b)
		}
		// In pieces: a CR is never the last of one.
		n := max(int(size), 1)
		s, seen, end := splitter{comma: ','}, 0, 0
		for seen < len(b) {
			upTo := min(seen+n, len(b))
			for upTo < len(b) && b[upTo-1] == '\r' {
				upTo++
			}
			if e := s.last(b[seen:upTo]); e > 0 {
				end = seen + e
			}
			seen = upTo
		}
		check("in pieces", end)
	})
}
