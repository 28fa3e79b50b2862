package outlook_test

import (
	"errors"
	"math"
	"testing"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
)

// Four batches of OG 1.048 that fall evenly: by hand, half-way to 24 h the first
// stands at 1.048 - 0.004 = 1.044, the last at 1.048 - 0.010 = 1.038.
func TestEnvelopeByHand(t *testing.T) {
	r := &reader{}
	for _, words := range []string{"24:1.040 48:1.030", "24:1.036 48:1.026", "24:1.032 48:1.020", "24:1.028"} {
		r.records = append(r.records, closed(batch("A", words), 220))
	}
	e, err := outlook.EnvelopeOf(t.Context(), r, journal.NewBook(nil), "Lane Bitter", "house ale", after(1000), 10, []float64{0, 12, 24, 36, 60})
	if err != nil {
		t.Fatal(err)
	}
	want := []struct{ h, lo, hi float64 }{{0, 1.048, 1.048}, {12, 1.038, 1.044}, {24, 1.028, 1.040}, {36, 1.026, 1.035}}
	if len(e.Hours) != len(want) || len(e.Batches) != 4 {
		t.Fatalf("%v of %v, wanted four hours of four batches: no batch was read at 60 h", e.Hours, e.Batches)
	}
	for k, w := range want {
		if e.Hours[k] != w.h || math.Abs(e.Low[k]-w.lo) > 5e-5 || math.Abs(e.High[k]-w.hi) > 5e-5 {
			t.Errorf("hour %g: %.4f to %.4f, wanted %.4f to %.4f", e.Hours[k], e.Low[k], e.High[k], w.lo, w.hi)
		}
	}
}

func TestEnvelopeNeedsThree(t *testing.T) {
	two := &reader{records: []*journal.Record{closed(batch("A", "24:1.040"), 99), closed(batch("B", "24:1.030"), 99)}}
	e, err := outlook.EnvelopeOf(t.Context(), two, journal.NewBook(nil), "", "", after(1000), 10, []float64{12})
	if err != nil || len(e.Hours) != 0 {
		t.Errorf("two batches: hours %v, error %v, wanted none and none", e.Hours, err)
	}
	// No more batches are asked for than are wanted.
	many := &reader{}
	for range 20 {
		many.records = append(many.records, closed(batch("A", "24:1.040 48:1.020"), 99))
	}
	if e, err = outlook.EnvelopeOf(t.Context(), many, journal.NewBook(nil), "", "", after(1000), 5, []float64{12}); err != nil || len(e.Batches) != 5 || many.given != 5 {
		t.Errorf("%d batches of %d given, error %v, wanted 5 of 5", len(e.Batches), many.given, err)
	}
	broken := &reader{err: errors.New("gone")}
	if _, err := outlook.EnvelopeOf(t.Context(), broken, journal.NewBook(nil), "", "", after(1000), 5, nil); err == nil {
		t.Error("an error of the reader was lost")
	}
}

// The curve lies between the readings that it was laid through, before the last one
// too; without three readings there is none.
func TestShown(t *testing.T) {
	f := forecast(t, "24:1.040 48:1.026 72:1.016 96:1.012", ales(t), 100)
	was := 2.0
	for h := 24.0; h <= 300; h += 12 {
		i, ok := f.Shown(h)
		if !ok || !(i.Lo <= i.Median && i.Median <= i.Hi) {
			t.Fatalf("hour %g: %+v, %v", h, i, ok)
		}
		if i.Median > was+0.0005 {
			t.Errorf("hour %g: %.4f, above %.4f before it", h, i.Median, was)
		}
		was = i.Median
	}
	if i, _ := f.Shown(48); math.Abs(i.Median-1.026) > 0.002 {
		t.Errorf("hour 48: %.4f, wanted the reading of 1.026 within 2 points", i.Median)
	}
	if _, ok := forecast(t, "24:1.040 48:1.026", ales(t), 60).Shown(48); ok {
		t.Error("two readings have no curve")
	}
}

// The bar of a reading in SG is its expanded uncertainty in points; one in °P is
// about 4 points a °P there (1.048 is 11.91 °P, 1.052 is 12.85 °P: 4.25).
func TestExpandedPoints(t *testing.T) {
	v := view("24:1.040")
	one := &v.Values[0]
	if got, want := outlook.ExpandedPoints(one), 1000*one.Result.Budget.Expanded; math.Abs(got-want) > 1e-9 || got <= 0 {
		t.Errorf("%v points, wanted %v", got, want)
	}
	rec := batch("B1", "24:1.040")
	rec.Readings[0].Body.Gravity = journal.Typed{Text: "12.4", Scale: "plato"}
	v = journal.Derive(rec, nil)
	one = &v.Values[0]
	if got, want := outlook.ExpandedPoints(one), 4.25*one.Result.Budget.Expanded; math.Abs(got/want-1) > 0.03 {
		t.Errorf("%v points of %v °P, wanted about %v", got, one.Result.Budget.Expanded, want)
	}
}
