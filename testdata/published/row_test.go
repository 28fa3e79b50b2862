package published

import (
	"strings"
	"testing"
)

// parse builds a file of the columns x, y, tol, why with these rows.
func parse(t *testing.T, rows ...string) *File {
	t.Helper()
	text := "# source: a book\n# status: read\nx,y,tol,why\n" + strings.Join(rows, "\n") + "\n"
	f, err := Parse("made", []byte(text))
	if err != nil {
		t.Fatal(err)
	}
	return f
}

func TestHalfPlace(t *testing.T) {
	// Half of one unit in the last place, by hand.
	for text, want := range map[string]float64{
		"1.04837": 0.000005,
		"1.00000": 0.000005,
		"12.0":    0.05,
		"-.38":    0.005,
		"+1":      0.5,
		".0003":   0.00005,
		"5":       0.5,
		"5.":      0.5,
		"0":       0.5,
		"1.5e-3":  0.00005, // 0.0015: the last place is 0.0001
		"2E2":     50,
		"":        0,
		"word":    0,
		"1|2":     0,
		"NaN":     0,
	} {
		f := parse(t, `"`+text+`",a,,`)
		if got := f.Rows[0].HalfPlace("x"); got != want {
			t.Errorf("HalfPlace of %q is %v, wanted %v", text, got, want)
		}
	}
	if got := parse(t, "1,a,,").Rows[0].HalfPlace("none"); got != 0 {
		t.Errorf("HalfPlace of a column that is not there is %v, wanted 0", got)
	}
}

func TestFloat(t *testing.T) {
	for text, want := range map[string]float64{
		".0003": 0.0003, "-.38": -0.38, "+1": 1, "1.04837": 1.04837, "5.": 5, "3e-05": 0.00003,
	} {
		if got, err := parse(t, text+",a,,").Rows[0].Float("x"); err != nil || got != want {
			t.Errorf("Float of %q is %v, %v, wanted %v", text, got, err, want)
		}
	}
	for _, text := range []string{"a", "nan", "Inf", "0x1p-2", "1_0", "1e400", "--1", "~4 (maximum)", "1|2", ""} {
		_, err := parse(t, text+",a,,").Rows[0].Float("x")
		if err == nil || !strings.Contains(err.Error(), "made.csv line 4: x is") {
			t.Errorf("Float of %q gives %v, wanted an error naming file, line and column", text, err)
		}
	}
	if _, err := parse(t, "1,a,,").Rows[0].Float("z"); err == nil || !strings.Contains(err.Error(), `no column "z"`) {
		t.Errorf("Float of a column that is not there gives %v", err)
	}
}

func TestTolerance(t *testing.T) {
	f := parse(
		t,
		`1.00,2.0,,`,
		`1.00,2.0,alpha:x=0.2 alpha=0.3 beta=0.001,"measured, once"`,
		`1|2,2.0,0.7,rounded in print`,
	)
	for _, c := range []struct {
		row           int
		relation, col string
		want          float64
		why           string
	}{
		{0, "alpha", "x", 0.005, ""},
		{0, "alpha", "y", 0.05, ""},
		{1, "alpha", "x", 0.2, "measured, once"},
		{1, "alpha", "y", 0.3, "measured, once"},
		{1, "beta", "x", 0.001, "measured, once"},
		{1, "gamma", "x", 0.005, ""},
		{2, "alpha", "x", 0.7, "rounded in print"},
		{2, "beta", "y", 0.7, "rounded in print"},
	} {
		tol, why, err := f.Rows[c.row].Tolerance(c.relation, c.col)
		if err != nil || tol != c.want || why != c.why {
			t.Errorf("row %d, %s:%s gives %v, %q, %v, wanted %v, %q", c.row, c.relation, c.col, tol, why, err, c.want, c.why)
		}
	}
}

func TestToleranceRefused(t *testing.T) {
	for _, c := range []struct{ row, col, want string }{
		{"1.00,2.0,alpha=0.006,", "x", "has no reason"},
		{"1.00,2.0,0.006,", "x", "has no reason"},
		{"word,2.0,,", "x", "no last printed place"},
		{"1.00,2.0,,", "z", `no column "z"`},
	} {
		_, _, err := parse(t, c.row).Rows[0].Tolerance("alpha", c.col)
		if err == nil || !strings.Contains(err.Error(), c.want) || !strings.Contains(err.Error(), "made.csv line 4") {
			t.Errorf("%q gives %v, wanted %q with file and line", c.row, err, c.want)
		}
	}
	// Narrower than the default needs no reason.
	if tol, _, err := parse(t, "1.00,2.0,alpha=0.004,").Rows[0].Tolerance("alpha", "x"); err != nil || tol != 0.004 {
		t.Errorf("a narrower tolerance gives %v, %v", tol, err)
	}
}
