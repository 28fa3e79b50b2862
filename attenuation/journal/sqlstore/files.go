package sqlstore

import (
	"errors"
	"fmt"
	"io/fs"
	"os"
	"runtime"
	"syscall"

	"gylebook/attenuation/journal"
)

// fileErr maps an error of the file system to those of the journal.
func fileErr(err error) error {
	switch {
	case errors.Is(err, journal.ErrBusy):
		return err
	case errors.Is(err, fs.ErrPermission), errors.Is(err, syscall.EROFS):
		return fmt.Errorf("%w: %w", journal.ErrReadOnly, err)
	case errors.Is(err, syscall.ENOSPC):
		return fmt.Errorf("%w: %w", journal.ErrDiskFull, err)
	}
	return fmt.Errorf("%w: %w", journal.ErrNotWritten, err)
}

func syncPath(path string) error {
	f, err := os.OpenFile(path, os.O_RDWR, 0)
	if err != nil {
		return err
	}
	return errors.Join(f.Sync(), f.Close())
}

// syncFolder makes a new name in a folder last. Windows has no such call.
func syncFolder(path string) error {
	if runtime.GOOS == "windows" {
		return nil
	}
	f, err := os.Open(path)
	if err != nil {
		return fileErr(err)
	}
	if err := errors.Join(f.Sync(), f.Close()); err != nil && !errors.Is(err, syscall.EINVAL) {
		return fileErr(err)
	}
	return nil
}
