package outlook_test

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"gylebook/attenuation/curve"
	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
)

// The reader gives the newest first; more than 20 are not asked for, however many
// there are.
func TestHistoryTakesTheNewestTwenty(t *testing.T) {
	r := &reader{}
	for k := range 500 {
		r.records = append(r.records, closed(batch(fmt.Sprintf("A%03d", k+1), course(10, 45, 204)), 220))
	}
	h := history(t, r)
	if r.given != outlook.Most || len(h.Batches) != outlook.Most || len(h.Fitted) != outlook.Most {
		t.Errorf("%d read, %d used, wanted 20", r.given, len(h.Batches))
	}
	if h.Batches[0] != "A001" || h.Batches[19] != "A020" || !slices.IsSorted(h.Batches) {
		t.Errorf("history %v, wanted A001 to A020 in order", h.Batches)
	}
	if n := h.Prior().History(); n != outlook.Most {
		t.Errorf("prior of %d batches", n)
	}
}

func TestHistoryLeavesOutWhatTellsNothing(t *testing.T) {
	broken := batch("NOMASS", "12:1.044 20:sugar? "+course(10, 45, 204))
	noOG := batch("NOOG", course(10, 45, 204))
	noOG.OGs = nil
	r := &reader{records: []*journal.Record{
		closed(batch("GOOD", course(10, 45, 204)), 220),
		closed(batch("EMPTY", ""), 220),
		closed(batch("EARLY", course(10, 45, 48)), 60),
		closed(batch("FALLING", "24:1.040 48:1.030 72:1.020 96:1.014"), 100),
		closed(broken, 220),
		closed(noOG, 220),
	}}
	h := history(t, r)
	if !slices.Equal(h.Batches, []string{"GOOD"}) {
		t.Errorf("history %v, wanted GOOD alone", h.Batches)
	}
	why := map[string]string{}
	for _, l := range h.Left {
		why[l.Batch] = l.Why
	}
	for id, want := range map[string]string{
		"EMPTY": "fewer than 2 readings", "EARLY": "not read to its end", "FALLING": "not read to its end",
		"NOMASS": "sugar added without mass", "NOOG": "original gravity not known",
	} {
		if !strings.Contains(why[id], want) {
			t.Errorf("%s left out for %q, wanted %q", id, why[id], want)
		}
	}
	// The fitted course ends where the batch did.
	if fg := h.Fitted[0].FG(); math.Abs(fg-10) > 0.6 {
		t.Errorf("fitted end %v points, wanted 10", fg)
	}
}

// Beer unless told otherwise, or the batches end dry.
func TestHistoryChoosesItsStart(t *testing.T) {
	dry := &reader{records: []*journal.Record{closed(batch("C1", course(-2, 60, 240)), 300)}}
	ale := &reader{records: []*journal.Record{closed(batch("A1", course(10, 45, 204)), 220)}}
	for _, c := range []struct {
		r     *reader
		drink outlook.Drink
		want  curve.Kind
	}{
		{&reader{}, outlook.Drink{}, curve.Beer},
		{ale, outlook.Drink{}, curve.Beer},
		{dry, outlook.Drink{}, curve.Wine},
		{&reader{}, outlook.Drink{Kind: curve.Cider, Named: true}, curve.Cider},
		{dry, outlook.Drink{Kind: curve.Beer, Named: true}, curve.Beer},
	} {
		h, err := outlook.HistoryOf(t.Context(), c.r, journal.NewBook(nil), "P", "Y", after(1000), c.drink)
		if err != nil || h.Kind != c.want || h.Prior().Kind != c.want {
			t.Errorf("%d batches, %+v: start of %v, error %v; wanted %v", len(c.r.records), c.drink, h.Kind, err, c.want)
		}
	}
}

// After priming the bottle works on: the end is that before it.
func TestHistoryEndsAtPriming(t *testing.T) {
	rec := closed(batch("A1", course(10, 45, 204)+" 210:priming 230:1.012"), 240)
	h := history(t, &reader{records: []*journal.Record{rec}})
	if len(h.Fitted) != 1 || math.Abs(h.Fitted[0].FG()-10) > 0.6 {
		t.Errorf("history %+v, wanted one that ends at 10 points", h)
	}
}

func TestHistoryError(t *testing.T) {
	broken := errors.New("broken")
	r := &reader{records: []*journal.Record{closed(batch("A1", course(10, 45, 204)), 220)}, err: broken}
	if _, err := outlook.HistoryOf(t.Context(), r, journal.NewBook(nil), "P", "Y", after(1000), outlook.Drink{}); !errors.Is(err, broken) {
		t.Errorf("error %v, wanted that of the reader", err)
	}
}
