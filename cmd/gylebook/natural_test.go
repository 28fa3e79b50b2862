package main

import (
	"slices"
	"strings"
	"testing"

	"pgregory.net/rapid"
)

func TestNaturalCompare(t *testing.T) {
	floor := "10 FV FV1 fv2 FV2 FV02 FV2a FV2b FV10 FV99999999999999999998 FV99999999999999999999 T T1-2 T1-10 T2 T10 Ü1"
	// In reverse, so that sorting has everything to do.
	names := strings.Fields(floor)
	slices.Reverse(names)
	slices.SortFunc(names, naturalCompare)
	want := "10 FV FV1 FV02 FV2 fv2 FV2a FV2b FV10 FV99999999999999999998 FV99999999999999999999 T T1-2 T1-10 T2 T10 Ü1"
	if got := strings.Join(names, " "); got != want {
		t.Errorf("sorted:\n%s\nwanted:\n%s", got, want)
	}
}

// Whatever the names: one order, and no two different names share a place.
func TestNaturalCompareIsAnOrder(t *testing.T) {
	name := rapid.StringMatching(`[aAbT]{0,2}[0-9]{0,3}[-/a]?[0-9]{0,2}`)
	rapid.Check(t, func(t *rapid.T) {
		a, b, c := name.Draw(t, "a"), name.Draw(t, "b"), name.Draw(t, "c")
		if got, back := naturalCompare(a, b), naturalCompare(b, a); got != -back || (got == 0) != (a == b) {
			t.Fatalf("%q and %q: %d one way, %d the other", a, b, got, back)
		}
		if naturalCompare(a, b) < 0 && naturalCompare(b, c) < 0 && naturalCompare(a, c) >= 0 {
			t.Fatalf("%q before %q before %q, but not the first before the last", a, b, c)
		}
	})
}
