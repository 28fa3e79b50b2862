package main

import (
	"context"
	"math"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"
	"time"

	"github.com/chromedp/chromedp"
)

// paper are the sizes that people print on.
var paper = []struct {
	name string
	size chromedp.PaperSize
}{{"A4", chromedp.PaperSize{Width: 8.27, Height: 11.69}}, {"Letter", chromedp.PaperLetter}}

// pdfPage is a page in a PDF as chromium writes it.
var pdfPage = regexp.MustCompile(`/Type\s*/Page\b`)

// pdfSheet is the size of a page in points, from its corner.
var pdfSheet = regexp.MustCompile(`/MediaBox\s*\[\s*0 0 ([\d.]+) ([\d.]+)\s*\]`)

// printed opens a file of the program and returns the number of its pages on paper,
// and the first sheet as it lies: the file may turn it, and says nothing of its size.
func (p *tab) printed(file string, size chromedp.PaperSize) (pages int, lies chromedp.PaperSize) {
	p.t.Helper()
	p.do(chromedp.Navigate("file://" + file))
	ctx, end := context.WithTimeout(p.ctx, time.Minute)
	defer end()
	pdf, err := chromedp.Run(ctx, chromedp.PrintToPDF(chromedp.PDFPaper(size), chromedp.PDFPreferCSSPageSize(), chromedp.PDFPrintBackground()))
	if err != nil {
		p.t.Fatal(err)
	}
	m := pdfSheet.FindSubmatch(pdf)
	if m == nil {
		p.t.Fatalf("no page in a PDF of %d bytes", len(pdf))
	}
	var points [2]float64
	for k := range points {
		if points[k], err = strconv.ParseFloat(string(m[k+1]), 64); err != nil {
			p.t.Fatal(err)
		}
	}
	lies = chromedp.PaperSize{Width: points[0] / 72, Height: points[1] / 72}
	same := func(a, b float64) bool { return math.Abs(a-b) < 0.02 }
	upright := same(lies.Width, size.Width) && same(lies.Height, size.Height)
	if !upright && !(same(lies.Width, size.Height) && same(lies.Height, size.Width)) {
		p.t.Errorf("%s is printed on %v, wanted %v", filepath.Base(file), lies, size)
	}
	return len(pdfPage.FindAll(pdf, -1)), lies
}

// cut lists what is laid out and not shown on paper: clipped by the element it is in,
// or beyond the edge of the sheet.
const cut = `(() => {
	const edge = document.documentElement.clientWidth + 0.5, out = [];
	for (const e of document.querySelectorAll("body *")) {
		const s = getComputedStyle(e), r = e.getBoundingClientRect();
		if (s.display == "none" || e.closest("svg") && e.localName != "svg" || e.clientWidth == 1) continue; // the last is for ears alone
		if (s.overflow != "visible" && (e.scrollWidth > e.clientWidth + 1 || e.scrollHeight > e.clientHeight + 1) && e.localName != "svg")
			out.push(e.localName + "." + e.className + " is clipped");
		if (r.right > edge && r.width > 0) out.push(e.localName + "." + e.className + " stands beyond the edge, at " + r.right + " of " + edge);
	}
	return out.slice(0, 5);
})()`

// browserCards prints each card on one sheet, whole.
func browserCards(t *testing.T, b *browser) {
	s := newServed(t)
	folder := filepath.Dir(s.place)
	p := b.tab(t, "file://")
	for name, args := range map[string][]string{
		"temperature": {"card", "temperature", "--instrument", "H1"},
		"scales":      {"card", "scales"},
		"rounds":      {"card", "rounds"},
	} {
		file := filepath.Join(folder, name+".html")
		s.run(append(args, "--out", file)...)
		for _, sheet := range paper {
			n, lies := p.printed(file, sheet.size)
			if n != 1 {
				t.Errorf("card %s on %s has %d pages, wanted 1", name, sheet.name, n)
			}
			p.onPaper(lies, 12)
			for _, one := range get[[]string](p, cut) {
				t.Errorf("card %s on %s: %s", name, sheet.name, one)
			}
			p.shot(name + sheet.name)
			p.media("", "")
		}
	}
}

// onPaper lays the page out as on a sheet with the margins that it asks for, in mm.
func (p *tab) onPaper(size chromedp.PaperSize, margin float64) {
	p.t.Helper()
	p.media("print", "")
	p.do(chromedp.EmulateViewport(int64((size.Width-2*margin/25.4)*96), int64((size.Height-2*margin/25.4)*96)))
}

// browserReports prints reports of which nothing may be lost, on as many sheets as
// they need.
func browserReports(t *testing.T, b *browser) {
	s := newServed(t)
	folder := filepath.Dir(s.place)
	p := b.tab(t, "file://")
	for name, args := range map[string][]string{
		"open batch": {"report", "batch", "LB-17"}, "closed batch": {"report", "batch", "LB-14"}, "season": {"report", "season"},
	} {
		file := filepath.Join(folder, strings.ReplaceAll(name, " ", "-")+".html")
		s.run(append(args, "--out", file)...)
		for _, sheet := range paper {
			n, lies := p.printed(file, sheet.size)
			if n < 1 {
				t.Errorf("report of the %s on %s has %d pages", name, sheet.name, n)
			}
			screen := get[string](p, allText)
			p.onPaper(lies, 15)
			for _, one := range get[[]string](p, cut) {
				t.Errorf("report of the %s on %s: %s", name, sheet.name, one)
			}
			if onPaper := get[string](p, allText); onPaper != screen || len(screen) < 200 {
				t.Errorf("report of the %s: %d characters on paper, %d on the screen", name, len(onPaper), len(screen))
			}
			p.shot(name + sheet.name)
			p.media("", "")
		}
	}
}

// allText is all that a page says.
const allText = `document.querySelector("main, body").innerText.replace(/\s+/g, " ")`
