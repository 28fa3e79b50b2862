package tables

import (
	"encoding/csv"
	"io"
	"math"
	"reflect"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func TestWriteCSV(t *testing.T) {
	reading := 12.4
	d := Document{
		Columns: []string{"not", "used"},
		Records: []Record{
			{{"batch", `pale, "dry"`}, {"reading", &reading}, {"third", 1.0 / 3}, {"n", 3}, {"hot", true}, {"notes", []Note{{"a", "first"}, {"b", "second"}}}, {"tags", []string{"x", "y"}}},
			// Found by name, whatever the order; what is missing stays empty.
			{{"hot", false}, {"third", math.NaN()}, {"reading", (*float64)(nil)}, {"batch", "dark\nold"}, {"n", nil}},
		},
		Summary: Record{{"rows", 2}},
		Notes:   []Note{{"c", "not in the csv"}},
	}
	got := render(t, d.WriteCSV)
	same(t, got, `batch,reading,third,n,hot,notes,tags
"pale, ""dry""",12.4,0.3333333333333333,3,true,first; second,x; y
"dark
old",,,,false,,
`)
	rows, err := csv.NewReader(strings.NewReader(got)).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	if want := []string{"dark\nold", "", "", "", "false", "", ""}; !reflect.DeepEqual(rows[2], want) {
		t.Errorf("row 2 read back as %q, want %q", rows[2], want)
	}
}

func TestWriteCSVEmpty(t *testing.T) {
	same(t, render(t, Document{Columns: []string{"batch", "og"}}.WriteCSV), "batch,og\n")
	same(t, render(t, Document{}.WriteCSV), "")
	// RFC 4180 readers skip an empty line: one empty cell has to be quoted.
	same(t, render(t, Document{Records: []Record{{{"og", nil}}, {{"og", 1.05}}}}.WriteCSV), "og\n\"\"\n1.05\n")
}

func TestWriteCSVUnknownColumn(t *testing.T) {
	err := Document{Records: []Record{{{"og", 1.05}}, {{"og", 1.05}, {"fg", 1.01}}}}.WriteCSV(io.Discard)
	if want := `record 2: field "fg" has no column, wanted one of og`; err == nil || err.Error() != want {
		t.Errorf("error %v, want %s", err, want)
	}
}

// Text that a spreadsheet would run is disarmed; numbers stay numbers.
func TestWriteCSVFormulaGuard(t *testing.T) {
	for in, want := range map[any]string{
		`=1+1`: `'=1+1`, `+1-1`: `'+1-1`, `-1+1`: `'-1+1`, `@sum(a1)`: `'@sum(a1)`, "\t=1": "'\t=1",
		`-`: `'-`, `-0.5.1`: `'-0.5.1`, `-0.5`: `-0.5`, `+1,5`: `+1,5`, `a=1`: `a=1`, ``: ``, -0.5: `-0.5`, -3: `-3`,
	} {
		got, err := csvCell(Field{Value: in})
		if err != nil || got != want {
			t.Errorf("cell of %#v = %q, %v, want %q", in, got, err, want)
		}
	}
	d := Document{Records: []Record{{{"=a", "\r=1"}, {"b", []Note{{"", "=2"}}}, {"c", []string{"@x"}}}}}
	same(t, render(t, d.WriteCSV), "'=a,b,c\n\"'\r=1\",'=2,'@x\n")
}

// Whatever the text, as many rows and fields come back as were written, and
// every cell as it was written, save that encoding/csv reads CR LF as LF.
func TestWriteCSVAnyText(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		cols := rapid.IntRange(1, 4).Draw(t, "cols")
		rows := rapid.IntRange(1, 4).Draw(t, "rows")
		var d Document
		want := [][]string{make([]string, cols)}
		for range rows {
			var r Record
			var cells []string
			for j := range cols {
				name, text := strings.Repeat("c", j+1), anyText().Draw(t, "text")
				want[0][j] = name
				r = append(r, Field{name, text})
				cells = append(cells, strings.ReplaceAll(guard(text), "\r\n", "\n"))
			}
			d.Records = append(d.Records, r)
			want = append(want, cells)
		}
		var b strings.Builder
		if err := d.WriteCSV(&b); err != nil {
			t.Fatal(err)
		}
		got, err := csv.NewReader(strings.NewReader(b.String())).ReadAll()
		if err != nil {
			t.Fatalf("%v in %q", err, b.String())
		}
		if !reflect.DeepEqual(got, want) {
			t.Fatalf("read back %q, want %q", got, want)
		}
	})
}

func BenchmarkWriteCSV(b *testing.B) {
	var d Document
	for i := range 1000 {
		d.Records = append(d.Records, Record{
			{"batch", "pale 12"},
			{"reading", 1.048 + float64(i)*1e-6},
			{"sample_c", 26.0},
			{"corrected", 1.0494},
			{"hot", false},
			{"notes", []Note{{"hot-sample", "26 °C"}}},
		})
	}
	b.ReportAllocs()
	for b.Loop() {
		if err := d.WriteCSV(io.Discard); err != nil {
			b.Fatal(err)
		}
	}
}
