package gravity_test

import (
	"math"
	"strings"
	"testing"

	"pgregory.net/rapid"

	"gylebook/gravity"
)

// Every figure that stands beside a row of the table is checked, also where the
// row lies beyond the fitted range and the figure says by how much it fails.
func TestFitsAgainstC440(t *testing.T) {
	checked := map[string]int{}
	for _, r := range rows(t, "sucrose_nbs_c440_t114") {
		s := gravity.SG(number(t, r, "sg_20_20_apparent"))
		for _, e := range gravity.Fits {
			stated := strings.Contains(r.Text("tol"), e.ID+":brix=")
			if e.Valid[0].Contains(float64(s)) && !stated {
				t.Errorf("%s: %s is in range and has no tolerance", r.Where(), e.ID)
			}
			if !stated {
				continue
			}
			x := s
			if e.ID == "sps4" {
				x = s.FromAir() // the table is in air, the model is true density
			}
			agree(t, r, e.ID, "brix", 1, float64(e.Fn.Extract(x)))
			checked[e.ID]++
		}
	}
	for _, id := range gravity.Fits.IDs() {
		if checked[id] < 10 {
			t.Errorf("%s was checked on %d rows", id, checked[id])
		}
	}
}

func TestFitsAtSG1040(t *testing.T) {
	fits := map[string]string{
		"sg1.040_app2020_to_brix_nbs": "nbs", "sg1.040_app2020_to_plato_asbc": "asbc", "sg1.040_app2020_to_icumsa_mass_pct": "sps4",
	}
	seen := 0
	for _, r := range rows(t, "scale_points") {
		id, ok := fits[r.Text("name")]
		if !ok {
			continue
		}
		e, err := gravity.Fits.Find(id)
		if err != nil {
			t.Fatal(err)
		}
		s := gravity.SG(number(t, r, "input")) // in air
		if id == "sps4" {
			s = s.FromAir()
		}
		agree(t, r, id, "value", 1, float64(e.Fn.Extract(s)))
		seen++
	}
	if seen != len(fits) {
		t.Errorf("%d rows for SG 1.040, wanted %d", seen, len(fits))
	}
}

// zeroAtWater is what a sound fit may give at SG 1: the coefficients are printed
// to three or four decimals, and four of them add up.
const zeroAtWater = 0.006

func TestFitsAreZeroAtWater(t *testing.T) {
	for _, e := range gravity.Fits {
		near(t, e.ID+" at water", float64(e.Fn.Extract(1)), 0, zeroAtWater)
	}
}

// Two misprints of the ASBC polynomial circulate; at water both show.
func TestMisprintsShowAtWater(t *testing.T) {
	asbc := func(c3, c2, c1, c0 float64) float64 { return c3 + c2 + c1 + c0 } // at S = 1
	if got := asbc(135.997, -630.272, 1111.14, -616.868); math.Abs(got) > zeroAtWater {
		t.Errorf("the right coefficients give %.3f at water", got)
	}
	for name, got := range map[string]float64{
		"1114.14 for 1111.14": asbc(135.997, -630.272, 1114.14, -616.868), // 2.997
		"135.977 for 135.997": asbc(135.977, -630.272, 1111.14, -616.868), // -0.023
	} {
		if math.Abs(got) <= zeroAtWater {
			t.Errorf("%s gives %.3f at water and would pass", name, got)
		}
	}
}

func TestFitsInvert(t *testing.T) {
	for _, e := range gravity.Fits {
		t.Run(e.ID, func(t *testing.T) {
			rapid.Check(t, func(t *rapid.T) {
				s := gravity.SG(rapid.Float64Range(0.96, 1.40).Draw(t, "s"))
				for name, way := range map[string]struct {
					there func(gravity.SG) gravity.Plato
					back  func(gravity.Plato) (gravity.SG, error)
				}{"as read": {e.Fn.Extract, e.Fn.SG}, "true": {e.Fn.TrueExtract, e.Fn.TrueSG}} {
					got, err := way.back(way.there(s))
					if err != nil {
						t.Fatalf("%s: %v", name, err)
					}
					if math.Abs(float64(got-s)) > 1e-10 {
						t.Fatalf("%s: SG %v came back as %v", name, s, got)
					}
				}
			})
		})
	}
}

func TestFitsRise(t *testing.T) {
	for _, e := range gravity.Fits {
		for s := gravity.MinSG; s < gravity.MaxSG-0.001; s += 0.001 {
			if !(e.Fn.Extract(s+0.001) > e.Fn.Extract(s)) {
				t.Errorf("%s does not rise from SG %.3f", e.ID, float64(s))
			}
		}
	}
}

// No extract outside the limits gets an SG, however far outside it lies: the
// polynomials and hyperbolas come back into reach there.
func TestFitsRefuseOutside(t *testing.T) {
	for _, e := range gravity.Fits {
		lo, hi := e.Fn.Extract(gravity.MinSG), e.Fn.Extract(gravity.MaxSG)
		for p := gravity.Plato(-2000); p <= 2000; p += 0.5 {
			if p > lo-0.01 && p < hi+0.01 {
				continue
			}
			if s, err := e.Fn.SG(p); err == nil {
				t.Errorf("%s: %v %% gives SG %v, wanted a refusal", e.ID, p, s)
			}
		}
		for _, x := range []float64{math.NaN(), math.Inf(1), math.Inf(-1)} {
			_, err := e.Fn.SG(gravity.Plato(x))
			refused(t, e.ID, err)
			_, err = e.Fn.TrueSG(gravity.Plato(x))
			refused(t, e.ID+" true", err)
		}
	}
}

func TestFitNotesNameTheFitThatServes(t *testing.T) {
	e := gravity.Fits.Default()
	if notes := gravity.FitNotes(e, 1.05); len(notes) != 0 {
		t.Errorf("SG 1.05 carries %v", notes)
	}
	notes := gravity.FitNotes(e, 1.12)
	if len(notes) != 1 || !strings.Contains(notes[0].Text, "nbs serves there") {
		t.Errorf("SG 1.12 carries %v, wanted one note that names nbs", notes)
	}
	for _, e := range gravity.Fits {
		if e.Better == "" {
			continue
		}
		if _, err := gravity.Fits.Find(e.Better); err != nil {
			t.Errorf("%s names a fit that is not there: %v", e.ID, err)
		}
	}
}
