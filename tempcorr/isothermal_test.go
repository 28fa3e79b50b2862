package tempcorr_test

import (
	"math"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity"
	"gylebook/tempcorr"
)

// The figures are those of Correct, bit for bit, on any pair and body.
func TestIsothermalIsCorrect(t *testing.T) {
	pairs := []gravity.Pair{gravity.Pair2020, gravity.Pair6060F, gravity.Pair1515, gravity.Pair154, gravity.Pair204}
	rapid.Check(t, func(t *rapid.T) {
		pair := rapid.SampledFrom(pairs).Draw(t, "pair")
		body := rapid.SampledFrom(tempcorr.Bodies).Draw(t, "body")
		r := rapid.Float64Range(0.94, 1.46).Draw(t, "reading")
		temp := gravity.Celsius(rapid.Float64Range(0, 60).Draw(t, "temperature"))
		if rapid.Bool().Draw(t, "at the reference") {
			temp = pair.Sample
		}
		x := tempcorr.IsothermalAt(pair, body.Expansion, temp)
		got, err := x.Figures(r)
		want, wantErr := tempcorr.Correct(
			tempcorr.New(gravity.ScaleSG, pair, body),
			tempcorr.Observation{Reading: r, T: temp, Plain: true},
		)
		if (err == nil) != (wantErr == nil) || err != nil && err.Error() != wantErr.Error() {
			t.Fatalf("error %v, wanted %v", err, wantErr)
		}
		if err != nil {
			return
		}
		for _, c := range []struct{ got, want float64 }{
			{got.Corrected, want.Corrected},
			{float64(got.SG), float64(want.SG)},
			{float64(got.Extract), float64(want.Extract)},
		} {
			if math.Float64bits(c.got) != math.Float64bits(c.want) {
				t.Fatalf("%+v, wanted %+v", got, want)
			}
		}
	})
}
