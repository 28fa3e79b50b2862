package main

import (
	"io"
	"os"
	"path/filepath"
	"strings"

	"github.com/urfave/cli/v2"
	"golang.org/x/term"

	"gylebook/tables"
)

func (b *bench) reportCommand() *cli.Command {
	return b.group("report", "a batch or a season as a page to keep and print",
		`gylebook report batch B26-014 --out B26-014.html
		gylebook report season 2026 --out season.html`,
		b.reportBatch(), b.reportSeason(),
	)
}

// pageFlags are those of every command that writes a page.
func pageFlags(more ...cli.Flag) []cli.Flag {
	return append([]cli.Flag{
		&cli.StringFlag{Name: "out", Aliases: []string{"o"}, Usage: "`FILE` to write, whole or not at all; standard output unless given"},
		&cli.BoolFlag{Name: "replace", Usage: "take the place of a page that is there"},
	}, more...)
}

// pageForm refuses forms that a page does not have.
func (b *bench) pageForm(c *cli.Context, figures string) error {
	if c.IsSet("format") || c.Bool("json") || c.Bool("csv") {
		return usageError(figures, "%s writes a page, wanted no --format, --json or --csv", strings.TrimPrefix(c.Command.HelpName, "gylebook "))
	}
	return nil
}

// pageInto writes a page to --out, or to standard output when that is no terminal.
func (b *bench) pageInto(c *cli.Context, write func(io.Writer) error) error {
	name := c.String("out")
	if name == "" {
		if c.Bool("replace") {
			return usageError("add --out FILE", "--replace is for --out")
		}
		if f, ok := b.out.(*os.File); ok && term.IsTerminal(int(f.Fd())) {
			return usageError("gylebook "+strings.TrimPrefix(c.Command.HelpName, "gylebook ")+" … --out page.html", "a page is for a browser; --out FILE is missing")
		}
		return write(b.out)
	}
	into := intoFile
	if c.Bool("replace") && isPage(name) {
		into = overFile
	} else if err := b.freeName(name); err != nil {
		return err
	}
	if err := into(name, everyone, write); err != nil {
		return err
	}
	b.note("note: wrote %s", tables.Clean(name))
	return nil
}

// pageStart is how every page of ours begins.
const pageStart = "<!doctype html>"

// isPage reports whether a file is there and begins like a page, or is a picture of
// the kind that its name says: only such a file is ever replaced.
func isPage(name string) bool {
	f, err := os.Open(name)
	if err != nil {
		return false
	}
	defer func() { _ = f.Close() }()
	head := make([]byte, len(pageStart))
	n, _ := io.ReadFull(f, head)
	start := strings.ToLower(string(head[:n]))
	switch pictureForm(name) {
	case "svg":
		return strings.HasPrefix(start, "<?xml") || strings.HasPrefix(start, "<svg")
	case "png":
		return strings.HasPrefix(string(head[:n]), "\x89PNG")
	}
	return start == pageStart
}

// pictureForm is the form of picture that the name of a file asks for, "" for none.
func pictureForm(name string) string {
	switch ext := strings.ToLower(filepath.Ext(name)); ext {
	case ".svg", ".png":
		return ext[1:]
	}
	return ""
}
