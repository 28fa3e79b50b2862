package report

import (
	"bytes"
	"errors"
	"io"
	"regexp"
	"strings"
	"testing"

	"golang.org/x/net/html"

	"gylebook/tables"
	"gylebook/tables/page"
)

type document interface{ Write(w io.Writer) error }

func htmlOf(t *testing.T, d document) string {
	t.Helper()
	var b strings.Builder
	if err := d.Write(&b); err != nil {
		t.Fatal(err)
	}
	return b.String()
}

// all are the elements of that name, in order; "" is every element.
func all(n *html.Node, name string) []*html.Node {
	var out []*html.Node
	for d := range n.Descendants() {
		if d.Type == html.ElementNode && (name == "" || d.Data == name) {
			out = append(out, d)
		}
	}
	return out
}

func attr(n *html.Node, key string) string {
	for _, a := range n.Attr {
		if a.Key == key {
			return a.Val
		}
	}
	return ""
}

// said is the text of n, spaces made single.
func said(n *html.Node) string {
	var b strings.Builder
	for d := range n.Descendants() {
		if d.Type == html.TextNode {
			b.WriteString(d.Data)
		}
	}
	return strings.Join(strings.Fields(b.String()), " ")
}

func parse(t *testing.T, text string) *html.Node {
	t.Helper()
	doc, err := html.Parse(strings.NewReader(text))
	if err != nil {
		t.Fatal(err)
	}
	return doc
}

// every document that the tests look at.
func documents() map[string]document {
	out := map[string]document{"report": batch(), "bare report": Report{Title: "bare", Made: made}}
	for name, c := range cards() {
		out["card "+name] = c
	}
	return out
}

// Each document is whole, names its tables and their heads, fetches nothing and
// runs nothing.
func TestDocuments(t *testing.T) {
	for name, d := range documents() {
		t.Run(name, func(t *testing.T) {
			text := htmlOf(t, d)
			if !strings.HasPrefix(text, "<!DOCTYPE html>") || text != htmlOf(t, d) {
				t.Error("no doctype, or other bytes the second time")
			}
			doc := parse(t, text)
			for _, element := range []string{"title", "style", "h1", "main"} {
				if n := len(all(doc, element)); n != 1 && (element != "title" || n < 1) {
					t.Errorf("%d of %s, want 1", n, element)
				}
			}
			if attr(all(doc, "html")[0], "lang") != "en" {
				t.Error("no language")
			}
			for _, table := range all(doc, "table") {
				if c := all(table, "caption"); len(c) != 1 || said(c[0]) == "" {
					t.Error("a table without caption")
				}
				for _, th := range all(table, "th") {
					if s := attr(th, "scope"); s != "col" && s != "row" {
						t.Errorf("head %q has scope %q", said(th), s)
					}
				}
			}
			checkAlone(t, doc)
		})
	}
}

var paper = regexp.MustCompile(`[{;]\s*size: ([^;]*);`)

// checkAlone fails for what would be fetched or run, for an id that stands twice
// and for a reference to none.
func checkAlone(t *testing.T, doc *html.Node) {
	t.Helper()
	ids := map[string]bool{}
	for _, n := range all(doc, "") {
		if id := attr(n, "id"); id != "" && ids[id] {
			t.Errorf("id %q stands twice", id)
		} else {
			ids[id] = true
		}
	}
	for _, n := range all(doc, "") {
		if n.Data == "script" || n.Data == "link" || n.Data == "iframe" || n.Data == "base" {
			t.Errorf("element %s", n.Data)
		}
		for _, a := range n.Attr {
			local, inside := strings.CutPrefix(a.Val, "#")
			switch {
			case a.Key == "src" || a.Key == "srcset" || strings.HasPrefix(a.Key, "on"):
				t.Errorf("%s=%q", a.Key, a.Val)
			case a.Key == "href" && (!inside || !ids[local]):
				t.Errorf("href %q leads nowhere in the document", a.Val)
			case a.Key == "aria-labelledby" && !ids[a.Val]:
				t.Errorf("labelled by %q, which is not there", a.Val)
			}
		}
	}
	style := said(all(doc, "style")[0])
	for _, bad := range []string{"url(", "@import", "http"} {
		if strings.Contains(style, bad) {
			t.Errorf("%q in the stylesheet", bad)
		}
	}
	for _, size := range paper.FindAllStringSubmatch(style, -1) {
		if size[1] != "landscape" {
			t.Errorf("%q names a paper; the printer knows it", size[1])
		}
	}
}

func TestReportContents(t *testing.T) {
	doc := parse(t, htmlOf(t, batch()))
	want := []string{"Where it stands", "Course", "Season", "Attenuation", "Methods and sources"}
	var listed, headed []string
	for _, a := range all(all(doc, "nav")[0], "a") {
		listed = append(listed, said(a))
	}
	for _, h := range all(all(doc, "main")[0], "h2") {
		headed = append(headed, said(h))
	}
	if strings.Join(listed, "|") != strings.Join(want, "|") || strings.Join(headed, "|") != strings.Join(want, "|") {
		t.Errorf("contents %q, headings %q, want %q", listed, headed, want)
	}
	foot := said(all(doc, "footer")[0])
	for _, s := range []string{"Caution: A forecast is no measurement", "Made 2026-11-18 12:20 UTC"} {
		if !strings.Contains(foot, s) {
			t.Errorf("foot %q lacks %q", foot, s)
		}
	}
	short := batch()
	short.Sections = short.Sections[:2]
	if doc := parse(t, htmlOf(t, short)); len(all(doc, "nav")) != 0 {
		t.Error("three sections have a list of contents")
	}
}

