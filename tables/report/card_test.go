package report

import (
	"errors"
	"fmt"
	"io"
	"strconv"
	"strings"
	"testing"

	"gylebook/tables"
)

// refusal is the error for a card that is too large.
func refusal(t *testing.T, c Card) *TooLarge {
	t.Helper()
	var tooLarge *TooLarge
	if err := c.Write(io.Discard); !errors.As(err, &tooLarge) {
		t.Fatalf("%s: error %v, want a TooLarge", c.Title, err)
	}
	return tooLarge
}

// A chart of 9 columns and 21 rows is what hangs by the tank: it fits, upright,
// in type of 14 pt or more.
func TestChartFits(t *testing.T) {
	s, err := chart(21, 9).layOut()
	if err != nil {
		t.Fatal(err)
	}
	if s.size < 14 {
		t.Errorf("type of %v pt", s.size)
	}
	if got := htmlOf(t, chart(21, 9)); !strings.Contains(got, fmt.Sprintf("font-size: %.0fpt", s.size)) {
		t.Error("the type is not in the stylesheet")
	}
}

// What a refusal says would fit does fit, and one more does not.
func TestRefusalIsTrue(t *testing.T) {
	for _, landscape := range []bool{false, true} {
		make := map[string]func(rows, columns int) Card{
			"chart": chart,
			"strip": func(rows, _ int) Card { return scale(rows) },
			"sheet": func(rows, columns int) Card {
				c := rounds(rows)
				c.Sheet.Columns = nil
				for i := range columns {
					c.Sheet.Columns = append(c.Sheet.Columns, "column_"+strconv.Itoa(i))
				}
				return c
			},
		}
		for name, of := range make {
			card := func(rows, columns int) Card {
				c := of(rows, columns)
				c.Landscape = landscape
				return c
			}
			e := refusal(t, card(300, 60))
			if e.Rows != 300 || e.FitRows < 5 || e.FitColumns < 2 || e.Landscape != landscape {
				t.Errorf("%s: %+v", name, e)
			}
			if err := card(e.FitRows, e.FitColumns).Write(io.Discard); err != nil {
				t.Errorf("%s: what fits is refused: %v", name, err)
			}
			refusal(t, card(e.FitRows+1, e.FitColumns))
			if name != "strip" {
				refusal(t, card(e.FitRows, e.FitColumns+1))
			}
		}
	}
}

func TestRefusalWords(t *testing.T) {
	e := &TooLarge{Card: "H1", Rows: 40, Columns: 9, FitRows: 24, FitColumns: 10}
	want := `card "H1": read 40 rows of 9 columns, wanted at most 24 rows of 10 columns, which is what one page of A4 or Letter holds upright at 14 pt; leave some out, take a larger step or print it landscape`
	if e.Error() != want {
		t.Errorf("said %q, want %q", e, want)
	}
	wordy := chart(5, 3)
	wordy.Cautions = []string{strings.Repeat("take great care ", 300)}
	named := scale(5)
	named.Strip.Left = strings.Repeat("specific gravity ", 5)
	for _, c := range []Card{wordy, named} {
		if e := refusal(t, c); !strings.Contains(e.Error(), "its words leave no room") {
			t.Errorf("said %q", e)
		}
	}
}

// A strip reads down its columns, every pair once and in order, and its stronger
// rules stand before the round figures.
func TestStripOrder(t *testing.T) {
	for _, n := range []int{1, 4, 12, 61, 85} {
		c := scale(n)
		var got []string
		doc := parse(t, htmlOf(t, c))
		for i, table := range all(doc, "table") {
			rows := all(all(table, "tbody")[0], "tr")
			for _, tr := range rows {
				got = append(got, said(all(tr, "th")[0])+"="+said(all(tr, "td")[0]))
			}
			if first := said(all(rows[0], "th")[0]); i > 0 && !strings.HasSuffix(first, "0") && !strings.HasSuffix(first, "5") {
				t.Errorf("%d pairs: column %d begins with %s", n, i+1, first)
			}
		}
		if len(got) != n {
			t.Fatalf("%d pairs shown, want %d", len(got), n)
		}
		for i, pair := range c.Strip.Rows {
			if want := pair[0] + "=" + strings.Replace(pair[1], "-", "−", 1); got[i] != want {
				t.Errorf("pair %d is %s, want %s", i+1, got[i], want)
			}
		}
	}
}

func TestFirstRound(t *testing.T) {
	for first, want := range map[int]int{10: 0, 11: 4, 14: 1, 15: 0, 996: 4} {
		var rows [][]string
		for i := range 9 {
			rows = append(rows, []string{strconv.Itoa(first + i)})
		}
		if got := firstRound(rows); got != want {
			t.Errorf("from %d: %d rows before the first round one, want %d", first, got, want)
		}
	}
	if got := firstRound([][]string{{"a"}, {}}); got != 0 {
		t.Errorf("of words: %d", got)
	}
}

// A blank sheet has the names of the columns as they are typed in a CSV file, and
// cells with nothing in them.
func TestSheet(t *testing.T) {
	c := rounds(12)
	doc := parse(t, htmlOf(t, c))
	var heads []string
	for _, th := range all(doc, "th") {
		heads = append(heads, said(th))
	}
	if strings.Join(heads, ",") != strings.Join(c.Sheet.Columns, ",") {
		t.Errorf("heads %q, want %q", heads, c.Sheet.Columns)
	}
	if n := len(all(doc, "td")); n != 12*6 {
		t.Errorf("%d cells, want 72", n)
	}
	if s, err := c.layOut(); err != nil || s.row < 8*72/25.4 {
		t.Errorf("rows of %v pt, error %v, want 8 mm for a pen", s.row, err)
	}
}

// The caller's table is not changed by the minus signs of the card.
func TestCardLeavesItsTable(t *testing.T) {
	table := &tables.Table{Columns: []tables.Column{{Head: "°C"}, {Head: "+"}}, Rows: [][]string{{"10", "-0.4"}, {"a-b", "-"}}}
	got := htmlOf(t, Card{Title: "t", Table: table, Made: made})
	if table.Rows[0][1] != "-0.4" || !strings.Contains(got, "<td>−0.4</td>") || !strings.Contains(got, ">a-b<") || !strings.Contains(got, "<td>-</td>") {
		t.Errorf("cell %q in %s", table.Rows[0][1], got)
	}
}

func TestLines(t *testing.T) {
	// Ten digits are 6 em at 10 pt: 60 pt, and a space between is 3.5 pt.
	word := "0123456789"
	for text, want := range map[string]int{"": 1, word: 1, word + " " + word: 1, word + " " + word + " " + word: 2, word + word + word: 2} {
		if got := lines(text, 10, 130); got != want {
			t.Errorf("%q takes %d lines, want %d", text, got, want)
		}
	}
}
