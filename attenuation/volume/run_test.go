package volume

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"io"
	"math"
	"math/rand/v2"
	"runtime"
	"strconv"
	"strings"
	"testing"
	"time"

	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/tables/dialect"
)

// drawn is a cell as people write it, one in ten wrong.
func drawn(r *rand.Rand, good, bad []string) string {
	if r.IntN(10) == 0 {
		return bad[r.IntN(len(bad))]
	}
	return good[r.IntN(len(good))]
}

// Random rows in every way of writing are, to the last digit, what the single-value
// functions give, and refused for their reason.
func TestRowsAreTheSingleValues(t *testing.T) {
	r := rand.New(rand.NewPCG(3, 4))
	var file strings.Builder
	file.WriteString("reading,temp\n")
	n := 100_000
	if testing.Short() {
		n = 10_000
	}
	want := make([][2]string, n)
	for i := range n {
		sg := 0.99 + r.Float64()*0.15
		reading := drawn(r, []string{
			fmt.Sprintf("%.4f", sg), fmt.Sprintf("%.3f", sg), fmt.Sprintf("%.5f", sg), fmt.Sprintf("%.13f", sg), fmt.Sprintf("%.4f", sg),
			fmt.Sprintf("%.2fP", r.Float64()*30), fmt.Sprintf("%.1f °Bx", r.Float64()*30), fmt.Sprintf("%d", r.IntN(181)), fmt.Sprintf("%d", 980+r.IntN(200)),
			fmt.Sprintf("%.1fOe", r.Float64()*100), fmt.Sprintf("%.2fkg/m3", 990+r.Float64()*100), fmt.Sprintf("%.4fsg", sg), " 1.0500 ",
		}, []string{"", "x", "1.48", "12.1", "1.16", "NaN", "1e3", "0.5", "-1", "104g/L", "1.0.5", "999999999999999999"})
		temp := drawn(r, []string{
			fmt.Sprintf("%.1f", r.Float64()*37), fmt.Sprintf("%d", r.IntN(38)), fmt.Sprintf("%.1fF", 32+r.Float64()*108), fmt.Sprintf("%.2f C", r.Float64()*60),
			fmt.Sprintf("%.1f", r.Float64()*37), "20", "20.0",
		}, []string{"", "40", "-1", "61C", "hot", "20K", "1e1"})
		want[i] = [2]string{reading, temp}
		fmt.Fprintf(&file, "%s,%s\n", reading, temp)
	}
	for _, c := range []struct {
		name string
		by   single
	}{
		{"SG 20/20 in °C", single{gravity.ScaleSG, asread.C, gravity.Pair2020}},
		{"SG 60/60F in °F", single{gravity.ScaleSG, asread.F, gravity.Pair6060F}},
	} {
		t.Run(c.name, func(t *testing.T) {
			out, sum := runOf(t, strings.NewReader(file.String()), correctPlan(c.by))
			rows := strings.Split(strings.TrimSuffix(out, "\n"), "\n")[1:]
			if len(rows) != n || sum.Rows != n {
				t.Fatalf("%d rows, counted %d, wanted %d", len(rows), sum.Rows, n)
			}
			refused := 0
			results := Results{make([]result, len(allResults))}
			for i, row := range rows {
				results.clear()
				err := c.by.Row([][]byte{[]byte(want[i][0]), []byte(want[i][1])}, &results)
				line := want[i][0] + "," + want[i][1]
				for k := range 6 {
					line += ","
					if err == nil {
						line += shortest(results.cells[k].x)
					}
				}
				if err != nil {
					refused++
					reason := err.Error()
					if strings.ContainsAny(reason, `",`) {
						reason = `"` + strings.ReplaceAll(reason, `"`, `""`) + `"`
					}
					line += "," + reason
				} else {
					line += ","
				}
				if row != line {
					t.Fatalf("row %d is\n%s, wanted\n%s", i+1, row, line)
				}
			}
			if refused == 0 || refused != sum.Refused {
				t.Errorf("%d refused, wanted %d and some", sum.Refused, refused)
			}
		})
	}
}

