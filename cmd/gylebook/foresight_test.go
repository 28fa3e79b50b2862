package main

import (
	"context"
	"io"
	"iter"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/demo"
	"gylebook/attenuation/journal/sqlstore"
)

// counting counts the batches that a reader hands on.
type counting struct {
	journal.Reader
	calls, records int
}

func (c *counting) counted(list iter.Seq2[*journal.Record, error]) iter.Seq2[*journal.Record, error] {
	c.calls++
	return func(yield func(*journal.Record, error) bool) {
		for rec, err := range list {
			c.records++
			if !yield(rec, err) {
				return
			}
		}
	}
}

func (c *counting) Finished(ctx context.Context, product, yeast string, before time.Time) iter.Seq2[*journal.Record, error] {
	return c.counted(c.Reader.Finished(ctx, product, yeast, before))
}

func (c *counting) Batches(ctx context.Context, f journal.Filter) iter.Seq2[*journal.Record, error] {
	return c.counted(c.Reader.Batches(ctx, f))
}

func (c *counting) Batch(ctx context.Context, id string) (*journal.Record, error) {
	c.calls++
	c.records++
	return c.Reader.Batch(ctx, id)
}

func (c *counting) Open(ctx context.Context) ([]*journal.Record, error) {
	open, err := c.Reader.Open(ctx)
	c.calls++
	c.records += len(open)
	return open, err
}

func bulk(t testing.TB, batches, readings int) journal.Store {
	t.Helper()
	s, err := sqlstore.Create(context.Background(), filepath.Join(t.TempDir(), "bulk.db"))
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { _ = s.Close() })
	if err := demo.Bulk(context.Background(), s, batches, readings); err != nil {
		t.Fatal(err)
	}
	return s
}

// dayOfBulk is when the last batches of the bulk journal ferment.
var dayOfBulk = time.Date(2026, 12, 8, 8, 0, 0, 0, time.UTC)

// However many batches are closed, today reads those that are open and, of each of
// the five products, the last twenty.
func TestTodayDoesNotGrowWithClosedBatches(t *testing.T) {
	for _, batches := range []int{400, 1200} {
		c := &counting{Reader: bulk(t, batches, 6)}
		list, err := standings(t.Context(), c, dayOfBulk, false)
		if err != nil {
			t.Fatal(err)
		}
		if len(list) != 200 || c.calls != 6 || c.records != 200+5*20 {
			t.Errorf("%d batches: %d open, %d batches read by %d calls; wanted 200, 300, 6", batches, len(list), c.records, c.calls)
		}
		foreseen := 0
		for _, s := range list {
			if s.state != "" {
				foreseen++
			}
		}
		if foreseen < 150 {
			t.Errorf("%d batches: %d of 200 open ones have a word of the forecast", batches, foreseen)
		}
	}
}

// 200 open batches of 40 readings, wanted within 1.5 s on an idle machine.
func BenchmarkToday200Open(b *testing.B) {
	s := bulk(b, 1000, 40)
	for b.Loop() {
		if list, err := standings(b.Context(), s, dayOfBulk, false); err != nil || len(list) != 200 {
			b.Fatal(len(list), err)
		}
	}
}

// The words of the demo cellar on two days, those of terminal and today alike.
func TestTodayAndTerminalAgree(t *testing.T) {
	demoJournal(t)
	for _, at := range []string{"2026-11-27T12:00:00Z", "2026-11-05T12:00:00Z"} {
		rows := printed(t, "today", "--at", at)
		if len(rows) < 5 {
			t.Fatalf("%d open batches on %s", len(rows), at)
		}
		compared := 0
		for _, row := range rows {
			id, _ := row["batch"].(string)
			word, foreseen := row["forecast_word"].(string)
			if !foreseen {
				continue
			}
			compared++
			one := printed(t, "terminal", id, "--at", at)[0]
			if one["word"] != word {
				t.Errorf("%s on %s: terminal says %v, today %v", id, at, one["word"], word)
			}
			next := printed(t, "forecast", id, "--at", at)[0]["next_sg_20_20"]
			if next != row["next_sg_20_20"] {
				t.Errorf("%s on %s: forecast expects %v, today %v", id, at, next, row["next_sg_20_20"])
			}
		}
		if compared < 4 {
			t.Errorf("%d words compared on %s", compared, at)
		}
	}
}

// Every batch of the demo cellar has a forecast or a reason, at any width, without
// NaN, and twice the same.
func TestForecastsOfTheDemoCellar(t *testing.T) {
	demoJournal(t)
	refused := 0
	for _, row := range printed(t, "season") {
		id, _ := row["batch_id"].(string)
		for _, line := range [][]string{{"forecast", id}, {"terminal", id}, {"terminal", id, "--json"}} {
			var first, again strings.Builder
			code := run(context.Background(), line, strings.NewReader(""), &first, io.Discard)
			if line[0] == "forecast" {
				if code == exitData {
					refused++
				}
				run(context.Background(), line, strings.NewReader(""), &again, io.Discard)
				if again.String() != first.String() {
					t.Errorf("%v twice:\n%s\n%s", line, first.String(), again.String())
				}
			}
			if code != exitOK && !(code == exitData && id == "NP-03") {
				t.Errorf("%v: exit code %d", line, code)
			}
			if text := first.String(); strings.Contains(text, "NaN") || strings.Contains(text, "Inf") {
				t.Errorf("%v:\n%s", line, text)
			}
			for text := range strings.Lines(first.String()) {
				if n := len([]rune(strings.TrimRight(text, "\n"))); n > 80 && line[len(line)-1] != "--json" {
					t.Errorf("%v: %d wide: %s", line, n, text)
				}
			}
		}
	}
	if refused != 1 {
		t.Errorf("%d batches refused, wanted NP-03 alone", refused)
	}
}
