package main

import (
	"errors"
	"os"
	"os/exec"
	"strconv"
	"strings"
	"testing"

	"github.com/rogpeppe/go-internal/testscript"
)

// TestMain lets the test binary stand in for the program: it runs main when it
// is called by the name gylebook, as the scripts and the README test do.
func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){"gylebook": main})
}

// fixedEnv is what the output may depend on. Nothing else of the caller's
// environment reaches the program.
var fixedEnv = map[string]string{
	"SOURCE_DATE_EPOCH": "1795000000", // 2026-11-18T11:06:40Z
	"COLUMNS":           "80",
	"LANG":              "C.UTF-8", // ° is one column wide
}

// TestScript runs testdata/script/*.txtar. Besides the commands of testscript
// the scripts know exits and digits (below), field and fields (scriptjson_test.go).
// The condition [devfull] holds where writing to /dev/full fails.
func TestScript(t *testing.T) {
	testscript.Run(t, testscript.Params{
		Dir: "../../testdata/script",
		Setup: func(env *testscript.Env) error {
			for name, value := range fixedEnv {
				env.Setenv(name, value)
			}
			return nil
		},
		Condition: func(cond string) (bool, error) {
			if cond != "devfull" {
				return false, errors.New("unknown condition " + cond)
			}
			_, err := os.Stat("/dev/full")
			return err == nil, nil
		},
		Cmds: map[string]func(ts *testscript.TestScript, neg bool, args []string){
			"exits": exits, "digits": digits, "field": field, "fields": fields,
		},
	})
}

// exits CODE PROGRAM ARG… runs a program as exec does and demands exactly this
// exit code. Whatever the code, a trace of a panic on stderr is a failure.
func exits(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) < 2 {
		ts.Fatalf("usage: exits CODE PROGRAM ARG…")
	}
	want, err := strconv.Atoi(args[0])
	ts.Check(err)
	got := 0
	if err := ts.Exec(args[1], args[2:]...); err != nil {
		var exit *exec.ExitError
		if !errors.As(err, &exit) {
			ts.Fatalf("%s: %v", args[1], err)
		}
		got = exit.ExitCode()
	}
	if stderr := ts.ReadFile("stderr"); strings.Contains(stderr, "panic:") || strings.Contains(stderr, "goroutine ") {
		ts.Fatalf("a panic reached stderr")
	}
	if got != want {
		ts.Fatalf("%s: exit code %d, wanted %d", args[1], got, want)
	}
}

// digits N NAME writes a line of N nines to the file NAME and sets the variable
// NAME to it.
func digits(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) != 2 {
		ts.Fatalf("usage: digits N NAME")
	}
	n, err := strconv.Atoi(args[0])
	ts.Check(err)
	number := strings.Repeat("9", n)
	ts.Check(os.WriteFile(ts.MkAbs(args[1]), []byte(number+"\n"), 0o600))
	ts.Setenv(args[1], number)
}
