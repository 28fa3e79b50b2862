package main

import (
	"errors"
	"io"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strconv"
)

// Who may read a file that is written: what is left of it is up to the umask.
const (
	ownOnly  os.FileMode = 0o600
	everyone os.FileMode = 0o666
)

// intoFile writes beside a new file and gives it its name when it is whole. A file
// that is there is left alone.
func intoFile(name string, perm os.FileMode, write func(io.Writer) error) error {
	return wholeFile(name, perm, write, func(from string) error {
		// A link never takes the place of a file; where there are no links, a look
		// just before has to do.
		err := os.Link(from, name)
		if err == nil {
			return nil
		}
		if _, there := os.Lstat(name); there == nil {
			return occupied(name)
		}
		return os.Rename(from, name)
	})
}

// overFile writes beside a file that may be there and takes its place when it is whole.
func overFile(name string, perm os.FileMode, write func(io.Writer) error) error {
	return wholeFile(name, perm, write, func(from string) error { return os.Rename(from, name) })
}

// wholeFile writes beside a file, on disk to the last byte, and then has it placed.
// Nothing is left of it when that fails.
func wholeFile(name string, perm os.FileMode, write func(io.Writer) error, place func(from string) error) error {
	f, err := beside(name, perm)
	if err != nil {
		return cannotWrite(name, err)
	}
	defer unfinished.add(f.Name())()
	defer func() { _ = os.Remove(f.Name()) }()
	if err := write(f); err != nil {
		_ = f.Close()
		return err
	}
	if err := errors.Join(f.Sync(), f.Close()); err != nil {
		return cannotWrite(name, err)
	}
	err = place(f.Name())
	var told *exitError
	if err == nil || errors.As(err, &told) {
		return err
	}
	return cannotWrite(name, err)
}

// beside makes a file in the folder of another, hidden and with a name of its own.
func beside(name string, perm os.FileMode) (*os.File, error) {
	for try := 0; ; try++ {
		other := filepath.Join(filepath.Dir(name), "."+filepath.Base(name)+"-"+strconv.FormatUint(rand.Uint64(), 36))
		f, err := os.OpenFile(other, os.O_RDWR|os.O_CREATE|os.O_EXCL, perm)
		if !errors.Is(err, os.ErrExist) || try == 100 {
			return f, err
		}
	}
}
