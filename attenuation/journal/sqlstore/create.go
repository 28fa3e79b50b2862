package sqlstore

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"time"

	"gylebook/attenuation/journal"
)

// Create makes a new journal, and the folders above it, for this user alone
// (0o700, 0o600). Whatever is at path already is left alone: journal.ErrExists.
// Other errors: journal.ErrReadOnly, journal.ErrDiskFull, journal.ErrNotWritten.
func Create(ctx context.Context, path string, opts ...Option) (*Store, error) {
	made, err := provide(ctx, path)
	if err != nil {
		return nil, fmt.Errorf("journal %s: %w", path, err)
	}
	if !made {
		return nil, fmt.Errorf("journal %s: %w", path, journal.ErrExists)
	}
	return Open(ctx, path, opts...)
}

// OpenOrCreate opens the journal at path, or makes it when nothing is there. The
// result says whether this call made it. Several processes may call it at once.
func OpenOrCreate(ctx context.Context, path string, opts ...Option) (*Store, bool, error) {
	s, err := Open(ctx, path, opts...)
	if !errors.Is(err, fs.ErrNotExist) {
		return s, false, err
	}
	made, err := provide(ctx, path)
	if err != nil {
		return nil, false, fmt.Errorf("journal %s: %w", path, err)
	}
	s, err = Open(ctx, path, opts...)
	return s, made, err
}

// provide makes the journal under another name beside path and gives it its name
// when it is whole, so that nobody ever opens a part of one. It returns false when
// something is there already.
func provide(ctx context.Context, path string) (bool, error) {
	if _, err := os.Lstat(path); err == nil {
		return false, nil
	}
	folder := filepath.Dir(path)
	if err := os.MkdirAll(folder, 0o700); err != nil {
		return false, fileErr(err)
	}
	draft, err := os.CreateTemp(folder, "."+filepath.Base(path)+"-new-*") // 0o600
	if err != nil {
		return false, fileErr(err)
	}
	_ = draft.Close()
	defer func() { _ = os.Remove(draft.Name()) }()
	if err := writeSchema(ctx, draft.Name()); err != nil {
		if ctx.Err() != nil {
			return false, ctx.Err()
		}
		return false, writeErr(err)
	}
	if err := syncPath(draft.Name()); err != nil {
		return false, fileErr(err)
	}
	switch err := publish(draft.Name(), path); {
	case errors.Is(err, fs.ErrExist):
		return false, nil
	case err != nil:
		return false, fileErr(err)
	}
	return true, syncFolder(folder)
}

// writeSchema makes an empty journal of an empty file. It is synced by the caller.
func writeSchema(ctx context.Context, path string) (err error) {
	name, err := dsn(path, create, time.Second)
	if err != nil {
		return err
	}
	db, err := sql.Open("sqlite", name)
	if err != nil {
		return err
	}
	defer func() { err = errors.Join(err, db.Close()) }()
	db.SetMaxOpenConns(1)
	for _, q := range []string{pragmaUnsynced, fmt.Sprintf(pragmaMark, applicationID)} {
		if _, err := db.ExecContext(ctx, q); err != nil {
			return err
		}
	}
	if err := migrate(ctx, db, 0, migrations); err != nil {
		return err
	}
	var mode string
	if err := db.QueryRowContext(ctx, pragmaWAL).Scan(&mode); err != nil {
		return err
	}
	if mode != "wal" {
		return fmt.Errorf("write-ahead log: %w here", journal.ErrNotWritten)
	}
	return nil
}

// link is os.Link; some file systems have no links.
var link = os.Link

// publish gives the file draft the name path unless something has it:
// fs.ErrExist.
func publish(draft, path string) error {
	err := link(draft, path)
	if err == nil || errors.Is(err, fs.ErrExist) {
		return err
	}
	// Without links: whoever makes the folder of this name may rename.
	guard := path + "-new"
	for deadline := time.Now().Add(5 * time.Second); ; time.Sleep(5 * time.Millisecond) {
		mkErr := os.Mkdir(guard, 0o700)
		if mkErr == nil {
			break
		}
		if !errors.Is(mkErr, fs.ErrExist) {
			return mkErr
		}
		if time.Now().After(deadline) {
			return fmt.Errorf("%w: remove %s if no program is making it", journal.ErrBusy, guard)
		}
	}
	defer func() { _ = os.Remove(guard) }()
	if _, err := os.Lstat(path); err == nil {
		return fs.ErrExist
	}
	return os.Rename(draft, path)
}
