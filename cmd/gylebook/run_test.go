package main

import (
	"bufio"
	"context"
	"errors"
	"io"
	"os"
	"os/exec"
	"runtime"
	"strings"
	"syscall"
	"testing"
	"time"
)

// failing refuses every write with err.
type failing struct{ err error }

func (f failing) Write([]byte) (int, error) { return 0, f.err }

// What cannot be written is an error of its own, data and help alike; a reader
// that has left is an ordinary end.
func TestWriteErrors(t *testing.T) {
	full := &os.PathError{Op: "write", Path: "/dev/stdout", Err: syscall.ENOSPC}
	gone := &os.PathError{Op: "write", Path: "/dev/stdout", Err: syscall.EPIPE}
	for _, line := range []string{
		"convert 48", "convert 48 --json", "convert 48 --csv", "convert 48 50 --format markdown",
		"convert 48 --plain", "abv 48 10 --quiet", "sources", "selfcheck", "table scales",
		"", "--help", "convert --help", "help abv", "--version",
	} {
		for _, c := range []struct {
			err    error
			code   int
			stderr string
		}{
			{full, exitCannotWrite, "gylebook: " + full.Error() + "\n"},
			{gone, exitOK, ""},
			{io.ErrClosedPipe, exitOK, ""},
		} {
			var stderr strings.Builder
			code := run(context.Background(), strings.Fields(line), strings.NewReader(""), failing{c.err}, &stderr)
			if code != c.code || stderr.String() != c.stderr {
				t.Errorf("%q on %v: exit code %d, stderr %q; wanted %d, %q", line, c.err, code, stderr.String(), c.code, c.stderr)
			}
		}
	}
}

func TestCanceledContext(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	var stdout, stderr strings.Builder
	if code := run(ctx, []string{"convert", "48"}, strings.NewReader(""), &stdout, &stderr); code != exitInterrupted {
		t.Errorf("exit code %d, wanted %d", code, exitInterrupted)
	}
}

// An interrupt ends the program while it waits for a line of stdin.
func TestInterruptWhileReading(t *testing.T) {
	if runtime.GOOS == "windows" {
		t.Skip("a process cannot be sent an interrupt on Windows")
	}
	// Far more than it takes, and an end for a program that does not heed it.
	ctx, cancel := context.WithTimeout(t.Context(), 30*time.Second)
	defer cancel()
	cmd := exec.CommandContext(ctx, "gylebook", "convert", "-")
	stdin, err := cmd.StdinPipe()
	if err != nil {
		t.Fatal(err)
	}
	stderr, err := cmd.StderrPipe()
	if err != nil {
		t.Fatal(err)
	}
	if err := cmd.Start(); err != nil {
		t.Fatal(err)
	}
	// The refusal of a first line shows that the program is reading.
	if _, err := io.WriteString(stdin, "abc\n"); err != nil {
		t.Fatal(err)
	}
	said, err := bufio.NewReader(stderr).ReadString('\n')
	if err != nil || !strings.Contains(said, "line 1:") {
		t.Errorf("read %q, %v; wanted the refusal of line 1", said, err)
	}
	if err := cmd.Process.Signal(os.Interrupt); err != nil {
		t.Fatal(err)
	}
	var exit *exec.ExitError
	if err := cmd.Wait(); !errors.As(err, &exit) || exit.ExitCode() != exitInterrupted {
		t.Errorf("%v, wanted exit code %d", err, exitInterrupted)
	}
}
