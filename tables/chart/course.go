package chart

import (
	"image/color"
	"slices"
	"strings"

	"gonum.org/v1/plot/vg"
)

// named is something in the picture that wants its name beside it.
type named struct {
	name   string
	class  string // of its lines among the obstacles
	hand   hand
	lines  [][]vg.Point // the upper and the lower edge, or one; the label goes between, above or below
	sample key
}

// draw lays the course out with every name beside its line. A name that has no room
// goes to a legend, which takes room itself, so it is tried again until all have a
// place.
func (c Course) draw(s Size) *frame {
	p := c.plan(s)
	flags := c.flagging(s)
	p.flagRows = flags.rows
	var listed []string
	for {
		f, homeless := c.try(p, flags, listed)
		if len(homeless) == 0 {
			return f
		}
		for _, n := range homeless {
			listed = append(listed, n.name)
			p.keys = append(p.keys, n.sample)
		}
	}
}

func (c Course) plan(s Size) plan {
	x, y := nothing, nothing
	for _, m := range c.Marks {
		x, y = x.with(m.X), y.with(m.Y-m.U, m.Y+m.U)
	}
	for _, l := range []*Line{c.Fitted, c.Median} {
		if l != nil {
			x, y = x.with(l.X...), y.with(l.Y...)
		}
	}
	for _, b := range []*Band{c.Forecast, c.Envelope} {
		if b != nil {
			x, y = x.with(b.X...), y.with(b.Low...).with(b.High...)
		}
	}
	for _, f := range c.Flags {
		x = x.with(f.X)
	}
	if c.Limit != nil {
		y = y.with(c.Limit.Y)
	}
	return plan{
		size: s, title: c.Title, xLabel: c.XLabel, yLabel: c.YLabel, yPlaces: c.YPlaces,
		x: x.atLeast(1e-4, 1).padded(0.02, 0.02), y: y.atLeast(0.01, 0).padded(0.05, 0.1),
		blank: x.empty() || y.empty(),
	}
}

// try draws everything, and names what is not listed in the legend. It returns those
// that found no place.
func (c Course) try(p plan, flags flagging, listed []string) (*frame, []named) {
	f := newFrame(p)
	var o obstacles
	var names []named
	if b := c.Envelope; b.drawn() {
		low, high := f.band("envelope", soft, b)
		names = append(names, named{b.Name, "envelope", textHand.in(softText), [][]vg.Point{high, low}, bandKey(b.Name, soft, nil)})
	}
	f.grid()
	if b := c.Forecast; b.drawn() {
		low, high := f.band("forecast", sky, b)
		f.line("edge", edgePen, low...)
		f.line("edge", edgePen, high...)
		o.along("forecast", low)
		o.along("forecast", high)
		names = append(names, named{b.Name, "forecast", textHand.in(blue), [][]vg.Point{high, low}, bandKey(b.Name, sky, &edgePen)})
	}
	if l := c.Limit; l != nil {
		y := f.py(l.Y)
		line := []vg.Point{{X: f.in.x0, Y: y}, {X: f.in.x1, Y: y}}
		f.line("limit", limitPen, line...)
		o.along("limit", line)
		names = append(names, named{l.Name, "limit", textHand.in(warmText), [][]vg.Point{line}, lineKey(l.Name, limitPen)})
	}
	f.drawFlags(flags, c.sortedFlags(), &o)
	for _, one := range []struct {
		line  *Line
		class string
		pen   pen
	}{{c.Fitted, "fitted", fittedPen}, {c.Median, "median", medianPen}} {
		if one.line == nil || len(one.line.X) < 2 {
			continue
		}
		points := f.trace(one.line.X, one.line.Y)
		f.line(one.class, one.pen, points...)
		o.along(one.class, points)
		if one.class == "median" && c.Forecast.drawn() && strings.HasPrefix(c.Forecast.Name, one.line.Name) {
			continue
		}
		names = append(names, named{one.line.Name, one.class, textHand.in(blue), [][]vg.Point{points}, lineKey(one.line.Name, one.pen)})
	}
	f.drawMarks(c.Marks, &o)
	if len(c.Marks) == 0 {
		f.noReadings(&o)
	}
	homeless := f.name(names, listed, &o)
	if p.blank {
		f.axis(nil)
	} else {
		f.axis(f.numbers())
	}
	return f, homeless
}

// name writes names beside their lines, those first that have the fewest places to
// go: the level, the lines, the bands.
func (f *frame) name(names []named, listed []string, o *obstacles) (homeless []named) {
	for _, n := range slices.Backward(names) {
		name := textHand.shorten(clean(n.name), (f.in.x1-f.in.x0)*0.45)
		if name == "" || slices.Contains(listed, n.name) {
			continue
		}
		var at vg.Point
		var ok bool
		if len(n.lines) > 1 {
			at, ok = f.between(o, n, name)
		}
		if !ok {
			at, ok = f.beside(o, n, name, n.lines[0], 1)
		}
		if !ok {
			at, ok = f.beside(o, n, name, n.lines[len(n.lines)-1], -1)
		}
		if !ok {
			homeless = append(homeless, n)
			continue
		}
		f.label(n.hand, "label", name, at, f.w)
		o.box(n.hand.box(name, at).grown(2))
	}
	return homeless
}

func (b *Band) drawn() bool { return b != nil && len(b.X) > 1 }

// band fills the area between two lines, and returns them.
func (f *frame) band(class string, fill color.Color, b *Band) (low, high []vg.Point) {
	low, high = f.trace(b.X, b.Low), f.trace(b.X, b.High)
	around := slices.Clone(high)
	for _, pt := range slices.Backward(low) {
		around = append(around, pt)
	}
	f.area(class, fill, around...)
	return low, high
}

func bandKey(name string, fill color.Color, border *pen) key {
	return key{name, sampleWide, func(f *frame, in rect) {
		f.area("sample", fill, in.corners()...)
		if border != nil {
			f.line("sample", *border, vg.Point{X: in.x0, Y: in.y0}, vg.Point{X: in.x1, Y: in.y0})
			f.line("sample", *border, vg.Point{X: in.x0, Y: in.y1}, vg.Point{X: in.x1, Y: in.y1})
		}
	}}
}
