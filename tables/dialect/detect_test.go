package dialect

import (
	"bytes"
	"errors"
	"io"
	"strings"
	"testing"
	"unicode/utf8"
)

func TestDetect(t *testing.T) {
	for _, c := range []struct {
		name, file string
		want       Dialect
	}{
		{"comma, point, LF", "a,b\n1.5,x\n", Dialect{Comma: ',', Decimal: '.'}},
		{"semicolon, decimal comma, BOM, CRLF", "\ufeffa;b\r\n1,5;x\r\n", Dialect{Comma: ';', Decimal: ',', BOM: true, CRLF: true}},
		{"tab", "a\tb\n-0.5\tx\n", Dialect{Comma: '\t', Decimal: '.'}},
		{"comma with quoted decimal commas", "a,b\n\"1,5\",x\n\"2,5\",y\n", Dialect{Comma: ',', Decimal: ','}},
		{"no decimals", "a,b\n1,x\n", Dialect{Comma: ','}},
		{"a mark in running text", "a;b\n1,5;well. so\n", Dialect{Comma: ';', Decimal: ','}},
		{"a column with text among numbers is no column of numbers", "a;b\n1,5;2.5\n1,6;none\n", Dialect{Comma: ';', Decimal: ','}},
		{"separator inside a quoted name", "\"a;b\",c\n1.5,2\n", Dialect{Comma: ',', Decimal: '.'}},
		{"separator in a name that rows lack", "a;b,c\n1.5,2\n", Dialect{Comma: ',', Decimal: '.'}},
		{"quoted line end", "a,b\n\"x\ny\",1.5\n", Dialect{Comma: ',', Decimal: '.'}},
		{"every field in quotes", "\"a\",\"b\"\n\"1.5\",\"x\"\n", Dialect{Comma: ',', Decimal: '.'}},
		{"header alone", "a;b;c", Dialect{Comma: ';'}},
	} {
		t.Run(c.name, func(t *testing.T) {
			got, err := Detect([]byte(c.file))
			if err != nil || got != c.want {
				t.Errorf("%+v, %v, wanted %+v", got, err, c.want)
			}
		})
	}
}

func TestDetectRefuses(t *testing.T) {
	for _, c := range []struct {
		name, file string
		is         error
		says       []string
	}{
		{"two separators in the header", "a;b,c\n1;2,3\n", ErrMixed, []string{"comma", "semicolon"}},
		{"a row with another separator", "a,b,c\n1,2,3\n4;5;6\n", ErrMixed, []string{"line 1 is separated by comma", "line 3 by semicolon"}},
		{"two marks in one column", "a;b\nx;1.5\ny;1,5\n", ErrMixed, []string{`line 2 has b "1.5"`, `line 3 has b "1,5"`}},
		{"two marks in two columns", "a;b\n1.5;2,5\n", ErrMixed, []string{"decimal point", "decimal comma"}},
		{"one column", "a\n1\n", ErrEmpty, []string{"one column"}},
		{"nothing", "\n\n", ErrEmpty, nil},
	} {
		t.Run(c.name, func(t *testing.T) {
			_, err := Detect([]byte(c.file))
			if !errors.Is(err, c.is) {
				t.Fatalf("%v, wanted %v", err, c.is)
			}
			for _, s := range c.says {
				if !strings.Contains(err.Error(), s) {
					t.Errorf("%q does not say %q", err, s)
				}
			}
		})
	}
}

// Only the columns that are known to hold numbers decide.
func TestDetectColumns(t *testing.T) {
	file := []byte("gravity;note\n12,1P;1.5\n")
	if _, err := Detect(file); err != nil {
		t.Fatalf("12,1P is no number, so the note alone decides: %v", err)
	}
	d, err := DetectColumns(file, func(name string) bool { return name == "gravity" })
	if err != nil || d.Decimal != ',' {
		t.Errorf("%v, %v, wanted a decimal comma", d, err)
	}
}

