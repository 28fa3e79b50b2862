package journal

import (
	"cmp"
	"fmt"
	"math"
	"reflect"
	"slices"
	"testing"
	"time"

	"pgregory.net/rapid"

	"gylebook/attenuation"
	"gylebook/gravity"
)

// figure is what a reading gives, without its place among the entries.
type figure struct {
	at      time.Time
	text    string
	sg      gravity.SG
	extract gravity.Plato
	own     float64
	oe      gravity.Plato
	a       attenuation.Attenuation
	why     string
	mean    int
	suspect bool
}

func figures(v View) []figure {
	var list []figure
	for _, one := range v.Values {
		if one.Void {
			continue
		}
		f := figure{
			at: one.Source.TakenAt, text: one.Source.Gravity.Text + one.Source.Temp.Text, sg: one.SG, extract: one.Extract,
			own: one.Result.Corrected, oe: one.OE, why: one.Why, mean: one.Replicates, suspect: one.Suspect,
		}
		if one.Attenuation != nil {
			f.a = *one.Attenuation
		}
		list = append(list, f)
	}
	slices.SortFunc(list, func(a, b figure) int {
		if c := a.at.Compare(b.at); c != 0 {
			return c
		}
		return cmp.Or(cmp.Compare(a.text, b.text), cmp.Compare(fmt.Sprint(a.suspect), fmt.Sprint(b.suspect)))
	})
	return list
}

// season draws the readings of a batch with an addition; some fall into one minute.
func season(t *rapid.T) *builder {
	b := brew("B1", "T1", "1.050", "100").event(30, Event{What: Sugar, MassKg: "2"})
	for range rapid.IntRange(1, 12).Draw(t, "n") {
		r := b.reading(float64(rapid.IntRange(0, 20).Draw(t, "h"))*6, fmt.Sprintf("1.0%03d", rapid.IntRange(50, 500).Draw(t, "sg")), fmt.Sprint(rapid.IntRange(4, 35).Draw(t, "c")))
		if rapid.IntRange(0, 9).Draw(t, "keep") == 0 {
			r.Keep = "doubt"
		}
		b.add(r)
	}
	return b
}

func TestOrderOfEntryDoesNotMatter(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b := season(t)
		want := figures(Derive(b.rec, nil))
		other := *b.rec
		other.Readings = rapid.Permutation(b.rec.Readings).Draw(t, "order")
		for k := range other.Readings {
			other.Readings[k].Number = int64(100 + k)
		}
		if got := figures(Derive(&other, nil)); !reflect.DeepEqual(got, want) {
			t.Fatalf("got  %+v\nwant %+v", got, want)
		}
	})
}

func TestVoidedAndEnteredAnewIsTheSame(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b := season(t)
		want := figures(Derive(b.rec, nil))
		other := *b.rec
		other.Readings = slices.Clone(b.rec.Readings)
		k := rapid.IntRange(0, len(other.Readings)-1).Draw(t, "which")
		again := other.Readings[k]
		again.Number = 1000
		other.Readings[k].Void = true
		other.Readings = append(other.Readings, again)
		v := Derive(&other, nil)
		if got := figures(v); !reflect.DeepEqual(got, want) {
			t.Fatalf("got  %+v\nwant %+v", got, want)
		}
		if len(v.Values) != len(want)+1 {
			t.Fatal("the void reading is gone")
		}
	})
}

// The figures are those of attenuation.Attenuate on the same gravities, and the
// narrowed view ends in the same values as the whole one.
func TestAttenuationAgrees(t *testing.T) {
	fit := gravity.Fits.Default()
	rapid.Check(t, func(t *rapid.T) {
		b := season(t)
		v := Derive(b.rec, nil)
		for _, one := range v.Values {
			if one.Attenuation == nil {
				t.Fatalf("%q", one.Why)
			}
			g, err := attenuation.NewGravities(one.OG, one.SG, fit)
			if err != nil {
				t.Fatal(err)
			}
			// After an addition the extract is what the balance gave and the SG
			// follows from it; before it, it is the other way round.
			if math.Abs(float64(g.OE-one.OE)) > 1e-9 {
				t.Fatalf("OE %v, of its SG %v", one.OE, g.OE)
			}
			g.OE = one.OE
			if a, err := attenuation.Attenuate(g); err != nil || a != *one.Attenuation {
				t.Fatalf("got %+v\nwant %+v (%v)", *one.Attenuation, a, err)
			}
		}
		n := rapid.IntRange(1, 4).Draw(t, "last")
		last := DeriveLast(b.rec, nil, n)
		tail := v.Values[len(v.Values)-len(last.Values):]
		if !reflect.DeepEqual(last.Values, tail) || len(last.Counting()) != min(n, len(v.Counting())) {
			t.Fatalf("the newest %d are %d values", n, len(last.Values))
		}
		f1, ok1 := v.Fall24h()
		if f2, ok2 := DeriveLast(b.rec, nil, 2).Fall24h(); f1 != f2 || ok1 != ok2 {
			t.Fatalf("fall %v %v and %v %v", f1, ok1, f2, ok2)
		}
	})
}

