package attenuation

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"gylebook/gravity"
)

// converted returns the gravities 20/20 of a brew printed on 15.6/15.6 °C: the
// wort as a sucrose solution, the beer by its own expansion.
func converted(tb testing.TB, wort, beer float64) Gravities {
	tb.Helper()
	fit := gravity.Fits.Default().Fn
	og, err := gravity.Relative{Value: wort, Pair: gravity.Pair6060F}.SG()
	if err != nil {
		tb.Fatal(err)
	}
	read := gravity.Relative{Value: beer, Pair: gravity.Pair6060F}
	m := gravity.Fermented(fit.Extract(og), fit.Extract(gravity.SG(beer)))
	fg := read.MixtureOn(gravity.Pair2020, m)
	return at(tb, float64(og), fg.Value)
}

// Tolman & Riley, A Study of American Beers and Ales, USDA Bulletin 493 (1917),
// Tables I-IV: gravities of wort and beer at 15.6/15.6 °C and the alcohol that
// was distilled, g/100 mL over 0.7894. The relations named are wanted within
// 0.15 % vol in the mean; a row's own tolerance holds for the relations that it
// names. What the registry states as a method's error is the bias found here.
func TestMeasuredBrews(t *testing.T) {
	const col = "abv20_from_g100mL"
	rows := load(t, "brews_usda1917").Rows
	if len(rows) < 16 {
		t.Fatalf("%d brews, wanted 16", len(rows))
	}
	for _, e := range ABVMethods {
		if e.Kind != KindABV {
			continue
		}
		var sum, squares, worst float64
		for _, r := range rows {
			g := converted(t, cell(t, r, "wort_SG"), cell(t, r, "beer_SG"))
			miss := float64(by(t, e.ID, g).ABV) - cell(t, r, col)
			sum += miss
			squares += miss * miss
			worst = max(worst, math.Abs(miss))
			if e.ID == "balling" || e.ID == "densimetric" || e.ID == idUKDuty || e.ID == "factor-131" {
				tol, _, err := r.Tolerance(e.ID, col)
				if err != nil {
					t.Fatal(err)
				}
				near(t, r.Where()+" "+e.ID+" miss", miss, 0, tol)
			}
		}
		n := float64(len(rows))
		bias := sum / n
		scatter := math.Sqrt((squares - n*bias*bias) / (n - 1))
		t.Logf("%-13s bias %+.3f, scatter %.3f, worst %.2f %% vol", e.ID, bias, scatter, worst)
		if stated := fmt.Sprintf("%+.2f %% vol against %d measured brews", bias, len(rows)); !strings.HasPrefix(e.Error, stated) {
			t.Errorf("%s states %q, wanted %q", e.ID, e.Error, stated)
		}
		if e.ID == "balling" || e.ID == "densimetric" {
			near(t, e.ID+" bias", bias, 0, 0.15)
		}
	}
}
