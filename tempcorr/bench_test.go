package tempcorr_test

import (
	"testing"

	"gylebook/gravity"
	"gylebook/tempcorr"
)

// Goal: under 1 µs.
func BenchmarkSucroseCorrection(b *testing.B) {
	f := glass2020(gravity.ScaleSG).Float()
	for b.Loop() {
		if _, err := tempcorr.Sucrose(f, 1.05, tempcorr.Sample{T: 25}); err != nil {
			b.Fatal(err)
		}
	}
}

// Goal: under 10 µs.
func BenchmarkFermentingCorrection(b *testing.B) {
	f := glass2020(gravity.ScaleSG).Float()
	for b.Loop() {
		if _, err := tempcorr.Fermenting(f, 1.012, tempcorr.Sample{T: 25, OE: 12}); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkCorrectWithBudget(b *testing.B) {
	h := glass2020(gravity.ScaleSG)
	o := tempcorr.Observation{Reading: 1.05, Step: 0.001, T: 25}
	for b.Loop() {
		if _, err := tempcorr.Correct(h, o); err != nil {
			b.Fatal(err)
		}
	}
}
