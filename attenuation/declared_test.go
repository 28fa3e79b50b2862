package attenuation

import (
	"errors"
	"strings"
	"testing"

	"gylebook/gravity"
	"gylebook/gravity/method"
)

// Truncation: 7.59 is 7.5 (HMRC, Alcoholic Products Technical Guide, section
// 11). Ties to even, 4.25 to 4.2 and 4.35 to 4.4: ISO 80000-1, rule A.
func TestDeclare(t *testing.T) {
	for _, c := range []struct {
		rule          string
		abv, declared gravity.VolPct
	}{
		{"uk-duty", 7.59, 7.5},
		{"uk-duty", 5.0, 5.0},
		{"uk-duty", 0.09, 0},
		{"eu-label", 4.25, 4.2},
		{"eu-label", 4.35, 4.4},
		{"eu-label", 4.251, 4.3},
		{"us-malt", 4.94, 4.9},
		{"us-malt", 4.96, 5.0},
	} {
		r, err := FindRule(c.rule)
		if err != nil {
			t.Fatal(err)
		}
		if got := r.Declare(c.abv); got != c.declared {
			t.Errorf("%s: %v declared %v, wanted %v", c.rule, c.abv, got, c.declared)
		}
	}
}

func TestRules(t *testing.T) {
	first, err := FindRule("")
	if err != nil || first.ID != "uk-duty" {
		t.Errorf("default rule %q, %v", first.ID, err)
	}
	if r, err := FindRule(" EU-Label "); err != nil || r.ID != "eu-label" {
		t.Errorf("rule %q, %v", r.ID, err)
	}
	var unknown *method.UnknownError
	if _, err := FindRule("mars"); !errors.As(err, &unknown) || !strings.Contains(err.Error(), "us-malt") {
		t.Errorf("unknown rule: %v, wanted the known ones listed", err)
	}
	for _, r := range Rules {
		if r.Name == "" || r.Text == "" || r.Source.Status == "" {
			t.Errorf("%s: incomplete: %+v", r.ID, r)
		}
		if r.Method != "" {
			if _, err := ABVMethods.Find(r.Method); err != nil {
				t.Errorf("%s: %v", r.ID, err)
			}
		}
	}
}

// Regulation (EU) No 1169/2011, Annex XII, and 27 CFR 7.71: half widths in % vol.
func TestTolerances(t *testing.T) {
	want := map[string][]float64{"uk-duty": nil, "eu-label": {0.5, 1.0, 1.5, 0.3}, "us-malt": {0.3}}
	for _, r := range Rules {
		if len(r.Tolerance) != len(want[r.ID]) {
			t.Fatalf("%s: %v", r.ID, r.Tolerance)
		}
		for i, tol := range r.Tolerance {
			if tol.Plus != want[r.ID][i] || tol.For == "" {
				t.Errorf("%s: %+v, wanted %v", r.ID, tol, want[r.ID][i])
			}
		}
	}
}
