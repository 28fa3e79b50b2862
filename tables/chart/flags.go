package chart

import (
	"cmp"
	"slices"
	"strconv"

	"gonum.org/v1/plot/vg"
)

// flagging is how the flags stand above the data.
type flagging struct {
	flags []placedFlag
	rows  int
	plain bool // every flag shows its text; else numbers stand there
}

type placedFlag struct {
	at   vg.Length // the pole
	text string
	full string
	left vg.Length // where the text begins
	row  int
}

const (
	mostFlagRows           = 3
	poleGap      vg.Length = 7  // from a pole to its text, with the pennant between
	tightHeight            = 75 // mm; below it the flags get one row
)

// sortedFlags are the flags by X; flags at the same X keep their order.
func (c Course) sortedFlags() []Flag {
	list := slices.Clone(c.Flags)
	slices.SortStableFunc(list, func(a, b Flag) int { return cmp.Compare(a.X, b.X) })
	return list
}

// Numbered reports whether a picture of this size has no room for the texts of the
// flags, and numbers them from 1 by X instead: the caller then lists them.
func (c Course) Numbered(s Size) bool {
	if len(c.Flags) == 0 || s.check() != nil || c.check() != nil {
		return false
	}
	return !c.flagging(s).plain
}

// flagging finds the fewest rows the flags need.
func (c Course) flagging(s Size) flagging {
	if len(c.Flags) == 0 {
		return flagging{plain: true}
	}
	list := c.sortedFlags()
	p := c.plan(s)
	rows := mostFlagRows
	if s.Height < tightHeight {
		rows = 1
	}
	for p.flagRows = 1; p.flagRows <= rows && len(list) <= 12; p.flagRows++ {
		if placed, ok := newFrame(p).texts(list, p.flagRows); ok {
			return flagging{placed, p.flagRows, true}
		}
	}
	p.flagRows = 1
	return flagging{newFrame(p).counted(list), 1, false}
}

// texts gives every flag its text beside its pole. From the last to the first a
// flag stands one row above those whose poles its text would cross.
func (f *frame) texts(list []Flag, rows int) ([]placedFlag, bool) {
	placed := make([]placedFlag, len(list))
	for k := len(list) - 1; k >= 0; k-- {
		one := placedFlag{at: f.px(list[k].X), full: clean(list[k].Text)}
		one.text = textHand.shorten(one.full, (f.w-2*edge)*0.4)
		one.left = one.at + poleGap
		for j := k + 1; j < len(list); j++ {
			if placed[j].at < one.right()+4 {
				one.row = max(one.row, placed[j].row+1)
			}
		}
		if one.row >= rows || one.right() > f.w-edge {
			return nil, false
		}
		placed[k] = one
	}
	return placed, true
}

func (p placedFlag) right() vg.Length { return p.left + textHand.width(p.text) }

// counted gives the flags numbers; those whose numbers would touch share a label.
func (f *frame) counted(list []Flag) []placedFlag {
	type group struct{ first, last int }
	place := func(g group) placedFlag {
		one := placedFlag{at: (f.px(list[g.first].X) + f.px(list[g.last].X)) / 2, text: strconv.Itoa(g.first + 1)}
		if g.last > g.first {
			one.text += "–" + strconv.Itoa(g.last+1)
		}
		w := textHand.width(one.text)
		one.left = max(edge/2, min(one.at-w/2, f.w-edge/2-w))
		return one
	}
	var groups []group
	for k := range list {
		if k > 0 && f.px(list[k].X)-f.px(list[k-1].X) < 1 {
			groups[len(groups)-1].last = k
		} else {
			groups = append(groups, group{k, k})
		}
		for n := len(groups); n > 1 && place(groups[n-2]).right()+5 > place(groups[n-1]).left; n = len(groups) {
			groups = append(groups[:n-2], group{groups[n-2].first, groups[n-1].last})
		}
	}
	placed := make([]placedFlag, len(groups))
	for k, g := range groups {
		placed[k] = place(g)
	}
	return placed
}

// drawFlags draws a pole for every flag and the labels, and keeps names off the poles.
func (f *frame) drawFlags(fl flagging, list []Flag, o *obstacles) {
	var last vg.Length
	for k, one := range list {
		x := f.px(one.X)
		if k > 0 && x-last < 0.5 {
			continue // a pole stands there
		}
		last = x
		pole := []vg.Point{{X: x, Y: f.in.y0}, {X: x, Y: f.flagFloor}}
		f.line("pole", polePen, pole...)
		o.along("pole", pole)
	}
	for _, one := range fl.flags {
		base := f.flagFloor + vg.Length(one.row)*lineHigh + 2
		shown := shape{class: "flag", fill: ink, text: one.text}
		if fl.plain {
			top := base + textHand.ascent()
			f.line("pole", pen{color: mist, width: 0.6}, vg.Point{X: one.at, Y: f.flagFloor}, vg.Point{X: one.at, Y: top})
			f.area("pennant", slate, vg.Point{X: one.at, Y: top}, vg.Point{X: one.at + 4.5, Y: top - 2}, vg.Point{X: one.at, Y: top - 4})
			if one.text != one.full {
				shown.full = one.full
			}
		}
		if one.text == "" {
			continue
		}
		at := vg.Point{X: one.left, Y: base}
		shown.path, shown.bounds = textHand.outline(one.text, at), textHand.box(one.text, at)
		f.add(shown)
	}
}
