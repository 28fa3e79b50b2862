package main

import (
	"context"
	"errors"
	"io/fs"
	"os/user"
	"path/filepath"
	"runtime/debug"
	"strings"
	"time"

	"github.com/adrg/xdg"
	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/sqlstore"
)

// place is where the journal lies: --journal or GYLEBOOK_JOURNAL, else the data
// folder of the user.
func (b *bench) place() string {
	if b.set.journal != "" {
		return b.set.journal
	}
	return filepath.Join(xdg.DataHome, "gylebook", "journal.db")
}

// by is the operator: --operator or GYLEBOOK_OPERATOR, else the login name.
func (b *bench) by() string {
	if b.set.operator != "" {
		return b.set.operator
	}
	u, err := user.Current()
	if err != nil || u.Username == "" {
		return "unknown"
	}
	// Windows puts the machine in front.
	return u.Username[strings.LastIndexByte(u.Username, '\\')+1:]
}

// withJournal hands the journal to do. A journal that is not there is refused.
func (b *bench) withJournal(ctx context.Context, do func(journal.Store) error) error {
	if b.held != nil {
		return do(b.held)
	}
	s, err := sqlstore.Open(ctx, b.place())
	if errors.Is(err, fs.ErrNotExist) {
		return &exitError{exitNoInput, "no journal at " + b.place(), "gylebook journal init makes one; --journal or GYLEBOOK_JOURNAL names another"}
	}
	if err != nil {
		return err
	}
	return closing(s, do)
}

// writing hands the journal to do, and makes it at its first use.
func (b *bench) writing(ctx context.Context, do func(journal.Store) error) error {
	s, made, err := sqlstore.OpenOrCreate(ctx, b.place())
	if err != nil {
		return err
	}
	if made {
		b.note("note: new journal at %s", b.place())
	}
	return closing(s, do)
}

// hasty lets more memory lie before it is collected while a command runs that reads
// much, keeps little and ends soon. A server keeps its own measure.
func (b *bench) hasty() (end func()) {
	if b.held != nil {
		return func() {}
	}
	usual := debug.SetGCPercent(400)
	return func() { debug.SetGCPercent(usual) }
}

func closing(s journal.Store, do func(journal.Store) error) error {
	err := do(s)
	return errors.Join(err, s.Close())
}

// commit writes what draft returns and gives back the entries.
func (b *bench) commit(ctx context.Context, s journal.Store, draft func(journal.Reader) ([]journal.Body, error)) ([]journal.Entry, error) {
	return s.Append(ctx, b.by(), b.set.now, func(r journal.Reader) ([]journal.Body, error) {
		bodies, err := draft(r)
		for _, body := range bodies {
			if err == nil {
				err = body.Check()
			}
		}
		return bodies, err
	})
}

// commitOne writes one body that does not depend on what the journal holds.
func (b *bench) commitOne(ctx context.Context, s journal.Store, body journal.Body) (journal.Entry, error) {
	entries, err := b.commit(ctx, s, func(journal.Reader) ([]journal.Body, error) { return []journal.Body{body}, nil })
	if err != nil {
		return journal.Entry{}, err
	}
	return entries[0], nil
}

// at reads a flag that holds a time, now when it is not given.
func (b *bench) at(c *cli.Context, flag string) (time.Time, error) {
	text := c.String(flag)
	if text == "" {
		return b.set.now.In(time.Local).Truncate(time.Second), nil
	}
	return b.timeOf(flag, text)
}

// past is at for what has been done: a time to come is refused.
func (b *bench) past(c *cli.Context, flag string) (time.Time, error) {
	at, err := b.at(c, flag)
	if err == nil && at.After(b.set.now) {
		err = dataError("check the date", "--%s: read %s, wanted a time that has been", flag, at.Format(time.RFC3339))
	}
	return at, err
}

func (b *bench) timeOf(flag, text string) (time.Time, error) {
	t, err := journal.ParseTime(text, time.Local, b.set.now)
	if err != nil {
		return t, dataError(hintOf(err), "--%s: %v", flag, err)
	}
	return t, nil
}

// journalCode is the exit code that stands for an error of the journal, 0 when it
// is none.
func journalCode(err error) int {
	is := func(targets ...error) bool {
		for _, t := range targets {
			if errors.Is(err, t) {
				return true
			}
		}
		return false
	}
	switch {
	case is(journal.ErrNoJournal, journal.ErrNewer, journal.ErrTampered, journal.ErrBusy):
		return exitFailed
	case is(journal.ErrReadOnly, journal.ErrDiskFull, journal.ErrNotWritten):
		return exitCannotWrite
	case is(journal.ErrNotFound, journal.ErrExists, journal.ErrClosed, journal.ErrRetired, journal.ErrVoided, journal.ErrNotEmpty, journal.ErrIncomplete):
		return exitData
	}
	return 0
}
