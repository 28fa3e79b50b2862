package chart

import (
	"gonum.org/v1/plot/vg"
)

// frame is the sheet with its title and axes: it turns values into places.
type frame struct {
	*scene
	in        rect // where the data goes
	x, y      span
	yTicks    []tick
	flagFloor vg.Length // where the rows of flags begin
}

// plan is what a frame is made for.
type plan struct {
	size                  Size
	title, xLabel, yLabel string
	keys                  []key // of a legend
	flagRows              int
	right                 vg.Length // kept free beside the data
	x, y                  span
	yPlaces               int
	blank                 bool // there is nothing to give the axes numbers
}

// Distances in points.
const (
	edge       vg.Length = 9  // around everything
	lineHigh   vg.Length = 12 // of text
	tickGap    vg.Length = 4  // between the data and the numbers of the Y axis
	tickDrop   vg.Length = 5  // between the data and the numbers of the X axis
	yTickHigh  vg.Length = 18 // between labels of the Y axis at least
	mostYTicks           = 7
)

// newFrame lays out the sheet; what is drawn over the data comes later, axes last.
func newFrame(p plan) *frame {
	w, h := p.size.points()
	f := &frame{scene: &scene{w: w, h: h, title: clean(p.title)}, x: p.x, y: p.y}
	wide := w - 2*edge
	top := h - edge
	if f.title != "" {
		f.label(titleHand, "title", f.title, vg.Point{X: edge, Y: top - titleHand.ascent()}, wide)
		top -= titleHand.size + 6
	}
	top = f.legend(p.keys, top)
	if label := clean(p.yLabel); label != "" {
		f.label(axisHand, "axis-name", label, vg.Point{X: edge, Y: top - axisHand.ascent()}, wide)
		top -= lineHigh
	}
	f.flagFloor = top - vg.Length(p.flagRows)*lineHigh
	f.in = rect{edge, edge + tickSize + tickDrop + 1, w - edge - p.right, f.flagFloor - 6}
	if label := clean(p.xLabel); label != "" {
		f.in.y0 += lineHigh - 2
		label = axisHand.shorten(label, wide)
		f.label(axisHand, "axis-name", label, vg.Point{X: f.in.x1 - min(axisHand.width(label), f.in.x1-edge), Y: edge + axisHand.descent()}, wide)
	}
	if !p.blank {
		f.yTicks = ticksFor(p.y, min(max(4, int((f.in.y1-f.in.y0)/yTickHigh)), mostYTicks), max(p.yPlaces, usualPlaces(p.yLabel, p.y)))
	}
	var widest vg.Length
	for _, t := range f.yTicks {
		widest = max(widest, tickHand.width(t.text))
	}
	f.in.x0 += widest + tickGap
	return f
}

func (f *frame) px(x float64) vg.Length {
	return f.in.x0 + (f.in.x1-f.in.x0)*vg.Length((x-f.x.lo)/f.x.width())
}

func (f *frame) py(y float64) vg.Length {
	return f.in.y0 + (f.in.y1-f.in.y0)*vg.Length((y-f.y.lo)/f.y.width())
}

func (f *frame) at(x, y float64) vg.Point { return vg.Point{X: f.px(x), Y: f.py(y)} }

// grid draws the labels of the Y axis, and hair lines that lead the eye to them.
func (f *frame) grid() {
	for _, t := range f.yTicks {
		y := f.py(t.at)
		f.line("grid", gridPen, vg.Point{X: f.in.x0, Y: y}, vg.Point{X: f.in.x1, Y: y})
		f.label(tickHand, "tick", t.text, vg.Point{X: f.in.x0 - tickGap - tickHand.width(t.text), Y: y - tickHand.ascent()/2}, f.in.x0)
	}
}

// axis draws the X axis with these ticks. A label that would leave the sheet is
// pushed in; one that would touch the label before it is left out.
func (f *frame) axis(ticks []tick) {
	f.line("axis", axisPen, vg.Point{X: f.in.x0, Y: f.in.y0}, vg.Point{X: f.in.x1, Y: f.in.y0})
	var taken vg.Length // up to where labels stand
	for _, t := range ticks {
		x := f.px(t.at)
		f.line("axis", axisPen, vg.Point{X: x, Y: f.in.y0}, vg.Point{X: x, Y: f.in.y0 - 2.5})
		w := tickHand.width(t.text)
		left := max(edge/2, min(x-w/2, f.w-edge/2-w))
		if left < taken {
			continue
		}
		taken = left + w + 3
		f.label(tickHand, "tick", t.text, vg.Point{X: left, Y: f.in.y0 - tickDrop - tickHand.ascent()}, f.w)
	}
}

// numbers are the ticks of an X axis of numbers: as many as have room, and whole
// numbers where there are three of them.
func (f *frame) numbers() []tick {
	most := 12
	if f.x.width() >= 3 {
		most = min(most, int(f.x.width())+1)
	}
	for {
		list := ticksFor(f.x, most, 0)
		var widest vg.Length
		for _, t := range list {
			widest = max(widest, tickHand.width(t.text))
		}
		if most <= 2 || len(list) <= roomFor(f.in.x1-f.in.x0, widest) {
			return list
		}
		most--
	}
}

// noReadings says so in the middle, before a ground that keeps lines away.
func (f *frame) noReadings(o *obstacles) {
	const text = "no readings"
	at := vg.Point{X: (f.in.x0+f.in.x1)/2 - axisHand.width(text)/2, Y: (f.in.y0 + f.in.y1) / 2}
	ground := axisHand.box(text, at).grown(3)
	f.area("ground", white, ground.corners()...)
	f.label(axisHand, "empty", text, at, f.w)
	o.box(ground)
}