// shortest prints x as machine output does in the range of these figures.
func shortest(x float64) string {
	switch a := math.Abs(x); {
	case x == 0:
		return "0"
	case a < 1e-6:
		return strconv.FormatFloat(x, 'e', -1, 64)
	}
	return strconv.FormatFloat(x, 'f', -1, 64)
}

func TestForms(t *testing.T) {
	p := correctPlan(single{gravity.ScaleSG, asread.C, gravity.Pair2020})
	p.Results = []string{"r", "t", "shift"}
	p.New = func() Worker {
		return NewCorrector([]Figure{Reading, SampleC, Other}, gravity.Pair2020, glass, asread.C, nil, single{})
	}
	for _, c := range []struct{ name, in, want string }{
		{"comma", "reading,temp\n1.050,28\n", "reading,temp,r,t,shift\n1.050,28,1.05,28,\n"},
		{
			"semicolon, decimal comma, BOM, CRLF", "\ufeffreading;temp\r\n1,050;28,5\r\n",
			"\ufeffreading;temp;r;t;shift\r\n1,050;28,5;1,05;28,5;\r\n",
		},
		{"tab, quotes kept", "reading\ttemp\tb c\n1.050\t\"28\"\t\"x\ty\"\n", "reading\ttemp\tb c\tr\tt\tshift\n1.050\t\"28\"\t\"x\ty\"\t1.05\t28\t\n"},
		{"comma and decimal comma", "reading,temp\n\"1,050\",\"28,5\"\n", "reading,temp,r,t,shift\n\"1,050\",\"28,5\",\"1,05\",\"28,5\",\n"},
		{"no last line end", "temp,reading\n28,1.050", "temp,reading,r,t,shift\n28,1.050,1.05,28,\n"},
		{"empty lines", "\nreading,temp\n\n1.050,28\n\n", "reading,temp,r,t,shift\n1.050,28,1.05,28,\n"},
		{"a header alone", "reading,temp\n", "reading,temp,r,t,shift\n"},
		{"a column without a name", "reading,temp,,\n1.050,28,,\n", "reading,temp,,,r,t,shift\n1.050,28,,,1.05,28,\n"},
	} {
		t.Run(c.name, func(t *testing.T) {
			if got, _ := runOf(t, strings.NewReader(c.in), p); got != c.want {
				t.Errorf("%q, wanted %q", got, c.want)
			}
		})
	}
	p.Lines = true
	got, _ := runOf(t, strings.NewReader("\"na\"\"me\",reading,temp,\n\"x\ny\\\",1.050,28,°\n"), p)
	if want := `{"na\"me":"x\u000ay\\","reading":"1.050","temp":"28","column_4":"°","r":1.05,"t":28,"shift":null}` + "\n"; got != want {
		t.Errorf("%s, wanted %s", got, want)
	}
}

func TestOneColumn(t *testing.T) {
	for in, want := range map[string]string{
		"a\nxx\n\nyyy\n": "a,length,error\nxx,2,\nyyy,3,\n",
		"a\r\n1,5\r\n":   "a;length;error\r\n1,5;3;\r\n",
	} {
		if got, _ := runOf(t, strings.NewReader(in), lengthPlan()); got != want {
			t.Errorf("%q, wanted %q", got, want)
		}
	}
}