// Anything that a journal could hold, and what it could not.
var (
	anyTyped = rapid.Custom(func(t *rapid.T) Typed {
		text := rapid.SampledFrom([]string{"1.048", "1.0105", "12.1P", "48", "12", "0.95sg", "1.45sg", "1450kg/m3", "85P", "-10P", "1250g/L", "0g/L", "450pt", "nonsense", "", "1e9", "NaN"}).Draw(t, "text")
		return Typed{text, rapid.SampledFrom([]string{"sg", "sg", "plato", "brix", "points", "oechsle", "kmw", "baume", "twaddell", "density", "gpl", "", "x"}).Draw(t, "scale")}
	})
	anyTemp = rapid.Custom(func(t *rapid.T) TypedTemp {
		return TypedTemp{rapid.SampledFrom([]string{"20", "0", "60C", "45C", "68F", "140F", "", "x"}).Draw(t, "temp"), rapid.SampledFrom([]string{"C", "F", ""}).Draw(t, "unit")}
	})
	anyNumber = rapid.SampledFrom([]string{"", "", "1", "0.000001", "100", "10000000", "-5", "x", "0", "9999999999999999999999999999999999999999"})
	anyTime   = rapid.Custom(func(t *rapid.T) time.Time {
		switch rapid.IntRange(0, 20).Draw(t, "kind") {
		case 0:
			return time.Time{}
		case 1:
			return time.Date(9999, 12, 31, 23, 59, 0, 0, time.UTC)
		}
		return after(float64(rapid.IntRange(-400, 400).Draw(t, "h")) / 4)
	})
	anyID    = rapid.SampledFrom([]string{"", "H1", "H2", "R1", "X9"})
	anyEvent = rapid.Custom(func(t *rapid.T) Event {
		return Event{
			Batch: "B1", At: anyTime.Draw(t, "at"), What: rapid.SampledFrom(append([]string{"", "x"}, EventKinds...)).Draw(t, "what"), MassKg: anyNumber.Draw(t, "kg"), VolumeL: anyNumber.Draw(t, "l"),
			Gravity: anyTyped.Draw(t, "gravity"), From: "B7", Vessel: "T2",
		}
	})
	anyReading = rapid.Custom(func(t *rapid.T) Reading {
		return Reading{
			Batch: "B1", TakenAt: anyTime.Draw(t, "at"), Quality: Exact, Gravity: anyTyped.Draw(t, "gravity"), Temp: anyTemp.Draw(t, "temp"),
			Instrument: anyID.Draw(t, "by"), Gassy: rapid.Bool().Draw(t, "gassy"), Keep: rapid.SampledFrom([]string{"", "", "x"}).Draw(t, "keep"),
		}
	})
	anyOG = rapid.Custom(func(t *rapid.T) OG {
		return OG{At: anyTime.Draw(t, "at"), Gravity: anyTyped.Draw(t, "gravity"), Temp: anyTemp.Draw(t, "temp"), Instrument: anyID.Draw(t, "by")}
	})
	anyLimit = rapid.Custom(func(t *rapid.T) Limit {
		return Limit{At: anyTime.Draw(t, "at"), Gravity: anyTyped.Draw(t, "gravity")}
	})
	anyInstrument = rapid.Custom(func(t *rapid.T) *InstrumentRecord {
		rec := glass("H2")
		i := &rec.Instrument
		i.Scale = rapid.SampledFrom([]string{"sg", "plato", "baume", "density", "gpl", ""}).Draw(t, "scale")
		i.Basis = rapid.SampledFrom([]string{"20/20", "15/4", "60/60F", ""}).Draw(t, "basis")
		i.Division, i.MaxError = anyNumber.Draw(t, "division"), anyNumber.Draw(t, "error")
		i.RangeLo, i.RangeHi = anyNumber.Draw(t, "lo"), anyNumber.Draw(t, "hi")
		i.StemMM, i.MassG, i.Tension = anyNumber.Draw(t, "stem"), anyNumber.Draw(t, "mass"), anyNumber.Draw(t, "tension")
		rec.Checks = numbered(t, rapid.Custom(func(t *rapid.T) Check {
			return Check{At: anyTime.Draw(t, "at"), Liquid: rapid.SampledFrom([]string{InWater, InDrink}).Draw(t, "in"), Found: anyTyped.Draw(t, "found"), Expected: anyTyped.Draw(t, "expected"), Correction: anyNumber.Draw(t, "correction")}
		}), 2)
		rec.Certificates = numbered(t, rapid.Custom(func(t *rapid.T) Certificate {
			point := rapid.Custom(func(t *rapid.T) CertificatePoint {
				return CertificatePoint{anyNumber.Draw(t, "r"), anyNumber.Draw(t, "c"), anyNumber.Draw(t, "u")}
			})
			return Certificate{At: anyTime.Draw(t, "at"), Points: rapid.SliceOfN(point, 0, 3).Draw(t, "points")}
		}), 2)
		return rec
	})
)

