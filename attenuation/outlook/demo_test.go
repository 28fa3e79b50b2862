package outlook_test

import (
	"context"
	"errors"
	"path/filepath"
	"slices"
	"testing"
	"time"

	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/demo"
	"gylebook/attenuation/journal/sqlstore"
	"gylebook/attenuation/outlook"
)

// season is the invented season with all its batches derived.
type season struct {
	store journal.Store
	book  *journal.Book
	views []journal.View
	sum   demo.Summary
}

func written(t *testing.T) season {
	t.Helper()
	s, err := sqlstore.Create(context.Background(), filepath.Join(t.TempDir(), "demo.db"))
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { _ = s.Close() })
	sum, err := demo.Write(context.Background(), s)
	if err != nil {
		t.Fatal(err)
	}
	list, err := s.Instruments(t.Context())
	if err != nil {
		t.Fatal(err)
	}
	out := season{store: s, book: journal.NewBook(list), sum: sum}
	for rec, err := range s.Batches(t.Context(), journal.Filter{}) {
		if err != nil {
			t.Fatal(err)
		}
		out.views = append(out.views, journal.Derive(rec, out.book))
	}
	return out
}

// at weighs a batch so many days after pitching, with the history of that moment.
func (s season) at(t *testing.T, v journal.View, days float64) (outlook.Evidence, error) {
	t.Helper()
	now := v.Pitched.Add(time.Duration(days * 24 * float64(time.Hour)))
	b := v.Record.Batch
	h, err := outlook.HistoryOf(t.Context(), s.store, s.book, b.Product, b.Yeast, now, outlook.Drink{})
	if err != nil {
		t.Fatal(err)
	}
	if slices.Contains(h.Batches, b.ID) {
		t.Fatalf("%s is in its own history", b.ID)
	}
	return outlook.EvidenceOf(v, h, now, false)
}

func (s season) view(t *testing.T, id string) journal.View {
	t.Helper()
	for _, v := range s.views {
		if v.Record.Batch.ID == id {
			return v
		}
	}
	t.Fatalf("no batch %s", id)
	return journal.View{}
}

// Forecasts from the middle of the fall hold the gravity that the batch was read at
// last, as often as a 90 % interval should. Left out are those with no history, the
// stuck one, and those to which something was still added.
func TestDemoForecastsHold(t *testing.T) {
	s := written(t)
	held, all := 0, 0
	for _, v := range s.views {
		b := v.Record.Batch
		days := 3.5
		if b.Yeast != "house ale" {
			days = 8.5
		}
		if len(v.Basis) > 0 || v.Record.Closed == nil || slices.Contains(s.sum.Stuck, b.ID) {
			continue
		}
		e, err := s.at(t, v, days)
		if err != nil {
			t.Fatalf("%s: %v", b.ID, err)
		}
		if e.Forecast.Curve.History == 0 {
			continue
		}
		fg, _ := e.Forecast.FG()
		all++
		if contains(fg, float64(v.Last().SG)) {
			held++
		} else {
			t.Logf("%s: last read at %.4f, forecast %.4f to %.4f", b.ID, float64(v.Last().SG), fg.Lo, fg.Hi)
		}
		if e.Weighed.State == curve.Terminal {
			t.Errorf("%s is terminal %v days after pitching", b.ID, days)
		}
	}
	// 20 of 22 and more: fewer than 17 of 22 held has a chance of 2 % at 90 %.
	if all < 15 || float64(held) < 0.77*float64(all) {
		t.Errorf("%d of %d forecasts held", held, all)
	}
}

// LB-17 is open on the last day; the season means such bitters to end at 1.0090.
func TestDemoOpenBatch(t *testing.T) {
	s := written(t)
	v := s.view(t, "LB-17")
	if v.Record.Closed != nil {
		t.Fatal("LB-17 is closed")
	}
	e, err := s.at(t, v, s.sum.Until.Sub(v.Pitched).Hours()/24)
	if err != nil {
		t.Fatal(err)
	}
	if fg, ok := e.Forecast.FG(); !ok || !contains(fg, 1.0090) || fg.Hi-fg.Lo > 0.012 {
		t.Errorf("final gravity %+v, wanted 1.0090 in it", fg)
	}
}

// The stuck batch falls as the others at first and is stalled when it has stood for
// two days; the others of its product end.
func TestDemoStuckBatchIsStalled(t *testing.T) {
	s := written(t)
	if len(s.sum.Stuck) == 0 {
		t.Fatal("no stuck batch in the season")
	}
	for _, id := range s.sum.Stuck {
		for days, want := range map[float64]curve.State{3.5: curve.Moving, 8.5: curve.Stalled, 12.5: curve.Stalled} {
			e, err := s.at(t, s.view(t, id), days)
			if err != nil || e.Weighed.State != want {
				t.Errorf("%s after %v days: %s, error %v; wanted %s", id, days, e.Weighed.State, err, want)
			}
		}
	}
	for _, id := range []string{"LB-02", "LB-07", "LB-08", "NP-02", "OD-02", "HC-04"} {
		v := s.view(t, id)
		e, err := s.at(t, v, v.Record.Closed.Body.At.Sub(v.Pitched).Hours()/24)
		if err != nil || e.Weighed.State != curve.Terminal {
			t.Errorf("%s at its close: %s, error %v", id, e.Weighed.State, err)
		}
	}
}

// LB-06 was dry-hopped on day 5 and cooled on day 9: its readings stand still only
// after the hops, and the cold ones add nothing.
func TestDemoWatchPeriodAndCrash(t *testing.T) {
	s := written(t)
	v := s.view(t, "LB-06")
	for _, days := range []float64{5.5, 6.9, 12.5} {
		e, err := s.at(t, v, days)
		if err != nil {
			t.Fatal(err)
		}
		if e.Weighed.State == curve.Terminal || factOf(t, e, "watch").Met {
			t.Errorf("day %v: %s, watch %+v", days, e.Weighed.State, factOf(t, e, "watch"))
		}
		if f := factOf(t, e, "warm"); f.Met != (days < 12) {
			t.Errorf("day %v: %+v", days, f)
		}
	}
}

// NP-03 got sugar that nobody weighed.
func TestDemoBrokenBasisIsRefused(t *testing.T) {
	s := written(t)
	_, err := s.at(t, s.view(t, "NP-03"), 8)
	if !errors.Is(err, outlook.ErrBasis) || err.Error() != "no forecast for NP-03: sugar added without mass" {
		t.Errorf("error %v", err)
	}
	if _, err := s.at(t, s.view(t, "NP-03"), 2); err != nil {
		t.Errorf("before the sugar: %v", err)
	}
}
