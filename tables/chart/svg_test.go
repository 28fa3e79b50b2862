package chart

import (
	"bytes"
	"encoding/xml"
	"io"
	"regexp"
	"slices"
	"strings"
	"testing"
)

// hostile is text that would do harm or break the file, were it not escaped.
const hostile = "<script>alert(1)</script> & \"quoted\" 'so' ]]> <!-- \x00\x07\x1b[31m\u202e\ufffe\xff end"

func hostilePictures() []interface {
	Write(io.Writer, Form, Size) error
} {
	c := fall()
	c.Title, c.XLabel, c.YLabel = hostile, hostile, hostile
	c.Limit.Name, c.Fitted.Name, c.Forecast.Name, c.Envelope.Name = hostile, hostile, hostile, hostile
	for k := range c.Flags {
		c.Flags[k].Text = hostile
	}
	s := season(20)
	s.Title, s.XLabel, s.YLabel, s.GroupName = hostile, hostile, hostile, hostile
	for k := range s.Points {
		s.Points[k].Label = hostile
	}
	return []interface {
		Write(io.Writer, Form, Size) error
	}{c, s}
}

// The file holds three kinds of element and no attribute that runs, styles or
// refers; texts come back as they were, cleaned.
func TestSVGIsSafe(t *testing.T) {
	allowed := []string{
		"role", "width", "height", "viewBox", "class", "aria-label", "d", "xmlns",
		"fill", "fill-opacity", "stroke", "stroke-opacity", "stroke-width", "stroke-linejoin", "stroke-dasharray",
	}
	for _, p := range hostilePictures() {
		data := written(t, p, SVG, Page)
		list := elements(t, data)
		for _, e := range list {
			if !slices.Contains([]string{"svg", "title", "path"}, e.name) {
				t.Errorf("element %s", e.name)
			}
			for name := range e.attr {
				if !slices.Contains(allowed, name) {
					t.Errorf("attribute %s of %s", name, e.name)
				}
			}
		}
		if list[0].name != "svg" || list[0].attr["role"] != "img" || list[1].name != "title" {
			t.Fatalf("the file begins with %v, wanted an svg that is an img, and its title", list[:2])
		}
		if want := `<script>alert(1)</script> & "quoted" 'so' ]]> <!-- [31m� end`; list[1].text != strings.ReplaceAll(want, "�", "") {
			t.Errorf("title is %q, wanted %q", list[1].text, want)
		}
		if n := bytes.Count(data, []byte("://")); n != 1 {
			t.Errorf("%d addresses, wanted that of the namespace alone", n)
		}
	}
}

// A label that was shortened tells the whole.
func TestShortenedLabelHasTitle(t *testing.T) {
	c := fall()
	c.Title = strings.Repeat("a long name ", 20)
	list := elements(t, written(t, c, SVG, Phone))
	for k, e := range list {
		if e.attr["class"] != "chart-title" {
			continue
		}
		if label := e.attr["aria-label"]; !strings.HasSuffix(label, "…") || len(label) > 60 {
			t.Errorf("title is drawn as %q", label)
		}
		if got, want := list[k+1], strings.TrimSpace(c.Title); got.name != "title" || got.text != want {
			t.Errorf("the whole is %q, wanted %q", got.text, want)
		}
		return
	}
	t.Error("no title drawn")
}

func TestSVGSize(t *testing.T) {
	svg := elements(t, written(t, fall(), SVG, Phone))[0]
	// 90 mm are 90/25.4·72 = 255.118 pt, 80 mm 226.772 pt.
	for name, want := range map[string]string{"width": "90mm", "height": "80mm", "viewBox": "0 0 255.12 226.77"} {
		if svg.attr[name] != want {
			t.Errorf("%s is %q, wanted %q", name, svg.attr[name], want)
		}
	}
}

// The same data gives the same bytes, whoever asks, and in whatever order readings
// and flags were given.
func TestSameBytes(t *testing.T) {
	turned := fall()
	slices.Reverse(turned.Marks)
	slices.Reverse(turned.Flags)
	for _, f := range []Form{SVG, PNG} {
		size := map[Form]Size{SVG: Page, PNG: leastSize}[f]
		first := written(t, fall(), f, size)
		answers := make(chan []byte)
		for range 3 {
			go func() {
				var b bytes.Buffer
				_ = fall().Write(&b, f, size)
				answers <- b.Bytes()
			}()
		}
		for range 3 {
			if !bytes.Equal(<-answers, first) {
				t.Errorf("%s written at the same time differs", f)
			}
		}
		if !bytes.Equal(written(t, turned, f, size), first) {
			t.Errorf("%s of the same readings in another order differs", f)
		}
		if !bytes.Equal(written(t, season(32), f, size), written(t, season(32), f, size)) {
			t.Errorf("%s of a control chart differs from itself", f)
		}
	}
}

// Path data is in the grammar of SVG 1.1, so short as it is.
func TestPathGrammar(t *testing.T) {
	number := `-?(?:[0-9]+(?:\.[0-9]+)?|\.[0-9]+)`
	grammar := regexp.MustCompile(`^(?:[mlhvqcaMHV](?:[ -.]?` + number + `)+|z|Z)+$`)
	joined := regexp.MustCompile(`[0-9] ?[0-9]*\.[0-9]*\.[0-9]*[^0-9 .a-zA-Z-]`)
	for _, e := range elements(t, written(t, fall(), SVG, Page)) {
		if d := e.attr["d"]; e.name == "path" && (!grammar.MatchString(d) || joined.MatchString(d)) {
			t.Errorf("path data %.80q", d)
		}
	}
}

func TestHundredths(t *testing.T) {
	for n, want := range map[int]string{0: "0", 5: ".05", -5: "-.05", 120: "1.2", -120: "-1.2", 1000: "10", 20050: "200.5"} {
		if got := hundredths(n); got != want {
			t.Errorf("%d hundredths are %q, wanted %q", n, got, want)
		}
	}
}

func TestEscapeGivesBack(t *testing.T) {
	for _, s := range []string{"", "a & b", `<i>"'</i>`, "酒 é °", hostile} {
		var got struct {
			A string `xml:"a,attr"`
			T string `xml:",chardata"`
		}
		if err := xml.Unmarshal([]byte(`<x a="`+escape(s)+`">`+escape(s)+`</x>`), &got); err != nil {
			t.Errorf("%q: %v", s, err)
		}
		if got.A != got.T || strings.Contains(s, "\xff") == (got.T == s) {
			t.Errorf("%q came back as %q and %q", s, got.A, got.T)
		}
	}
}
