package chart

import (
	"math"

	"gonum.org/v1/plot/vg"
)

// obstacles are what a label may not cover.
type obstacles struct {
	boxes []rect
	lines []stretch
}

// stretch is a piece of a line of some class.
type stretch struct {
	class string
	a, b  vg.Point
}

func (o *obstacles) box(r rect) { o.boxes = append(o.boxes, r) }

func (o *obstacles) along(class string, points []vg.Point) {
	for k := 1; k < len(points); k++ {
		o.lines = append(o.lines, stretch{class, points[k-1], points[k]})
	}
}

// hit reports whether a rectangle covers anything, lines of one class left out.
func (o *obstacles) hit(r rect, but string) bool {
	for _, b := range o.boxes {
		if b.meets(r) {
			return true
		}
	}
	for _, l := range o.lines {
		if l.class != but && crosses(l.a, l.b, r) {
			return true
		}
	}
	return false
}

// crosses reports whether a segment touches a rectangle (Liang and Barsky 1984).
func crosses(a, b vg.Point, r rect) bool {
	from, to := vg.Length(0), vg.Length(1)
	dx, dy := b.X-a.X, b.Y-a.Y
	for _, c := range [][2]vg.Length{{-dx, a.X - r.x0}, {dx, r.x1 - a.X}, {-dy, a.Y - r.y0}, {dy, r.y1 - a.Y}} {
		p, q := c[0], c[1]
		switch {
		case p == 0 && q < 0:
			return false
		case p < 0:
			from = max(from, q/p)
		case p > 0:
			to = min(to, q/p)
		}
	}
	return from <= to
}

const labelGap vg.Length = 3 // between a line and its name

// parts reports whether another line runs through the way from a name to its line.
// Bars and poles do not mislead.
func (o *obstacles) parts(way rect, class string) bool {
	for _, l := range o.lines {
		if l.class != class && l.class != "bar" && l.class != "pole" && crosses(l.a, l.b, way) {
			return true
		}
	}
	return false
}

// spot is where a name could stand: its baseline, how far the line it belongs to
// rises or falls along it, and the height of that line.
type spot struct{ base, slope, line vg.Length }

// beside is the place for a name right above or below a line, where the line is
// flattest, so that nobody has to guess which line is meant. ok is false where the
// name has no room.
func (f *frame) beside(o *obstacles, n named, name string, points []vg.Point, side int) (at vg.Point, ok bool) {
	var extent vg.Length
	if len(points) > 0 {
		extent = points[len(points)-1].X - points[0].X
	}
	return f.flattest(o, n, name, func(x0, x1 vg.Length) (spot, bool) {
		low, high, covered := reach(points, x0, x1)
		s := spot{high + labelGap + textHand.descent(), high - low, low}
		if side < 0 {
			s.base, s.line = low-labelGap-textHand.ascent(), high
		}
		return s, covered > 0 && covered >= 0.6*min(x1-x0, extent)
	})
}

// between is the place for a name inside a band, under its upper edge.
func (f *frame) between(o *obstacles, n named, name string) (at vg.Point, ok bool) {
	return f.flattest(o, n, name, func(x0, x1 vg.Length) (spot, bool) {
		ceiling, high, covered := reach(n.lines[0], x0, x1)
		low, floor, _ := reach(n.lines[1], x0, x1)
		base := ceiling - labelGap - textHand.ascent()
		return spot{base, min(high-ceiling, floor-low), base}, covered >= (x1-x0)*0.999 && base-textHand.descent()-labelGap > floor
	})
}

// flattest tries places from left to right, and takes the first among those with the
// least slope where the name is inside the frame, covers nothing and has nothing
// between it and its line; with some distance to everything else if that can be had.
func (f *frame) flattest(o *obstacles, n named, name string, place func(x0, x1 vg.Length) (spot, bool)) (at vg.Point, ok bool) {
	w := textHand.width(name)
	least := vg.Length(math.Inf(1))
	const tries = 48
	for _, distance := range []vg.Length{7, 1} {
		for k := range tries + 1 {
			x := f.in.x0 + 3 + (f.in.x1-f.in.x0-6-w)*vg.Length(k)/tries
			s, possible := place(x, x+w)
			if !possible || s.slope >= least-0.5 {
				continue
			}
			r := textHand.box(name, vg.Point{X: x, Y: s.base})
			way := rect{r.x0, min(r.y0, s.line), r.x1, max(r.y1, s.line)}
			if f.in.holds(r.grown(1)) && !o.hit(r.grown(distance), n.class) && !o.parts(way, n.class) {
				least, at, ok = s.slope, vg.Point{X: x, Y: s.base}, true
			}
		}
		if ok {
			break
		}
	}
	return at, ok
}

// reach is the lowest and the highest point of a line between two x, and how much of
// the way the line covers.
func reach(points []vg.Point, x0, x1 vg.Length) (low, high, covered vg.Length) {
	low, high = vg.Length(math.Inf(1)), vg.Length(math.Inf(-1))
	for k := 1; k < len(points); k++ {
		a, b := points[k-1], points[k]
		from, to := max(a.X, x0), min(b.X, x1)
		if from > to {
			continue
		}
		covered += to - from
		for _, x := range []vg.Length{from, to} {
			y := a.Y
			if b.X > a.X {
				y += (b.Y - a.Y) * (x - a.X) / (b.X - a.X)
			}
			low, high = min(low, y), max(high, y)
		}
	}
	return low, high, covered
}