// A bad row keeps its place and its cells, has its reason, and the rows stay in form.
func TestBadRows(t *testing.T) {
	for _, c := range []struct{ name, row, want string }{
		{"a value", "bad,2", `bad,2,,"bad, and ""quoted"""`},
		{"too few", "x", `x,,,"1 fields, wanted 2 as in the header"`},
		{"too many", "x,2,3", `x,"2,3",,"3 fields, wanted 2 as in the header"`},
		{"NUL", "x,\x00", "x,\ufffd,,\"a NUL byte, wanted text: is this a spreadsheet's own file?\""},
		{"not UTF-8", "x,\xff", "x,\ufffd,,\"text is not UTF-8, wanted UTF-8: save it again in that encoding\""},
		{"quote inside", `x,5" pipe`, `x,"5"" pipe",,"a quote inside a field that does not begin with one, wanted the field in quotes and the quote doubled"`},
		{"too long", "x," + strings.Repeat("y", dialect.MaxRecord), `,,,a record of more than 1048576 bytes: is a quote left open?`},
	} {
		t.Run(c.name, func(t *testing.T) {
			for _, n := range []int{0, 100} {
				p := lengthPlan()
				p.chunk = n
				got, sum := runOf(t, strings.NewReader("a,b\nx,1\n"+c.row+"\nyy,3\n"), p)
				if want := lines("a,b,length,error", "x,1,1,", c.want, "yy,3,2,"); got != want {
					t.Errorf("%.600q, wanted %q", got, want)
				}
				if sum.Rows != 3 || sum.Refused != 1 || sum.First.Line != 3 {
					t.Errorf("%+v, wanted one of three refused, on line 3", sum)
				}
			}
		})
	}
}

func TestStop(t *testing.T) {
	p := lengthPlan()
	p.Stop = true
	var out bytes.Buffer
	_, err := Run(context.Background(), strings.NewReader("a,b\nx,\"1\n1\"\nbad,2\nyy,3\n"), &out, p)
	var row *RowError
	if !errors.As(err, &row) || row.Line != 4 {
		t.Errorf("%v, wanted line 4", err)
	}
	if want := "a,b,length,error\nx,\"1\n1\",1,\n"; out.String() != want {
		t.Errorf("%q, wanted %q", out.String(), want)
	}
}

func TestFilesRefused(t *testing.T) {
	for _, c := range []struct{ name, in, says string }{
		{"empty", "", "the file is empty"},
		{"line ends alone", "\n\r\n", "the file is empty"},
		{"no such column", "b,c\n1,2\n", `no column "a", those there are "b", "c"`},
		{"one name twice", "a,b,a\n1,2,3\n", `columns 1 and 3 are both called "a"`},
		{"a result is there", "a,length\n1,2\n", `a column "length" is there already`},
		{"NUL in the header", "a,\x00\n1,2\n", "line 1, the header: a NUL byte"},
		{"two separators", "a;b,c\n1;2,3\n", "wanted one separator"},
		{"a header without end", strings.Repeat("a", 70000), "the header is longer than"},
	} {
		t.Run(c.name, func(t *testing.T) {
			var out bytes.Buffer
			_, err := Run(context.Background(), strings.NewReader(c.in), &out, lengthPlan())
			var file *FileError
			if !errors.As(err, &file) || !strings.Contains(err.Error(), c.says) {
				t.Errorf("%v, wanted %q", err, c.says)
			}
			if out.Len() > 0 {
				t.Errorf("%q written", out.String())
			}
		})
	}
}

type broken struct {
	after int
	err   error
}

func (b *broken) Write(p []byte) (int, error) {
	b.after--
	if b.after < 0 {
		return 0, b.err
	}
	return len(p), nil
}

func TestErrorsOfInAndOut(t *testing.T) {
	gone := errors.New("disk gone")
	rows := strings.Repeat("x,1\n", 100_000)
	_, err := Run(context.Background(), strings.NewReader("a,b\n"+rows), &broken{2, gone}, lengthPlan())
	if !errors.Is(err, gone) {
		t.Errorf("%v, wanted that of the writer", err)
	}
	_, err = Run(context.Background(), io.MultiReader(strings.NewReader("a,b\n"+rows), failing{gone}), io.Discard, lengthPlan())
	if !errors.Is(err, gone) {
		t.Errorf("%v, wanted that of the reader", err)
	}
	// A reader that waits for ever does not hold back the end.
	ctx, cancel := context.WithCancel(context.Background())
	r, w := io.Pipe()
	go func() {
		_, _ = io.WriteString(w, "a,b\n"+rows)
		cancel()
	}()
	if _, err = Run(ctx, r, io.Discard, lengthPlan()); !errors.Is(err, context.Canceled) {
		t.Errorf("%v, wanted that of the context", err)
	}
}

