package chart

import (
	"image/color"
	"math"

	"gonum.org/v1/plot/vg"
)

// shape is one thing drawn: a path that is filled, stroked or both.
type shape struct {
	class  string // what it is, "mark"; the SVG has it as "chart-mark"
	path   vg.Path
	fill   color.Color // nil = not filled
	stroke color.Color // nil = not stroked
	width  vg.Length
	dash   []vg.Length
	text   string // what the outlines of a label say
	full   string // the whole of it, where text was shortened
	bounds rect   // of a label
}

// scene is what both forms are written from: shapes from back to front on white, in
// points from the lower left corner.
type scene struct {
	w, h   vg.Length
	title  string
	shapes []shape
}

// rect is an upright rectangle.
type rect struct{ x0, y0, x1, y1 vg.Length }

func (r rect) meets(o rect) bool {
	return r.x0 < o.x1 && o.x0 < r.x1 && r.y0 < o.y1 && o.y0 < r.y1
}

func (r rect) holds(o rect) bool {
	return o.x0 >= r.x0 && o.x1 <= r.x1 && o.y0 >= r.y0 && o.y1 <= r.y1
}

func (r rect) grown(by vg.Length) rect {
	return rect{r.x0 - by, r.y0 - by, r.x1 + by, r.y1 + by}
}

// pen is how a line is drawn.
type pen struct {
	color color.Color
	width vg.Length
	dash  []vg.Length
}

func (sc *scene) add(s shape) { sc.shapes = append(sc.shapes, s) }

func (sc *scene) line(class string, p pen, points ...vg.Point) {
	if len(points) > 1 {
		sc.add(shape{class: class, path: openPath(points), stroke: p.color, width: p.width, dash: p.dash})
	}
}

func (sc *scene) area(class string, fill color.Color, points ...vg.Point) {
	if len(points) > 2 {
		path := openPath(points)
		path.Close()
		sc.add(shape{class: class, path: path, fill: fill})
	}
}

func openPath(points []vg.Point) vg.Path {
	var p vg.Path
	p.Move(points[0])
	for _, pt := range points[1:] {
		p.Line(pt)
	}
	return p
}

func circle(at vg.Point, r vg.Length) vg.Path {
	var p vg.Path
	p.Move(vg.Point{X: at.X + r, Y: at.Y})
	p.Arc(at, r, 0, 2*math.Pi)
	p.Close()
	return p
}

// regular is a polygon around a point with its first corner at an angle in degrees.
func regular(at vg.Point, r vg.Length, corners int, first float64) vg.Path {
	var p vg.Path
	for k := range corners {
		sin, cos := math.Sincos((first + 360*float64(k)/float64(corners)) * math.Pi / 180)
		pt := vg.Point{X: at.X + r*vg.Length(cos), Y: at.Y + r*vg.Length(sin)}
		if k == 0 {
			p.Move(pt)
		} else {
			p.Line(pt)
		}
	}
	p.Close()
	return p
}
