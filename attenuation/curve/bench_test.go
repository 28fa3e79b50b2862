package curve

import (
	"math/rand/v2"
	"testing"
)

func BenchmarkFit(b *testing.B) {
	_, batch := simulated(rand.New(rand.NewPCG(1, 2)))
	prior := NewPrior(Beer, nil)
	for b.Loop() {
		if _, err := Fit(batch, prior, prior.Options()); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkForecast(b *testing.B) {
	rng := rand.New(rand.NewPCG(1, 2))
	prior := NewPrior(Beer, history(b, rng, 20))
	_, batch := simulated(rng)
	batch.Readings = batch.Readings[:5]
	for b.Loop() {
		if _, err := prior.Forecast(batch, 500); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkEvidence(b *testing.B) {
	prior := NewPrior(Beer, sixPast())
	for b.Loop() {
		if _, err := prior.Evidence(ended(), 1000, Watch{}); err != nil {
			b.Fatal(err)
		}
	}
}
