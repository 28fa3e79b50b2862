package main

import (
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/exchange"
	"gylebook/tables"
)

func (b *bench) exportCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "export", Usage: "the whole journal as JSON Lines, or its readings as CSV",
		Description: `JSON Lines hold every entry with its digest; imported into an empty journal they make the same one. --csv writes
			the table of readings for people, in a profile: standard (comma, decimal point), spreadsheet-eu (semicolon, decimal
			comma), tab.`,
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "profile", Value: string(exchange.Standard), Usage: "`P` of the CSV: standard, spreadsheet-eu, tab"},
			&cli.StringFlag{Name: "output", Aliases: []string{"o"}, Usage: "`FILE` to write instead of stdout"},
		},
	}, `gylebook export -o season.jsonl
		gylebook export --csv --profile spreadsheet-eu -o readings.csv`, b.export)
}

func (b *bench) export(c *cli.Context) error {
	if c.Args().Len() > 0 {
		return wanted(c, "none; -o names the file")
	}
	csv := b.set.format == tables.CSV
	switch {
	case b.set.format == tables.Markdown:
		return usageError("--csv writes the table of readings", "--format markdown: an export is JSON Lines or CSV")
	case c.IsSet("profile") && !csv:
		return usageError("add --csv", "--profile is for --csv")
	}
	profile, err := exchange.ParseProfile(c.String("profile"))
	if err != nil {
		return usageError("", "--profile: %v", err)
	}
	return b.withJournal(c.Context, func(s journal.Store) error {
		write := func(w io.Writer) error {
			if !csv {
				_, err := exchange.WriteLines(c.Context, w, s)
				return err
			}
			book, err := bookOf(c.Context, s)
			if err != nil {
				return err
			}
			return exchange.WriteReadings(c.Context, w, s, profile, book)
		}
		if file := c.String("output"); file != "" {
			err = intoFile(file, write)
		} else {
			err = write(b.out)
		}
		if err == nil {
			b.noteAs("caution", cautionRecords)
		}
		return err
	})
}

// intoFile writes beside a file and gives it its name when it is whole.
func intoFile(name string, write func(io.Writer) error) (err error) {
	f, err := os.CreateTemp(filepath.Dir(name), "."+filepath.Base(name)+"-*")
	if err != nil {
		return cannotWrite(name, err)
	}
	defer func() {
		if err != nil {
			_ = f.Close()
			_ = os.Remove(f.Name())
		}
	}()
	if err := write(f); err != nil {
		return err
	}
	if err := errors.Join(f.Sync(), f.Close()); err != nil {
		return cannotWrite(name, err)
	}
	if err := os.Rename(f.Name(), name); err != nil {
		return cannotWrite(name, err)
	}
	return nil
}

func cannotWrite(name string, err error) error {
	return &exitError{exitCannotWrite, fmt.Sprintf("%s: %v", name, err), "name a file in a folder that can be written"}
}
