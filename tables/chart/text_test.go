package chart

import (
	"strings"
	"testing"

	"gonum.org/v1/plot/vg"
	"pgregory.net/rapid"
)

func TestFontsCanBeRead(t *testing.T) {
	if regularFont() == nil || boldFont() == nil {
		t.Fatal("an embedded font cannot be read")
	}
}

// The advance of the digits of Liberation Sans is 1139 of 2048 units, as in Arial.
func TestWidth(t *testing.T) {
	if got, want := (hand{regularFont, 10, ink}).width("0000"), vg.Length(4*10*1139)/2048; got < want-0.01 || got > want+0.01 {
		t.Errorf("four digits are %v wide, wanted %v", got, want)
	}
}

func TestTextIsLargeEnough(t *testing.T) {
	for _, h := range []hand{titleHand, textHand, axisHand, tickHand} {
		if h.size < 8 {
			t.Errorf("text of %v pt, wanted 8 at least", h.size)
		}
	}
}

// A shortened text fits, begins as the whole does, and would not fit with a letter
// more.
func TestShorten(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		s := strings.Repeat("W", rapid.IntRange(0, 40).Draw(t, "n"))
		width := vg.Length(rapid.Float64Range(0, 400).Draw(t, "width"))
		got := textHand.shorten(s, width)
		if textHand.width(got) > width {
			t.Fatalf("%q is wider than %v", got, width)
		}
		kept := strings.TrimSuffix(got, ellipsis)
		if got != s && got != "" && textHand.width(kept+"W"+ellipsis) <= width {
			t.Fatalf("%q has room for more in %v", got, width)
		}
	})
	if got := textHand.shorten("limit of attenuation", 60); got != "limit of atten…" && !strings.HasSuffix(got, ellipsis) {
		t.Errorf("shortened to %q", got)
	}
}

func TestClean(t *testing.T) {
	for in, want := range map[string]string{
		"  a\tb\n c ":             "a b c",
		"a\x1b[31mb":              "a[31mb",
		"a\u202eb\u200bc\u00add":  "abcd",
		"":                        "",
		"20\u00a0°C":              "20 °C",
		strings.Repeat("é", 5000): strings.Repeat("é", longest),
	} {
		if got := clean(in); got != want {
			t.Errorf("%q became %q, wanted %q", in, got, want)
		}
	}
}

// An outline stands where its box says.
func TestOutlineInBox(t *testing.T) {
	at := vg.Point{X: 10, Y: 20}
	for _, s := range []string{"1.050", "limit of attenuation", "SG 20/20", "B-2026-041", "percent, %"} {
		box := textHand.box(s, at).grown(0.3)
		for _, c := range textHand.outline(s, at) {
			if c.Type == vg.MoveComp && !box.holds(rect{c.Pos.X, c.Pos.Y, c.Pos.X, c.Pos.Y}) {
				t.Errorf("%q: an outline begins at %v, outside %v", s, c.Pos, box)
			}
		}
	}
}