type failing struct{ err error }

func (f failing) Read([]byte) (int, error) { return 0, f.err }

// A pipe is answered as it comes: the rows that are whole are there before the next.
func TestPipeIsAnsweredAsItComes(t *testing.T) {
	inR, in := io.Pipe()
	outR, out := io.Pipe()
	ended := make(chan error, 1)
	go func() {
		_, err := Run(context.Background(), inR, out, lengthPlan())
		ended <- errors.Join(err, out.Close())
	}()
	got := make(chan string, 1000)
	go func() {
		b := make([]byte, 1<<20)
		for {
			n, err := outR.Read(b)
			if err != nil {
				return
			}
			got <- string(b[:n])
		}
	}()
	// The form is found from the beginning, which has to be there first.
	if _, err := io.WriteString(in, "a,b\n"+strings.Repeat("x,1\n", sampleSize/4)); err != nil {
		t.Fatal(err)
	}
	if _, err := io.WriteString(in, "yyy,2\nzz"); err != nil {
		t.Fatal(err)
	}
	all := ""
	for !strings.HasSuffix(all, "\nyyy,2,3,\n") {
		select {
		case s := <-got:
			all += s
		case <-time.After(10 * time.Second):
			t.Fatalf("the row is not answered, %.60q at the end", all[max(0, len(all)-60):])
		}
	}
	if err := in.Close(); err != nil {
		t.Fatal(err)
	}
	if err := <-ended; err != nil {
		t.Error(err)
	}
}

// A large input does not make a large heap, whatever it holds.
func TestMemoryIsFlat(t *testing.T) {
	if testing.Short() {
		t.Skip("200 MB to work")
	}
	for _, c := range []struct {
		name, text string
		size       int64
	}{
		{"rows", "2016-01-01T00:00Z,B1000000,1.0500,20.0\n", 200 << 20},
		{"a quote that is never closed", "\"x,", 100 << 20},
		{"one line", "xxxxxxxx", 100 << 20},
	} {
		t.Run(c.name, func(t *testing.T) {
			p := correctPlan(single{gravity.ScaleSG, asread.C, gravity.Pair2020})
			most := uint64(0)
			calls := 0
			p.Progress = func(int, int64) {
				if calls++; calls%50 != 1 {
					return
				}
				var m runtime.MemStats
				runtime.ReadMemStats(&m)
				most = max(most, m.HeapAlloc)
			}
			in := io.MultiReader(strings.NewReader("time,batch,reading,temp\n"+strings.Repeat("2016-01-01T00:00Z,B1000000,1.0500,20.0\n", 2000)), &repeated{text: c.text, n: c.size})
			if _, err := Run(context.Background(), in, io.Discard, p); err != nil {
				t.Fatal(err)
			}
			if most == 0 || most > 64<<20 {
				t.Errorf("%d bytes on the heap, wanted below 64 MB", most)
			}
		})
	}
}

// A row that is worked allocates nothing.
func TestRowsAllocateNothing(t *testing.T) {
	if testing.Short() {
		t.Skip("360 000 rows to work")
	}
	allocations := func(n int) float64 {
		text := rows(n)
		p := correctPlan(single{gravity.ScaleSG, asread.C, gravity.Pair2020})
		return testing.AllocsPerRun(3, func() {
			if _, err := Run(context.Background(), strings.NewReader(text), io.Discard, p); err != nil {
				t.Fatal(err)
			}
		})
	}
	// What is allocated once does not count, so the difference is that of the rows.
	few, many := allocations(30_000), allocations(90_000)
	if more := (many - few) / 60_000; more > 0.01 {
		t.Errorf("%.3f allocations a row", more)
	}
}
