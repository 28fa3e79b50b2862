package volume

import (
	"bytes"
	"context"
	"errors"
	"io"
	"strings"

	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/tempcorr"
)

// single computes a row through the single-value functions alone.
type single struct {
	scale gravity.Scale
	units asread.Unit
	basis gravity.Pair
}

func (s single) Row(cells [][]byte, out *Results) error {
	r, err := asread.ParseReading(string(cells[0]), s.scale)
	if err != nil {
		return err
	}
	t, err := asread.ParseTemperature(string(cells[1]), s.units)
	if err != nil {
		return err
	}
	h := tempcorr.New(r.Scale, s.basis, glass)
	res, err := tempcorr.Correct(h, tempcorr.Observation{Reading: r.Value, Step: r.Step, T: t.C, Plain: true})
	if err != nil {
		return err
	}
	for i, x := range []float64{res.Reading, float64(t.C), res.Temperature, res.Corrected, float64(res.SG), float64(res.Extract)} {
		out.Number(i, x)
	}
	return nil
}

var (
	glass      = tempcorr.Bodies[0]
	allFigures = []Figure{Reading, SampleC, ShiftSG, Corrected, SG2020, Extract, Other}
	allResults = []string{"r", "t", "shift", "corrected", "sg_20_20", "extract", ErrorColumn}
)

// correctPlan is a plan with a Corrector before the single-value functions.
func correctPlan(s single) Plan {
	return Plan{
		Inputs: []string{"reading", "temp"}, Results: allResults,
		New: func() Worker { return NewCorrector(allFigures, s.basis, glass, s.units, nil, s) },
	}
}

// lengths is a worker that gives the length of its one cell and refuses "bad".
type lengths struct{}

func (lengths) Row(cells [][]byte, out *Results) error {
	if string(cells[0]) == "bad" {
		return errors.New("bad, and \"quoted\"")
	}
	out.Number(0, float64(len(cells[0])))
	return nil
}

func lengthPlan() Plan {
	return Plan{Inputs: []string{"a"}, Results: []string{"length", ErrorColumn}, New: func() Worker { return lengths{} }, Workers: 3}
}

// drip gives a few bytes at a time.
type drip struct {
	in io.Reader
	n  int
}

func (d drip) Read(p []byte) (int, error) { return d.in.Read(p[:min(len(p), d.n)]) }

// repeated gives a header and then the same rows until n bytes are given.
type repeated struct {
	text string
	at   int
	n    int64
}

func (r *repeated) Read(p []byte) (int, error) {
	if r.n <= 0 {
		return 0, io.EOF
	}
	k := 0
	for k < len(p) && int64(k) < r.n {
		c := copy(p[k:], r.text[r.at:])
		r.at = (r.at + c) % len(r.text)
		k += c
	}
	k = int(min(int64(k), r.n))
	r.n -= int64(k)
	return k, nil
}

func lines(rows ...string) string { return strings.Join(rows, "\n") + "\n" }

// runOf is ran for any reader and any test.
func runOf(t fatal, in io.Reader, p Plan) (string, Summary) {
	t.Helper()
	var out bytes.Buffer
	sum, err := Run(context.Background(), in, &out, p)
	if err != nil {
		t.Fatalf("%v, after %.200q", err, out.String())
	}
	return out.String(), sum
}
