package report

import (
	_ "embed"
	"fmt"
	"html/template"
	"io"
	"strings"
	"time"

	"gylebook/tables"
	"gylebook/tables/page"
)

// Card is one page to print and hang up: black on white, at least 14 pt, the
// same page whether the paper is A4 or Letter. It holds one of Table, Strip and
// Sheet.
type Card struct {
	Title     string   // may not be empty
	Basis     []string // what it holds for: instrument, basis, relation, date
	Table     *tables.Table
	Strip     *Strip
	Sheet     *Sheet
	Cautions  []string
	Made      string // RFC 3339
	Landscape bool
}

// Strip is a scale beside another, in as many columns as the page needs.
type Strip struct {
	Left, Right string // names with units
	Rows        [][2]string
}

// Sheet is blank, with lines to write on below the names of the columns.
type Sheet struct {
	Columns []string
	Rows    int
}

//go:embed card.css
var cardStyle string

var cardPage = page.Parsed("card", `<!DOCTYPE html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>{{.Title}}</title>
<style>
{{.Style}}</style>
</head>
<body>
<main>
<h1>{{.Title}}</h1>
{{- with .Basis}}
<ul class="basis">
{{- range .}}
<li>{{.}}</li>
{{- end}}
</ul>
{{- end}}
<div class="{{.Kind}}">
{{range .Tables}}{{.}}{{end -}}
</div>
{{.Cautions -}}
<p class="made">Made <time datetime="{{.Made}}">{{.Time}}</time></p>
</main>
</body>
</html>
`)

// Write writes the card as one HTML document. What does not fit on one page is a
// [*TooLarge]; that, a missing title, a time that is not RFC 3339 and another
// number of contents than one are errors, and nothing is written.
func (c Card) Write(w io.Writer) error {
	if c.Title = strings.TrimSpace(page.Text(c.Title)); c.Title == "" {
		return fmt.Errorf("card: read no title, wanted one")
	}
	at, err := madeAt(c.Made)
	if err != nil {
		return fmt.Errorf("card %q: %w", c.Title, err)
	}
	c.Basis, c.Cautions = page.Texts(c.Basis), page.Texts(c.Cautions)
	s, err := c.layOut()
	if err != nil {
		return err
	}
	d := struct {
		Title, Kind, Made, Time string
		Style                   template.CSS
		Basis                   []string
		Tables                  []template.HTML
		Cautions                template.HTML
	}{
		Title: c.Title, Kind: s.kind, Basis: c.Basis, Cautions: page.Cautions(c.Cautions),
		Made: at.Format(time.RFC3339), Time: shown(at), Style: template.CSS(cardStyle + s.css(c.Landscape)),
	}
	for _, t := range s.tables {
		d.Tables = append(d.Tables, page.Table(t))
	}
	return write(w, cardPage, d)
}

// TooLarge says that a card does not fit on one page, and what would.
type TooLarge struct {
	Card                string
	Rows, Columns       int // of the card; a strip has two columns and as many rows as pairs
	FitRows, FitColumns int // of the page, at 14 pt
	Landscape           bool
}

func (e *TooLarge) Error() string {
	way, other := "upright", "landscape"
	if e.Landscape {
		way, other = other, way
	}
	if e.FitRows < 1 || e.FitColumns < 1 {
		return fmt.Sprintf("card %q: its words leave no room for rows on one page at 14 pt, wanted fewer or shorter lines of basis and cautions, shorter names of columns", e.Card)
	}
	return fmt.Sprintf("card %q: read %d rows of %d columns, wanted at most %d rows of %d columns, which is what one page of A4 or Letter holds %s at 14 pt; leave some out, take a larger step or print it %s",
		e.Card, e.Rows, e.Columns, e.FitRows, e.FitColumns, way, other)
}
