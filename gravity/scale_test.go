package gravity_test

import (
	"errors"
	"math"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity"
	"gylebook/gravity/method"
)

func TestScalePoints(t *testing.T) {
	seen := 0
	for _, r := range rows(t, "scale_points") {
		x := number(t, r, "input")
		switch r.Text("name") {
		case "kmw_to_oechsle":
			agree(t, r, "kmw", "value", 1, gravity.OechsleOfKMW(x))
		case "long_lb_per_barrel_to_balling":
			agree(t, r, "long", "value", 1, float64(gravity.LongBalling(x)))
		case "balling_to_long_lb_per_barrel":
			agree(t, r, "long", "value", 1, gravity.LongPounds(gravity.Plato(x)))
		default:
			continue
		}
		seen++
	}
	if seen != 3 {
		t.Errorf("%d scale rows, wanted 3", seen)
	}
}

func TestScaleRelationsInvert(t *testing.T) {
	for _, e := range gravity.ScaleRelations {
		t.Run(e.ID, func(t *testing.T) {
			rapid.Check(t, func(t *rapid.T) {
				s := rapid.Float64Range(float64(gravity.MinSG), float64(gravity.MaxSG)).Draw(t, "s")
				v := e.Fn.Of(s)
				if got := e.Fn.SG(v); math.Abs(got-s) > 1e-12 {
					t.Fatalf("%v is %v and comes back as %v", s, v, got)
				}
				if !(e.Fn.Of(s+1e-6) > v) {
					t.Fatalf("does not rise at %v", s)
				}
			})
		})
	}
}

// By hand: 145 - 145/1.090 = 11.972; 144.3 - 144.3/1.090 = 11.915; 200 · 0.090 = 18;
// 1000 · 0.090 = 90.
func TestScalesByHand(t *testing.T) {
	for id, want := range map[string]float64{"baume-145": 11.972, "baume-144.3": 11.915, "twaddell": 18, "oechsle": 90, "points": 90} {
		e, err := gravity.ScaleRelations.Find(id)
		if err != nil {
			t.Fatal(err)
		}
		near(t, id, e.Fn.Of(1.090), want, 0.0005)
	}
	e, err := gravity.ScaleRelations.Find("baume-144.3")
	if err != nil || e.Fn.Pair != gravity.Pair154 {
		t.Errorf("the rational Baumé stands on %v, wanted 15/4 (%v)", e.Fn.Pair, err)
	}
}

func TestRelativeScale(t *testing.T) {
	for _, s := range gravity.Scales() {
		fn, ok := gravity.RelativeScale(s.Scale, 0)
		formula := !s.Scale.IsMass() && s.Scale != gravity.ScaleDensity && s.Scale != gravity.ScaleGPL
		if ok != formula {
			t.Errorf("%s: formula of a relative density is %t", s.ID, ok)
		}
		if ok {
			near(t, s.ID+" there and back", fn.SG(fn.Of(1.05)), 1.05, 1e-12)
		}
	}
	if _, ok := gravity.RelativeScale(gravity.Scale(-1), 0); ok {
		t.Error("an unknown scale has a formula")
	}
	fn, ok := gravity.RelativeScale(gravity.ScaleBaume, gravity.Modulus1443)
	if !ok || fn.Pair != gravity.Pair154 {
		t.Errorf("modulus 144.3 stands on %v", fn.Pair)
	}
}

func TestFindScale(t *testing.T) {
	for _, s := range gravity.Scales() {
		got, err := gravity.FindScale(s.ID)
		if err != nil || got != s.Scale || got.String() != s.ID {
			t.Errorf("%s: got %v, %v", s.ID, got, err)
		}
		if s.Scale.Info() != s {
			t.Errorf("%s: Info gives %+v", s.ID, s.Scale.Info())
		}
	}
	_, err := gravity.FindScale("hectoplato")
	var unknown *method.UnknownError
	if !errors.As(err, &unknown) || unknown.What != "scale" || len(unknown.Known) != len(gravity.Scales()) {
		t.Errorf("got %v, wanted an error that lists the scales", err)
	}
	for _, s := range []gravity.Scale{-1, gravity.Scale(len(gravity.Scales()))} {
		if s.String() != "unknown" {
			t.Errorf("scale %d is called %q", int(s), s.String())
		}
	}
}

// A caller that changes what Scales returned changes nothing here.
func TestScalesIsACopy(t *testing.T) {
	gravity.Scales()[0].ID = "changed"
	if gravity.ScaleSG.String() != "sg" {
		t.Error("the list of scales was changed from outside")
	}
}

func TestTemperatureAndPoints(t *testing.T) {
	near(t, "60 °F", float64(gravity.FromFahrenheit(60)), 15.5556, 5e-5) // (60 - 32) · 5/9
	near(t, "68 °F", float64(gravity.FromFahrenheit(68)), 20, 1e-12)
	near(t, "20 °C", gravity.Celsius(20).Fahrenheit(), 68, 1e-12)
	near(t, "1.048", float64(gravity.SG(1.048).Points()), 48, 1e-9)
	near(t, "48 points", float64(gravity.Points(48).SG()), 1.048, 1e-12)
}
