package chart

import (
	"fmt"
	"math"
	"slices"
	"strings"
	"testing"

	"gonum.org/v1/plot/vg"
	"pgregory.net/rapid"
)

func TestCourseElements(t *testing.T) {
	for _, s := range []Size{Page, Phone} {
		list := elements(t, written(t, fall(), SVG, s))
		for class, want := range map[string]int{
			"mark": 9, "hollow": 2, "bar": 10, // one hollow reading has no uncertainty
			"fitted": 1, "median": 1, "forecast": 1, "envelope": 1, "limit": 1, "pole": 6, "pennant": 3,
		} {
			if got := len(ofClass(list, class)); got != want {
				t.Errorf("%v: %d of %s, wanted %d", s, got, class, want)
			}
		}
	}
}

// A bar is as long as twice its uncertainty on the axis that is printed beside it.
func TestBarsToScale(t *testing.T) {
	c := fall()
	f := c.draw(Page)
	scale := yScale(t, f)
	bars := shapesOf(f, "bar")
	k := 0
	for _, m := range f.thinned(c.Marks) {
		if m.U == 0 {
			continue
		}
		p := bars[k].points()
		if got, want := float64(p[1].Y-p[0].Y), 2*m.U*scale; math.Abs(got-want) > 1e-6*want {
			t.Errorf("bar at %g is %g pt long, wanted %g", m.X, got, want)
		}
		k++
	}
	if k != len(bars) {
		t.Errorf("%d bars, wanted %d", len(bars), k)
	}
}

// The forecast's polygon surrounds its median.
func TestBandHoldsMedian(t *testing.T) {
	f := fall().draw(Page)
	around := shapesOf(f, "forecast")[0].points()
	median := shapesOf(f, "median")[0].points()
	for _, p := range median[1 : len(median)-1] {
		if !inside(around, p) {
			t.Errorf("%v of the median is outside the band", p)
		}
	}
	if inside(around, median[1].Add(vg.Point{Y: 100})) {
		t.Error("a point far above counts as inside")
	}
}

// inside counts crossings of a ray to the right.
func inside(around []vg.Point, p vg.Point) bool {
	in := false
	for k, a := range around {
		b := around[(k+1)%len(around)]
		if (a.Y > p.Y) != (b.Y > p.Y) && p.X < a.X+(b.X-a.X)*(p.Y-a.Y)/(b.Y-a.Y) {
			in = !in
		}
	}
	return in
}

// Whatever is drawn: marks lie in the frame, labels on the sheet, no label covers
// another or a mark, and no name lies over a line.
func TestCourseLegible(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		c := drawnCourse(t)
		s := Size{rapid.Float64Range(60, 250).Draw(t, "width"), rapid.Float64Range(60, 200).Draw(t, "height")}
		if err := c.check(); err != nil {
			t.Fatal(err)
		}
		legible(t, c.draw(s))
	})
}

func legible(t *rapid.T, f *frame) {
	if f.in.x1-f.in.x0 < 20 || f.in.y1-f.in.y0 < 20 {
		t.Fatalf("the frame %v leaves no room for data", f.in)
	}
	sheet := rect{0, 0, f.w, f.h}
	var labels []shape
	var marks []rect
	var lines []shape
	for _, s := range f.shapes {
		if slices.Contains([]string{"fitted", "median", "edge", "limit", "pole", "bar", "run", "centre", "warning", "action"}, s.class) {
			lines = append(lines, s)
		}
		if s.text != "" {
			labels = append(labels, s)
		}
		if s.class != "mark" && s.class != "hollow" && s.class != "point" {
			continue
		}
		at := s.middle()
		r := rect{at.X, at.Y, at.X, at.Y}
		if !f.in.holds(r) {
			t.Fatalf("%s at %v outside %v", s.class, at, f.in)
		}
		marks = append(marks, r.grown(markSize))
	}
	for k, a := range labels {
		if !sheet.holds(a.bounds) {
			t.Fatalf("%s %q at %v is cut by the edge", a.class, a.text, a.bounds)
		}
		if !strings.HasPrefix(a.full, strings.TrimSuffix(a.text, ellipsis)) && a.full != "" {
			t.Fatalf("%q shortens %q", a.text, a.full)
		}
		for _, b := range labels[:k] {
			if a.bounds.meets(b.bounds) {
				t.Fatalf("%s %q covers %s %q", a.class, a.text, b.class, b.text)
			}
		}
		for _, l := range lines {
			p := l.points()
			for k := 1; k < len(p) && a.class == "label"; k++ {
				if crosses(p[k-1], p[k], a.bounds) {
					t.Fatalf("%s %q lies over a line of the %s", a.class, a.text, l.class)
				}
			}
		}
		for _, m := range marks {
			if a.bounds.meets(m) {
				t.Fatalf("%s %q covers a mark", a.class, a.text)
			}
		}
	}
}

func drawnCourse(t *rapid.T) Course {
	name := rapid.StringOfN(rapid.RuneFrom([]rune("abc WMil…é°%")), 0, 60, -1)
	lo := rapid.Float64Range(-1000, 1000).Draw(t, "low")
	y := rapid.Float64Range(lo, lo+rapid.SampledFrom([]float64{0, 0.001, 0.05, 10, 5000}).Draw(t, "span"))
	x := rapid.Float64Range(0, rapid.SampledFrom([]float64{0.01, 1, 9, 30, 400}).Draw(t, "long"))
	c := Course{Title: name.Draw(t, "title"), XLabel: name.Draw(t, "x label"), YLabel: name.Draw(t, "y label")}
	for range rapid.IntRange(0, 12).Draw(t, "marks") {
		c.Marks = append(c.Marks, Mark{X: x.Draw(t, "x"), Y: y.Draw(t, "y"), U: rapid.Float64Range(0, 0.01).Draw(t, "u"), Hollow: rapid.Bool().Draw(t, "hollow")})
	}
	for range rapid.IntRange(0, 9).Draw(t, "flags") {
		c.Flags = append(c.Flags, Flag{x.Draw(t, "flag"), name.Draw(t, "text")})
	}
	if rapid.Bool().Draw(t, "limit") {
		c.Limit = &Level{name.Draw(t, "limit name"), y.Draw(t, "limit y")}
	}
	band := func(what string) *Band {
		b := &Band{Name: name.Draw(t, what)}
		for k := range rapid.IntRange(0, 9).Draw(t, what+" points") {
			p, q := y.Draw(t, "band"), y.Draw(t, "band")
			b.X, b.Low, b.High = append(b.X, float64(k)), append(b.Low, math.Min(p, q)), append(b.High, math.Max(p, q))
		}
		return b
	}
	e := band("fitted")
	c.Fitted = &Line{e.Name, e.X, e.Low}
	c.Forecast, c.Envelope = band("forecast"), band("envelope")
	c.Median = &Line{fmt.Sprint("median ", name.Draw(t, "median")), c.Forecast.X, c.Forecast.High}
	return c
}
