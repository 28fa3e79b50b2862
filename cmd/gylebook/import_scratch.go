package main

import (
	"errors"
	"io/fs"
	"os"

	"gylebook/attenuation/journal/exchange"
)

// scratch is a file in the folder for temporary ones that is gone with its last
// user, also when the program is killed.
type scratch struct{ *os.File }

// newScratch makes a file for what an import does not hold in memory.
func newScratch() (exchange.Scratch, error) {
	f, err := os.CreateTemp("", "gylebook-*")
	if err != nil {
		return nil, err
	}
	_ = os.Remove(f.Name()) // where an open file cannot be removed, Close does it
	return scratch{f}, nil
}

// Close closes the file and takes it away.
func (s scratch) Close() error {
	err := s.File.Close()
	if gone := os.Remove(s.Name()); !errors.Is(gone, fs.ErrNotExist) {
		err = errors.Join(err, gone)
	}
	return err
}
