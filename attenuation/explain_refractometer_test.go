package attenuation

import (
	"math"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"gylebook/gravity"
)

// The printed formula, evaluated term by term, gives the value of the relation.
func TestExplainRefractometerCanBeRedone(t *testing.T) {
	term := regexp.MustCompile(`([+-]) ([0-9.e-]+) ([if])([²³]?)`)
	powers := map[string]float64{"": 1, "²": 2, "³": 3}
	for _, b := range [][2]float64{{12, 6}, {11.63, 6.15}, {24, 9}} {
		es := RefractometerEstimates(gravity.Plato(b[0]), gravity.Plato(b[1]))
		lines := ExplainRefractometer(gravity.Plato(b[0]), gravity.Plato(b[1]), es)
		if len(lines) != 1+len(es) {
			t.Fatalf("%d lines for %d relations", len(lines), len(es))
		}
		for k, e := range es {
			id, formula, _ := strings.Cut(lines[k+1], ": SG = ")
			if id != e.Info.ID {
				t.Fatalf("line %q, wanted %s", lines[k+1], e.Info.ID)
			}
			first, _, _ := strings.Cut(formula, " ")
			sg, err := strconv.ParseFloat(first, 64)
			if err != nil {
				t.Fatal(err)
			}
			for _, m := range term.FindAllStringSubmatch(formula, -1) {
				c, err := strconv.ParseFloat(m[1]+m[2], 64)
				if err != nil {
					t.Fatal(err)
				}
				x := b[0]
				if m[3] == "f" {
					x = b[1]
				}
				sg += c * math.Pow(x, powers[m[4]])
			}
			if math.Abs(sg-float64(e.SG)) > 1e-12 {
				t.Errorf("%s at %v: the formula gives %.12f, the relation %.12f", id, b, sg, float64(e.SG))
			}
		}
	}
}
