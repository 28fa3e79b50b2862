package chart

import (
	"bytes"
	"fmt"
	"image/color"
	"math"
	"strconv"
	"strings"
	"unicode/utf8"

	"gonum.org/v1/plot/vg"
)

// svg writes the scene as SVG 1.1 without styles, scripts, identifiers or
// references, so that it can stand in a page under a strict content policy, and
// several of them side by side. Labels are outlines; what they say is their
// aria-label, and where they were shortened a title shows the whole.
func (sc *scene) svg() []byte {
	var b bytes.Buffer
	fmt.Fprintf(&b, `<svg xmlns="http://www.w3.org/2000/svg" role="img" width="%smm" height="%smm" viewBox="0 0 %s %s">`,
		decimal(float64(sc.w/vg.Millimeter), 2), decimal(float64(sc.h/vg.Millimeter), 2), decimal(float64(sc.w), 2), decimal(float64(sc.h), 2))
	fmt.Fprintf(&b, "\n<title>%s</title>\n", escape(sc.title))
	fmt.Fprintf(&b, `<path class="chart-paper" fill="#ffffff" d="M0 0H%sV%sH0z"/>`, decimal(float64(sc.w), 2), decimal(float64(sc.h), 2))
	b.WriteByte('\n')
	for _, s := range sc.shapes {
		fmt.Fprintf(&b, `<path class="chart-%s"`, s.class)
		if s.text != "" {
			fmt.Fprintf(&b, ` aria-label="%s"`, escape(s.text))
		}
		paint(&b, "fill", s.fill)
		if s.stroke != nil {
			paint(&b, "stroke", s.stroke)
			fmt.Fprintf(&b, ` stroke-width="%s" stroke-linejoin="round"`, decimal(float64(s.width), 2))
		}
		if len(s.dash) > 0 {
			fmt.Fprintf(&b, ` stroke-dasharray="%s"`, dashes(s.dash))
		}
		fmt.Fprintf(&b, ` d="%s"`, sc.pathData(s.path))
		if s.full == "" {
			b.WriteString("/>\n")
		} else {
			fmt.Fprintf(&b, "><title>%s</title></path>\n", escape(s.full))
		}
	}
	b.WriteString("</svg>\n")
	return b.Bytes()
}

// paint writes a colour and, where it is not opaque, its opacity.
func paint(b *bytes.Buffer, what string, c color.Color) {
	if c == nil {
		fmt.Fprintf(b, ` %s="none"`, what)
		return
	}
	n := color.NRGBAModel.Convert(c).(color.NRGBA)
	fmt.Fprintf(b, ` %s="#%02x%02x%02x"`, what, n.R, n.G, n.B)
	if n.A < 255 {
		fmt.Fprintf(b, ` %s-opacity="%s"`, what, decimal(float64(n.A)/255, 2))
	}
}

func dashes(list []vg.Length) string {
	parts := make([]string, len(list))
	for k, d := range list {
		parts[k] = decimal(float64(d), 2)
	}
	return strings.Join(parts, " ")
}

// drawer writes path data with coordinates relative to where the pen stands,
// which are short, in hundredths of a point; it remembers the pen as written, so
// that rounding does not add up.
type drawer struct {
	b      strings.Builder
	h      vg.Length
	at     [2]int // hundredths
	start  [2]int
	last   byte // the last command
	within bool // the last character belongs to a number
	// pointed: that number has a decimal point, so another point begins the next
	pointed bool
}

func (sc *scene) pathData(path vg.Path) string {
	d := drawer{h: sc.h}
	for _, comp := range path {
		switch comp.Type {
		case vg.MoveComp:
			d.to('m', comp.Pos)
			d.start = d.at
		case vg.LineComp:
			d.to('l', comp.Pos)
		case vg.CurveComp:
			d.to(map[int]byte{1: 'q', 2: 'c'}[len(comp.Control)], append(comp.Control[:len(comp.Control):len(comp.Control)], comp.Pos)...)
		case vg.ArcComp: // whole circles only, begun at the right
			r := decimal(float64(comp.Radius), 2)
			d.last = 'a'
			wide := int(math.Round(float64(2*comp.Radius) * 100))
			fmt.Fprintf(&d.b, "a%s %s 0 1 0 %s 0a%s %s 0 1 0 %s 0", r, r, hundredths(-wide), r, r, hundredths(wide))
		case vg.CloseComp:
			d.b.WriteByte('z')
			d.at, d.last = d.start, 'z'
		}
	}
	return d.b.String()
}

func (d *drawer) to(command byte, points ...vg.Point) {
	from := d.at
	steps := make([]int, 0, 6)
	for _, p := range points {
		d.at = [2]int{int(math.Round(float64(p.X) * 100)), int(math.Round(float64(d.h-p.Y) * 100))}
		steps = append(steps, d.at[0]-from[0], d.at[1]-from[1])
	}
	switch {
	case command == 'l' && steps[0] == 0:
		command, steps = 'v', steps[1:]
	case command == 'l' && steps[1] == 0:
		command, steps = 'h', steps[:1]
	}
	if command != d.last || command == 'm' { // a repeated command is understood
		d.b.WriteByte(command)
		d.last, d.within = command, false
	}
	for _, step := range steps {
		n := hundredths(step)
		if n[0] != '-' && d.within && !(n[0] == '.' && d.pointed) {
			d.b.WriteByte(' ')
		}
		d.b.WriteString(n)
		d.within, d.pointed = true, strings.Contains(n, ".")
	}
}

// hundredths writes a number of them as a short decimal: -5 as -.05.
func hundredths(n int) string {
	s := decimal(float64(n)/100, 2)
	s = strings.Replace(s, "0.", ".", 1)
	if strings.HasPrefix(s, ".") || strings.HasPrefix(s, "-.") {
		return s
	}
	return decimal(float64(n)/100, 2)
}

// decimal writes at most so many places, without zeros at the end and without -0.
func decimal(x float64, places int) string {
	s := strconv.FormatFloat(x, 'f', places, 64)
	if strings.Contains(s, ".") {
		s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	}
	if s == "-0" {
		return "0"
	}
	return s
}

// escape makes a text safe inside an element and inside a quoted attribute, and
// drops what XML 1.0 has no place for.
func escape(s string) string {
	var b strings.Builder
	for _, r := range s {
		switch {
		case r == '&':
			b.WriteString("&amp;")
		case r == '<':
			b.WriteString("&lt;")
		case r == '>':
			b.WriteString("&gt;")
		case r == '"':
			b.WriteString("&#34;")
		case r == '\'':
			b.WriteString("&#39;")
		case r < ' ' || r == utf8.RuneError || r&0xfffe == 0xfffe: // control characters, not UTF-8, no characters
		default:
			b.WriteRune(r)
		}
	}
	return b.String()
}
