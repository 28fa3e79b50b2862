package report

import (
	_ "embed"
	"fmt"
	"html/template"
	"io"
	"strconv"
	"strings"
	"time"

	"gylebook/tables"
	"gylebook/tables/page"
)

// Report is a document of sections.
type Report struct {
	Title    string // may not be empty
	Subtitle string
	Lead     []string // what the reader should know first, a paragraph each
	Sections []Section
	Methods  []Method // how every figure was found, in the last section
	Cautions []string // in the foot
	Made     string   // RFC 3339
	Lang     string   // BCP 47; "" is "en"
}

// Section is shown in this order: answers, what is said of them, pictures, tables,
// notes.
type Section struct {
	Heading string
	Ladders []tables.Ladder
	Tables  []tables.Table
	Figures []page.Figure // ids that stand twice are numbered; ids inside an SVG are the caller's
	Lines   []string
	Notes   []tables.Note
}

// Method says how a figure was found and where that comes from.
type Method struct{ Figure, Method, Source string }

// contentsFrom is the number of sections from which a list of contents helps.
const contentsFrom = 4

//go:embed report.css
var reportStyle string

var reportPage = page.Parsed("report", `<!DOCTYPE html>
<html lang="{{.Lang}}">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>{{.Title}}</title>
<style>
{{.Style}}</style>
</head>
<body>
<header>
<h1>{{.Title}}</h1>
{{- with .Subtitle}}
<p class="subtitle">{{.}}</p>
{{- end}}
{{- range .Lead}}
<p class="lead">{{.}}</p>
{{- end}}
</header>
{{- with .Contents}}
<nav aria-labelledby="contents">
<h2 id="contents">Contents</h2>
<ol>
{{- range .}}
<li><a href="#{{.ID}}">{{.Heading}}</a></li>
{{- end}}
</ol>
</nav>
{{- end}}
<main>
{{- range .Sections}}
<section{{if .Short}} class="short"{{end}}{{if .Heading}} aria-labelledby="{{.ID}}"{{end}}>
{{- if .Heading}}
<h2 id="{{.ID}}">{{.Heading}}</h2>
{{- end}}
{{range .Blocks}}{{.}}{{end -}}
</section>
{{- end}}
</main>
<footer>
{{.Cautions -}}
<p class="made">Made <time datetime="{{.Made}}">{{.Time}}</time></p>
</footer>
</body>
</html>
`)

type section struct {
	ID, Heading string
	Short       bool // kept on one page of paper
	Blocks      []template.HTML
}

// Write writes the report as one HTML document. A missing title and a time that is
// not RFC 3339 are errors, and nothing is written.
func (r Report) Write(w io.Writer) error {
	title := strings.TrimSpace(page.Text(r.Title))
	if title == "" {
		return fmt.Errorf("report: read no title, wanted one")
	}
	at, err := madeAt(r.Made)
	if err != nil {
		return fmt.Errorf("report: %w", err)
	}
	d := struct {
		Lang, Title, Subtitle, Made, Time string
		Style                             template.CSS
		Lead                              []string
		Contents, Sections                []section
		Cautions                          template.HTML
	}{
		Lang: page.Text(r.Lang), Title: title, Subtitle: page.Text(r.Subtitle),
		Made: at.Format(time.RFC3339), Time: shown(at),
		Style: template.CSS(page.Style + reportStyle), Lead: page.Texts(r.Lead),
		Cautions: page.Cautions(r.Cautions),
	}
	if d.Lang == "" {
		d.Lang = "en"
	}
	ids := map[string]bool{"contents": true}
	for _, s := range r.Sections {
		d.Sections = append(d.Sections, s.blocks(ids))
	}
	if len(r.Methods) > 0 {
		d.Sections = append(d.Sections, section{
			ID: unique(ids, "methods"), Heading: "Methods and sources", Blocks: []template.HTML{methods(r.Methods)},
		})
	}
	if len(d.Sections) >= contentsFrom {
		for _, s := range d.Sections {
			if s.Heading != "" {
				d.Contents = append(d.Contents, s)
			}
		}
	}
	return write(w, reportPage, d)
}

// onePage is the weight up to which a section is kept on one page of paper: a
// heavier one would leave half a page white before it.
const onePage = 24

// weight is about how many lines of a table the section is as high as.
func (s Section) weight() int {
	n := len(s.Lines) + len(s.Notes) + 14*len(s.Figures)
	for _, l := range s.Ladders {
		n += 3 + len(l.Rungs) + len(l.Lines)
	}
	for _, t := range s.Tables {
		n += 3 + len(t.Rows) + len(t.Foot)
	}
	return n
}

func (s Section) blocks(ids map[string]bool) section {
	heading := strings.TrimSpace(page.Text(s.Heading))
	out := section{Heading: heading, Short: s.weight() <= onePage}
	if heading != "" {
		out.ID = unique(ids, "section-"+page.Anchor(heading))
	}
	for _, l := range s.Ladders {
		out.Blocks = append(out.Blocks, page.Ladder(l))
	}
	if lines := page.Texts(s.Lines); len(lines) > 0 {
		out.Blocks = append(out.Blocks, paragraphs(lines))
	}
	for _, f := range s.Figures {
		if f.ID = page.Anchor(f.ID); f.ID != "" {
			f.ID = unique(ids, f.ID)
		}
		out.Blocks = append(out.Blocks, f.Inline())
	}
	for _, t := range s.Tables {
		out.Blocks = append(out.Blocks, page.Table(t))
	}
	out.Blocks = append(out.Blocks, page.Notes(s.Notes))
	return out
}

// methods is a table: what is read in one column is compared down it.
func methods(all []Method) template.HTML {
	t := tables.Table{
		Title:   "How each figure was found",
		Columns: []tables.Column{{Head: "Figure"}, {Head: "Method"}, {Head: "Source"}},
	}
	for _, m := range all {
		t.Rows = append(t.Rows, []string{m.Figure, m.Method, m.Source})
	}
	return page.Table(t)
}

func paragraphs(lines []string) template.HTML {
	var b strings.Builder
	for _, line := range lines {
		b.WriteString("<p>" + template.HTMLEscapeString(line) + "</p>\n")
	}
	return template.HTML(b.String())
}

// unique is id, numbered if it is taken.
func unique(ids map[string]bool, id string) string {
	name := id
	for n := 2; ids[name]; n++ {
		name = id + "-" + strconv.Itoa(n)
	}
	ids[name] = true
	return name
}
