package main

import (
	"bytes"
	"encoding/json"
	"fmt"
	"io"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"gylebook/attenuation/curve"
)

// simulatedFolder writes simulated courses, n of them, read every 10 to 24 h.
func simulatedFolder(t *testing.T, n int) string {
	t.Helper()
	rng := rand.New(rand.NewPCG(21, 22))
	var b strings.Builder
	b.WriteString("# simulated\nseries,hours,gravity_value,unit,temp_C\n")
	for i := range n {
		p := curve.Params{
			AA: 0.78 + 0.03*rng.NormFloat64(), LnT50: 3.9 + 0.25*rng.NormFloat64(),
			Phi: 0.8 + 0.3*rng.NormFloat64(), LnS: -0.6 + 0.3*rng.NormFloat64(),
		}
		og := 42 + 20*rng.Float64()
		end := p.TimeTo(og, 0.3)
		for h := 0.0; h < end+70; h += 10 + 14*rng.Float64() {
			fmt.Fprintf(&b, "s_%02d,%.1f,%.1f,sg_points,20\n", i, h, p.At(og, h)+0.3*rng.NormFloat64())
		}
	}
	dir := t.TempDir()
	if err := os.WriteFile(filepath.Join(dir, "made.csv"), []byte(b.String()), 0o600); err != nil {
		t.Fatal(err)
	}
	return dir
}

func output(t *testing.T, args ...string) []byte {
	t.Helper()
	var out bytes.Buffer
	if err := run(args, &out, io.Discard); err != nil {
		t.Fatal(err)
	}
	return out.Bytes()
}

func TestScoresOfSimulatedCourses(t *testing.T) {
	dir := simulatedFolder(t, 20)
	raw := output(t, "-curves", dir, "-k", "3,4", "-seeds", "1", "-json")
	var got struct {
		Rows []map[string]any `json:"rows"`
	}
	if err := json.Unmarshal(raw, &got); err != nil {
		t.Fatal(err)
	}
	if len(got.Rows) != 4*3 {
		t.Fatalf("%d rows, wanted four methods with k 3, 4 and their mean", len(got.Rows))
	}
	mean := make(map[string]map[string]any)
	for _, r := range got.Rows {
		for _, key := range []string{"method", "k", "n", "fg_mae_points", "fg_coverage90", "fg_crps", "time_mae_h", "time_coverage90"} {
			if _, ok := r[key]; !ok {
				t.Errorf("row %v has no %s", r, key)
			}
		}
		if r["k"] == 0.0 {
			mean[r["method"].(string)] = r
		}
	}
	for _, m := range []string{"last", "logistic-ls"} {
		if mean[m]["fg_coverage90"] != nil {
			t.Errorf("%s has no interval, coverage %v", m, mean[m]["fg_coverage90"])
		}
		for _, key := range []string{"fg_mae_points", "fg_crps", "time_mae_h"} {
			if !(mean["ours"][key].(float64) < mean[m][key].(float64)) {
				t.Errorf("%s: ours %v, %s %v", key, mean["ours"][key], m, mean[m][key])
			}
		}
	}
	if !(mean["ours"]["time_mae_h"].(float64) < mean["history-mean"]["time_mae_h"].(float64)) {
		t.Errorf("time: ours %v, history-mean %v", mean["ours"]["time_mae_h"], mean["history-mean"]["time_mae_h"])
	}
	if again := output(t, "-curves", dir, "-k", "3,4", "-seeds", "1", "-json"); !bytes.Equal(raw, again) {
		t.Error("the same seed gives another score")
	}
}

func TestTablesAndCold(t *testing.T) {
	dir := simulatedFolder(t, 6)
	text := string(output(t, "-curves", dir, "-k", "2,4", "-history", "0", "-seeds", "1"))
	for _, want := range []string{"FG MAE", "ours", "last", "history-mean", "logistic-ls", "mean"} {
		if !strings.Contains(text, want) {
			t.Errorf("the table lacks %q:\n%s", want, text)
		}
	}
	// Six courses give no seven others: nothing is scored, and it says nothing.
	text = string(output(t, "-curves", dir, "-history", "7", "-seeds", "1"))
	if strings.Contains(text, "NaN") || !strings.Contains(text, "-") {
		t.Errorf("a score of nothing:\n%s", text)
	}
}

