package chart

import (
	"bytes"
	"encoding/binary"
	"image"
	"image/color"
	"image/png"
	"testing"
)

func decoded(t *testing.T, data []byte) image.Image {
	t.Helper()
	img, err := png.Decode(bytes.NewReader(data))
	if err != nil {
		t.Fatal(err)
	}
	return img
}

func TestPNGSize(t *testing.T) {
	// 300 dots an inch: 170 mm are 170/25.4·300 = 2007.9 dots.
	for size, want := range map[Size]image.Point{Page: {2008, 1122}, Phone: {1063, 945}} {
		data := written(t, fall(), PNG, size)
		if got := decoded(t, data).Bounds().Size(); got != want {
			t.Errorf("%v has %v dots, wanted %v", size, got, want)
		}
		at := bytes.Index(data, []byte("pHYs"))
		if at < 0 {
			t.Fatal("the file does not say how large a dot is")
		}
		// 300/0.0254 = 11811.02 dots a metre.
		if x, y := binary.BigEndian.Uint32(data[at+4:]), binary.BigEndian.Uint32(data[at+8:]); x != 11811 || y != 11811 || data[at+12] != 1 {
			t.Errorf("%d by %d dots a metre, wanted 11811", x, y)
		}
	}
}

// The PNG shows what the scene holds: black in the middle of a reading, white in the
// middle of a hollow one, the paper white and opaque at the corners.
func TestPNGShowsMarks(t *testing.T) {
	c := fall()
	f := c.draw(Page)
	img := decoded(t, written(t, c, PNG, Page))
	at := func(s shape) color.Color {
		m := s.middle()
		return img.At(int(pixels(m.X)), int(pixels(f.h-m.Y)))
	}
	same := func(a, b color.Color) bool { return color.NRGBAModel.Convert(a) == color.NRGBAModel.Convert(b) }
	for _, s := range shapesOf(f, "mark") {
		if !same(at(s), black) {
			t.Errorf("a reading is %v", at(s))
		}
	}
	for _, s := range shapesOf(f, "hollow") {
		if !same(at(s), white) {
			t.Errorf("the middle of a hollow reading is %v", at(s))
		}
	}
	for _, p := range []image.Point{{}, img.Bounds().Max.Sub(image.Pt(1, 1))} {
		if !same(img.At(p.X, p.Y), white) {
			t.Errorf("the corner %v is %v", p, img.At(p.X, p.Y))
		}
	}
}
