package tempcorr

import (
	"errors"
	"fmt"
	"math"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity"
	"gylebook/gravity/method"
	"gylebook/testdata/published"
)

// refractometerFiles names the published rows of each method.
var refractometerFiles = map[string]struct {
	file  string
	table refractometerTable
}{
	"refractometer-crc": {"refractometer_temp_crc", crcTable},
	"refractometer-oiv": {"refractometer_temp_oiv", oivTable},
}

func cell(t *testing.T, r published.Row, col string) float64 {
	t.Helper()
	x, err := r.Float(col)
	if err != nil {
		t.Fatal(err)
	}
	return x
}

func TestRefractometerPublishedRows(t *testing.T) {
	for _, m := range RefractometerMethods {
		src, ok := refractometerFiles[m.ID]
		if !ok {
			t.Errorf("%s has no published rows", m.ID)
			continue
		}
		f, err := published.Load(src.file)
		if err != nil {
			t.Fatal(err)
		}
		if len(f.Rows) != len(src.table.rows) {
			t.Errorf("%s: %d rows built in, %d published", m.ID, len(src.table.rows), len(f.Rows))
		}
		for _, r := range f.Rows {
			at := gravity.Celsius(cell(t, r, "t_C"))
			for _, brix := range src.table.brix {
				want := cell(t, r, fmt.Sprintf("c%g", brix))
				got, err := m.Fn(gravity.Plato(brix), at)
				// A row is a node of the interpolation: only rounding is left.
				if err != nil || math.Abs(float64(got)-want) > 1e-12 {
					t.Errorf("%s at %g %%: %g (%v), printed %g", r.Where(), brix, float64(got), err, want)
				}
			}
		}
	}
}

// Every inner row is predicted from its two neighbours within the 0.02 that the
// methods state.
func TestRefractometerLeaveOneOut(t *testing.T) {
	for id, src := range refractometerFiles {
		for k := 1; k < len(src.table.rows)-1; k++ {
			left := src.table.rows[k]
			without := src.table
			without.rows = append(append([]refractometerRow(nil), src.table.rows[:k]...), src.table.rows[k+1:]...)
			for c, brix := range src.table.brix {
				got, err := without.at(gravity.Plato(brix), gravity.Celsius(left.t))
				if err != nil || math.Abs(float64(got)-left.c[c]) > 0.02 {
					t.Errorf("%s, %g °C left out, %g %%: %.4f (%v), printed %g", id, left.t, brix, float64(got), err, left.c[c])
				}
			}
		}
	}
}

func TestRefractometerBetweenColumns(t *testing.T) {
	// CRC at 25 °C, 25 %: halfway from 0.34 to 0.36 is 0.35.
	// CRC at 25.5 °C, 10 %: halfway from 0.32 to 0.39 is 0.355.
	// OIV at 8 °C, 12.5 %: the mean of -0.74, -0.78, -0.64 and -0.67 is -0.7075.
	for _, c := range []struct {
		brix gravity.Plato
		t    gravity.Celsius
		want float64
		id   string
	}{
		{25, 25, 0.35, "refractometer-crc"},
		{10, 25.5, 0.355, "refractometer-crc"},
		{12.5, 8, -0.7075, "refractometer-oiv"},
		{10, 15, -0.27, "refractometer-crc"}, // the split: CRC from 15 °C up
		{10, 14, -0.375, "refractometer-oiv"},
	} {
		got, info, notes, err := RefractometerCorrection(c.brix, c.t)
		if err != nil || math.Abs(float64(got)-c.want) > 1e-12 || info.ID != c.id || len(notes) != 0 {
			t.Errorf("%g %% at %g °C: %g by %s, notes %v, %v; wanted %g by %s", float64(c.brix), float64(c.t), float64(got), info.ID, notes, err, c.want, c.id)
		}
	}
}

func TestRefractometerEndColumnHeld(t *testing.T) {
	for _, c := range []struct {
		brix, column gravity.Plato
		t            gravity.Celsius
	}{{3, 5, 25}, {-1, 5, 16}, {45, 30, 25}, {8, 10, 9}, {31, 30, 9}} {
		got, _, notes, err := RefractometerCorrection(c.brix, c.t)
		want, _, none, err2 := RefractometerCorrection(c.column, c.t)
		if err != nil || err2 != nil || got != want {
			t.Errorf("%g %% at %g °C: %g (%v), column %g has %g (%v)", float64(c.brix), float64(c.t), float64(got), err, float64(c.column), float64(want), err2)
		}
		if len(notes) != 1 || notes[0].Code != method.OutOfRange || len(none) != 0 {
			t.Errorf("%g %% at %g °C: notes %v, in its column %v; wanted one and none", float64(c.brix), float64(c.t), notes, none)
		}
	}
}

func TestRefractometerNothingAt20(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		brix := rapid.Float64Range(minBrix, maxBrix).Draw(t, "brix")
		got, _, notes, err := RefractometerCorrection(gravity.Plato(brix), 20)
		if got != 0 || len(notes) != 0 || err != nil {
			t.Fatalf("%v %% at 20 °C: %v, %v, %v", brix, float64(got), notes, err)
		}
	})
}

func TestRefractometerMonotone(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		brix := gravity.Plato(rapid.Float64Range(minBrix, maxBrix).Draw(t, "brix"))
		cold := rapid.Float64Range(5, 30).Draw(t, "cold")
		warm := rapid.Float64Range(cold, 30).Draw(t, "warm")
		a, _, _, errA := RefractometerCorrection(brix, gravity.Celsius(cold))
		b, _, _, errB := RefractometerCorrection(brix, gravity.Celsius(warm))
		if errA != nil || errB != nil || b < a-1e-12 {
			t.Fatalf("%v %%: %v at %v °C (%v), %v at %v °C (%v)", brix, a, cold, errA, b, warm, errB)
		}
	})
}

func TestRefractometerRefuses(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for _, c := range []struct{ brix, t float64 }{
		{12, 4.9}, {12, 30.1}, {12, -40}, {12, nan}, {12, inf}, {12, -inf}, {nan, 22}, {inf, 22}, {-inf, 9}, {90, 22},
	} {
		got, _, notes, err := RefractometerCorrection(gravity.Plato(c.brix), gravity.Celsius(c.t))
		var re *method.RangeError
		if !errors.As(err, &re) || got != 0 || len(notes) != 0 || re.Hint == "" {
			t.Errorf("%v %% at %v °C: %v, %v, %v; wanted a range error with a hint", c.brix, c.t, float64(got), notes, err)
		}
	}
	// A method by itself ends with its own table.
	for id, outside := range map[string][]gravity.Celsius{"refractometer-crc": {14.9, 30.1}, "refractometer-oiv": {4.9, 17.1}} {
		m, err := RefractometerMethods.Find(id)
		if err != nil {
			t.Fatal(err)
		}
		for _, at := range outside {
			var re *method.RangeError
			if got, err := m.Fn(12, at); !errors.As(err, &re) || got != 0 {
				t.Errorf("%s at %g °C: %v, %v; wanted a range error", id, float64(at), got, err)
			}
		}
	}
}
