package report

import (
	"bytes"
	"context"
	"os"
	"os/exec"
	"path/filepath"
	"regexp"
	"strings"
	"testing"
	"time"
)

// browser is the program that prints; without it the test is skipped, save where
// everything must be there.
func browser(t *testing.T) string {
	t.Helper()
	path, err := exec.LookPath("chromium")
	if err != nil && os.Getenv("GYLEBOOK_CI") == "1" {
		t.Fatalf("chromium is needed in CI: %v", err)
	}
	if err != nil {
		t.Skipf("chromium is not here: %v", err)
	}
	return path
}

var (
	pageObject = regexp.MustCompile(`/Type\s*/Page\b`)
	mediaBox   = regexp.MustCompile(`/MediaBox \[0 0 ([0-9]+)`)
)

// Every card, filled to what it can hold, is one page of A4 and one of Letter.
// The card names no paper, so the paper is named here for the printer.
func TestPrintOnOnePage(t *testing.T) {
	if testing.Short() {
		t.Skip("printing starts a browser for every page")
	}
	program, profile := browser(t), t.TempDir()
	wide := chart(21, 9)
	wide.Table.Foot = append(wide.Table.Foot, strings.Repeat("the sample is stirred before it is read ", 4))
	most := refusal(t, withRows(wide, 300))
	across := chart(10, 12)
	across.Landscape = true
	sheet := rounds(refusal(t, rounds(300)).FitRows)
	for name, c := range map[string]Card{
		"chart": withRows(wide, most.FitRows), "landscape chart": withRows(across, refusal(t, withRows(across, 300)).FitRows),
		"strip": scale(refusal(t, scale(900)).FitRows), "sheet": sheet,
	} {
		for paper, width := range map[string][2]string{"A4": {"594", "841"}, "letter": {"612", "792"}} {
			pdf := printOn(t, program, profile, htmlOf(t, c), paper)
			if n := len(pageObject.FindAll(pdf, -1)); n != 1 {
				t.Errorf("%s on %s: %d pages, want 1", name, paper, n)
			}
			want := width[0]
			if c.Landscape {
				want = width[1]
			}
			if box := mediaBox.FindSubmatch(pdf); box == nil || string(box[1]) != want {
				t.Errorf("%s on %s: paper %q, want a width of %s", name, paper, box, want)
			}
		}
	}
}

// withRows is the card with so many rows.
func withRows(c Card, rows int) Card {
	t := *c.Table
	t.Rows = chart(rows, len(t.Columns)).Table.Rows
	c.Table = &t
	return c
}

// printOn is the PDF that the browser makes of a document, with its own files in
// the folder profile.
func printOn(t *testing.T, program, profile, document, paper string) []byte {
	t.Helper()
	dir := t.TempDir()
	in, out := filepath.Join(dir, "card.html"), filepath.Join(dir, "card.pdf")
	if strings.Contains(document, "@page { size: landscape;") {
		document = strings.Replace(document, "size: landscape;", "size: "+paper+" landscape;", 1)
	} else {
		document = strings.Replace(document, "@page { ", "@page { size: "+paper+"; ", 1)
	}
	if err := os.WriteFile(in, []byte(document), 0o600); err != nil {
		t.Fatal(err)
	}
	ctx, cancel := context.WithTimeout(t.Context(), 2*time.Minute)
	defer cancel()
	said, err := exec.CommandContext(ctx, program, "--headless", "--no-sandbox", "--disable-gpu", "--disable-quic",
		"--no-first-run", "--disable-background-networking", "--disable-component-update", "--disable-sync",
		"--user-data-dir="+profile, "--no-pdf-header-footer", "--print-to-pdf="+out, in).CombinedOutput()
	if err != nil {
		t.Fatalf("printing: %v\n%s", err, said)
	}
	pdf, err := os.ReadFile(out)
	if err != nil {
		t.Fatal(err)
	}
	if !bytes.HasPrefix(pdf, []byte("%PDF")) {
		t.Fatalf("no PDF: %.40q", pdf)
	}
	return pdf
}
