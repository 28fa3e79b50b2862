package chart

import (
	"cmp"
	"math"
	"slices"

	"gonum.org/v1/plot/vg"
)

// column is the width within which only the lowest and the highest of many marks
// can be told apart.
const column vg.Length = 0.5

// manyMarks is the number up to which every mark is drawn.
const manyMarks = 1500

// thinned keeps, of a great many marks, the lowest and the highest of each column,
// of the hollow ones as of the others, by X.
func (f *frame) thinned(marks []Mark) []Mark {
	list := slices.Clone(marks)
	slices.SortStableFunc(list, func(a, b Mark) int { return cmp.Compare(a.X, b.X) })
	if len(list) <= manyMarks {
		return list
	}
	type slot struct {
		column int
		hollow bool
	}
	ends := make(map[slot][2]int)
	for k, m := range list {
		s := slot{int(f.px(m.X) / column), m.Hollow}
		e, seen := ends[s]
		switch {
		case !seen:
			e = [2]int{k, k}
		case m.Y < list[e[0]].Y:
			e[0] = k
		case m.Y > list[e[1]].Y:
			e[1] = k
		}
		ends[s] = e
	}
	keep := make([]int, 0, 2*len(ends))
	for _, e := range ends {
		keep = append(keep, e[0], e[1])
	}
	slices.Sort(keep)
	keep = slices.Compact(keep)
	few := make([]Mark, len(keep))
	for k, i := range keep {
		few[k] = list[i]
	}
	return few
}

// drawMarks draws bars first, so that no bar lies over a mark, then the marks.
func (f *frame) drawMarks(marks []Mark, o *obstacles) {
	list := f.thinned(marks)
	for _, m := range list {
		o.box(rect{f.px(m.X), f.py(m.Y), f.px(m.X), f.py(m.Y)}.grown(markSize + 1))
		if m.U == 0 {
			continue
		}
		bar := []vg.Point{f.at(m.X, m.Y-m.U), f.at(m.X, m.Y+m.U)}
		p := barPen
		if m.Hollow {
			p.color = mist
		}
		f.line("bar", p, bar...)
		o.along("bar", bar)
	}
	for _, m := range list {
		if m.Hollow {
			f.add(shape{class: "hollow", path: circle(f.at(m.X, m.Y), markSize), fill: white, stroke: slate, width: 0.9})
		} else {
			f.add(shape{class: "mark", path: circle(f.at(m.X, m.Y), markSize), fill: black})
		}
	}
}

// trace is a line on the sheet; of a great many points a column keeps its ends and
// extremes.
func (f *frame) trace(x, y []float64) []vg.Point {
	points := make([]vg.Point, 0, min(len(x), 4*manyMarks))
	if len(x) <= manyMarks {
		for k := range x {
			points = append(points, f.at(x[k], y[k]))
		}
		return points
	}
	for from := 0; from < len(x); {
		to, low, high := from+1, from, from
		here := math.Floor(float64(f.px(x[from]) / column))
		for ; to < len(x) && math.Floor(float64(f.px(x[to])/column)) == here; to++ {
			if y[to] < y[low] {
				low = to
			}
			if y[to] > y[high] {
				high = to
			}
		}
		keep := []int{from, low, high, to - 1}
		slices.Sort(keep)
		for _, k := range slices.Compact(keep) {
			points = append(points, f.at(x[k], y[k]))
		}
		from = to
	}
	return points
}