// A sample ends anywhere; the record it cuts does not count.
func TestDetectCutSample(t *testing.T) {
	var b bytes.Buffer
	b.WriteString("a,b,c\n")
	for b.Len() < SampleSize-7 {
		b.WriteString("1.5,2,3\n")
	}
	b.WriteString("1.5,2,\"3 and more")
	if d, err := Detect(b.Bytes()[:SampleSize]); err != nil || d.Comma != ',' {
		t.Errorf("%v, %v", d, err)
	}
}

func TestMark(t *testing.T) {
	for cell, want := range map[string]struct {
		mark rune
		all  bool
	}{
		"1.048": {'.', true}, "1,048": {',', true}, "1,048.5": {'.', true}, "1.048,5": {',', true}, "-0.5": {'.', true},
		"\u22120,5": {',', true}, "12,1P": {',', false}, "48": {0, true}, "12. March": {0, false}, "": {0, false}, "abc": {0, false}, ".": {0, false},
	} {
		if mark, all := Mark(cell); mark != want.mark || all != want.all {
			t.Errorf("Mark(%q) = %q, %v, wanted %q, %v", cell, mark, all, want.mark, want.all)
		}
	}
}

func TestGuard(t *testing.T) {
	for cell, want := range map[string]string{
		"=1+1": "'=1+1", "+1+2": "'+1+2", "-x": "'-x", "@a": "'@a", "\tx": "'\tx", "\rx": "'\rx",
		"-0.5": "-0.5", "+1,5": "+1,5", "-12": "-12", "-1P": "'-1P", // numbers are left alone
		"plain": "plain", "": "", "'quoted": "'quoted", "'=x": "''=x", "''=x": "'''=x",
	} {
		if got := Guard(cell); got != want {
			t.Errorf("Guard(%q) = %q, wanted %q", cell, got, want)
		}
		if back := Strip(Guard(cell)); back != cell {
			t.Errorf("Strip(Guard(%q)) = %q", cell, back)
		}
	}
}

func FuzzGuard(f *testing.F) {
	for _, s := range []string{"=1", "'=1", "-0.5", "''\t", "' =", "-\u2212"} {
		f.Add(s)
	}
	f.Fuzz(func(t *testing.T, s string) {
		g := Guard(s)
		if back := Strip(g); back != s {
			t.Errorf("Strip(Guard(%q)) = %q", s, back)
		}
		if g != "" && strings.IndexByte("=@\t\r", g[0]) >= 0 {
			t.Errorf("Guard(%q) = %q, which a spreadsheet runs", s, g)
		}
	})
}

// Whatever is detected can be read by what was detected, up to its first error.
func FuzzDetect(f *testing.F) {
	for _, s := range []string{
		"a,b\n1.5,x\n", "\ufeffa;b\r\n1,5;x\r\n", "a\tb\n\"1\n2\"\t3", "a;b,c\n1;2,3\n", "\"", "a,\"b", "\x00,\xff\n", "a,b\r1,2\r",
	} {
		f.Add([]byte(s))
	}
	f.Fuzz(func(t *testing.T, sample []byte) {
		d, err := Detect(sample)
		if err != nil {
			return
		}
		if d.Comma == 0 {
			t.Fatal("no separator and no error")
		}
		r := NewReader(bytes.NewReader(sample), d)
		columns, line := 0, 0
		for {
			rec, err := r.Read()
			if errors.Is(err, io.EOF) {
				return
			}
			var bad *Error
			if err != nil && !errors.As(err, &bad) {
				t.Fatal(err)
			}
			if rec.Line <= line {
				t.Fatalf("line %d after line %d", rec.Line, line)
			}
			line = rec.Line
			if err != nil {
				continue
			}
			if columns == 0 {
				columns = len(rec.Fields)
			}
			if len(rec.Fields) != columns {
				t.Fatalf("line %d: %d fields, wanted %d", line, len(rec.Fields), columns)
			}
			for _, field := range rec.Fields {
				if !utf8.ValidString(field) || strings.ContainsRune(field, 0) {
					t.Fatalf("line %d: %q let through", line, field)
				}
			}
		}
	})
}
