package chart

import (
	"bytes"
	"encoding/xml"
	"errors"
	"io"
	"math"
	"strconv"
	"strings"
	"testing"

	"gonum.org/v1/plot/vg"
)

// fall is an invented course: a logistic fall from 1.050 to 1.010 in eight days.
func fall() Course {
	at := func(x float64) float64 { return 1.010 + 0.040/(1+math.Exp((x-2.5)/0.6)) }
	c := Course{Title: "Vessel 3 Harbour Pale", XLabel: "days since pitching", YLabel: "SG 20/20"}
	for k, x := range []float64{0, 1, 2, 2.9, 3.5, 4.1, 5, 6.2, 8} {
		c.Marks = append(c.Marks, Mark{X: x, Y: at(x) + 0.0003*float64(k%3-1), U: 0.0004 * float64(1+k%4)})
	}
	c.Marks = append(c.Marks, Mark{X: 4.5, Y: 1.027, U: 0.001, Hollow: true}, Mark{X: 7, Y: 1.03, Hollow: true})
	trace := func(from, to float64) (x, y []float64) {
		for k := range 81 {
			x = append(x, from+(to-from)*float64(k)/80)
			y = append(y, at(x[k]))
		}
		return x, y
	}
	moved := func(list []float64, by float64) []float64 {
		out := make([]float64, len(list))
		for k := range list {
			out[k] = list[k] + by
		}
		return out
	}
	x, y := trace(0, 8)
	c.Fitted = &Line{"fitted curve", x, y}
	c.Envelope = &Band{"last 10 batches", x, moved(y, -0.004), moved(y, 0.005)}
	x, y = trace(8, 10)
	c.Median = &Line{"forecast", x, y}
	c.Forecast = &Band{"forecast, 5 to 95 %", x, moved(y, -0.0015), moved(y, 0.002)}
	c.Limit = &Level{"limit of attenuation", 1.0085}
	c.Flags = []Flag{{4.2, "dry hops"}, {0.1, "oxygen"}, {7.5, "racked"}}
	return c
}

// season is an invented control chart of n values, two of them flagged.
func season(n int) Control {
	c := Control{
		Title: "Harbour Pale", XLabel: "closed batches", YLabel: "apparent attenuation, %", HasLimits: true,
		Centre: 79.1, WarningLow: 77.4, WarningHigh: 80.8, ActionLow: 76.5, ActionHigh: 81.7,
	}
	for k := range n {
		y := 79.1 + 1.3*math.Sin(float64(k*k))
		p := Individual{Label: "B-" + strconv.Itoa(100+3*k), Y: y, Group: 1 + k%3}
		if k == n/3 || k == n/2 {
			p.Y, p.Flagged = 75.2+float64(k%2)*7.5, true
		}
		c.Points = append(c.Points, p)
	}
	return c
}

// written is the picture, which has to be possible.
func written(t *testing.T, p interface {
	Write(io.Writer, Form, Size) error
}, f Form, s Size,
) []byte {
	t.Helper()
	var b bytes.Buffer
	if err := p.Write(&b, f, s); err != nil {
		t.Fatalf("writing %s at %v: %v", f, s, err)
	}
	return b.Bytes()
}

// element is what was read from an SVG.
type element struct {
	name string
	attr map[string]string
	text string
}

// elements reads a whole SVG with the strict parser.
func elements(t *testing.T, data []byte) (list []element) {
	t.Helper()
	d := xml.NewDecoder(bytes.NewReader(data))
	var open []int
	for {
		token, err := d.Token()
		if errors.Is(err, io.EOF) {
			return list
		}
		if err != nil {
			t.Fatalf("not well-formed: %v", err)
		}
		switch token := token.(type) {
		case xml.StartElement:
			e := element{name: token.Name.Local, attr: map[string]string{}}
			for _, a := range token.Attr {
				e.attr[a.Name.Local] = a.Value
			}
			open = append(open, len(list))
			list = append(list, e)
		case xml.EndElement:
			open = open[:len(open)-1]
		case xml.CharData:
			if len(open) > 0 {
				list[open[len(open)-1]].text += string(token)
			}
		default:
			t.Fatalf("%T in the file, wanted elements and text only", token)
		}
	}
}

func ofClass(list []element, class string) (found []element) {
	for _, e := range list {
		if e.attr["class"] == "chart-"+class {
			found = append(found, e)
		}
	}
	return found
}

// shapesOf are the shapes of a class on a sheet.
func shapesOf(f *frame, class string) (found []shape) {
	for _, s := range f.shapes {
		if s.class == class {
			found = append(found, s)
		}
	}
	return found
}

// points are the ends of the pieces of a path of straight lines.
func (s shape) points() (list []vg.Point) {
	for _, c := range s.path {
		if c.Type == vg.MoveComp || c.Type == vg.LineComp {
			list = append(list, c.Pos)
		}
	}
	return list
}

// middle is the centre of a circle or the mean of the corners.
func (s shape) middle() vg.Point {
	var sum vg.Point
	corners := s.points()
	for _, p := range corners {
		sum = sum.Add(p)
	}
	for _, c := range s.path {
		if c.Type == vg.ArcComp {
			return c.Pos
		}
	}
	return sum.Scale(1 / vg.Length(len(corners)))
}

// yScale reads the Y axis off the picture as a person does: points of paper for a
// unit, from the first and the last grid line and what is written beside them.
func yScale(t *testing.T, f *frame) float64 {
	t.Helper()
	grid := shapesOf(f, "grid")
	if len(grid) < 2 {
		t.Fatalf("%d grid lines, wanted 2 at least", len(grid))
	}
	first, last := grid[0].points()[0].Y, grid[len(grid)-1].points()[0].Y
	return float64(last-first) / (labelled(t, f, last) - labelled(t, f, first))
}

// labelled is the number beside a height of the Y axis.
func labelled(t *testing.T, f *frame, y vg.Length) float64 {
	t.Helper()
	for _, s := range shapesOf(f, "tick") {
		if s.bounds.x1 < f.in.x0 && s.bounds.y0 < y && y < s.bounds.y1 {
			v, err := strconv.ParseFloat(strings.Replace(s.text, "−", "-", 1), 64)
			if err != nil {
				t.Fatal(err)
			}
			return v
		}
	}
	t.Fatalf("no number beside %v", y)
	return 0
}
