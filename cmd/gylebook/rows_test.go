package main

import (
	"bytes"
	"context"
	"encoding/csv"
	"fmt"
	"math/rand/v2"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strings"
	"syscall"
	"testing"
	"time"
)

// output runs the program and returns its CSV.
func output(t *testing.T, stdin string, args ...string) [][]string {
	t.Helper()
	var out, errOut bytes.Buffer
	code := run(context.Background(), args, strings.NewReader(stdin), &out, &errOut)
	if code != exitOK && code != exitData {
		t.Fatalf("%q: exit code %d, %s", args, code, errOut.String())
	}
	rows, err := csv.NewReader(&out).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	return rows
}

// Every field of every row is that of the command on the row alone.
func TestRowsAreTheCommandOnEach(t *testing.T) {
	t.Setenv("SOURCE_DATE_EPOCH", fixedEnv["SOURCE_DATE_EPOCH"])
	r := rand.New(rand.NewPCG(5, 6))
	pick := func(from ...string) string { return from[r.IntN(len(from))] }
	var readings, pairs []string
	for range 60 {
		sg := 1.001 + 0.1*r.Float64()
		readings = append(readings, pick(fmt.Sprintf("%.4f", sg), fmt.Sprintf("%.3f", sg), fmt.Sprintf("%.1fP", 250*(sg-1)), fmt.Sprintf("%dOe", r.IntN(100)))+
			","+pick(fmt.Sprintf("%.1f", 37*r.Float64()), fmt.Sprintf("%dF", 32+r.IntN(108))))
		pairs = append(pairs, fmt.Sprintf("%.4f,%.3f", sg+0.03, 0.998+(sg-0.998)*r.Float64()))
	}
	for _, c := range []struct {
		command string
		header  string
		fields  []string
		rows    []string
		flags   []string
	}{
		{"correct", "r,t", correctColumns, readings, nil},
		{"correct", "r,t", []string{"corrected", "sg_20_20", "extract_pct_mass", "temperature_correction"}, readings, []string{"--basis", "60/60F", "--body", "polycarbonate"}},
		{"correct", "r,t", []string{"corrected", "sg_20_20", "extract_pct_mass"}, readings, []string{"--meniscus", "top", "--og", "1.110"}},
		{"convert", "r,t", convertFields(columns[:len(columns)-1]), readings, []string{"--basis", "15/4", "--modulus", "144.3"}},
		{"attenuation", "og,pg", attenuationColumns, pairs, []string{"--fit", "nbs"}},
	} {
		t.Run(c.command+" "+strings.Join(c.flags, " "), func(t *testing.T) {
			file := c.header + "\n" + strings.Join(c.rows, "\n") + "\n"
			named := map[string][]string{"correct": {"--reading-col", "r", "--temp-col", "t"}, "convert": {"--reading-col", "r"}}[c.command]
			got := output(t, file, slices.Concat([]string{c.command, "--rows", "-", "--quiet", "--columns", strings.Join(c.fields, ",")}, named, c.flags)...)
			if len(got) != len(c.rows)+1 {
				t.Fatalf("%d rows, wanted %d", len(got)-1, len(c.rows))
			}
			compared := 0
			for i, row := range c.rows {
				a, b, _ := strings.Cut(row, ",")
				values := []string{a, b}
				switch c.command {
				case "correct":
					values = []string{a, "--temp", b}
				case "convert":
					values = []string{a}
				}
				single := output(t, "", slices.Concat([]string{c.command, "--csv", "--quiet"}, values, c.flags)...)
				if len(single) < 2 {
					if reason := got[i+1][len(got[i+1])-1]; reason == "" {
						t.Errorf("%s has no reason, wanted it refused as alone", row)
					}
					continue
				}
				compared++
				for k, field := range c.fields {
					want := single[1][slices.Index(single[0], field)]
					if cell := got[i+1][2+k]; cell != want {
						t.Errorf("%s: %s is %q, wanted %q", row, field, cell, want)
					}
				}
			}
			if compared < len(c.rows)/2 {
				t.Errorf("%d of %d rows compared", compared, len(c.rows))
			}
		})
	}
}

// The answer of a pair is that of the summary.
func TestRowsOfAbvAreTheSummary(t *testing.T) {
	got := output(t, "og,pg\n1.048,1.010\n12P,2.6P\n", "abv", "--rows", "-", "--quiet", "--columns", "abv_pct_20c,abw_pct,expanded_uncertainty_k2,declared_pct")
	for i, pair := range [][]string{{"1.048", "1.010"}, {"12P", "2.6P"}} {
		all := output(t, "", "abv", pair[0], pair[1], "--csv", "--quiet")
		if want := []string{all[1][1], all[1][2]}; !slices.Equal(got[i+1][2:4], want) {
			t.Errorf("%v: %v, wanted %v", pair, got[i+1][2:4], want)
		}
	}
}

// An interrupt in the middle leaves nothing: not the file, nor what was beside it.
func TestRowsInterrupted(t *testing.T) {
	dir := t.TempDir()
	cmd := exec.Command("gylebook", "correct", "--rows", "-", "--out", filepath.Join(dir, "out.csv"))
	cmd.Env = append(os.Environ(), "XDG_DATA_HOME="+dir, "HOME="+dir)
	in, err := cmd.StdinPipe()
	if err != nil {
		t.Fatal(err)
	}
	if err := cmd.Start(); err != nil {
		t.Fatal(err)
	}
	defer func() { _ = cmd.Process.Kill() }()
	if _, err := in.Write([]byte("reading,temp\n" + strings.Repeat("1.050,28\n", 100_000))); err != nil {
		t.Fatal(err)
	}
	beside := func() []string {
		found, err := filepath.Glob(filepath.Join(dir, "*out.csv*"))
		if err != nil {
			t.Fatal(err)
		}
		hidden, err := filepath.Glob(filepath.Join(dir, ".out.csv-*"))
		if err != nil {
			t.Fatal(err)
		}
		return append(found, hidden...)
	}
	if len(beside()) == 0 {
		t.Fatal("nothing is written beside, so nothing could be left")
	}
	if err := cmd.Process.Signal(os.Interrupt); err != nil {
		t.Skip("no interrupt on this system:", err)
	}
	_ = cmd.Wait()
	if status, ok := cmd.ProcessState.Sys().(syscall.WaitStatus); !ok || status.ExitStatus() != exitInterrupted {
		t.Errorf("%v, wanted exit code %d", cmd.ProcessState, exitInterrupted)
	}
	if left := beside(); len(left) > 0 {
		t.Errorf("%v left", left)
	}
}

func TestRowsRate(t *testing.T) {
	// A quarter of the file in 2 s: three quarters take 6 s.
	if got, want := rowsRate(1_000_000, 25, 100, 2*time.Second), "rows, 500000 a second, 25 %, 6 s left "; got != want {
		t.Errorf("%q, wanted %q", got, want)
	}
	if got, want := rowsRate(1000, 25, 0, time.Second), "rows, 1000 a second"; got != want {
		t.Errorf("%q, wanted %q", got, want)
	}
}
