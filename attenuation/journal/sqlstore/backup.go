package sqlstore

import (
	"context"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"

	"gylebook/attenuation/journal"
)

// Backup implements journal.Store. The copy appears under its name when it is whole
// and on the disk; its folder must be there.
func (s *Store) Backup(ctx context.Context, path string) error {
	if s.closed.Load() {
		return closedErr()
	}
	if err := s.copyTo(ctx, path); err != nil {
		if ctx.Err() != nil {
			return ctx.Err()
		}
		return fmt.Errorf("copy %s: %w", path, err)
	}
	return nil
}

func (s *Store) copyTo(ctx context.Context, path string) error {
	if _, err := os.Lstat(path); err == nil {
		return journal.ErrExists
	}
	folder := filepath.Dir(path)
	draft, err := os.CreateTemp(folder, "."+filepath.Base(path)+"-new-*") // 0o600
	if err != nil {
		return fileErr(err)
	}
	_ = draft.Close()
	defer func() { _ = os.Remove(draft.Name()) }()
	if _, err := s.db.ExecContext(ctx, copyInto, draft.Name()); err != nil {
		return writeErr(err)
	}
	if err := syncPath(draft.Name()); err != nil {
		return fileErr(err)
	}
	switch err := publish(draft.Name(), path); {
	case errors.Is(err, fs.ErrExist):
		return journal.ErrExists
	case err != nil:
		return fileErr(err)
	}
	return syncFolder(folder)
}
