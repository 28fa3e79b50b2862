package chart

import (
	"math"
	"slices"
	"strconv"

	"gonum.org/v1/plot/vg"
)

// draw lays the values out in order.
func (c Control) draw(s Size) *frame {
	groups := c.groups()
	y := nothing
	for _, p := range c.Points {
		y = y.with(p.Y)
	}
	if c.HasLimits {
		y = y.with(c.ActionLow, c.ActionHigh)
	}
	p := plan{
		size: s, title: c.Title, xLabel: c.XLabel, yLabel: c.YLabel, yPlaces: c.YPlaces, blank: y.empty(),
		x: span{0, float64(len(c.Points)) + 1}, y: y.atLeast(0.01, 0).padded(0.07, 0.07), keys: groups.keys(c.GroupName),
	}
	texts := c.limitTexts(p.y)
	w, _ := s.points()
	for k := range texts {
		texts[k].Name = textHand.shorten(texts[k].Name, w*0.3)
		p.right = max(p.right, textHand.width(texts[k].Name)+5)
	}
	f := newFrame(p)
	f.grid()
	var o obstacles
	f.drawLimits(texts, &o)
	f.drawPoints(c.Points, groups, &o)
	f.nameFlagged(c.Points, &o)
	if len(c.Points) == 0 {
		f.noReadings(&o)
	}
	f.axis(f.individuals(c.Points))
	return f
}

// limitTexts are the limits with what stands beside them, from above; their values
// have as many decimals as can be told apart in the picture.
func (c Control) limitTexts(y span) []Level {
	if !c.HasLimits {
		return nil
	}
	places := max(c.YPlaces, usualPlaces(c.YLabel, y), int(math.Ceil(-math.Log10(y.width()/40))), 0)
	names := []string{"action", "warning", "centre", "warning", "action"}
	list := c.limits()
	for k := 1; k < len(list); k++ { // what differs looks different
		for more := 0; more < 3 && list[k].Y != list[k-1].Y && rounded(list[k].Y, places) == rounded(list[k-1].Y, places); more++ {
			places++
		}
	}
	for k := range list {
		list[k].Name = names[k] + " " + rounded(list[k].Y, places)
	}
	return list
}

func (f *frame) drawLimits(texts []Level, o *obstacles) {
	if len(texts) == 0 {
		return
	}
	classes := []string{"action", "warning", "centre", "warning", "action"}
	pens := []pen{limitPen, warningPen, centrePen, warningPen, limitPen}
	hands := []hand{textHand.in(warmText), textHand.in(slate), textHand, textHand.in(slate), textHand.in(warmText)}
	heights := make([]vg.Length, len(texts))
	for k, l := range texts {
		y := f.py(l.Y)
		heights[k] = y
		line := []vg.Point{{X: f.in.x0, Y: y}, {X: f.in.x1, Y: y}}
		f.line(classes[k], pens[k], line...)
		o.along(classes[k], line)
	}
	for k, y := range apart(heights, textHand.size+1, f.in.y0+1, f.in.y1) {
		f.label(hands[k], "limit-name", texts[k].Name, vg.Point{X: f.in.x1 + 5, Y: y - hands[k].ascent()/2}, f.w)
	}
}

// apart moves heights, which fall, as little as it takes to keep a distance, within
// bounds.
func apart(heights []vg.Length, distance, low, high vg.Length) []vg.Length {
	type cluster struct {
		sum vg.Length // of what the middle would be for each
		n   int
		mid vg.Length
	}
	half := func(c cluster) vg.Length { return vg.Length(c.n-1) * distance / 2 }
	var list []cluster
	for _, h := range heights {
		c := cluster{h, 1, h}
		for {
			c.mid = min(max(c.sum/vg.Length(c.n), low+half(c)), high-half(c))
			k := len(list) - 1
			if k < 0 || list[k].mid-half(list[k])-distance >= c.mid+half(c) {
				break
			}
			c = cluster{sum: c.sum + list[k].sum, n: c.n + list[k].n}
			list = list[:k]
		}
		list = append(list, c)
	}
	var out []vg.Length
	for _, c := range list {
		for k := range c.n {
			out = append(out, c.mid+half(c)-vg.Length(k)*distance)
		}
	}
	return out
}

// individuals are the ticks of the X axis: as many names as have room side by side.
func (f *frame) individuals(points []Individual) []tick {
	const most = 60
	room := f.in.x1 - f.in.x0
	every := max(1, int(math.Ceil(float64(len(points))*18/float64(room))))
	names := func() (list []tick, widest vg.Length) {
		for k := 0; k < len(points); k += every {
			name := clean(points[k].Label)
			if name == "" {
				name = strconv.Itoa(k + 1)
			}
			name = tickHand.shorten(name, most)
			widest = max(widest, tickHand.width(name))
			list = append(list, tick{float64(k + 1), name})
		}
		return list, widest
	}
	list, widest := names()
	for len(list) > 1 && f.px(float64(1+every))-f.px(1) < widest+7 {
		every += max(1, every/8)
		list, widest = names()
	}
	return list
}

// nameFlagged writes the names of flagged points beside them, where there is room.
func (f *frame) nameFlagged(points []Individual, o *obstacles) {
	for _, k := range f.kept(points) {
		p := points[k]
		if !p.Flagged {
			continue
		}
		name := textHand.shorten(clean(p.Label), 70)
		if name == "" {
			continue
		}
		w := textHand.width(name)
		at := f.at(float64(k+1), p.Y)
		up, down := ringSize+4, -ringSize-3-textHand.ascent()
		for _, shift := range []vg.Point{
			{X: -w / 2, Y: up},
			{X: -w / 2, Y: down},
			{X: ringSize + 3, Y: -textHand.ascent() / 2},
			{X: -ringSize - 3 - w, Y: -textHand.ascent() / 2},
			{X: 0, Y: up},
			{X: -w, Y: up},
			{X: 0, Y: down},
			{X: -w, Y: down},
		} {
			r := textHand.box(name, at.Add(shift))
			if f.in.holds(r) && !o.hit(r, "") {
				f.label(textHand, "label", name, at.Add(shift), f.w)
				o.box(r.grown(2))
				break
			}
		}
	}
}

// kept are the indices of the points that are drawn: all of them, or of a great many
// the lowest and the highest of each column, flagged ones apart.
func (f *frame) kept(points []Individual) []int {
	marks := make([]Mark, len(points))
	for k, p := range points {
		marks[k] = Mark{X: float64(k + 1), Y: p.Y, Hollow: p.Flagged}
	}
	var list []int
	for _, m := range f.thinned(marks) {
		list = append(list, int(m.X)-1)
	}
	return slices.Compact(list)
}
