package main

import (
	"bytes"
	"errors"
	"fmt"
	"os"
	"os/exec"
	"slices"
	"strconv"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
)

// example is one command of a console block and what it is said to print.
type example struct {
	line           int // of the command in README.md
	command        string
	stdout, stderr string
	hasStderr      bool
	exit           int
}

// examples returns the commands of the ```console blocks and the number of
// blocks. In a block a line "$ …" is a command, what follows is its stdout; a
// line [stderr] begins its stderr, a line [exit N] gives its exit code.
func examples(readme string) (all []example, blocks int, err error) {
	inside := false
	for n, line := range strings.Split(readme, "\n") {
		command, isCommand := strings.CutPrefix(line, "$ ")
		switch {
		case !inside:
			if inside = line == "```console"; inside {
				blocks++
				all = append(all, example{line: n + 1})
			}
		case line == "```":
			inside = false
		case isCommand:
			if all[len(all)-1].command == "" {
				all = all[:len(all)-1]
			}
			all = append(all, example{line: n + 1, command: command})
		default:
			e := &all[len(all)-1]
			code, isExit := strings.CutPrefix(line, "[exit ")
			switch {
			case e.command == "":
				return nil, 0, fmt.Errorf("line %d: read %q, wanted a command after \"$ \"", n+1, line)
			case line == "[stderr]":
				e.hasStderr = true
			case isExit:
				if e.exit, err = strconv.Atoi(strings.TrimSuffix(code, "]")); err != nil {
					return nil, 0, fmt.Errorf("line %d: %w", n+1, err)
				}
			case e.hasStderr:
				e.stderr += line + "\n"
			default:
				e.stdout += line + "\n"
			}
		}
	}
	return all, blocks, nil
}

// call splits a command into the words after gylebook and its standard input.
// Words stand between spaces or in double quotes; single quotes are known in
// printf '…' only.
func (e example) call() (args []string, stdin string, err error) {
	command := e.command
	if rest, ok := strings.CutPrefix(command, "printf '"); ok {
		text, after, closed := strings.Cut(rest, "' | ")
		if !closed {
			return nil, "", fmt.Errorf("read %q, wanted printf '…' | gylebook …", e.command)
		}
		stdin, command = strings.ReplaceAll(text, `\n`, "\n"), after
	}
	for _, program := range []string{"gylebook ", "go run ./cmd/gylebook "} {
		if words, ok := strings.CutPrefix(command, program); ok {
			args, err = plainWords(words)
			return args, stdin, err
		}
	}
	return nil, "", fmt.Errorf("read %q, wanted gylebook or go run ./cmd/gylebook", command)
}

