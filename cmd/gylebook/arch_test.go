package main

import (
	"fmt"
	"io/fs"
	"path/filepath"
	"slices"
	"strings"
	"testing"
)

const module = "gylebook"

// rooms lists every package of the module. A package may import rooms of a
// strictly lower rank; where only is given, no package but those may import it.
// A new room gets one line here.
var rooms = []room{
	{path: "gravity/method", rank: 0},
	{path: "gravity/root", rank: 0},
	{path: "testdata/published", rank: 0, only: []string{"attenuation/selfcheck", "cmd/gylebook"}},
	{path: "gravity", rank: 1},
	{path: "gravity/asread", rank: 2},
	{path: "tempcorr", rank: 3},
	{path: "attenuation", rank: 4},
	{path: "attenuation/control", rank: 4},
	{path: "attenuation/selfcheck", rank: 5},
	{path: "attenuation/journal", rank: 5},
	{path: "attenuation/journal/sqlstore", rank: 6, only: []string{"cmd/gylebook"}},
	{path: "attenuation/journal/exchange", rank: 6},
	{path: "attenuation/journal/demo", rank: 6},
	{path: "attenuation/journal/storetest", rank: 6, only: []string{}}, // for tests alone
	{path: "attenuation/season", rank: 6},
	{path: "attenuation/volume", rank: 5},
	{path: "attenuation/cause", rank: 7},
	{path: "attenuation/curve", rank: 5},
	{path: "attenuation/outlook", rank: 7},
	{path: "tables", rank: 0, only: []string{"cmd/gylebook", "tables/chart", "tables/page", "tables/report", "tables/web"}}, // neutral rows in, so no room of ours below it
	{path: "tables/dialect", rank: 0}, // the same for what comes in
	{path: "tables/chart", rank: 1, only: []string{"cmd/gylebook"}},
	{path: "tables/page", rank: 1},
	{path: "tables/report", rank: 2, only: []string{"cmd/gylebook"}},
	{path: "tables/web", rank: 2, only: []string{"cmd/gylebook"}},
	{path: "cmd/backtest", rank: 9},
	{path: "cmd/gylebook", rank: 9},
}

// formulas are the folders, with all below them, that compute and nothing else.
var formulas = []string{"gravity", "tempcorr", "attenuation"}

// fences say which folders may import a package, or may not. A fence holds for
// everything below the import path and below the folders.
var fences = []fence{
	{of: "github.com/shopspring/decimal", within: []string{"gravity/asread"}},
	{of: "github.com/urfave/cli/v2", within: []string{"cmd"}},
	{of: "github.com/olekukonko/tablewriter", within: []string{"tables"}},
	{of: "gonum.org/v1/plot", within: []string{"tables/chart"}},
	{of: "git.sr.ht/~sbinet/gg", within: []string{"tables/chart"}},
	{of: "golang.org/x/image", within: []string{"tables/chart"}},
	{of: "codeberg.org/go-fonts", within: []string{"tables/chart"}},
	{of: "html/template", within: []string{"tables"}},
	{of: "net/http", outside: []string{"tables", "cmd"}, except: []string{"tables/web", "cmd/gylebook"}}, // in formulas no net at all, below
	{of: "golang.org/x/crypto", within: []string{"tables/web"}},
	{of: "github.com/chromedp", within: []string{"cmd/gylebook"}}, // in tests
	{of: "modernc.org/sqlite", within: []string{"attenuation/journal/sqlstore"}},
	{of: "os", outside: formulas, except: []string{"attenuation/journal/sqlstore"}, testsFree: true}, // os/exec with it
	{of: "time", outside: formulas, except: []string{"attenuation/journal", "attenuation/season", "attenuation/cause", "attenuation/outlook"}, testsFree: true},
	{of: "database/sql", outside: formulas, except: []string{"attenuation/journal/sqlstore"}, testsFree: true},
	{of: "net", outside: formulas, testsFree: true},
}

type room struct {
	path string // below the module
	rank int
	only []string
}

type fence struct {
	of        string   // import path
	within    []string // folders that alone may import it
	outside   []string // folders that may not
	except    []string // folders below those of outside that may
	testsFree bool     // tests are exempt
}

func TestArrowsGoDown(t *testing.T) {
	for _, fault := range arrowFaults(rooms, listPackages(t)) {
		t.Error(fault)
	}
}

func TestFences(t *testing.T) {
	root := moduleRoot(t)
	seen := 0
	err := filepath.WalkDir(root, func(path string, d fs.DirEntry, err error) error {
		if err != nil {
			return err
		}
		if d.IsDir() && path != root && strings.HasPrefix(d.Name(), ".") {
			return filepath.SkipDir
		}
		if d.IsDir() || filepath.Ext(path) != ".go" {
			return nil
		}
		imports, err := fileImports(path)
		if err != nil {
			return err
		}
		rel, err := filepath.Rel(root, path)
		if err != nil {
			return err
		}
		seen++
		for _, fault := range fenceFaults(fences, filepath.ToSlash(rel), imports) {
			t.Error(fault)
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	if seen == 0 {
		t.Fatalf("no Go file found in %s", root)
	}
}

// arrowFaults names every package that is not listed and every import that does
// not go strictly down or is not among those allowed.
func arrowFaults(rooms []room, packages []goPackage) []string {
	byPath := make(map[string]room)
	for _, r := range rooms {
		byPath[r.path] = r
	}
	var faults []string
	for _, p := range packages {
		name := strings.TrimPrefix(p.ImportPath, module+"/")
		from, listed := byPath[name]
		if !listed {
			faults = append(faults, fmt.Sprintf("package %s is not listed, wanted a line in rooms", p.ImportPath))
			continue
		}
		for _, i := range p.Imports {
			below, ours := strings.CutPrefix(i, module+"/")
			if !ours {
				continue
			}
			to, listed := byPath[below]
			switch {
			case !listed:
				faults = append(faults, fmt.Sprintf("%s imports %s, which is not listed in rooms", name, below))
			case to.rank >= from.rank:
				faults = append(faults, fmt.Sprintf("%s (rank %d) imports %s (rank %d), wanted a strictly lower rank", name, from.rank, below, to.rank))
			case to.only != nil && !slices.Contains(to.only, name):
				faults = append(faults, fmt.Sprintf("%s imports %s, which is for %s", name, below, strings.Join(to.only, ", ")))
			}
		}
	}
	return faults
}

// fenceFaults names every import of a file, its path given below the module
// root, that a fence forbids.
func fenceFaults(fences []fence, file string, imports []string) []string {
	var faults []string
	for _, f := range fences {
		if f.testsFree && strings.HasSuffix(file, "_test.go") {
			continue
		}
		inside := func(folder string) bool { return under(file, folder) }
		shut := slices.ContainsFunc(f.outside, inside) && !slices.ContainsFunc(f.except, inside)
		if (f.within == nil || slices.ContainsFunc(f.within, inside)) && !shut {
			continue
		}
		for _, i := range imports {
			if under(i, f.of) {
				faults = append(faults, fmt.Sprintf("%s imports %s, which has no place there", file, i))
			}
		}
	}
	return faults
}

// under reports whether a slash path is the folder or lies below it.
func under(path, folder string) bool {
	return path == folder || strings.HasPrefix(path, folder+"/")
}
