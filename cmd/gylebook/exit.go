package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"syscall"

	"golang.org/x/term"

	"gylebook/gravity/method"
	"gylebook/tables"
)

// Exit codes, after sysexits.h.
const (
	exitOK          = 0
	exitFailed      = 1
	exitNotMet      = 3 // a decision test, with --check alone
	exitUsage       = 64
	exitData        = 65
	exitNoInput     = 66
	exitCannotWrite = 73
	exitInterrupted = 130
)

// errShown ends a command whose errors have been printed already.
var errShown = errors.New("already reported")

// exitError is an error with its exit code and a hint.
type exitError struct {
	code int
	text string
	hint string
}

func (e *exitError) Error() string { return e.text }

// Hint says what to type instead.
func (e *exitError) Hint() string { return e.hint }

// usageError is a wrong command line, exit 64.
func usageError(hint, format string, args ...any) error {
	return &exitError{exitUsage, fmt.Sprintf(format, args...), hint}
}

// dataError is a value that cannot be used, exit 65.
func dataError(hint, format string, args ...any) error {
	return &exitError{exitData, fmt.Sprintf(format, args...), hint}
}

// failure prints err on w and returns the exit code that stands for it.
func failure(w io.Writer, err error) int {
	switch {
	case err == nil:
		return exitOK
	case errors.Is(err, errShown):
		return exitData
	case errors.Is(err, context.Canceled):
		return exitInterrupted
	case errors.Is(err, syscall.EPIPE), errors.Is(err, io.ErrClosedPipe):
		return exitOK
	}
	say(w, "", err)
	var e *exitError
	var unknown *method.UnknownError
	var path *os.PathError
	switch {
	case errors.As(err, &e):
		return e.code
	case errors.As(err, &unknown):
		return exitUsage
	case journalCode(err) != 0:
		return journalCode(err)
	case errors.As(err, &path):
		return exitCannotWrite
	}
	return exitData
}

// say prints one error with its hint. prefix names the place, "line 3".
func say(w io.Writer, prefix string, err error) {
	if prefix != "" {
		prefix += ": "
	}
	tell(w, "gylebook: "+prefix+tables.Clean(err.Error()))
	if hint := hintOf(err); hint != "" {
		tell(w, "hint: "+tables.Clean(hint))
	}
}

// tell prints what a person is told: on a terminal wrapped at its width, what
// follows indented; elsewhere as the one line that programs look for.
func tell(w io.Writer, text string) {
	width := 0
	if f, ok := w.(*os.File); ok && term.IsTerminal(int(f.Fd())) {
		width = terminalWidth(f)
	}
	for _, line := range told(text, width) {
		fmt.Fprintln(w, line)
	}
}

// told is a text in lines of at most width columns; 0 is one line.
func told(text string, width int) []string {
	if width == 0 {
		return []string{text}
	}
	lines := tables.Wrap(text, max(width-2, 18))
	for k := range lines[1:] {
		lines[k+1] = "  " + lines[k+1]
	}
	return lines
}

func hintOf(err error) string {
	var h interface{ Hint() string }
	if errors.As(err, &h) {
		return h.Hint()
	}
	var r *method.RangeError
	if errors.As(err, &r) {
		return r.Hint
	}
	return ""
}
