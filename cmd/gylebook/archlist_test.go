package main

import (
	"encoding/json"
	"errors"
	"fmt"
	"go/parser"
	"go/token"
	"io"
	"os/exec"
	"path/filepath"
	"strconv"
	"strings"
	"testing"
)

// goPackage is what "go list -json" tells; Imports are those of non-test files.
type goPackage struct {
	ImportPath string
	Imports    []string
}

func fileImports(path string) ([]string, error) {
	f, err := parser.ParseFile(token.NewFileSet(), path, nil, parser.ImportsOnly)
	if err != nil {
		return nil, err
	}
	imports := make([]string, len(f.Imports))
	for k, i := range f.Imports {
		if imports[k], err = strconv.Unquote(i.Path.Value); err != nil {
			return nil, fmt.Errorf("%s: import %s: %w", path, i.Path.Value, err)
		}
	}
	return imports, nil
}

// listPackages asks the go command for the packages of the module. It leaves
// testdata out of "./...", so the package there is named.
func listPackages(t *testing.T) []goPackage {
	t.Helper()
	out := runGo(t, moduleRoot(t), "list", "-json=ImportPath,Imports", "./...", "./testdata/published")
	var packages []goPackage
	for dec := json.NewDecoder(strings.NewReader(out)); ; {
		var p goPackage
		err := dec.Decode(&p)
		if errors.Is(err, io.EOF) {
			break
		}
		if err != nil {
			t.Fatal(err)
		}
		packages = append(packages, p)
	}
	if len(packages) == 0 {
		t.Fatal("go list named no package")
	}
	return packages
}

func moduleRoot(t *testing.T) string {
	t.Helper()
	return filepath.Dir(strings.TrimSpace(runGo(t, ".", "env", "GOMOD")))
}

func runGo(t *testing.T, dir string, args ...string) string {
	t.Helper()
	cmd := exec.Command("go", args...)
	cmd.Dir = dir
	var stderr strings.Builder
	cmd.Stderr = &stderr
	out, err := cmd.Output()
	if err != nil {
		t.Fatalf("go %s: %v\n%s", strings.Join(args, " "), err, stderr.String())
	}
	return string(out)
}