// plainWords splits a line at spaces that are not in double quotes.
func plainWords(line string) (words []string, err error) {
	parts := strings.Split(line, `"`)
	if strings.ContainsAny(line, `'|>$\`) || len(parts)%2 == 0 {
		return nil, fmt.Errorf("read %q, wanted plain words", line)
	}
	for i, part := range parts {
		if i%2 == 1 {
			words = append(words, part)
			continue
		}
		words = append(words, strings.Fields(part)...)
	}
	return words, nil
}

func readReadme(t *testing.T) string {
	t.Helper()
	text, err := os.ReadFile("../../README.md")
	if err != nil {
		t.Fatal(err)
	}
	return string(text)
}

// home stands in the README for the folder that its commands run in.
const home = "/home/ines"

// The program runs as a process of its own, so that the locale and the terminal
// of whoever runs the tests do not reach it. The commands run in one new folder, in
// order, a minute apart: what one logs the next ones see.
func TestReadmeExamples(t *testing.T) {
	all, blocks, err := examples(readReadme(t))
	if err != nil {
		t.Fatal(err)
	}
	if blocks < 5 {
		t.Errorf("%d console blocks, wanted at least 5", blocks)
	}
	dir := t.TempDir()
	env := []string{"HOME=" + dir, "XDG_DATA_HOME=" + dir, "GYLEBOOK_OPERATOR=ines", "TZ=Europe/Berlin"}
	for name, value := range fixedEnv {
		env = append(env, name+"="+value)
	}
	clock, err := strconv.Atoi(fixedEnv["SOURCE_DATE_EPOCH"])
	if err != nil {
		t.Fatal(err)
	}
	for _, e := range all {
		clock += 60
		t.Run(fmt.Sprintf("line %d", e.line), func(t *testing.T) {
			args, stdin, err := e.call()
			if err != nil {
				t.Fatal(err)
			}
			cmd := exec.Command("gylebook", args...)
			cmd.Dir, cmd.Env = dir, append(slices.Clip(env), "SOURCE_DATE_EPOCH="+strconv.Itoa(clock))
			var stdout, stderr bytes.Buffer
			cmd.Stdin, cmd.Stdout, cmd.Stderr = strings.NewReader(stdin), &stdout, &stderr
			var exit *exec.ExitError
			if err := cmd.Run(); err != nil && !errors.As(err, &exit) {
				t.Fatal(err)
			}
			if got := cmd.ProcessState.ExitCode(); got != e.exit {
				t.Errorf("exit code %d, wanted %d; stderr %s", got, e.exit, stderr.String())
			}
			if diff := cmp.Diff(e.stdout, strings.ReplaceAll(stdout.String(), dir, home)); diff != "" {
				t.Errorf("stdout of %q: -README +program\n%s", e.command, diff)
			}
			if diff := cmp.Diff(e.stderr, strings.ReplaceAll(stderr.String(), dir, home)); e.hasStderr && diff != "" {
				t.Errorf("stderr of %q: -README +program\n%s", e.command, diff)
			}
		})
	}
}

// The first paragraph names the job.
func TestReadmeOpensWithTheJob(t *testing.T) {
	for _, paragraph := range strings.Split(readReadme(t), "\n\n") {
		paragraph = strings.TrimSpace(paragraph)
		if paragraph == "" || strings.HasPrefix(paragraph, "#") {
			continue
		}
		if !strings.Contains(paragraph, "hydrometer") {
			t.Errorf("first paragraph does not name the hydrometer: %q", paragraph)
		}
		return
	}
	t.Error("no paragraph")
}

func TestExamples(t *testing.T) {
	text := "a\n```console\n$ gylebook convert 48\nout\n$ printf '1\\n2\\n' | gylebook convert -\n[stderr]\nno\n[exit 65]\n```\n$ b\n"
	want := []example{
		{line: 3, command: "gylebook convert 48", stdout: "out\n"},
		{line: 5, command: `printf '1\n2\n' | gylebook convert -`, stderr: "no\n", hasStderr: true, exit: 65},
	}
	all, blocks, err := examples(text)
	if err != nil || blocks != 1 {
		t.Fatalf("%d blocks, %v", blocks, err)
	}
	if diff := cmp.Diff(want, all, cmp.AllowUnexported(example{})); diff != "" {
		t.Fatalf("-want +got\n%s", diff)
	}
	args, stdin, err := all[1].call()
	if diff := cmp.Diff([]string{"convert", "-"}, args); diff != "" || stdin != "1\n2\n" || err != nil {
		t.Errorf("%s, stdin %q, %v", diff, stdin, err)
	}
	quoted := example{command: `gylebook log T4 1.012 18 --taken "yesterday 18:00"`}
	args, _, err = quoted.call()
	if diff := cmp.Diff([]string{"log", "T4", "1.012", "18", "--taken", "yesterday 18:00"}, args); diff != "" || err != nil {
		t.Errorf("%s, %v", diff, err)
	}
	for _, command := range []string{"ls", "printf '1' gylebook", "gylebook convert '12 P'", `gylebook convert "12 P`, ""} {
		if args, _, err := (example{command: command}).call(); err == nil {
			t.Errorf("%q: accepted as %q", command, args)
		}
	}
	if _, _, err := examples("```console\nout\n```\n"); err == nil {
		t.Error("output without a command: accepted")
	}
}
