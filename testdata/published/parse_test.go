package published

import (
	"strings"
	"testing"
)

func TestParse(t *testing.T) {
	text := "# source: a book: page 3\r\n# status: read\r\n# note: one\r\n# note: two\r\n\r\nx,tol,why\r\n1.0,,\r\n\"a\nb\",,\r\n2,,\r\n"
	f, err := Parse("made", []byte(text))
	if err != nil {
		t.Fatal(err)
	}
	if f.Source != "a book: page 3" || f.Status != "read" || f.Units != "" {
		t.Errorf("source %q, status %q, units %q", f.Source, f.Status, f.Units)
	}
	if strings.Join(f.Notes, "|") != "one|two" {
		t.Errorf("notes %q", f.Notes)
	}
	// Lines are those of the file, a cell of two lines counted in.
	for i, want := range []int{7, 8, 10} {
		if f.Rows[i].Line != want {
			t.Errorf("row %d is on line %d, wanted %d", i, f.Rows[i].Line, want)
		}
	}
	if got := f.Rows[2].Where(); got != "made.csv line 10" {
		t.Errorf("Where is %q", got)
	}
	if got := f.Rows[0].Text("z"); got != "" {
		t.Errorf("Text of a column that is not there is %q", got)
	}
}

func TestParseRefused(t *testing.T) {
	const head = "# source: a book\n# status: read\n"
	for _, c := range []struct{ name, text, want string }{
		{"empty", "", "line 1: the head has no source"},
		{"no source", "# status: read\nx,tol,why\n1,,\n", "line 2: the head has no source"},
		{"no status", "# source: a\nx,tol,why\n1,,\n", "line 2: the head has no status"},
		{"two sources", "# source: a\n# source: b\n", "line 2: a second source"},
		{"unknown key", "# source: a\n# origin: b\n", `line 2: head key "origin"`},
		{"no colon", "# source: a\n# read\n", "line 2: head line"},
		{"no value", "# source:\n", "line 1: head line"},
		{"no columns", head, "line 3: no column names"},
		{"no rows", head + "x,tol,why\n", "line 3: no rows"},
		{"no tol", head + "x,why\n1,\n", `line 3: no column "tol"`},
		{"no why", head + "x,tol\n1,\n", `line 3: no column "why"`},
		{"same column", head + "x,x,tol,why\n1,1,,\n", `line 3: a second column "x"`},
		{"unnamed column", head + "x,,tol,why\n1,1,,\n", "line 3: column name"},
		{"short row", head + "x,tol,why\n1,,\n2,\n", "line 5: wrong number of fields"},
		{"long row", head + "x,tol,why\n1,,,\n", "line 4: wrong number of fields"},
		{"open quote", head + "x,tol,why\n1,,\"a\n", "line 4: extraneous or missing"},
		{"comment among rows", head + "x,tol,why\n1,,\n# note: late\n", "line 5: wrong number of fields"},
		{"space", head + "x,tol,why\n1 ,,\n", "line 4: x is"},
		{"bad tolerance", head + "x,tol,why\n1,alpha=wide,r\n", "line 4: tolerance"},
		{"negative tolerance", head + "x,tol,why\n1,alpha=-1,r\n", "line 4: tolerance"},
		{"zero tolerance", head + "x,tol,why\n1,0,r\n", "line 4: tolerance"},
		{"no relation", head + "x,tol,why\n1,=1,r\n", "line 4: tolerance"},
		{"unknown column in tolerance", head + "x,tol,why\n1,alpha:y=1,r\n", "line 4: tolerance"},
		{"same tolerance", head + "x,tol,why\n1,alpha=1 alpha=2,r\n", "line 4: tolerance"},
		{"not text", head + "x,tol,why\n\xff,,\n", "line 1: not UTF-8 text"},
	} {
		t.Run(c.name, func(t *testing.T) {
			_, err := Parse("made", []byte(c.text))
			if err == nil || !strings.HasPrefix(err.Error(), "made.csv "+c.want) {
				t.Errorf("error is %v, wanted it to begin with made.csv %s", err, c.want)
			}
		})
	}
}
