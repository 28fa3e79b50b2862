package main

import (
	"strings"
	"testing"
)

// The checker must be able to fail: each case holds one fault, or none.
func TestArrowFaults(t *testing.T) {
	made := []room{
		{path: "low", rank: 0},
		{path: "aside", rank: 1},
		{path: "middle", rank: 1},
		{path: "kept", rank: 0, only: []string{"high"}},
		{path: "high", rank: 2},
	}
	for _, c := range []struct {
		name, from string
		imports    []string
		want       string // part of the one fault, "" for none
	}{
		{"down", "middle", []string{"fmt", "gylebook/low"}, ""},
		{"two ranks down", "high", []string{"gylebook/middle", "gylebook/low", "gylebook/kept"}, ""},
		{"another module of the name", "low", []string{"gylebookish/high"}, ""},
		{"upward", "low", []string{"gylebook/high"}, "low (rank 0) imports high (rank 2)"},
		{"sideways", "middle", []string{"gylebook/aside"}, "middle (rank 1) imports aside (rank 1)"},
		{"kept for another", "middle", []string{"gylebook/kept"}, "middle imports kept, which is for high"},
		{"to an unlisted package", "high", []string{"gylebook/new"}, "high imports new, which is not listed"},
		{"unlisted package", "new", []string{"gylebook/low"}, "package gylebook/new is not listed"},
	} {
		t.Run(c.name, func(t *testing.T) {
			got := arrowFaults(made, []goPackage{{"gylebook/" + c.from, c.imports}})
			checkFaults(t, got, c.want)
		})
	}
}

func TestFenceFaults(t *testing.T) {
	for _, c := range []struct{ name, file, imports, want string }{
		{"decimal in its room", "gravity/asread/number.go", "github.com/shopspring/decimal", ""},
		{"decimal in a formula", "gravity/fits.go", "github.com/shopspring/decimal", "gravity/fits.go imports github.com/shopspring/decimal"},
		{"decimal in a test elsewhere", "tables/csv_test.go", "github.com/shopspring/decimal", "tables/csv_test.go imports"},
		{"decimal in a folder of a like name", "gravity/asreader/a.go", "github.com/shopspring/decimal", "has no place there"},
		{"cli in a command", "cmd/gylebook/main.go", "github.com/urfave/cli/v2", ""},
		{"cli in a table", "tables/text.go", "github.com/urfave/cli/v2", "has no place there"},
		{"tables draw", "tables/text.go", "github.com/olekukonko/tablewriter/renderer", ""},
		{"a command draws", "cmd/gylebook/abv.go", "github.com/olekukonko/tablewriter/tw", "has no place there"},
		{"os in a formula", "tempcorr/float.go", "os", "tempcorr/float.go imports os"},
		{"os/exec in a formula", "gravity/water.go", "os/exec", "gravity/water.go imports os/exec"},
		{"net/http in a formula", "attenuation/selfcheck/rows.go", "net/http", "has no place there"},
		{"net/http in the page at the tank", "tables/web/server.go", "net/http", ""},
		{"net/http in a fragment", "tables/page/ladder.go", "net/http", "has no place there"},
		{"clock in a formula", "attenuation/abv.go", "time", "has no place there"},
		{"clock in a test of a formula", "attenuation/abv_test.go", "time", ""},
		{"clock in the journal", "attenuation/journal/entry.go", "time", ""},
		{"database in the journal's domain", "attenuation/journal/entry.go", "database/sql", "has no place there"},
		{"database in its store", "attenuation/journal/sqlstore/store.go", "database/sql", ""},
		{"driver in a command", "cmd/gylebook/main.go", "modernc.org/sqlite", "has no place there"},
		{"clock in a command", "cmd/gylebook/main.go", "time", ""},
		{"a package that begins alike", "gravity/water.go", "oslo", ""},
	} {
		t.Run(c.name, func(t *testing.T) {
			checkFaults(t, fenceFaults(fences, c.file, []string{"math", c.imports}), c.want)
		})
	}
}

func checkFaults(t *testing.T, got []string, want string) {
	t.Helper()
	if want == "" {
		if len(got) != 0 {
			t.Errorf("faults %q, wanted none", got)
		}
		return
	}
	if len(got) != 1 || !strings.Contains(got[0], want) {
		t.Errorf("faults %q, wanted one with %q", got, want)
	}
}
