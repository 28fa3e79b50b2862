package page

import (
	"html/template"
	"strings"
	"testing"

	"golang.org/x/net/html"
	"pgregory.net/rapid"

	"gylebook/tables"
)

func TestLadder(t *testing.T) {
	doc := parse(t, Ladder(tables.Ladder{
		Answer: []string{"1.0146 SG 20/20", "±0.0006", " "},
		Rungs: []tables.Rung{
			{Name: "read", Value: "1.012", Remark: "at 30 °C"},
			{Name: "temperature", Value: "+0.0026"},
			{Name: "empty", Value: "-"},
		},
		Lines: []string{"a free line", ""},
	}))
	same(t, "number", texts(all(doc, "b")), []string{"1.0146"})
	same(t, "answer", texts(all(doc, "strong")), []string{"1.0146 SG 20/20"})
	same(t, "whole answer", texts(all(doc, "p")), []string{"1.0146 SG 20/20 ±0.0006"})
	same(t, "terms", texts(all(doc, "dt")), []string{"read", "temperature", "empty"})
	same(t, "values and remarks", texts(all(doc, "dd")), []string{"1.012", "at 30 °C", "+0.0026", "-"})
	same(t, "lines", texts(all(doc, "li")), []string{"a free line"})
}

// An answer is a figure if it begins with a number that stands by itself.
func TestLadderFigure(t *testing.T) {
	for answer, number := range map[string]string{
		"78.5 % apparent": "78.5", "+0.4 points": "+0.4", "1,048.2 kg": "1,048.2", "12": "12",
		"T4 B26-1": "", "2026-11-16": "", "4h ago": "", "": "",
	} {
		var got string
		if b := all(parse(t, Ladder(tables.Ladder{Answer: []string{answer}})), "b"); len(b) > 0 {
			got = said(b[0])
		}
		if got != number {
			t.Errorf("figure of %q is %q, want %q", answer, got, number)
		}
	}
}

func TestTable(t *testing.T) {
	doc := parse(t, Table(tables.Table{
		Title:   "Readings",
		Columns: []tables.Column{{Head: "taken"}, {Head: "SG", Align: tables.Right}, {}},
		Rows:    [][]string{{"Monday", "1.048", "x", "over"}, {"", "-1"}},
		Foot:    []string{"a foot"},
	}))
	same(t, "caption", texts(all(doc, "caption")), []string{"Readings"})
	same(t, "heads", texts(all(doc, "th")), []string{"taken", "SG", "Monday"})
	var scopes, classes []string
	for _, th := range all(doc, "th") {
		scopes = append(scopes, attr(th, "scope"))
		classes = append(classes, attr(th, "class"))
	}
	same(t, "scopes", scopes, []string{"col", "col", "row"})
	same(t, "classes", classes, []string{"", "num", ""})
	same(t, "cells", texts(all(doc, "td")), []string{"", "", "1.048", "x", "over", "", "-1", "", ""})
	same(t, "foot", texts(all(doc, "p")), []string{"a foot"})
	if n := len(all(doc, "tr")); n != 3 {
		t.Errorf("%d rows, want 3", n)
	}
}

// A table wider than a telephone scrolls where the keyboard reaches it, under its
// own name; a small one is no stop for the keyboard.
func TestTableRegion(t *testing.T) {
	for _, c := range []struct {
		title, head string
		name        string
	}{
		{"Readings", strings.Repeat("w", 40), "Readings"},
		{"", strings.Repeat("w", 40), strings.Repeat("w", 40) + ", b"},
		{"Readings", "narrow", ""},
	} {
		doc := parse(t, Table(tables.Table{Title: c.title, Columns: []tables.Column{{Head: c.head, Align: tables.Right}, {Head: "b"}}}))
		region := all(doc, "div")[1]
		if attr(region, "aria-label") != c.name {
			t.Errorf("region named %q, want %q", attr(region, "aria-label"), c.name)
		}
		if wide := c.name != ""; wide != (attr(region, "tabindex") == "0") || wide != (attr(region, "role") == "region") {
			t.Errorf("%s: tabindex %q, role %q", c.head, attr(region, "tabindex"), attr(region, "role"))
		}
		if got := said(all(doc, "caption")[0]); got == "" {
			t.Error("a table without caption")
		}
	}
	if c := all(parse(t, Table(tables.Table{})), "caption"); said(c[0]) == "" {
		t.Error("a table without heads has no caption")
	}
}

func TestNotes(t *testing.T) {
	doc := parse(t, Notes([]tables.Note{
		{Code: "range", Text: "outside"}, {Code: "caution", Text: "wait"}, {Code: "range", Text: "outside"}, {Code: "x", Text: " "},
	}))
	lists := all(doc, "ul")
	if len(lists) != 2 || attr(lists[0], "class") != "cautions" {
		t.Fatalf("%d lists, want cautions and notes", len(lists))
	}
	same(t, "cautions", texts(all(lists[0], "li")), []string{"Caution: wait"})
	same(t, "notes", texts(all(lists[1], "li")), []string{"outside"})
	if got := Notes(nil); strings.TrimSpace(string(got)) != "" {
		t.Errorf("no notes are %q", got)
	}
}

