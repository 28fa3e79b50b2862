package attenuation

import (
	"testing"

	"gylebook/gravity"
)

// OIV-MA-AS2-02, Table II: density to sugar and potential alcohol, every row.
// The printed strength comes from sugar before it was rounded and is cut after
// the second decimal (136.1/16.83 = 8.0868 is printed 8.08), so ours may lie
// 0.05/16.83 below it, and that plus 0.01 above.
func TestMustTable(t *testing.T) {
	rows := load(t, "must_oiv_as2_02_t2").Rows
	if len(rows) != len(mustTable) {
		t.Fatalf("%d rows, published %d", len(mustTable), len(rows))
	}
	for i, r := range rows {
		rho, sugar := cell(t, r, "must_rho_kg_L"), cell(t, r, "sugar_g_L")
		if mustTable[i] != (mustRow{rho, sugar}) {
			t.Errorf("%s: row is %v", r.Where(), mustTable[i])
		}
		above := float64(strength(gravity.GramsPerLitre(sugar), SugarPerVol)) - cell(t, r, "abv_at_16.83")
		if rounded := 0.05 / 16.83; !(above >= -rounded && above <= 0.01+rounded) {
			t.Errorf("%s: potential is %+.4f off the print", r.Where(), above)
		}
		if i == 0 || i == len(rows)-1 {
			continue
		}
		got, err := MustSugar(gravity.SG(rho / 0.9982))
		if err != nil {
			t.Fatal(err)
		}
		near(t, r.Where()+" sugar", float64(got), sugar, 1e-6)
	}
}

// Between the rows, 1.0841 kg/L is half way from 1.0818 to 1.0863 less 0.05 g:
// by hand 191.9 + 11.4·23/45 = 197.73 g/L.
func TestMustBetweenRows(t *testing.T) {
	sugar, err := MustSugar(gravity.SG(1.0841 / 0.9982))
	if err != nil {
		t.Fatal(err)
	}
	near(t, "sugar", float64(sugar), 191.9+11.4*23/45, 1e-6)
	base, lo, hi, err := PotentialAlcohol(gravity.SG(1.0841 / 0.9982))
	if err != nil {
		t.Fatal(err)
	}
	near(t, "base", float64(base), 197.7267/16.83, 1e-4)
	near(t, "red", float64(lo), 197.7267/18, 1e-4)
	near(t, "white", float64(hi), 197.7267/17, 1e-4)
}

// Table "Densité primitive de moût" of an encyclopaedia: 74.74 g/L, 4.44 % vol.
func TestPotentialBase(t *testing.T) {
	ex := worked(t, "61")
	near(t, "potential", float64(strength(gravity.GramsPerLitre(ex.in[""]), SugarPerVol)), ex.want[0], ex.tol)
}

func TestMustOutside(t *testing.T) {
	for _, og := range []gravity.SG{1.0409, 1.1308, 0.99} {
		if _, err := MustSugar(og); !hasRange(err) {
			t.Errorf("%v: %v, wanted a range error", og, err)
		}
	}
	for _, og := range []float64{mustRange.Lo, mustRange.Hi} {
		if _, err := MustSugar(gravity.SG(og)); err != nil {
			t.Errorf("the stated end %v: %v", og, err)
		}
	}
}
