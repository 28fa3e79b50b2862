package main

import (
	"context"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/demo"
	"gylebook/attenuation/journal/sqlstore"
	"gylebook/tables"
)

func (b *bench) journalCommand() *cli.Command {
	return b.group("journal", "the file that keeps it all: where, whole, copied",
		`gylebook journal where
		gylebook journal verify
		gylebook journal backup /media/stick/journal.db
		gylebook journal demo demo.db`,
		b.journalInit(), b.journalWhere(), b.journalVerify(), b.journalBackup(), b.journalDemo(),
	)
}

func (b *bench) journalInit() *cli.Command {
	return b.sub("journal", &cli.Command{
		Name: "init", Usage: "make an empty journal",
		Description: "In the data folder, or where --journal or GYLEBOOK_JOURNAL says.",
	}, `gylebook journal init
		gylebook journal init --journal cellar.db`, func(c *cli.Context) error {
		if c.Args().Len() > 0 {
			return wanted(c, "none; name the place with --journal")
		}
		s, err := sqlstore.Create(c.Context, b.place())
		if errors.Is(err, journal.ErrExists) {
			return &exitError{exitCannotWrite, "a journal or another file is at " + b.place(), "--journal names another place"}
		}
		if err != nil {
			return err
		}
		return closing(s, func(journal.Store) error { return b.printPlace("journal-init", b.place(), 0) })
	})
}

func (b *bench) journalWhere() *cli.Command {
	return b.sub("journal", &cli.Command{
		Name: "where", Usage: "print where the journal lies",
	}, "gylebook journal where", func(c *cli.Context) error {
		if c.Args().Len() > 0 {
			return wanted(c, "none")
		}
		there := true
		if _, err := os.Stat(b.place()); errors.Is(err, fs.ErrNotExist) {
			there = false
			b.note("note: nothing is there yet; gylebook journal init makes it")
		}
		return b.print(sheet{
			name:    "journal-where",
			records: []tables.Record{{{Name: "journal", Value: absolute(b.place())}, {Name: "exists", Value: there}}},
			ladder:  &tables.Ladder{Answer: []string{absolute(b.place())}},
		})
	})
}

// absolute is a place from the root, as it stands where that cannot be told.
func absolute(place string) string {
	if abs, err := filepath.Abs(place); err == nil {
		return abs
	}
	return place
}

// printPlace prints a place and how many entries it holds.
func (b *bench) printPlace(name, place string, entries int64) error {
	return b.print(sheet{
		name:    name,
		records: []tables.Record{{{Name: "journal", Value: absolute(place)}, {Name: "entries", Value: int(entries)}}},
		ladder:  &tables.Ladder{Answer: []string{absolute(place), count(int(entries), "entry", "entries")}},
	})
}

// audit lets a store that can check more than the chain do so: the structure of
// its file and what it keeps beside the entries.
func (b *bench) audit(ctx context.Context, s journal.Store) error {
	a, ok := s.(interface {
		Audit(ctx context.Context) (int, error)
	})
	if !ok {
		return nil
	}
	wrong, err := a.Audit(ctx)
	switch {
	case ctx.Err() != nil:
		return ctx.Err()
	case errors.Is(err, journal.ErrReadOnly), errors.Is(err, journal.ErrBusy):
		b.note("note: every entry holds; the list of open batches was not checked: %v", err)
		return nil
	case err != nil:
		return &exitError{exitFailed, err.Error(), "take a backup, then compare it with gylebook journal verify --journal FILE"}
	case wrong > 0:
		b.note("note: the list of open batches was wrong in %d places and has been made anew from the entries", wrong)
	}
	return nil
}

// allHold returns how many entries hold, and exit 1 when one does not.
func allHold(ctx context.Context, s journal.Reader) (int64, error) {
	n, err := journal.VerifyAll(ctx, s)
	if err == nil || ctx.Err() != nil {
		return n, err
	}
	return n, &exitError{
		exitFailed, fmt.Sprintf("%v; the %s before it", err, count(int(n), "entry holds", "entries hold")),
		"keep the file as it is; a backup from before the change holds what was written",
	}
}

