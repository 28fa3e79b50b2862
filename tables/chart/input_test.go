package chart

import (
	"bytes"
	"errors"
	"io"
	"math"
	"testing"
)

// What cannot be drawn is an error that says what was read, and nothing is written.
func TestInputErrors(t *testing.T) {
	course := func(change func(*Course)) Course {
		c := fall()
		change(&c)
		return c
	}
	control := func(change func(*Control)) Control {
		c := season(9)
		change(&c)
		return c
	}
	nan, inf := math.NaN(), math.Inf(1)
	for want, p := range map[string]interface {
		Write(io.Writer, Form, Size) error
	}{
		"mark 3: y is NaN, wanted a number from -1e+09 to 1e+09":                                                   course(func(c *Course) { c.Marks[2].Y = nan }),
		"mark 1: x is +Inf, wanted a number from -1e+09 to 1e+09":                                                  course(func(c *Course) { c.Marks[0].X = inf }),
		"mark 2: uncertainty is -0.001, wanted 0 or more":                                                          course(func(c *Course) { c.Marks[1].U = -0.001 }),
		"flag 1: x is NaN, wanted a number from -1e+09 to 1e+09":                                                   course(func(c *Course) { c.Flags[0].X = nan }),
		"limit is -Inf, wanted a number from -1e+09 to 1e+09":                                                      course(func(c *Course) { c.Limit.Y = -inf }),
		"fitted line is 3 x and 2 y, wanted as many of each":                                                       course(func(c *Course) { c.Fitted = &Line{"", []float64{1, 2, 3}, []float64{1, 2}} }),
		"fitted line 3: x is 2 after 2, wanted x that rises":                                                       course(func(c *Course) { c.Fitted = &Line{"", []float64{1, 2, 2}, []float64{1, 2, 3}} }),
		"median 2: y is NaN, wanted a number from -1e+09 to 1e+09":                                                 course(func(c *Course) { c.Median = &Line{"", []float64{1, 2}, []float64{1, nan}} }),
		"forecast 1: x is 1e+300, wanted a number from -1e+09 to 1e+09":                                            course(func(c *Course) { c.Forecast = &Band{"", []float64{1e300}, []float64{1}, []float64{2}} }),
		"envelope 2 is from 3 to 2, wanted low below high":                                                         course(func(c *Course) { c.Envelope = &Band{"", []float64{1, 2}, []float64{1, 3}, []float64{2, 2}} }),
		"envelope is 2 x and 1 y, wanted as many of each":                                                          course(func(c *Course) { c.Envelope = &Band{"", []float64{1, 2}, []float64{1, 3}, []float64{2}} }),
		"point 4 is NaN, wanted a number from -1e+09 to 1e+09":                                                     control(func(c *Control) { c.Points[3].Y = nan }),
		"centre is NaN, wanted a number from -1e+09 to 1e+09":                                                      control(func(c *Control) { c.Centre = nan }),
		"lower action limit is 79 above lower warning limit 77.4, wanted action, warning and centre in this order": control(func(c *Control) { c.ActionLow = 79 }),
	} {
		var b bytes.Buffer
		err := p.Write(&b, SVG, Page)
		var input *InputError
		if !errors.As(err, &input) || err.Error() != want {
			t.Errorf("got %v, wanted %q", err, want)
		}
		if b.Len() > 0 {
			t.Errorf("%q: %d bytes written", want, b.Len())
		}
	}
}

func TestFormAndSizeErrors(t *testing.T) {
	for _, c := range []struct {
		form Form
		size Size
		want string
	}{
		{"gif", Page, `picture form is "gif", wanted svg or png`},
		{SVG, Size{10, 80}, "picture width is 10 mm, wanted 60 to 600 mm"},
		{PNG, Size{100, math.NaN()}, "picture height is NaN mm, wanted 60 to 600 mm"},
		{PNG, Size{100, 5000}, "picture height is 5000 mm, wanted 60 to 600 mm"},
		{PNG, Size{}, "picture width is 0 mm, wanted 60 to 600 mm"},
	} {
		if err := fall().Write(io.Discard, c.form, c.size); err == nil || err.Error() != c.want {
			t.Errorf("course: got %v, wanted %q", err, c.want)
		}
		if err := season(9).Write(io.Discard, c.form, c.size); err == nil || err.Error() != c.want {
			t.Errorf("control: got %v, wanted %q", err, c.want)
		}
	}
}

type broken struct{}

var errBroken = errors.New("the pipe is closed")

func (broken) Write([]byte) (int, error) { return 0, errBroken }