func numbered[B any](t *rapid.T, g *rapid.Generator[B], most int) []Numbered[B] {
	return rapid.SliceOfN(rapid.Custom(func(t *rapid.T) Numbered[B] {
		return Numbered[B]{Number: rapid.Int64Range(0, 50).Draw(t, "number"), Void: rapid.IntRange(0, 4).Draw(t, "void") == 0, Body: g.Draw(t, "body")}
	}), 0, most).Draw(t, "list")
}

func anyRecord(t *rapid.T, id string) *Record {
	rec := &Record{
		Batch: Batch{ID: id, Volume: anyNumber.Draw(t, "volume")}, OGs: numbered(t, anyOG, 3), Limits: numbered(t, anyLimit, 2),
		Readings: numbered(t, anyReading, 8), Events: numbered(t, anyEvent, 5),
	}
	if rapid.Bool().Draw(t, "pitched") {
		p := anyTime.Draw(t, "pitched at")
		rec.Batch.Pitched = &p
	}
	return rec
}

// checkFinite walks x and reports every float that is no number. An error may name
// the value that it refuses, whatever that is.
func checkFinite(t *rapid.T, path string, x reflect.Value) {
	switch x.Kind() {
	case reflect.Float64:
		if math.IsNaN(x.Float()) || math.IsInf(x.Float(), 0) {
			t.Fatalf("%s is %v", path, x.Float())
		}
	case reflect.Pointer:
		if !x.IsNil() {
			checkFinite(t, path, x.Elem())
		}
	case reflect.Slice:
		for k := range x.Len() {
			checkFinite(t, fmt.Sprintf("%s[%d]", path, k), x.Index(k))
		}
	case reflect.Struct:
		for k := range x.NumField() {
			if x.Type().Field(k).IsExported() {
				checkFinite(t, path+"."+x.Type().Field(k).Name, x.Field(k))
			}
		}
	}
}

func TestNoPanicAndNoNaN(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		rec := anyRecord(t, "B1")
		book := NewBook([]*InstrumentRecord{glass("H1"), anyInstrument.Draw(t, "H2"), {Instrument: Instrument{ID: "R1", Type: Refractometer, Scale: "brix"}}})
		book.OE = func(string) (gravity.Plato, bool) {
			return gravity.Plato(rapid.SampledFrom([]float64{9, -50, 500, math.NaN()}).Draw(t, "oe")), true
		}
		book.ABV = rapid.SampledFrom(attenuation.ABVMethods).Draw(t, "abv")
		v := Derive(rec, book)
		checkFinite(t, "view", reflect.ValueOf(v))
		for _, one := range v.Values {
			if (one.Attenuation == nil) != (one.Why != "") || (one.Alcohol == nil) != (one.AlcoholWhy != "") || one.Err != nil && one.Attenuation != nil {
				t.Fatalf("%+v %q, %+v %q, %v", one.Attenuation, one.Why, one.Alcohol, one.AlcoholWhy, one.Err)
			}
		}
		fall, _ := v.Fall24h()
		strength, _ := v.ExpectedABV()
		sg, sd, _ := Expected(v, anyTime.Draw(t, "expected at"))
		if !finite(fall, float64(strength), sg, sd) {
			t.Fatalf("fall %v, strength %v, expected %v ± %v", fall, strength, sg, sd)
		}
		s := Situation{Now: anyTime.Draw(t, "now"), Target: rec, Book: book, Others: []*Record{anyRecord(t, "B2"), nil, rec}}
		r := anyReading.Draw(t, "r")
		notes, hold := Judge(s, r)
		if hold != nil && (hold.Code == "" || hold.Text == "" || len(notes) > 0) {
			t.Fatalf("%v, %+v", notes, hold)
		}
		if hold != nil && r.Keep != "" && !hold.Final && hold.Code != HoldDuplicate {
			t.Fatalf("kept, and held: %+v", hold)
		}
	})
}
