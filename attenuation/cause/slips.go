package cause

import (
	"fmt"
	"math"
	"strconv"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/asread"
)

// slip is a reading with one slip of the pen taken back.
type slip struct {
	reading asread.Reading
	reads   string
	why     string
}

// slips lists what a reading may have been meant for: two neighbouring digits
// swapped, one main mark too much or too little, the decimal point a place off,
// points taken for °P and the other way round. That these are the usual slips is
// common practice, no source.
func slips(r asread.Reading) []slip {
	var list []slip
	add := func(scale gravity.Scale, value float64, why string) {
		if !finite(value) || value == r.Value && scale == r.Scale {
			return
		}
		s := r
		s.Scale, s.Value = scale, value
		list = append(list, slip{s, asread.Fixed(value, scale.Info().Decimals, asread.HalfEven) + " " + scale.Info().Name, why})
	}
	switch {
	case r.Scale == gravity.ScaleSG:
		for _, swapped := range swaps(strconv.Itoa(int(math.Round((r.Value - 1) * 1e4)))) {
			add(r.Scale, 1+swapped/1e4, "digits swapped")
		}
		add(r.Scale, r.Value-0.010, "a main mark off")
		add(r.Scale, r.Value+0.010, "a main mark off")
		add(r.Scale, 1+(r.Value-1)/10, "the decimal point a place off")
		add(r.Scale, 1+(r.Value-1)*10, "the decimal point a place off")
		add(gravity.ScalePlato, (r.Value-1)/point, "points for °P")
	case r.Scale.IsMass():
		for _, swapped := range swaps(strconv.Itoa(int(math.Round(r.Value * 10)))) {
			add(r.Scale, swapped/10, "digits swapped")
		}
		add(r.Scale, r.Value-1, "a main mark off")
		add(r.Scale, r.Value+1, "a main mark off")
		add(r.Scale, r.Value/10, "the decimal point a place off")
		add(r.Scale, r.Value*10, "the decimal point a place off")
		add(gravity.ScaleSG, 1+r.Value*point, "°P for points")
	}
	return list
}

// swaps returns the numbers that text gives with two neighbouring digits swapped.
func swaps(text string) []float64 {
	var list []float64
	for k := 1; k < len(text); k++ {
		if text[k-1] == '-' || text[k] == text[k-1] {
			continue
		}
		b := []byte(text)
		b[k-1], b[k] = b[k], b[k-1]
		if n, err := strconv.Atoi(string(b)); err == nil {
			list = append(list, float64(n))
		}
	}
	return list
}

// otherUnit reads the number of a temperature in the other unit.
func otherUnit(t asread.Temperature) (asread.Temperature, bool) {
	n := t.Typed.Float()
	if t.Unit == "F" {
		t.C, t.Unit = gravity.Celsius(n), "C"
	} else {
		t.C, t.Unit = gravity.Celsius((n-32)*5/9), "F"
	}
	return t, t.C >= 0 && t.C <= 60
}

// swapWithin is how far apart two readings of a round may lie.
const swapWithin = 2 * time.Hour

// swapped returns what another tank read about when a batch was read, if the
// batch's own reading would stand in that tank as well: between its readings
// before and after.
func swapped(t journal.View, last *journal.Value) (sg gravity.SG, hour string, ok bool) {
	list := t.Counting()
	for k, other := range list {
		if gap := other.Source.TakenAt.Sub(last.Source.TakenAt).Abs(); gap > swapWithin {
			continue
		}
		fits := len(list) > 1
		if k > 0 && points(last.SG, list[k-1].SG) > alike || k+1 < len(list) && points(list[k+1].SG, last.SG) > alike {
			fits = false
		}
		if fits {
			at := other.Source.TakenAt
			return other.SG, fmt.Sprintf("%02d:%02d", at.Hour(), at.Minute()), true
		}
	}
	return 0, "", false
}

// ogOf corrects a reading of the original gravity, or another one in its place, as
// the journal does.
func (q *question) ogOf(o journal.OG, instead *asread.Reading) (gravity.SG, asread.Reading, error) {
	typed, err := o.Gravity.Reading()
	if err != nil {
		return 0, typed, err
	}
	if instead != nil {
		typed = *instead
	}
	if o.Temp.Text == "" {
		f, err := gravity.NewConverter().Convert(typed.Scale, typed.Value, gravity.Pair2020)
		return f.SG, typed, err
	}
	temp, err := o.Temp.Temperature()
	if err != nil {
		return 0, typed, err
	}
	h, _, err := q.Book.Hydrometer(o.Instrument, o.At)
	if err != nil {
		return 0, typed, err
	}
	res, _, err := journal.CorrectTyped(h, typed, temp, 0)
	return res.SG, typed, err
}