// Headings and figures that are called alike get ids of their own.
func TestReportIDs(t *testing.T) {
	f := page.Figure{ID: "course", SVG: course("a")}
	g := page.Figure{ID: "section-course", SVG: course("b")}
	r := Report{Title: "t", Made: made, Sections: []Section{
		{Heading: "Course", Figures: []page.Figure{f, f, g}}, {Heading: "course"}, {Heading: "°"}, {Heading: "Contents"}, {},
	}}
	r.Sections[0].Figures[1].SVG = course("c")
	doc := parse(t, htmlOf(t, r))
	checkAlone(t, doc)
	var got []string
	for _, n := range all(doc, "figure") {
		got = append(got, attr(n, "id"))
	}
	if strings.Join(got, " ") != "course course-2 section-course-2" {
		t.Errorf("ids %q", got)
	}
}

// The time keeps the offset it was given with.
func TestReportTime(t *testing.T) {
	doc := parse(t, htmlOf(t, Report{Title: "t", Made: "2026-03-01T08:30:00+01:00", Lang: "en-GB"}))
	at := all(doc, "time")[0]
	if attr(at, "datetime") != "2026-03-01T08:30:00+01:00" || said(at) != "2026-03-01 08:30 +01:00" {
		t.Errorf("time %v, %q", at.Attr, said(at))
	}
	if lang := attr(all(doc, "html")[0], "lang"); lang != "en-GB" {
		t.Errorf("language %q", lang)
	}
}

func TestRefusals(t *testing.T) {
	for name, c := range map[string]struct {
		d    document
		want string
	}{
		"no title":      {Report{Made: made}, "report: read no title, wanted one"},
		"no time":       {Report{Title: "t"}, `made: read "", wanted a time`},
		"words as time": {Card{Title: "t", Made: "today"}, `card "t": made: read "today", wanted a time`},
		"no card title": {Card{Title: " \u202e", Made: made}, "card: read no title, wanted one"},
		"nothing":       {Card{Title: "t", Made: made}, "read 0 of table, strip and sheet, wanted one"},
		"two":           {Card{Title: "t", Made: made, Sheet: &Sheet{}, Strip: &Strip{}}, "read 2 of table"},
		"no rows":       {Card{Title: "t", Made: made, Strip: &Strip{}}, "read 0 rows of 2 columns, wanted at least one"},
		"blank sheet":   {Card{Title: "t", Made: made, Sheet: &Sheet{Rows: 3}}, "read 3 rows of 0 columns"},
		"no table rows": {Card{Title: "t", Made: made, Table: &tables.Table{}}, "read 0 rows of 0 columns"},
	} {
		var b bytes.Buffer
		if err := c.d.Write(&b); err == nil || !strings.Contains(err.Error(), c.want) || b.Len() > 0 {
			t.Errorf("%s: error %v and %d bytes, want %q and none", name, err, b.Len(), c.want)
		}
	}
}

type full struct{}

func (full) Write([]byte) (int, error) { return 0, errors.New("disk full") }

func TestWriterFails(t *testing.T) {
	if err := batch().Write(full{}); err == nil || !strings.Contains(err.Error(), "disk full") {
		t.Errorf("error %v", err)
	}
}

// Hostile text in every field is shown as it stands.
func TestEscaping(t *testing.T) {
	const s = `<script>alert("x")</script></style></title>`
	two := []string{s, s}
	table := tables.Table{Title: s, Columns: []tables.Column{{Head: s}}, Rows: [][]string{{s}}, Foot: two}
	report := Report{
		Title: s, Subtitle: s, Lead: two, Cautions: two, Made: made, Lang: "en",
		Methods: []Method{{s, s, s}},
		Sections: []Section{{
			Heading: s, Lines: two, Tables: []tables.Table{table}, Notes: []tables.Note{{Code: "x", Text: s}},
			Ladders: []tables.Ladder{{Answer: two, Rungs: []tables.Rung{{Name: s, Value: s, Remark: s}}, Lines: two}},
			Figures: []page.Figure{{ID: s, Alt: s, Caption: s, Text: two, SVG: course("a")}},
		}},
	}
	small := tables.Table{Title: s, Columns: []tables.Column{{Head: s}}, Rows: [][]string{{s}}}
	for name, c := range map[string]struct {
		d    document
		want int // times the text is seen: a title twice, what is said twice in one list of cautions once
	}{
		"report": {report, 28},
		"table":  {Card{Title: s, Basis: two, Table: &small, Cautions: []string{s}, Made: made}, 8},
		"strip":  {Card{Title: s, Strip: &Strip{Left: "<script>", Right: "<b>", Rows: [][2]string{{"<i>", "</table>"}}}, Made: made}, 2},
		"sheet":  {Card{Title: s, Sheet: &Sheet{Columns: []string{s}, Rows: 2}, Made: made}, 4},
	} {
		doc := parse(t, htmlOf(t, c.d))
		if n := strings.Count(said(doc), s); n != c.want {
			t.Errorf("%s: the text is shown %d times, want %d", name, n, c.want)
		}
		checkAlone(t, doc)
		if n := len(all(doc, "style")); n != 1 {
			t.Errorf("%s: %d stylesheets", name, n)
		}
	}
}
