package page

import (
	"html/template"
	"regexp"
	"strings"
	"sync"
)

// Figure is a picture and what it shows.
type Figure struct {
	ID      string // unique in the page; "" for none
	Alt     string // what a reader who does not see the picture hears
	Caption string
	SVG     []byte   // drawn by this program, dark on white; never what a user sent
	Text    []string // the same as the picture, in words
}

var figurePage = Parsed("figure", `<figure{{with .ID}} id="{{.}}"{{end}}>
<div class="picture">{{if .SVG}}{{.SVG}}{{else}}<img src="{{.Src}}" alt="{{.Alt}}">{{end}}</div>
{{- if or .Caption .Text}}
<figcaption>
{{- with .Caption}}
<p class="title">{{.}}</p>
{{- end}}
{{- range .Text}}
<p>{{.}}</p>
{{- end}}
</figcaption>
{{- end}}
</figure>
`)

type figureData struct {
	ID, Src, Alt, Caption string
	SVG                   template.HTML
	Text                  []string
}

// Inline is the figure with its picture in the page, for a report in one file.
// The picture keeps everything but its XML prolog, and gets role="img" and Alt as
// its name.
func (f Figure) Inline() template.HTML {
	return fill(figurePage, figureData{
		ID: Anchor(f.ID), Alt: Text(f.Alt), Caption: Text(f.Caption), Text: Texts(f.Text),
		SVG: picture(f.SVG, Text(f.Alt)),
	})
}

// FigureLink is a figure whose picture lies at src, for a page that may not hold
// the picture itself. An address of another scheme than http, https or mailto
// is refused by html/template.
func FigureLink(src, alt, caption string, text []string) template.HTML {
	return fill(figurePage, figureData{Src: src, Alt: Text(alt), Caption: Text(caption), Text: Texts(text)})
}

var (
	prolog = sync.OnceValue(func() *regexp.Regexp { return regexp.MustCompile(`(?s)<\?xml.*?\?>|<!DOCTYPE[^>]*>`) })
	named  = sync.OnceValue(func() *regexp.Regexp {
		return regexp.MustCompile(`\s(role|aria-label|aria-labelledby)\s*=\s*("[^"]*"|'[^']*')`)
	})
)

// picture makes the SVG part of an HTML page. Without a picture there is a line
// that says so.
func picture(svg []byte, alt string) template.HTML {
	before, rest, found := strings.Cut(string(svg), "<svg")
	open, inside, closed := strings.Cut(rest, ">")
	if !found || !closed {
		return "<p>no picture</p>"
	}
	before = strings.TrimLeft(prolog().ReplaceAllString(before, ""), "\ufeff \r\n\t")
	open = named().ReplaceAllString(open, "")
	name := ` role="img"`
	if alt != "" {
		name += ` aria-label="` + template.HTMLEscapeString(alt) + `"`
	}
	return template.HTML(before + "<svg" + name + open + ">" + strings.TrimRight(inside, "\r\n\t "))
}
