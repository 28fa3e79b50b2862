package chart

import "gonum.org/v1/plot/vg"

// key is an entry of a legend: a sample, and what it stands for.
type key struct {
	name string
	wide vg.Length // of the sample
	draw func(f *frame, in rect)
}

const (
	sampleWide vg.Length = 16
	keyGap     vg.Length = 12
)

// legend writes the keys in rows from the top down and returns where they end. A
// name is shortened to half the sheet.
func (f *frame) legend(keys []key, top vg.Length) vg.Length {
	if len(keys) == 0 {
		return top
	}
	wide := f.w - 2*edge
	x, base := edge, top-textHand.ascent()
	for _, k := range keys {
		name := textHand.shorten(clean(k.name), wide/2-k.wide-4)
		w := k.wide + 4 + textHand.width(name)
		if x > edge && x+w > edge+wide {
			x, base = edge, base-lineHigh
		}
		k.draw(f, rect{x, base - 1, x + k.wide, base + textHand.ascent()})
		f.label(textHand, "key", name, vg.Point{X: x + k.wide + 4, Y: base}, wide)
		x += w + keyGap
	}
	return base - textHand.descent() - 4
}

func lineKey(name string, p pen) key {
	return key{name, sampleWide, func(f *frame, in rect) {
		y := (in.y0 + in.y1) / 2
		f.line("sample", p, vg.Point{X: in.x0, Y: y}, vg.Point{X: in.x1, Y: y})
	}}
}

func (r rect) corners() []vg.Point {
	return []vg.Point{{X: r.x0, Y: r.y0}, {X: r.x1, Y: r.y0}, {X: r.x1, Y: r.y1}, {X: r.x0, Y: r.y1}}
}
