package selfcheck

import (
	"slices"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"

	"gylebook/gravity/method"
)

// measuredBrews is the one file whose rows are what brews had, not what a
// relation was printed with: it serves every alcohol method, but tells little of
// whether a formula was copied well.
const measuredBrews = "brews_usda1917"

// withoutRows are the relations for which no published row was found, by Key.
var withoutRows = []string{
	"scale/baume-144.3",
	"abv method/factor-131",
	"abv method/hall1995",
	"abv method/mead-132",
	"refractometer relation/terrill2011-linear",
	"refractometer relation/terrill2011-cubic",
	"refractometer relation/bonham2001",
	"meniscus/meniscus",
	"surface tension/surface-tension",
	"certificate/certificate",
}

// definitions need no row.
var definitions = []string{
	"scale/points", "scale/oechsle",
	"control test/nelson-1", "control test/nelson-2", "control test/nelson-3", "control test/nelson-4",
	"control test/nelson-5", "control test/nelson-6", "control test/nelson-7", "control test/nelson-8",
}

func run(t testing.TB, r Relations) []Outcome {
	t.Helper()
	outcomes, err := Run(r)
	if err != nil {
		t.Fatal(err)
	}
	return outcomes
}

func TestEveryRowPasses(t *testing.T) {
	for _, o := range run(t, Offered()) {
		if !o.Passed || len(o.Misses) != 0 {
			t.Errorf("%s, %s, %s:\n%s", o.Source, o.Key(), o.Compared, strings.Join(o.Misses, "\n"))
		}
		if o.Rows == 0 || o.Cited == "" || !(o.Worst <= o.Tolerance+slack) || o.Tolerance <= 0 {
			t.Errorf("outcome %+v", o)
		}
	}
}

func TestRunIsTheSameTwice(t *testing.T) {
	if d := cmp.Diff(run(t, Offered()), run(t, Offered())); d != "" {
		t.Error(d)
	}
}

func TestEveryFileIsUsed(t *testing.T) {
	used := make(map[string]bool)
	for _, o := range run(t, Offered()) {
		used[o.Source] = true
	}
	for name := range checks {
		if !used[name] {
			t.Errorf("no outcome of file %s", name)
		}
	}
}

func TestEveryRelationHasARow(t *testing.T) {
	var printed []Outcome
	for _, o := range run(t, Offered()) {
		if o.Source != measuredBrews {
			printed = append(printed, o)
		}
	}
	all, rows := Covered(run(t, Offered())), Covered(printed)
	exempt := slices.Concat(withoutRows, definitions)
	offered := make(map[string]method.Info)
	for _, i := range Offered().Infos() {
		key := Key(i)
		offered[key] = i
		if all[key] == 0 && !slices.Contains(exempt, key) {
			t.Errorf("%s has no published row", key)
		}
		if got, want := i.Check == method.FormulaOnly, slices.Contains(withoutRows, key); got != want {
			t.Errorf("%s: check %q, listed as without a row: %v", key, i.Check, want)
		}
		if got, want := i.Check == "definition", slices.Contains(definitions, key); got != want {
			t.Errorf("%s: check %q, listed as definition: %v", key, i.Check, want)
		}
	}
	for _, key := range exempt {
		if _, ok := offered[key]; !ok {
			t.Errorf("%s is listed but not offered", key)
		}
		if rows[key] != 0 {
			t.Errorf("%s is listed but has %d published values", key, rows[key])
		}
	}
	for key := range all {
		if _, ok := offered[key]; !ok {
			t.Errorf("%s was compared but is not offered", key)
		}
	}
}

func TestInfosAreComplete(t *testing.T) {
	seen := make(map[string]bool)
	for _, i := range Offered().Infos() {
		key := Key(i)
		if seen[key] {
			t.Errorf("%s stands twice", key)
		}
		seen[key] = true
		if i.ID == "" || i.ID != strings.ToLower(i.ID) || strings.ContainsAny(i.ID, " :=") {
			t.Errorf("id %q, wanted lower case without space, colon and equals sign", i.ID)
		}
		if i.Kind == "" || i.Name == "" || i.Use == "" || i.Error == "" && i.Check == "" || i.Check == "" {
			t.Errorf("%s: kind %q, name %q, use %q, error %q, check %q", key, i.Kind, i.Name, i.Use, i.Error, i.Check)
		}
		if i.Source.Status == "" || i.Source.Author == "" && i.Source.Where == "" {
			t.Errorf("%s: source %+v", key, i.Source)
		}
		if i.Better != "" && !slices.ContainsFunc(Offered().Infos(), func(o method.Info) bool { return o.Kind == i.Kind && o.ID == i.Better }) {
			t.Errorf("%s names %q as better, which is not offered", key, i.Better)
		}
	}
}

// A relation that gives no number, or an error, is a miss and not an error of
// the run; one that is not there at all is.
func TestMissingRelation(t *testing.T) {
	r := Offered()
	r.Corrections = r.Corrections[:1]
	_, err := Run(r)
	if err == nil || !strings.Contains(err.Error(), "lyons1992") {
		t.Errorf("without lyons1992 Run gives %v", err)
	}
}

func BenchmarkRun(b *testing.B) {
	r := Offered()
	for b.Loop() {
		if _, err := Run(r); err != nil {
			b.Fatal(err)
		}
	}
}
