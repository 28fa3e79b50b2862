package main

import (
	"errors"
	"fmt"
	"io"
	"io/fs"
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
			&cli.StringFlag{Name: "output", Aliases: []string{"o", "out"}, Usage: "new `FILE` to write instead of stdout"},
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
	file := c.String("output")
	return b.withJournal(c.Context, func(s journal.Store) error {
		if file != "" {
			if err := b.freeName(file); err != nil {
				return err
			}
		}
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
		if file != "" {
			err = intoFile(file, ownOnly, write)
		} else {
			err = write(b.out)
		}
		if err == nil {
			b.noteAs("caution", cautionRecords)
		}
		return err
	})
}

// freeName refuses a file that is there already, one beside the journal that the
// journal itself uses, and a folder that is not there.
func (b *bench) freeName(name string) error {
	if _, err := os.Lstat(name); err == nil {
		return occupied(name)
	}
	for _, of := range []string{"-wal", "-shm", "-journal"} {
		if absolute(name) == absolute(b.place())+of {
			return &exitError{exitCannotWrite, name + " is a file of the journal; choose another name", ""}
		}
	}
	folder := filepath.Dir(name)
	switch info, err := os.Stat(folder); {
	case errors.Is(err, fs.ErrNotExist):
		return &exitError{exitCannotWrite, "the folder " + folder + " is not there", "make it first, or name another"}
	case err == nil && !info.IsDir():
		return &exitError{exitCannotWrite, folder + " is not a folder", "name a file in a folder that can be written"}
	}
	return nil
}

func occupied(name string) error {
	return &exitError{exitCannotWrite, name + " exists; choose another name", ""}
}

// cannotWrite names the file that was asked for, not the one written beside it.
func cannotWrite(name string, err error) error {
	why := err
	var path *os.PathError
	var link *os.LinkError
	switch {
	case errors.As(err, &path):
		why = path.Err
	case errors.As(err, &link):
		why = link.Err
	}
	return &exitError{exitCannotWrite, fmt.Sprintf("%s: %v", name, why), "name a file in a folder that can be written"}
}