// count is a number with its noun.
func count(n int, one, more string) string {
	if n == 1 {
		return "1 " + one
	}
	return fmt.Sprintf("%d %s", n, more)
}

func (b *bench) journalVerify() *cli.Command {
	return b.sub("journal", &cli.Command{
		Name: "verify", Usage: "check that no entry was changed, lost or put in",
		Description: "Recomputes the digest of every entry and the chain through them. Exit 1 when one does not hold.",
	}, `gylebook journal verify
		gylebook journal verify --journal copy.db`, func(c *cli.Context) error {
		if c.Args().Len() > 0 {
			return wanted(c, "none; name the place with --journal")
		}
		return b.withJournal(c.Context, func(s journal.Store) error {
			n, err := allHold(c.Context, s)
			if err != nil {
				return err
			}
			if err := b.audit(c.Context, s); err != nil {
				return err
			}
			_, chain, err := s.Head(c.Context)
			if err != nil {
				return err
			}
			return b.print(sheet{
				name: "journal-verify",
				records: []tables.Record{{
					{Name: "journal", Value: absolute(b.place())},
					{Name: "entries", Value: int(n)},
					{Name: "holds", Value: true},
					{Name: "chain", Value: nilIfEmpty(chain)},
				}},
				ladder: &tables.Ladder{Answer: []string{count(int(n), "entry holds", "entries hold")}},
			})
		})
	})
}

func (b *bench) journalBackup() *cli.Command {
	return b.sub("journal", &cli.Command{
		Name: "backup", Usage: "write a whole copy, while others write", ArgsUsage: "FILE",
		Description: "The copy is a journal: --journal FILE opens it, and copying it back restores it.",
	}, "gylebook journal backup /media/stick/journal.db", func(c *cli.Context) error {
		if c.Args().Len() != 1 {
			return wanted(c, "the file to write")
		}
		file := c.Args().First()
		return b.withJournal(c.Context, func(s journal.Store) error {
			if err := b.freeName(file); err != nil {
				return err
			}
			if _, err := allHold(c.Context, s); err != nil {
				return err
			}
			err := s.Backup(c.Context, file)
			if errors.Is(err, journal.ErrExists) {
				return occupied(file)
			}
			if err != nil && c.Context.Err() == nil && !errors.Is(err, journal.ErrNoJournal) {
				return &exitError{exitCannotWrite, fmt.Sprintf("backup %s: %v", file, err), "name a new file in a folder that can be written"}
			}
			if err != nil {
				return err
			}
			copied, err := sqlstore.Open(c.Context, file)
			if err != nil {
				return err
			}
			return closing(copied, func(s journal.Store) error {
				n, _, err := s.Head(c.Context)
				if err != nil {
					return err
				}
				return b.printPlace("journal-backup", file, n)
			})
		})
	})
}

func (b *bench) journalDemo() *cli.Command {
	return b.sub("journal", &cli.Command{
		Name: "demo", Usage: "write a journal of an invented cellar to try things on", ArgsUsage: "PLACE",
		Description: "The same every time. PLACE is a new file; your own journal is left alone.",
	}, `gylebook journal demo demo.db
		gylebook today --journal demo.db --at "2026-11-18 08:00"`, func(c *cli.Context) error {
		if c.Args().Len() != 1 {
			return wanted(c, "the file to write")
		}
		s, err := sqlstore.Create(c.Context, c.Args().First())
		if errors.Is(err, journal.ErrExists) {
			return occupied(c.Args().First())
		}
		if err != nil {
			return err
		}
		return closing(s, func(s journal.Store) error {
			if _, err := demo.Write(c.Context, s); err != nil {
				return err
			}
			n, _, err := s.Head(c.Context)
			if err != nil {
				return err
			}
			return b.printPlace("journal-demo", c.Args().First(), n)
		})
	})
}
