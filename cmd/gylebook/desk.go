package main

import (
	"context"
	"errors"
	"io"
	"io/fs"
	"net/http"
	"os"
	"slices"
	"strings"
	"sync"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/gravity/method"
	"gylebook/tables"
	"gylebook/tables/web"
)

// desk answers for the pages: each answer is that of a command, run as if it had
// been typed, on a journal that stays open.
type desk struct {
	store journal.Store
	flags []string // settings of this run: --units, --scale
	now   func() time.Time
	place string      // of the journal
	file  os.FileInfo // of the journal as it was opened

	mu      sync.Mutex // guards since, tools and batches
	since   since
	batches map[string]*batchAsOf // by the name asked for
	tools   struct {
		list []*journal.InstrumentRecord
		all  int64 // the newest entry that bore on everything when they were read
	}
	ground ground
	board  boardAsOf
}

var _ web.Desk = (*desk)(nil)

// ask runs a command with the values given and returns what it would have printed.
// Flags are given as "--name=value" and values stand behind "--", so that nothing
// that was typed into a page can be taken for a flag.
func (d *desk) ask(ctx context.Context, operator string, command []string, values ...string) ([]sheet, error) {
	if err := d.there(); err != nil {
		return nil, err
	}
	var got []sheet
	b := &bench{
		in: strings.NewReader(""), out: io.Discard, err: io.Discard,
		take: func(s sheet) { got = append(got, s) }, held: d.store, wide: pageWidth,
	}
	line := append(slices.Clone(command), d.flags...)
	if operator != "" {
		line = append(line, "--operator="+operator)
	}
	line = append(append(line, "--no-input", "--"), values...)
	app := b.app(command[0])
	app.Writer, app.HideVersion, app.HideHelp = io.Discard, true, true
	helpless(app.Commands)
	line, err := arrange(line, app.Commands)
	if err == nil {
		err = app.RunContext(ctx, append([]string{app.Name}, line...))
	}
	return got, err
}

// helpless takes the flags of help away, as those of the version are: the parser has
// one of each for the whole program and writes into it, and pages ask at once.
func helpless(commands []*cli.Command) {
	for _, c := range commands {
		c.HideHelp = true
		helpless(c.Subcommands)
	}
}

// there is an error when the journal's file is not the one that was opened: what is
// written into a file that was removed would be lost.
func (d *desk) there() error {
	if now, err := os.Stat(d.place); err != nil || !os.SameFile(now, d.file) {
		return &web.Refused{Status: http.StatusServiceUnavailable, Text: "the journal is not where it was", Hint: "nothing was written; put it back, or start gylebook serve again"}
	}
	return nil
}

// answer is ask for a page.
func (d *desk) answer(ctx context.Context, operator string, command []string, values ...string) (web.Answer, error) {
	got, err := d.ask(ctx, operator, command, values...)
	if err != nil {
		return web.Answer{}, refused(err)
	}
	return answerOf(got), nil
}

// answerOf puts the sheets of a command one after the other.
func answerOf(sheets []sheet) web.Answer {
	var a web.Answer
	var notes []method.Note
	for _, s := range sheets {
		switch {
		case s.logged != nil:
			a.Ladders = append(a.Ladders, *logLadder(*s.logged))
		case s.ladder != nil:
			a.Ladders = append(a.Ladders, *s.ladder)
		}
		for _, l := range s.more {
			a.Ladders = append(a.Ladders, *l)
		}
		a.Tables = append(a.Tables, s.tables...)
		for _, r := range s.records {
			if list, ok := r.Get("notes").([]tables.Note); ok {
				for _, n := range list {
					notes = append(notes, method.Note(n))
				}
			}
		}
		notes = append(notes, s.notes...)
	}
	seen := map[string]bool{}
	for _, n := range neutral(notes) {
		if !seen[n.Text] {
			seen[n.Text] = true
			a.Notes = append(a.Notes, n)
		}
	}
	return a
}

// refused is an error in the words of the command, with the status that stands for
// its exit code. An error of another kind is not told to a page.
func refused(err error) error {
	if err == nil || errors.Is(err, context.Canceled) || errors.Is(err, context.DeadlineExceeded) {
		return err
	}
	status := http.StatusUnprocessableEntity
	var held *journal.Hold
	var exit *exitError
	var told *web.Refused
	switch {
	case errors.As(err, &told):
		return told
	case errors.As(err, &held):
		status = http.StatusConflict
	case errors.Is(err, journal.ErrNotFound):
		status = http.StatusNotFound
	case journalCode(err) == exitData:
		status = http.StatusConflict
	case journalCode(err) != 0:
		// The place of the journal is nobody's business.
		return &web.Refused{Status: http.StatusServiceUnavailable, Text: journalTrouble(err), Hint: "nothing was written; tell whoever looks after this computer"}
	case errors.As(err, &exit) && (exit.code == exitUsage || exit.code == exitData):
	case errors.As(err, &exit), isPathError(err):
		return &web.Refused{Status: http.StatusServiceUnavailable, Text: "the journal cannot be reached", Hint: "nothing was written; tell whoever looks after this computer"}
	}
	return &web.Refused{Status: status, Text: tables.Clean(err.Error()), Hint: tables.Clean(hintOf(err))}
}

func isPathError(err error) bool {
	var path *fs.PathError
	return errors.As(err, &path)
}

// journalTrouble names what is wrong with the journal without its place.
func journalTrouble(err error) string {
	for _, kind := range []error{
		journal.ErrBusy, journal.ErrReadOnly, journal.ErrDiskFull, journal.ErrTampered, journal.ErrNewer, journal.ErrNoJournal, journal.ErrNotWritten,
	} {
		if errors.Is(err, kind) {
			return "the journal cannot be used: " + kind.Error()
		}
	}
	return "the journal cannot be used"
}
