package gravity_test

import (
	"testing"

	"gylebook/gravity"
)

func BenchmarkASBCInverse(b *testing.B) {
	fit := gravity.Fits.Default().Fn
	for b.Loop() {
		if _, err := fit.SG(12); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkConvert(b *testing.B) {
	c := gravity.NewConverter()
	for b.Loop() {
		if _, err := c.Convert(gravity.ScaleSG, 1.048, gravity.Pair2020); err != nil {
			b.Fatal(err)
		}
	}
}
