package main

import (
	"strings"
	"testing"

	"gylebook/attenuation/selfcheck"
	"gylebook/tables"
)

// A miss is named for a person and for a machine, and ends in exit code 1.
func TestSelfcheckNamesAMiss(t *testing.T) {
	made := []selfcheck.Outcome{
		{Source: "made_up", Relation: "one", Rows: 3, Worst: 0.001, Tolerance: 0.002, Passed: true},
		{Source: "made_up", Relation: "two", Rows: 2, Worst: 0.5, Tolerance: 0.002, Misses: []string{"row 2: wanted 1, got 1.5"}},
		{Source: "other", Relation: "one", Rows: 5, Worst: 0.001, Tolerance: 0.002, Passed: true},
	}
	for _, c := range []struct {
		name     string
		outcomes []selfcheck.Outcome
		code     int
		stdout   []string
		stderr   string
	}{
		{
			"one of three", made, exitFailed,
			[]string{"2 of 3 checks passed   10 rows of 2 sources\n", "made_up       2     5  NO\n", "other         1     5  yes\n"},
			"gylebook: 1 of 3 checks miss: made_up by two: row 2: wanted 1, got 1.5\nhint: gylebook selfcheck --csv lists them\n",
		},
		{
			"none", made[2:], exitOK,
			[]string{"1 of 1 checks passed   5 rows of 1 sources\n", "other        1     5  yes\n"},
			"",
		},
	} {
		t.Run(c.name, func(t *testing.T) {
			var out, errOut strings.Builder
			b := &bench{out: &out, err: &errOut, set: settings{format: tables.Text, width: 80}}
			if code := failure(&errOut, b.reportChecks(c.outcomes)); code != c.code {
				t.Errorf("exit code %d, wanted %d", code, c.code)
			}
			for _, want := range c.stdout {
				if !strings.Contains(out.String(), want) {
					t.Errorf("stdout\n%swanted %q in it", out.String(), want)
				}
			}
			if errOut.String() != c.stderr {
				t.Errorf("stderr %q, wanted %q", errOut.String(), c.stderr)
			}
		})
	}
}
