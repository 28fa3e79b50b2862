package published

import (
	"embed"
	"fmt"
	"io/fs"
	"strings"
)

//go:embed *.csv
var files embed.FS

// File is one published source.
type File struct {
	Name    string // base name without .csv
	Source  string
	Status  string   // how the rows were seen: read, quoted, generated
	Units   string   // of the columns; may be empty
	Notes   []string // in the order of the file
	Columns []string // tol and why included
	Rows    []Row
}

// Row is one row of a File.
type Row struct {
	Line  int // in the CSV file, counted from 1
	file  *File
	cells []string
}

// All returns every embedded file, sorted by name. An error says which file and
// line could not be read.
func All() ([]*File, error) {
	names, err := names()
	if err != nil {
		return nil, err
	}
	all := make([]*File, 0, len(names))
	for _, name := range names {
		f, err := Load(name)
		if err != nil {
			return nil, err
		}
		all = append(all, f)
	}
	return all, nil
}

// Load returns the embedded file of this name, without .csv. An unknown name is
// an error that lists the known ones.
func Load(name string) (*File, error) {
	data, err := files.ReadFile(name + ".csv")
	if err != nil {
		known, err := names()
		if err != nil {
			return nil, err
		}
		return nil, fmt.Errorf("no published file %.60q, known: %s", name, strings.Join(known, ", "))
	}
	return Parse(name, data)
}

// names lists the embedded files; Glob sorts them.
func names() ([]string, error) {
	found, err := fs.Glob(files, "*.csv")
	if err != nil {
		return nil, fmt.Errorf("list the published files: %w", err)
	}
	for i, f := range found {
		found[i] = strings.TrimSuffix(f, ".csv")
	}
	return found, nil
}

// column returns the place of a column, or -1.
func (f *File) column(name string) int {
	for i, c := range f.Columns {
		if c == name {
			return i
		}
	}
	return -1
}