func TestFigure(t *testing.T) {
	f := Figure{
		ID: "The course", Alt: `gravity "over" time`, Caption: "Course", Text: []string{"falls to 1.010"},
		SVG: []byte("\ufeff<?xml version=\"1.0\"?>\n<!DOCTYPE svg PUBLIC \"x\" \"y\">\n<svg role='none' viewBox=\"0 0 1 1\"><path d=\"M0 0\"/></svg>\n"),
	}
	out := f.Inline()
	if strings.Contains(string(out), "<?xml") || strings.Contains(string(out), "DOCTYPE") {
		t.Errorf("prolog left in %s", out)
	}
	doc := parse(t, out)
	svg := all(doc, "svg")[0]
	if attr(svg, "role") != "img" || attr(svg, "aria-label") != f.Alt || attr(svg, "viewBox") != "0 0 1 1" {
		t.Errorf("svg has %v", svg.Attr)
	}
	if strings.Count(string(out), "role=") != 1 || len(all(svg, "path")) != 1 {
		t.Errorf("picture changed: %s", out)
	}
	if id := attr(all(doc, "figure")[0], "id"); id != "the-course" {
		t.Errorf("id %q", id)
	}
	same(t, "caption", texts(all(all(doc, "figcaption")[0], "p")), []string{"Course", "falls to 1.010"})
	if got := said(parse(t, Figure{SVG: []byte("no picture here")}.Inline())); !strings.Contains(got, "no picture") {
		t.Errorf("without an svg: %q", got)
	}
}

func TestFigureLink(t *testing.T) {
	img := all(parse(t, FigureLink("/chart/3.svg?w=6&h=2", "a course", "", nil)), "img")[0]
	if attr(img, "src") != "/chart/3.svg?w=6&h=2" || attr(img, "alt") != "a course" {
		t.Errorf("img has %v", img.Attr)
	}
	if out := string(FigureLink("javascript:alert(1)", "", "", nil)); strings.Contains(out, "javascript") {
		t.Errorf("script in %s", out)
	}
}

func TestText(t *testing.T) {
	if got := Text("a\u202eb\x00c\x1b[1m\u200fd\nе\uffff\xff"); got != "abc[1md е\ufffd" {
		t.Errorf("cleaned to %q", got)
	}
	for in, want := range map[string]string{"Where it stands": "where-it-stands", " °P & °C! ": "p-c", "°": "", "a--b": "a-b"} {
		if got := Anchor(in); got != want {
			t.Errorf("anchor of %q is %q, want %q", in, got, want)
		}
	}
}

// Whatever the text, it is shown and nothing else: no element and no attribute
// comes of it, none that a strict policy forbids and none that fetches.
func TestAnyText(t *testing.T) {
	hostile := []string{"<script>alert(1)</script>", `"><img src=x onerror=alert(1)>`, "' onfocus='alert(1)", "</td></table><style>", "{{.}}", "\u202e<b>"}
	rapid.Check(t, func(rt *rapid.T) {
		s := rapid.OneOf(rapid.SampledFrom(hostile), rapid.String()).Draw(rt, "text")
		row := []string{s, s}
		out := Ladder(tables.Ladder{Answer: row, Rungs: []tables.Rung{{Name: s, Value: s, Remark: s}}, Lines: row}) +
			Table(tables.Table{Title: s, Columns: []tables.Column{{Head: s}, {Head: s, Align: tables.Right}}, Rows: [][]string{row}, Foot: row}) +
			Notes([]tables.Note{{Code: s, Text: s}, {Code: "caution", Text: s}}) +
			Figure{ID: s, Alt: s, Caption: s, SVG: []byte("<svg></svg>"), Text: row}.Inline() +
			FigureLink("/x", s, s, row)
		checkStrict(rt, out)
		if strings.Contains(s, "<script>") && !strings.Contains(said(parse(t, out)), "<script>alert(1)</script>") {
			rt.Fatal("the text is not shown")
		}
	})
}

// checkStrict fails for what no fragment may hold.
func checkStrict(t *rapid.T, out template.HTML) {
	doc, err := html.Parse(strings.NewReader(string(out)))
	if err != nil {
		t.Fatal(err)
	}
	allowed := " html head body div p strong b span dl dt dd ul li table caption thead tbody tr th td figure figcaption svg img section "
	for _, n := range all(doc, "") {
		if !strings.Contains(allowed, " "+n.Data+" ") {
			t.Fatalf("element %s in %s", n.Data, out)
		}
		for _, a := range n.Attr {
			if a.Key == "style" || strings.HasPrefix(a.Key, "on") || (a.Key == "src" && a.Val != "/x") || a.Key == "href" {
				t.Fatalf("attribute %s=%q in %s", a.Key, a.Val, out)
			}
		}
	}
	for _, r := range string(out) {
		if r == '\u202e' || r == 0 || r == '\x1b' {
			t.Fatalf("%U in %q", r, out)
		}
	}
}
