package chart

import (
	"image/color"

	"gonum.org/v1/plot/vg"
)

// The colours of Okabe and Ito (2008), and greys.
var (
	black      = color.NRGBA{A: 255}
	orange     = color.NRGBA{R: 230, G: 159, A: 255}
	green      = color.NRGBA{G: 158, B: 115, A: 255}
	blue       = color.NRGBA{G: 114, B: 178, A: 255}
	vermillion = color.NRGBA{R: 213, G: 94, A: 255}
	purple     = color.NRGBA{R: 204, G: 121, B: 167, A: 255}
	white      = color.NRGBA{R: 255, G: 255, B: 255, A: 255}
	ink        = color.NRGBA{R: 38, G: 38, B: 38, A: 255}    // text
	slate      = color.NRGBA{R: 89, G: 89, B: 89, A: 255}    // axes, names of axes
	mist       = color.NRGBA{R: 120, G: 120, B: 120, A: 255} // lines that stand back
	pale       = color.NRGBA{R: 165, G: 165, B: 165, A: 255} // lines that stand further back
	hair       = color.NRGBA{R: 229, G: 229, B: 229, A: 255} // the grid
	soft       = color.NRGBA{R: 235, G: 231, B: 221, A: 255} // what others did
	softText   = color.NRGBA{R: 96, G: 88, B: 74, A: 255}
	sky        = color.NRGBA{R: 86, G: 180, B: 233, A: 84} // 56B4E9, what lies behind shines through
	warmText   = color.NRGBA{R: 166, G: 66, A: 255}        // vermillion, dark enough for small text
)

// Lines differ in style as well as in colour.
var (
	axisPen    = pen{color: slate, width: 0.6}
	gridPen    = pen{color: hair, width: 0.5}
	barPen     = pen{color: ink, width: 0.8}
	fittedPen  = pen{color: blue, width: 1.4}
	medianPen  = pen{color: blue, width: 1.2, dash: []vg.Length{4, 2.5}}
	edgePen    = pen{color: color.NRGBA{G: 114, B: 178, A: 150}, width: 0.5}
	limitPen   = pen{color: vermillion, width: 1, dash: []vg.Length{7, 2, 1.5, 2}}
	polePen    = pen{color: pale, width: 0.5, dash: []vg.Length{1, 2}}
	runPen     = pen{color: pale, width: 0.7}
	centrePen  = pen{color: slate, width: 0.9}
	warningPen = pen{color: mist, width: 0.7, dash: []vg.Length{3, 2.5}}
	ringPen    = pen{color: vermillion, width: 1.2}
)

// Sizes of text and marks, in points at the final size.
const (
	titleSize vg.Length = 11
	textSize  vg.Length = 8.5
	tickSize  vg.Length = 8
	markSize  vg.Length = 2.1 // radius
	ringSize  vg.Length = 5
)