func TestReplay(t *testing.T) {
	dir := simulatedFolder(t, 8)
	var got struct{ Rows []replayRow }
	if err := json.Unmarshal(output(t, "-curves", dir, "-replay", "-seeds", "1", "-json"), &got); err != nil {
		t.Fatal(err)
	}
	byRule := make(map[string]replayRow)
	for _, r := range got.Rows {
		byRule[r.Rule] = r
	}
	both, flat, alone := byRule["terminal"], byRule["unchanged 48 h"], byRule["probably terminal"]
	if both.Courses != 8 || both.Fired == nil || alone.Fired == nil || flat.Fired == nil {
		t.Fatalf("%+v: wanted eight courses and every rule fired", got.Rows)
	}
	if *both.Fired > *flat.Fired || *alone.Fired < *both.Fired {
		t.Errorf("terminal fired on %g, the 48 h rule on %g, probably terminal on %g", *both.Fired, *flat.Fired, *alone.Fired)
	}
	if both.Delay == nil || alone.Delay == nil || *alone.Delay > *both.Delay {
		t.Errorf("probably terminal %v late, terminal %v: wanted the first earlier", alone.Delay, both.Delay)
	}
	if text := string(output(t, "-curves", dir, "-replay", "-seeds", "1")); !strings.Contains(text, "premature") {
		t.Errorf("no table:\n%s", text)
	}
}

func TestRunRefuses(t *testing.T) {
	empty, broken := t.TempDir(), t.TempDir()
	if err := os.WriteFile(filepath.Join(broken, "b.csv"), []byte("series,hours,gravity_value,unit\na,0,1,ells\n"), 0o600); err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		args []string
		want string
	}{
		{nil, "wanted -curves DIR"},
		{[]string{"-curves", filepath.Join(empty, "none")}, "courses:"},
		{[]string{"-curves", empty}, "no .csv file"},
		{[]string{"-curves", broken}, `b.csv: line 2: unknown unit "ells"`},
		{[]string{"-curves", empty, "-k", "three"}, "-k holds"},
		{[]string{"-curves", empty, "-k", "0"}, "-k holds"},
		{[]string{"-curves", empty, "-history", "-1"}, "-history is -1"},
		{[]string{"-curves", empty, "-seeds", "0"}, "-seeds is 0"},
		{[]string{"-curves", empty, "-u", "NaN"}, "-u is NaN"},
		{[]string{"-curves", empty, "more"}, "not understood"},
		{[]string{"-curves", simulatedFolder(t, 1), "-only", "rye"}, "no course whose class"},
	} {
		err := run(c.args, io.Discard, io.Discard)
		if err == nil || !strings.Contains(err.Error(), c.want) {
			t.Errorf("%v: %v, wanted %q", c.args, err, c.want)
		}
	}
}

// TestRealBeerCourses holds the forecast to what it is to reach on real beer,
// where GYLEBOOK_CURVES names a folder of such courses.
func TestRealBeerCourses(t *testing.T) {
	dir := os.Getenv("GYLEBOOK_CURVES")
	if dir == "" {
		t.Skip("GYLEBOOK_CURVES names no folder of courses")
	}
	cs, err := readFolder(dir)
	if err != nil {
		t.Fatal(err)
	}
	var beer []course
	for _, c := range cs {
		if strings.HasPrefix(c.class, "beer") {
			beer = append(beer, c)
		}
	}
	s := settings{ks: []int{3, 4, 5}, history: 5, seed: 1, seeds: 3, u: 0.5}
	rows, err := scores(beer, s)
	if err != nil {
		t.Fatal(err)
	}
	means := make(map[string]row)
	for _, r := range rows {
		if r.K == 0 && r.N > 0 {
			means[r.Method] = r
		}
	}
	ours, ok := means["ours"]
	if !ok {
		t.Fatalf("no beer course in %s could be scored", dir)
	}
	if *ours.FGMAE > 1.8 || *ours.TimeMAE > 11 || *ours.CRPS > 1.5 {
		t.Errorf("FG %.2f points, time %.1f h, CRPS %.2f: wanted 1.8, 11, 1.5 at most", *ours.FGMAE, *ours.TimeMAE, *ours.CRPS)
	}
	for what, c := range map[string]float64{"FG": *ours.FGCover, "time": *ours.TimeCover} {
		if c < 0.85 || c > 0.97 {
			t.Errorf("%s: %.3f inside the 90 %% interval, wanted 0.85 to 0.97", what, c)
		}
	}
	for _, m := range methods[1:] {
		b := means[m]
		if *ours.FGMAE >= *b.FGMAE || *ours.TimeMAE >= *b.TimeMAE || *ours.CRPS >= *b.CRPS {
			t.Errorf("%s is as good: %v, %v, %v", m, *b.FGMAE, *b.TimeMAE, *b.CRPS)
		}
	}
}
