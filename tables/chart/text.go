package chart

import (
	"image/color"
	"strings"
	"sync"
	"unicode"

	"codeberg.org/go-fonts/liberation/liberationsansbold"
	"codeberg.org/go-fonts/liberation/liberationsansregular"
	"golang.org/x/image/font/opentype"
	"golang.org/x/image/font/sfnt"
	"golang.org/x/image/math/fixed"
	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/vg"

	"gylebook/tables"
)

// The fonts are read when the first picture is drawn, not when the program starts.
var (
	regularFont = sync.OnceValue(func() *opentype.Font { return parse(liberationsansregular.TTF) })
	boldFont    = sync.OnceValue(func() *opentype.Font { return parse(liberationsansbold.TTF) })
)

// parse reads an embedded font; that it can be read is tested.
func parse(ttf []byte) *opentype.Font {
	f, err := opentype.Parse(ttf)
	if err != nil {
		return nil
	}
	return f
}

// hand is a font at a size, in a colour.
type hand struct {
	font  func() *opentype.Font
	size  vg.Length
	color color.Color
}

var (
	titleHand = hand{boldFont, titleSize, ink}
	textHand  = hand{regularFont, textSize, ink}
	axisHand  = hand{regularFont, textSize, slate}
	tickHand  = hand{regularFont, tickSize, slate}
)

func (h hand) in(c color.Color) hand {
	h.color = c
	return h
}

func (h hand) width(s string) vg.Length {
	face := font.Face{Font: font.Font{Size: h.size}, Face: h.font()}
	return face.Width(s)
}

// Heights above and below the baseline, as parts of the size: those of capitals and
// of a descending letter in this font.
func (h hand) ascent() vg.Length  { return h.size * 0.73 }
func (h hand) descent() vg.Length { return h.size * 0.21 }

// box is where s stands with its baseline starting at a point.
func (h hand) box(s string, at vg.Point) rect {
	return rect{at.X, at.Y - h.descent(), at.X + h.width(s), at.Y + h.ascent()}
}

const ellipsis = "…"

// shorten cuts s to a width, at the end; nothing is left where not even the
// ellipsis has room.
func (h hand) shorten(s string, width vg.Length) string {
	if h.width(s) <= width {
		return s
	}
	runes := []rune(s)
	low, high := 0, len(runes) // so many fit; so many do not
	for high-low > 1 {
		if mid := (low + high) / 2; h.width(strings.TrimRight(string(runes[:mid]), " ")+ellipsis) <= width {
			low = mid
		} else {
			high = mid
		}
	}
	if low == 0 {
		return ""
	}
	return strings.TrimRight(string(runes[:low]), " ") + ellipsis
}

// longest is how many characters of a text are looked at: more fit in no picture.
const longest = 500

// clean leaves one line without characters that steer or cannot be seen.
func clean(s string) string {
	s = strings.Map(func(r rune) rune {
		if unicode.IsPrint(r) || unicode.IsSpace(r) {
			return r
		}
		return -1
	}, tables.Clean(s))
	s = strings.Join(strings.Fields(s), " ")
	if runes := []rune(s); len(runes) > longest {
		s = string(runes[:longest])
	}
	return s
}

// outline is the path of s with its baseline starting at a point.
func (h hand) outline(s string, at vg.Point) vg.Path {
	var path vg.Path
	var buf sfnt.Buffer
	f := h.font()
	em := fixed.Int26_6(f.UnitsPerEm()) // a unit of the font is then 1/64
	scale := h.size / vg.Length(em)
	var before sfnt.GlyphIndex
	for k, r := range []rune(s) {
		glyph, err := f.GlyphIndex(&buf, r)
		if err != nil {
			continue
		}
		if k > 0 {
			if kern, err := f.Kern(&buf, before, glyph, em, 0); err == nil {
				at.X += vg.Length(kern) * scale
			}
		}
		segments, err := f.LoadGlyph(&buf, glyph, em, nil)
		if err == nil {
			addGlyph(&path, segments, at, scale)
		}
		if advance, err := f.GlyphAdvance(&buf, glyph, em, 0); err == nil {
			at.X += vg.Length(advance) * scale
		}
		before = glyph
	}
	return path
}

func addGlyph(path *vg.Path, segments sfnt.Segments, at vg.Point, scale vg.Length) {
	pt := func(p fixed.Point26_6) vg.Point { // the font counts downwards
		return vg.Point{X: at.X + vg.Length(p.X)*scale, Y: at.Y - vg.Length(p.Y)*scale}
	}
	for k, s := range segments {
		switch s.Op {
		case sfnt.SegmentOpMoveTo:
			if k > 0 {
				path.Close()
			}
			path.Move(pt(s.Args[0]))
		case sfnt.SegmentOpLineTo:
			path.Line(pt(s.Args[0]))
		case sfnt.SegmentOpQuadTo:
			path.QuadTo(pt(s.Args[0]), pt(s.Args[1]))
		case sfnt.SegmentOpCubeTo:
			path.CubeTo(pt(s.Args[0]), pt(s.Args[1]), pt(s.Args[2]))
		}
	}
	if len(segments) > 0 {
		path.Close()
	}
}

// label puts s, shortened to a width, with its baseline starting at a point.
func (sc *scene) label(h hand, class, s string, at vg.Point, width vg.Length) {
	short := h.shorten(s, width)
	if short == "" {
		return
	}
	written := shape{class: class, path: h.outline(short, at), fill: h.color, text: short, bounds: h.box(short, at)}
	if short != s {
		written.full = s
	}
	sc.add(written)
}
