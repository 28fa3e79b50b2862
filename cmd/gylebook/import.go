package main

import (
	"bufio"
	"context"
	"errors"
	"io"
	"io/fs"
	"os"
	"path/filepath"
	"runtime/debug"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/exchange"
	"gylebook/attenuation/journal/sqlstore"
	"gylebook/tables"
)

func (b *bench) importCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "import", Usage: "take in an export: all of it or nothing", ArgsUsage: "FILE",
		Description: `JSON Lines go into an empty journal and are verified. CSV: what was typed is taken in, the rest is reckoned anew,
			and figures that differ are reported; byte order mark, delimiter and decimal mark are found out. A row is judged as log
			judges a reading, at its own time; status suspect with a reason keeps what is held. Every refused row is named and then
			nothing is written. A large file takes as much again of the folder for temporary ones (TMPDIR). "-" reads stdin.`,
		Flags: []cli.Flag{
			&cli.BoolFlag{Name: "dry-run", Usage: "report, and write nothing"},
			&cli.BoolFlag{Name: "create", Usage: "make batches and instruments that the journal lacks"},
		},
	}, `gylebook import readings.csv --dry-run
		gylebook import readings.csv --create
		gylebook import season.jsonl --journal copy.db`, b.importFile)
}

func (b *bench) importFile(c *cli.Context) error {
	if c.Args().Len() != 1 {
		return wanted(c, "one file")
	}
	in, err := b.openInput(c.Args().First())
	if err != nil {
		return err
	}
	defer func() { _ = in.Close() }()
	file := bufio.NewReaderSize(in, 64<<10)
	dry := c.Bool("dry-run")
	// Little is held, and much made and dropped for each row: the collector runs more
	// often, so that less lies about.
	defer debug.SetGCPercent(debug.SetGCPercent(50))
	if isLines(file) {
		if dry {
			return b.checkLines(c.Context, file)
		}
		return b.filling(c.Context, func(s journal.Store) error { return b.restore(c.Context, s, file) })
	}
	open := b.filling
	if dry {
		open = b.trying
	}
	return open(c.Context, func(s journal.Store) error {
		report, err := exchange.Import(c.Context, s, b.by(), b.set.now, file, exchange.Options{
			DryRun: dry, Create: c.Bool("create"), Location: time.Local, Scratch: newScratch,
		})
		if err != nil && !errors.Is(err, exchange.ErrRefused) {
			return err
		}
		return b.reportImport(report, dry, err)
	})
}

// filling is writing that takes a new journal away again when nothing came into it.
func (b *bench) filling(ctx context.Context, do func(journal.Store) error) error {
	_, err := os.Lstat(b.place())
	isNew := errors.Is(err, fs.ErrNotExist)
	empty := false
	err = b.writing(ctx, func(s journal.Store) error {
		failed := do(s)
		if failed != nil && isNew {
			// Another may have written to it meanwhile; the context may be over.
			n, _, err := s.Head(context.WithoutCancel(ctx))
			empty = err == nil && n == 0
		}
		return failed
	})
	if empty {
		for _, of := range []string{"-wal", "-shm", ""} {
			_ = os.Remove(b.place() + of)
		}
		b.note("note: nothing came into the new journal; it was taken away again")
	}
	return err
}

// trying hands the journal to do, and an empty one for the time when there is none.
func (b *bench) trying(ctx context.Context, do func(journal.Store) error) (err error) {
	if _, err := os.Lstat(b.place()); !errors.Is(err, fs.ErrNotExist) {
		return b.withJournal(ctx, do)
	}
	folder, err := os.MkdirTemp("", "gylebook-*")
	if err != nil {
		return err
	}
	defer func() { err = errors.Join(err, os.RemoveAll(folder)) }()
	s, err := sqlstore.Create(ctx, filepath.Join(folder, "empty.db"))
	if err != nil {
		return err
	}
	return closing(s, do)
}

// openInput opens a file to read, "-" for stdin.
func (b *bench) openInput(name string) (io.ReadCloser, error) {
	if name == "-" {
		return io.NopCloser(b.in), nil
	}
	f, err := os.Open(name)
	if err != nil {
		why := err.Error()
		if errors.Is(err, fs.ErrNotExist) {
			why = "no file " + name
		}
		return nil, &exitError{exitNoInput, why, ""}
	}
	return f, nil
}

// isLines reports whether a file begins as JSON Lines do, with an object.
func isLines(file *bufio.Reader) bool {
	head, _ := file.Peek(512)
	for _, r := range string(head) {
		switch r {
		case '\ufeff', ' ', '\t', '\r', '\n':
		default:
			return r == '{'
		}
	}
	return false
}

// restore fills an empty journal.
func (b *bench) restore(ctx context.Context, s journal.Store, file io.Reader) error {
	n, err := s.Restore(ctx, exchange.ReadLines(file))
	if errors.Is(err, journal.ErrNotEmpty) {
		return dataError("name a new one with --journal", "JSON Lines go into an empty journal: %v", err)
	}
	if err != nil {
		return err
	}
	return b.printPlace("import", b.place(), n)
}

// checkLines verifies JSON Lines without a journal.
func (b *bench) checkLines(ctx context.Context, file io.Reader) error {
	var n int64
	chain := ""
	for e, err := range exchange.ReadLines(file) {
		if err != nil {
			return err
		}
		if ctx.Err() != nil {
			return ctx.Err()
		}
		if err := e.Verify(chain); err != nil {
			return err
		}
		n, chain = n+1, e.Chain
	}
	return b.print(sheet{
		name:    "import",
		records: []tables.Record{{{Name: "entries", Value: int(n)}, {Name: "dry_run", Value: true}}},
		ladder:  &tables.Ladder{Answer: []string{count(int(n), "entry holds", "entries hold") + "; nothing was written"}},
	})
}
