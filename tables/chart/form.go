package chart

import (
	"io"
	"math"
	"strconv"

	"gonum.org/v1/plot/vg"
)

// Form is a file format.
type Form string

// The forms a picture is written in.
const (
	SVG Form = "svg"
	PNG Form = "png" // 300 dots an inch, and the file says so
)

// Size of a picture in millimetres.
type Size struct{ Width, Height float64 }

var (
	Page  = Size{Width: 170, Height: 95} // across a printed page
	Phone = Size{Width: 90, Height: 80}  // across the screen of a phone
)

// The least size has room for the axes, all that can stand above them and a few
// marks; the largest is bounded by
// the memory of its PNG.
var (
	leastSize   = Size{Width: 60, Height: 60}
	largestSize = Size{Width: 600, Height: 600}
)

// InputError is data that cannot be drawn.
type InputError struct {
	What   string // the place: "mark 3: y"
	Read   string
	Wanted string
}

func (e *InputError) Error() string {
	return e.What + " is " + e.Read + ", wanted " + e.Wanted
}

func (s Size) check() error {
	for _, side := range []struct {
		name               string
		is, least, largest float64
	}{
		{"width", s.Width, leastSize.Width, largestSize.Width},
		{"height", s.Height, leastSize.Height, largestSize.Height},
	} {
		if !(side.is >= side.least && side.is <= side.largest) { // NaN too
			return &InputError{
				What: "picture " + side.name, Read: plain(side.is) + " mm",
				Wanted: plain(side.least) + " to " + plain(side.largest) + " mm",
			}
		}
	}
	return nil
}

func (f Form) check() error {
	if f != SVG && f != PNG {
		return &InputError{What: "picture form", Read: strconv.Quote(string(f)), Wanted: string(SVG) + " or " + string(PNG)}
	}
	return nil
}

// points are the sides in the unit everything is drawn in.
func (s Size) points() (w, h vg.Length) {
	return vg.Length(s.Width) * vg.Millimeter, vg.Length(s.Height) * vg.Millimeter
}

// Write draws the course into a picture of this form and size, in one piece: an
// error leaves nothing behind. It is an [InputError] for what cannot be drawn, or
// that of w.
func (c Course) Write(w io.Writer, f Form, s Size) error {
	if err := firstError(f.check(), s.check(), c.check()); err != nil {
		return err
	}
	return c.draw(s).write(w, f)
}

// Write draws the values into a picture of this form and size, in one piece: an
// error leaves nothing behind. It is an [InputError] for what cannot be drawn, or
// that of w.
func (c Control) Write(w io.Writer, f Form, s Size) error {
	if err := firstError(f.check(), s.check(), c.check()); err != nil {
		return err
	}
	return c.draw(s).write(w, f)
}

func (sc *scene) write(w io.Writer, f Form) error {
	var data []byte
	if f == SVG {
		data = sc.svg()
	} else {
		var err error
		if data, err = sc.png(); err != nil {
			return err
		}
	}
	_, err := w.Write(data)
	return err
}

func firstError(list ...error) error {
	for _, err := range list {
		if err != nil {
			return err
		}
	}
	return nil
}

// plain is a number in an error, as it was given.
func plain(x float64) string {
	if math.Abs(x) >= 1e9 {
		return strconv.FormatFloat(x, 'g', -1, 64)
	}
	return strconv.FormatFloat(x, 'f', -1, 64)
}
