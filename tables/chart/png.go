package chart

import (
	"bytes"
	"encoding/binary"
	"hash/crc32"
	"image/png"
	"math"

	"git.sr.ht/~sbinet/gg"
	"gonum.org/v1/plot/vg"
)

const dotsPerInch = 300

// pixels is a length in dots.
func pixels(l vg.Length) float64 { return float64(l) * dotsPerInch / 72 }

// png paints the scene.
func (sc *scene) png() ([]byte, error) {
	dc := gg.NewContext(int(math.Round(pixels(sc.w))), int(math.Round(pixels(sc.h))))
	dc.SetColor(white)
	dc.Clear()
	dc.SetLineCapButt()
	dc.SetLineJoinRound()
	for _, s := range sc.shapes {
		sc.trace(dc, s.path)
		if s.fill != nil {
			dc.SetColor(s.fill)
			dc.FillPreserve()
		}
		if s.stroke != nil {
			list := make([]float64, len(s.dash))
			for k, d := range s.dash {
				list[k] = pixels(d)
			}
			dc.SetDash(list...)
			dc.SetLineWidth(pixels(s.width))
			dc.SetColor(s.stroke)
			dc.StrokePreserve()
		}
		dc.ClearPath()
	}
	var b bytes.Buffer
	if err := png.Encode(&b, dc.Image()); err != nil {
		return nil, err
	}
	return withResolution(b.Bytes()), nil
}

func (sc *scene) trace(dc *gg.Context, path vg.Path) {
	x := func(p vg.Point) float64 { return pixels(p.X) }
	y := func(p vg.Point) float64 { return pixels(sc.h - p.Y) }
	for _, comp := range path {
		at := comp.Pos
		switch comp.Type {
		case vg.MoveComp:
			dc.MoveTo(x(at), y(at))
		case vg.LineComp:
			dc.LineTo(x(at), y(at))
		case vg.ArcComp:
			dc.DrawArc(x(at), y(at), pixels(comp.Radius), comp.Start, comp.Start+comp.Angle)
		case vg.CurveComp:
			if c := comp.Control; len(c) == 1 {
				dc.QuadraticTo(x(c[0]), y(c[0]), x(at), y(at))
			} else {
				dc.CubicTo(x(c[0]), y(c[0]), x(c[1]), y(c[1]), x(at), y(at))
			}
		case vg.CloseComp:
			dc.ClosePath()
		}
	}
}

// withResolution adds the chunk that says how many dots there are to a metre, which
// the encoder leaves out, behind the header (PNG, third edition, 11.3.5.3).
func withResolution(data []byte) []byte {
	const header = 8 + 25 // signature, IHDR
	perMetre := uint32(math.Round(dotsPerInch / 0.0254))
	chunk := binary.BigEndian.AppendUint32([]byte("pHYs"), perMetre)
	chunk = append(binary.BigEndian.AppendUint32(chunk, perMetre), 1)
	out := binary.BigEndian.AppendUint32(bytes.Clone(data[:header]), uint32(len(chunk)-4))
	out = binary.BigEndian.AppendUint32(append(out, chunk...), crc32.ChecksumIEEE(chunk))
	return append(out, data[header:]...)
}
