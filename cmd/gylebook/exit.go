package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"syscall"

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
	fmt.Fprintf(w, "gylebook: %s%s\n", prefix, tables.Clean(err.Error()))
	if hint := hintOf(err); hint != "" {
		fmt.Fprintf(w, "hint: %s\n", tables.Clean(hint))
	}
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
