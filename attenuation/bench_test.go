package attenuation

import "testing"

func BenchmarkEstimates(b *testing.B) {
	g := at(b, 1.048, 1.010)
	for b.Loop() {
		if len(Estimates(g)) != len(ABVMethods) {
			b.Fatal("an estimate is missing")
		}
	}
}

func BenchmarkDensimetric(b *testing.B) {
	g := at(b, 1.048, 1.010)
	for b.Loop() {
		if _, err := densimetric(g); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkAttenuate(b *testing.B) {
	g := at(b, 1.048, 1.010)
	for b.Loop() {
		if _, err := Attenuate(g); err != nil {
			b.Fatal(err)
		}
	}
}
