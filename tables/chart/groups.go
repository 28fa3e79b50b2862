package chart

import (
	"image/color"
	"maps"
	"slices"
	"strconv"

	"gonum.org/v1/plot/vg"
)

// look is how the members of a group are drawn.
type look struct {
	color color.Color
	path  func(at vg.Point) vg.Path
}

// looks differ in shape first, in colour second; the areas are about the same. Groups
// beyond the last share it.
var looks = []look{
	{black, func(at vg.Point) vg.Path { return circle(at, 2.5) }},
	{blue, func(at vg.Point) vg.Path { return regular(at, 3.5, 3, 90) }},
	{orange, func(at vg.Point) vg.Path { return regular(at, 3.1, 4, 45) }},
	{green, func(at vg.Point) vg.Path { return regular(at, 3.2, 4, 90) }},
	{purple, func(at vg.Point) vg.Path { return regular(at, 3.5, 3, -90) }},
	{slate, func(at vg.Point) vg.Path { return star(at, 3.6, 1.4) }},
}

func star(at vg.Point, r, inner vg.Length) vg.Path {
	outer, notch := regular(at, r, 5, 90), regular(at, inner, 5, 126)
	var p vg.Path
	p.Move(outer[0].Pos)
	for k := range 5 {
		if k > 0 {
			p.Line(outer[k].Pos)
		}
		p.Line(notch[k].Pos)
	}
	p.Close()
	return p
}

// grouping gives every group its look.
type grouping struct {
	order []int // groups that occur, rising; 0 last
	index map[int]int
}

func (c Control) groups() grouping {
	seen := make(map[int]bool)
	for _, p := range c.Points {
		seen[p.Group] = true
	}
	g := grouping{order: slices.Sorted(maps.Keys(seen)), index: make(map[int]int)}
	if k := slices.Index(g.order, 0); k >= 0 {
		g.order = append(slices.Delete(g.order, k, k+1), 0)
	}
	for k, n := range g.order {
		g.index[n] = min(k, len(looks)-1)
	}
	return g
}

// keys are the legend, wanted where there is more than one group. The first says
// what a group is.
func (g grouping) keys(name string) []key {
	if len(g.order) < 2 {
		return nil
	}
	if name == "" {
		name = "generation"
	}
	var list []key
	for k, n := range g.order {
		text := strconv.Itoa(n)
		if n == 0 {
			text = "not known"
		}
		if k == 0 {
			text = name + " " + text
		}
		if k == len(looks)-1 && k < len(g.order)-1 {
			text += " and later"
		}
		list = append(list, key{text, 8, func(f *frame, in rect) {
			f.marker("sample", vg.Point{X: in.x1 - 4, Y: (in.y0 + in.y1) / 2}, looks[k])
		}})
		if k == len(looks)-1 {
			break
		}
	}
	return list
}

func (f *frame) marker(class string, at vg.Point, l look) {
	f.add(shape{class: class, path: l.path(at), fill: l.color, stroke: white, width: 0.5})
}

// drawPoints joins the values by a thin line, rings the flagged ones and draws them.
func (f *frame) drawPoints(points []Individual, g grouping, o *obstacles) {
	list := f.kept(points)
	run := make([]vg.Point, len(list))
	for k, i := range list {
		run[k] = f.at(float64(i+1), points[i].Y)
		o.box(rect{run[k].X, run[k].Y, run[k].X, run[k].Y}.grown(4))
	}
	f.line("run", runPen, run...)
	o.along("run", run)
	for k, i := range list {
		if points[i].Flagged {
			f.add(shape{class: "ring", path: circle(run[k], ringSize), stroke: ringPen.color, width: ringPen.width})
			o.box(rect{run[k].X, run[k].Y, run[k].X, run[k].Y}.grown(ringSize + 1))
		}
	}
	for k, i := range list {
		f.marker("point", run[k], looks[g.index[points[i].Group]])
	}
}
