package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"slices"
	"strings"
	"sync/atomic"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/volume"
	"gylebook/tables"
)

// rowsJob is what a command does with a file of rows.
type rowsJob struct {
	inputs   []string // what a row must hold; the names of the columns unless told
	fields   []string // what can be asked for with --columns, in the order of a record
	standard []string // what is asked for unless told
	// one computes one row on a bench of its own; the record has the fields in order.
	one func(b *bench, cells []string) (tables.Record, error)
	// fast, if any, puts a quicker worker before the one that is given.
	fast func(results []string, slow volume.Worker) volume.Worker
}

// rowsFlags let a command work through a file. inputs are the columns it reads.
func rowsFlags(inputs ...string) []cli.Flag {
	flags := []cli.Flag{
		&cli.StringFlag{Name: "rows", Usage: "`FILE` of separated values with a header, or -: the same rows out, with the results as further columns"},
		&cli.StringFlag{Name: "columns", Usage: "`LIST` results to add with --rows, any of the fields that --json names"},
		&cli.StringFlag{Name: "out", Usage: "`FILE` to write with --rows, whole or not at all"},
		&cli.BoolFlag{Name: "stop", Usage: "end at the first bad row of --rows"},
	}
	for _, in := range inputs {
		short := columnFlag(in)
		flags = append(flags, &cli.StringFlag{Name: short, Value: in, Usage: "`NAME` of the column of --rows with the " + columnMeans[in]})
	}
	return flags
}

// rowsAlone refuses flags that mean nothing without --rows.
func rowsAlone(c *cli.Context) error {
	for _, name := range []string{"columns", "out", "stop", "reading-col", "temp-col", "og-col", "pg-col"} {
		if c.IsSet(name) {
			return usageError("add --rows FILE, or leave it out", "--%s is for --rows", name)
		}
	}
	return nil
}

func columnFlag(input string) string { return input + "-col" }

var columnMeans = map[string]string{
	"reading": "reading", "temp": "temperature of the sample", "og": "original gravity", "pg": "present gravity",
}

// rows works through the file named with --rows.
func (b *bench) rows(c *cli.Context, job rowsJob) error {
	switch {
	case c.Args().Len() > 0:
		return usageError("leave them out, or leave --rows out", "read %s beside --rows, wanted none: they come from the file", count(c.Args().Len(), "value", "values"))
	case b.set.format == tables.Markdown:
		return usageError("leave --format out for separated values", "--format markdown: rows are separated values or, with --json, JSON Lines")
	case b.set.explain:
		return usageError("explain a single value", "--explain is not for --rows")
	}
	plan := volume.Plan{Stop: c.Bool("stop"), Lines: b.set.format == tables.JSON}
	for _, in := range job.inputs {
		plan.Inputs = append(plan.Inputs, c.String(columnFlag(in)))
	}
	var err error
	if plan.Results, err = job.results(c.String("columns")); err != nil {
		return err
	}
	var points atomic.Bool
	plan.New = func() volume.Worker {
		var w volume.Worker = newRowWorker(b, job, plan.Results, &points)
		if job.fast != nil {
			w = job.fast(plan.Results, w)
		}
		return w
	}
	in, size, err := b.openRows(c.String("rows"))
	if err != nil {
		return err
	}
	defer in.Close()
	progress := b.rowsProgress(size)
	plan.Progress = progress.to
	var sum volume.Summary
	work := func(w io.Writer) error {
		sum, err = volume.Run(c.Context, in, w, plan)
		progress.end()
		return job.columnError(err)
	}
	if name := c.String("out"); name != "" {
		if err := b.freeName(name); err != nil {
			return err
		}
		err = intoFile(name, ownOnly, work)
	} else {
		err = work(b.out)
	}
	var stopped *volume.RowError
	if errors.As(err, &stopped) {
		say(b.err, "", stopped)
		return errShown
	}
	if err != nil {
		return err
	}
	if points.Load() {
		b.note("note: whole numbers from 2 to 30 are read as points, 12 as SG 1.012; for degrees Plato add --scale plato")
	}
	if sum.Refused > 0 {
		say(b.err, fmt.Sprintf("%d of %s refused; the first, line %d", sum.Refused, count(sum.Rows, "row", "rows"), sum.First.Line), sum.First.Err)
		return errShown
	}
	if sum.Rows == 0 {
		b.note("note: there is a header and no row below it")
	}
	return nil
}

// results reads --columns; the column for the reason of a bad row is always there.
func (j rowsJob) results(list string) ([]string, error) {
	picked := slices.Clone(j.standard)
	if strings.TrimSpace(list) != "" {
		picked = nil
		for _, name := range strings.Split(list, ",") {
			name = strings.TrimSpace(name)
			if name != volume.ErrorColumn && !slices.Contains(j.fields, name) {
				return nil, usageError("", "--columns: read %.40q, known: %s, %s", name, strings.Join(j.fields, ", "), volume.ErrorColumn)
			}
			if !slices.Contains(picked, name) {
				picked = append(picked, name)
			}
		}
	}
	if !slices.Contains(picked, volume.ErrorColumn) {
		picked = append(picked, volume.ErrorColumn)
	}
	return picked, nil
}

// columnError adds the flag that names a column which was not found.
func (j rowsJob) columnError(err error) error {
	var f *volume.FileError
	if !errors.As(err, &f) {
		return err
	}
	hint := f.Hint()
	if f.Missing != "" {
		flags := make([]string, len(j.inputs))
		for i, in := range j.inputs {
			flags[i] = "--" + columnFlag(in)
		}
		hint = "name the columns with " + strings.Join(flags, " and ")
	}
	return dataError(hint, "%v", err)
}

// openRows opens a file, or stdin for "-". size is 0 when it is not known.
func (b *bench) openRows(name string) (in io.ReadCloser, size int64, err error) {
	f, err := b.openInput(name)
	if err != nil {
		return nil, 0, err
	}
	if file, ok := f.(*os.File); ok {
		if info, err := file.Stat(); err == nil && info.Mode().IsRegular() {
			size = info.Size()
		}
	}
	return rowsInput{f}, size, nil
}

// rowsInput tells a failing input from a failing output.
type rowsInput struct{ io.ReadCloser }

func (r rowsInput) Read(p []byte) (int, error) {
	n, err := r.ReadCloser.Read(p)
	if err != nil && !errors.Is(err, io.EOF) && !errors.Is(err, context.Canceled) {
		err = &exitError{exitNoInput, err.Error(), ""}
	}
	return n, err
}
