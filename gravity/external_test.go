package gravity_test

import (
	"bytes"
	"errors"
	"fmt"
	"math"
	"os"
	"os/exec"
	"strconv"
	"strings"
	"testing"

	"gylebook/gravity"
)

// missing skips where a program is not installed; in CI it must be.
func missing(t *testing.T, what string, err error) {
	t.Helper()
	if os.Getenv("GYLEBOOK_CI") == "1" {
		t.Fatalf("%s is needed in CI: %v", what, err)
	}
	t.Skipf("%s is not here: %v", what, err)
}

// program runs a program on input and returns the numbers it prints, one a line.
func program(t *testing.T, input, name string, args ...string) []float64 {
	t.Helper()
	path, err := exec.LookPath(name)
	if err != nil {
		missing(t, name, err)
	}
	cmd := exec.Command(path, args...)
	cmd.Stdin = strings.NewReader(input)
	var out, msg bytes.Buffer
	cmd.Stdout, cmd.Stderr = &out, &msg
	if err := cmd.Run(); err != nil {
		var exit *exec.ExitError
		if errors.As(err, &exit) && strings.Contains(msg.String(), "ModuleNotFoundError") {
			missing(t, name+" module", errors.New("ModuleNotFoundError"))
		}
		t.Fatalf("%s: %v: %s", name, err, msg.String())
	}
	var numbers []float64
	for line := range strings.Lines(out.String()) {
		x, err := strconv.ParseFloat(strings.TrimSpace(line), 64)
		if err != nil {
			t.Fatalf("%s printed %q, wanted a number", name, line)
		}
		numbers = append(numbers, x)
	}
	return numbers
}

// unitsOf asks GNU Units for pairs of lines, what one has and what one wants.
func unitsOf(t *testing.T, questions []string) []float64 {
	t.Helper()
	got := program(t, strings.Join(questions, "\n")+"\n", "units", "--terse", "--output-format", "%.12g")
	if len(got) != len(questions)/2 {
		t.Fatalf("%d answers to %d questions", len(got), len(questions)/2)
	}
	return got
}

// GNU Units' brix holds the whole of NBS C440 Table 114, every degree of it, as a
// density over 0.99717 g/cm³.
func TestNBSFitAgainstGNUUnits(t *testing.T) {
	var questions []string
	for bx := range 81 {
		questions = append(questions, fmt.Sprintf("brix(%d)", bx), "0.99717 g/cm^3")
	}
	nbs, err := gravity.Fits.Find("nbs")
	if err != nil {
		t.Fatal(err)
	}
	sps4, err := gravity.Fits.Find("sps4")
	if err != nil {
		t.Fatal(err)
	}
	for bx, s := range unitsOf(t, questions) {
		if bx >= 1 && bx <= 40 {
			// Stated: 0.0017 °Bx for 1 to 40 °Bx.
			near(t, fmt.Sprintf("nbs at %d °Bx", bx), float64(nbs.Fn.Extract(gravity.SG(s))), float64(bx), 0.0017)
		}
		// Stated: 0.012 to 20, 0.018 to 30, 0.022 to 40; beyond, it grows to the
		// 0.080 of the row at 80 °Bx.
		tol := 0.080
		for _, step := range []struct{ to, tol float64 }{{40, 0.022}, {30, 0.018}, {20, 0.012}} {
			if float64(bx) <= step.to {
				tol = step.tol
			}
		}
		tol += 0.0013 // half the last place of the printed SG, in °Bx
		near(t, fmt.Sprintf("sps4 at %d °Bx", bx), float64(sps4.Fn.Extract(gravity.SG(s).FromAir())), float64(bx), tol)
	}
}

// GNU Units takes Baumé (145) and Twaddell on the density in g/cm³.
func TestScalesAgainstGNUUnits(t *testing.T) {
	for id, name := range map[string]string{"baume-145": "baume", "twaddell": "twaddell"} {
		e, err := gravity.ScaleRelations.Find(id)
		if err != nil {
			t.Fatal(err)
		}
		var there, back []string
		for v := range 45 {
			there = append(there, fmt.Sprintf("%s(%d)", name, v), "g/cm^3")
			back = append(back, fmt.Sprintf("%.3f g/cm^3", 1+float64(v)/100), name)
		}
		for v, s := range unitsOf(t, there) {
			near(t, fmt.Sprintf("%s %d", id, v), e.Fn.SG(float64(v)), s, 1e-11)
		}
		for v, d := range unitsOf(t, back) {
			near(t, fmt.Sprintf("%s at %d", id, v), e.Fn.Of(1+float64(v)/100), d, 1e-9)
		}
	}
}

// Water from 0 to 90 °C every 2.5 °C against IAPWS-95 as python3-iapws has it.
func TestWaterAgainstIAPWSProgram(t *testing.T) {
	const script = `
from iapws import IAPWS95
for i in range(37):
    print(repr(float(IAPWS95(T=273.15 + 2.5*i, P=0.101325).rho)))
`
	const python = "/usr/bin/python3" // where Debian puts python3-iapws
	got := program(t, script, python, "-")
	if len(got) != 37 {
		t.Fatalf("%d densities, wanted 37", len(got))
	}
	worst := map[string]float64{}
	for i, rho := range got {
		at := 2.5 * float64(i)
		if at <= 40 {
			d := float64(gravity.Tanaka(gravity.Celsius(at))) - rho
			near(t, fmt.Sprintf("Tanaka at %v °C", at), d, 0, 0.0012)
			worst["tanaka2001"] = math.Max(worst["tanaka2001"], math.Abs(d))
		}
		d := float64(gravity.Kell(gravity.Celsius(at))) - rho
		near(t, fmt.Sprintf("Kell at %v °C", at), d, 0, 0.0058)
		worst["kell-its90"] = math.Max(worst["kell-its90"], math.Abs(d))
	}
	t.Logf("worst, kg/m³: %v", worst)
}
