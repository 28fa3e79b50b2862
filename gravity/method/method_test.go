package method_test

import (
	"errors"
	"math"
	"strings"
	"testing"

	"gylebook/gravity/method"
)

var set = method.Set[int]{
	{Info: method.Info{ID: "first", Kind: "fit", Valid: []method.Range{{Of: "SG", Lo: 1, Hi: 1.083, Unit: "20/20"}}, Better: "second"}, Fn: 1},
	{Info: method.Info{ID: "second", Kind: "fit"}, Fn: 2},
}

func TestFind(t *testing.T) {
	for id, want := range map[string]int{"": 1, "first": 1, "second": 2, "SECOND": 2, " Second ": 2} {
		e, err := set.Find(id)
		if err != nil || e.Fn != want {
			t.Errorf("%q: got %d, %v, wanted %d", id, e.Fn, err, want)
		}
	}
	if set.Default().Fn != 1 {
		t.Error("the default is not the first")
	}
}

func TestFindUnknown(t *testing.T) {
	e, err := set.Find("third")
	var unknown *method.UnknownError
	if !errors.As(err, &unknown) || e.ID != "" {
		t.Fatalf("got %+v, %v, wanted an *UnknownError", e, err)
	}
	if want := `unknown fit "third", known: first, second`; err.Error() != want {
		t.Errorf("got %q, wanted %q", err, want)
	}
	// A set without a kind still says what was looked for.
	_, err = method.Set[int]{{Info: method.Info{ID: "x"}}}.Find("y")
	if want := `unknown method "y", known: x`; err == nil || err.Error() != want {
		t.Errorf("got %v, wanted %q", err, want)
	}
	// What was typed is not repeated at any length.
	_, err = set.Find(strings.Repeat("z", 1000))
	if err == nil || len(err.Error()) > 100 {
		t.Errorf("got an error of %d bytes", len(err.Error()))
	}
}

func TestIDsAndInfos(t *testing.T) {
	if got := strings.Join(set.IDs(), " "); got != "first second" {
		t.Errorf("ids: %s", got)
	}
	infos := set.Infos()
	if len(infos) != 2 || infos[0].ID != "first" || infos[1].ID != "second" {
		t.Errorf("infos: %+v", infos)
	}
}

func TestInRange(t *testing.T) {
	first := set[0]
	for _, x := range []float64{1, 1.05, 1.083, 1.0830004, 0.9999996} {
		if notes := first.InRange(x); len(notes) != 0 {
			t.Errorf("%v carries %v", x, notes)
		}
	}
	for _, x := range []float64{0.999, 1.084, math.NaN(), math.Inf(1)} {
		notes := first.InRange(x)
		if len(notes) != 1 || notes[0].Code != method.OutOfRange {
			t.Errorf("%v carries %v, wanted one note", x, notes)
		}
	}
	want := "first: SG 1.09 is outside the fitted range 1 to 1.083 20/20; second serves there"
	if got := first.InRange(1.09)[0].Text; got != want {
		t.Errorf("got %q, wanted %q", got, want)
	}
}

// Values come in the order of Valid; missing ones and surplus ones are let be.
func TestInRangeOfTwoInputs(t *testing.T) {
	info := method.Info{ID: "two", Valid: []method.Range{{Of: "OE", Lo: 0, Hi: 20, Unit: "°P"}, {Of: "AE", Lo: -3, Hi: 20, Unit: "°P"}}}
	for want, values := range map[int][]float64{0: {12, 2}, 1: {12, 25}, 2: {25, -4}} {
		if got := len(info.InRange(values...)); got != want {
			t.Errorf("%v: %d notes, wanted %d", values, got, want)
		}
	}
	if n := len(info.InRange(25)); n != 1 {
		t.Errorf("one value: %d notes, wanted 1", n)
	}
	if n := len(info.InRange(12, 2, 1e9)); n != 0 {
		t.Errorf("a surplus value: %d notes, wanted none", n)
	}
	if n := len(info.InRange()); n != 0 {
		t.Errorf("no value: %d notes, wanted none", n)
	}
	if got := info.Valid[1].String(); got != "AE -3..20 °P" {
		t.Errorf("got %q", got)
	}
}

func TestSourceString(t *testing.T) {
	for want, s := range map[string]method.Source{
		"Tanaka et al. 2001, Metrologia 38, 301": {Author: "Tanaka et al.", Year: 2001, Where: "Metrologia 38, 301"},
		"ICUMSA, SPS-4":                          {Author: "ICUMSA", Where: "SPS-4"},
		"1942, Table 114":                        {Year: 1942, Where: "Table 114"},
		"1000 (SG - 1)":                          {Where: "1000 (SG - 1)", Status: method.Read},
		"Balling 1865":                           {Author: "Balling", Year: 1865},
		"common practice":                        {Status: method.CommonPractice},
		"":                                       {},
	} {
		if got := s.String(); got != want {
			t.Errorf("got %q, wanted %q", got, want)
		}
	}
}

func TestRangeErrorNumbers(t *testing.T) {
	for want, e := range map[string]*method.RangeError{
		"sample temperature is 61.5 °C, wanted 0 to 60 °C":                 {What: "sample temperature", Got: 61.5, Hi: 60, Unit: "°C"},
		"specific gravity is 1.5 SG, wanted 0.95 to 1.45 SG":               {What: "specific gravity", Got: 1.5, Lo: 0.95, Hi: 1.45, Unit: "SG"},
		"specific gravity is 1.4601 SG, wanted 0.95 to 1.45 SG":            {What: "specific gravity", Got: 1.460100000001, Lo: 0.95, Hi: 1.45, Unit: "SG"},
		"extract is 0 %, wanted -13 to 100 %":                              {What: "extract", Got: math.Copysign(0, -1), Lo: -13, Hi: 100, Unit: "%"},
		"sample temperature is not a finite number, wanted 0 to 60 °C":     {What: "sample temperature", Got: math.NaN(), Hi: 60, Unit: "°C"},
		"specific gravity is not a finite number, wanted 0.95 to 1.45 SG":  {What: "specific gravity", Got: math.Inf(1), Lo: 0.95, Hi: 1.45, Unit: "SG"},
		"specific gravity is not a finite number, wanted 0.95 to 1.451 SG": {What: "specific gravity", Got: math.Inf(-1), Lo: 0.95, Hi: 1.451, Unit: "SG"},
	} {
		if got := e.Error(); got != want {
			t.Errorf("got %q, wanted %q", got, want)
		}
	}
}
