package journal

import (
	"errors"
	"math"
	"testing"
	"time"

	"gylebook/gravity/method"
)

var day0 = time.Date(2026, 10, 1, 12, 0, 0, 0, time.UTC)

// after is a time so many hours after day0.
func after(hours float64) time.Time { return day0.Add(time.Duration(hours * float64(time.Hour))) }

func sg(text string) Typed { return Typed{Text: text, Scale: "sg"} }

func celsius(text string) TypedTemp { return TypedTemp{Text: text, Unit: "C"} }

// builder numbers the entries of one batch.
type builder struct {
	rec  *Record
	next int64
}

func brew(id, vessel, og, litres string) *builder {
	b := &builder{rec: &Record{Batch: Batch{ID: id, Vessel: vessel, Product: "Mild", Volume: litres, Opened: day0}}, next: 1}
	if og != "" {
		b.rec.OGs = append(b.rec.OGs, Numbered[OG]{Number: b.number(), Body: OG{Batch: id, At: day0, Gravity: sg(og)}})
	}
	return b
}

func (b *builder) number() int64 { b.next++; return b.next }

func (b *builder) reading(hours float64, text, temp string) Reading {
	return Reading{
		Batch: b.rec.Batch.ID, Vessel: b.rec.Batch.Vessel, TakenAt: after(hours), Quality: Exact,
		Gravity: sg(text), Temp: celsius(temp),
	}
}

func (b *builder) read(hours float64, text, temp string) *builder {
	return b.add(b.reading(hours, text, temp))
}

func (b *builder) add(r Reading) *builder {
	b.rec.Readings = append(b.rec.Readings, Numbered[Reading]{Number: b.number(), Body: r})
	return b
}

func (b *builder) event(hours float64, e Event) *builder {
	e.Batch, e.At = b.rec.Batch.ID, after(hours)
	b.rec.Events = append(b.rec.Events, Numbered[Event]{Number: b.number(), Body: e})
	return b
}

func glass(id string) *InstrumentRecord {
	return &InstrumentRecord{Instrument: Instrument{
		ID: id, Type: Hydrometer, Scale: "sg", Basis: "20/20", Division: "0.001",
		RangeLo: "0.990", RangeHi: "1.060", Body: "glass", ReadAt: "bottom", Since: day0.AddDate(0, -1, 0),
	}}
}

func near(t *testing.T, what string, got, want, tolerance float64) {
	t.Helper()
	if !(math.Abs(got-want) <= tolerance) {
		t.Errorf("%s: got %v, want %v ± %g", what, got, want, tolerance)
	}
}

func hasNote(list []method.Note, code string) bool {
	for _, n := range list {
		if n.Code == code {
			return true
		}
	}
	return false
}

func hint(t *testing.T, err error) string {
	t.Helper()
	var h interface{ Hint() string }
	if !errors.As(err, &h) {
		t.Fatalf("%v has no hint", err)
	}
	return h.Hint()
}