func TestWriterError(t *testing.T) {
	for _, f := range []Form{SVG, PNG} {
		if err := fall().Write(broken{}, f, leastSize); !errors.Is(err, errBroken) {
			t.Errorf("%s: got %v, wanted the error of the writer", f, err)
		}
	}
}

// Without readings the picture says so, whatever else there is to draw.
func TestNoReadings(t *testing.T) {
	bare := fall()
	bare.Marks = nil
	for _, p := range []interface {
		Write(io.Writer, Form, Size) error
	}{Course{}, Control{}, bare, Course{Fitted: &Line{}, Forecast: &Band{}, Median: &Line{}, Envelope: &Band{}}, Control{HasLimits: true}} {
		for _, s := range []Size{Page, Phone, leastSize} {
			said := ofClass(elements(t, written(t, p, SVG, s)), "empty")
			if len(said) != 1 || said[0].attr["aria-label"] != "no readings" {
				t.Errorf("%+v: says %v, wanted that there are no readings", p, said)
			}
		}
		decoded(t, written(t, p, PNG, leastSize))
	}
}

// One reading, equal readings and readings at one time stand in the middle of an axis
// that can be read.
func TestFlatData(t *testing.T) {
	for name, marks := range map[string][]Mark{
		"one":      {{X: 3, Y: 1.05}},
		"equal":    {{X: 0, Y: 1.02}, {X: 1, Y: 1.02}, {X: 2, Y: 1.02}},
		"one time": {{X: 2, Y: 1.02}, {X: 2, Y: 1.05}},
		"zero":     {{}, {}},
		"one line": {{X: 1, Y: -5}},
	} {
		f := Course{Marks: marks}.draw(Page)
		if got := len(shapesOf(f, "mark")); got != len(marks) {
			t.Errorf("%s: %d marks, wanted %d", name, got, len(marks))
		}
		grid := shapesOf(f, "grid")
		if len(grid) < 2 || yScale(t, f) <= 0 {
			t.Errorf("%s: the axis cannot be read", name)
		}
		for _, s := range shapesOf(f, "mark") {
			if m := s.middle(); !f.in.grown(-5).holds(rect{m.X, m.Y, m.X, m.Y}) {
				t.Errorf("%s: a mark at %v, on the edge of %v", name, m, f.in)
			}
		}
	}
}

// Of a million readings the lowest and the highest of each half point are drawn, and
// the extremes of all.
func TestManyMarks(t *testing.T) {
	const n = 1_000_000
	c := Course{YLabel: "%"}
	low, high := math.Inf(1), math.Inf(-1)
	for k := range n {
		y := 50 + 40*math.Sin(float64(k)/1000)*math.Sin(float64(k)/77)
		low, high = math.Min(low, y), math.Max(high, y)
		c.Marks = append(c.Marks, Mark{X: float64(k) / n, Y: y})
		if k%10 == 0 {
			c.Flags = append(c.Flags, Flag{X: float64(k) / n, Text: "roused"})
		}
	}
	f := c.draw(Page)
	marks := shapesOf(f, "mark")
	columns := func(f *frame) int { return int((f.in.x1-f.in.x0)/column) + 2 }
	if len(marks) > 2*columns(f) {
		t.Errorf("%d marks in %d columns", len(marks), columns(f))
	}
	top, bottom := math.Inf(-1), math.Inf(1)
	for _, s := range marks {
		top, bottom = math.Max(top, float64(s.middle().Y)), math.Min(bottom, float64(s.middle().Y))
	}
	scale := yScale(t, f)
	if got, want := top-bottom, (high-low)*scale; math.Abs(got-want) > 1e-6*want {
		t.Errorf("the marks reach over %g pt, wanted %g", got, want)
	}

	s := Control{Points: make([]Individual, n/10)}
	for k := range s.Points {
		s.Points[k] = Individual{Y: c.Marks[k].Y, Group: k, Flagged: k%2 == 0}
	}
	f = s.draw(Page)
	if got := len(shapesOf(f, "point")); got > 4*columns(f) {
		t.Errorf("%d points in %d columns", got, columns(f))
	}
	long := Line{X: make([]float64, n), Y: make([]float64, n)}
	for k, m := range c.Marks {
		long.X[k], long.Y[k] = m.X, m.Y
	}
	f = Course{Fitted: &long}.draw(Page)
	if got := len(shapesOf(f, "fitted")[0].path); got > 4*columns(f) {
		t.Errorf("a line of %d points in %d columns", got, columns(f))
	}
}
