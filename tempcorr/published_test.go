package tempcorr_test

import (
	"math"
	"testing"

	"gylebook/gravity"
	"gylebook/tempcorr"
)

// Bigelow & Stevenson 1923, Table 8, at a reading of 5 °Bx: the page gives no
// concentration, and 5 °Bx fits its Brix column best.
func TestSucroseAgainstBigelow(t *testing.T) {
	const reading = 5.0
	glass := tempcorr.Float{Scale: gravity.ScaleBrix, Basis: gravity.Pair2020, Expansion: 25e-6}
	bare := glass
	bare.Expansion = 0
	sg := glass
	sg.Scale = gravity.ScaleSG
	readingSG := float64(gravity.SucroseDensity(reading, 20) / gravity.Kell(20))

	var sum, sumBare float64
	table := rows(t, "hydrometer_temp_bigelow1923_t8")
	for _, r := range table {
		s := tempcorr.Sample{T: gravity.FromFahrenheit(number(t, r, "t_F"))} // t_C is rounded
		printed := number(t, r, "corr_brix")
		got, err := tempcorr.Sucrose(glass, reading, s)
		if err != nil {
			t.Fatal(err)
		}
		got -= reading
		agree(t, r, "sucrose", "corr_brix", got)
		if math.Abs(got-printed) > 0.03 {
			t.Errorf("%s: off by %.3f °Bx, stated 0.03", r.Where(), got-printed)
		}
		without, err := tempcorr.Sucrose(bare, reading, s)
		if err != nil {
			t.Fatal(err)
		}
		asSG, err := tempcorr.Sucrose(sg, readingSG, s)
		if err != nil {
			t.Fatal(err)
		}
		agree(t, r, "sucrose", "corr_sg", asSG-readingSG)
		sum += (got - printed) * (got - printed)
		sumBare += (without - reading - printed) * (without - reading - printed)
	}
	n := float64(len(table))
	rms, rmsBare := math.Sqrt(sum/n), math.Sqrt(sumBare/n)
	t.Logf("rms %.4f °Bx, without the glass %.4f °Bx", rms, rmsBare)
	if rms > 0.009 {
		t.Errorf("rms %.4f °Bx, wanted 0.009", rms)
	}
	if rmsBare < 4*rms {
		t.Errorf("without the glass rms is %.4f °Bx: the glass makes no difference", rmsBare)
	}
}

// C. Lyons 1992: the cubic against the table it was fitted to, to 0.17 point.
func TestLyonsAgainstItsTable(t *testing.T) {
	for _, r := range rows(t, "hydrometer_temp_lyons1992") {
		got := tempcorr.LyonsPoints(gravity.FromFahrenheit(number(t, r, "temp_F")))
		agree(t, r, "lyons1992", "corr_points", got)
		if miss := math.Abs(got - number(t, r, "corr_points")); miss > 0.175 {
			t.Errorf("%s: misses by %.3f point, stated 0.17", r.Where(), miss)
		}
	}
	// By hand at 59 °F: 1.313454 - 7.827766 + 7.163177 - 0.539661 = 0.109204.
	near(t, "at its own reference", tempcorr.LyonsPoints(15), 0.109204, 1e-6)
}

// What an instrument reads in water follows from IAPWS-95 alone: by hand, 20/20
// glass, 999.1026 (1 - 125e-6)/998.2072 = 1.00077 at 15 °C and
// 997.0476 (1 + 125e-6)/998.2072 = 0.99896 at 25 °C. Corrected it is water.
func TestWaterCheck(t *testing.T) {
	water := map[float64]float64{}
	for _, r := range rows(t, "water_iapws95") {
		water[number(t, r, "t_C")] = number(t, r, "rho_kg_m3")
	}
	expected := func(at float64) float64 { return water[at] * (1 + 25e-6*(at-20)) / water[20] }
	near(t, "expected at 15 °C", expected(15), 1.00077, 5e-6)
	near(t, "expected at 25 °C", expected(25), 0.99896, 5e-6)
	h := glass2020(gravity.ScaleSG)
	for _, at := range []float64{5, 10, 15, 20, 25, 30, 35, 40, 45, 50, 55, 60} {
		res := correct(t, h, tempcorr.Observation{Reading: expected(at), Step: 1e-5, T: gravity.Celsius(at)})
		// Kell's water of 20 °C is 0.0041 below IAPWS-95, of t at most 0.0017 apart
		// from that: 2e-6 in all.
		near(t, "water corrected", res.Corrected, 1, 2e-6)
	}
}
