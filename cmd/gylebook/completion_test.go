package main

import (
	"context"
	"os"
	"os/exec"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"time"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/sqlstore"
)

// shell returns the path of a shell. Without it the test is skipped, save where it
// must be there.
func shell(t *testing.T, name string) string {
	t.Helper()
	path, err := exec.LookPath(name)
	if err != nil && os.Getenv("GYLEBOOK_CI") == "1" {
		t.Fatalf("%s is needed in CI: %v", name, err)
	}
	if err != nil {
		t.Skipf("%s is not here: %v", name, err)
	}
	return path
}

// openJournal writes a journal with these open batches, words "ID:VESSEL".
func openJournal(t *testing.T, batches ...string) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), "a b.db")
	ctx, at := context.Background(), time.Date(2026, 11, 1, 8, 0, 0, 0, time.UTC)
	s, _, err := sqlstore.OpenOrCreate(ctx, path)
	if err != nil {
		t.Fatal(err)
	}
	var bodies []journal.Body
	for _, b := range batches {
		id, vessel, _ := strings.Cut(b, ":")
		bodies = append(bodies, journal.Batch{ID: id, Product: "Lane Bitter", Vessel: vessel, Opened: at})
	}
	bodies = append(bodies, journal.Batch{ID: "B1", Product: "Lane Bitter", Vessel: "T1", Opened: at}, journal.Close{Batch: "B1", At: at})
	if _, err := s.Append(ctx, "ada", at, func(journal.Reader) ([]journal.Body, error) { return bodies, nil }); err != nil {
		t.Fatal(err)
	}
	if err := s.Close(); err != nil {
		t.Fatal(err)
	}
	return path
}

// completed lines: the last word is the one that is being typed.
var completionCases = []struct{ line, want string }{
	{"gylebook lo", "log"},
	{"gylebook completion ", "bash fish zsh"},
	{"gylebook table te", "temperature"},
	{"gylebook log T", "T10 T2"},
	{"gylebook log --gassy T1", "T10"},
	{"gylebook log --keep rubbish T1", "T10"},
	{"gylebook log --format json T1", "T10"},
	{"gylebook --quiet log B2", "B26-2 B26-3 B26-4"},
	{"gylebook log T2 1", ""},
	{"gylebook event T2 dry", "dry-hop"},
	{"gylebook batch sh", "show"},
	{"gylebook batch show B26-3", "B26-3"},
	{"gylebook batch close T1", "T10"},
	{"gylebook log --gas", "--gassy"},
	{"gylebook today --at", "--at"},
	{"gylebook today --format m", "markdown"},
	{"gylebook today --units ", "C F"},
	{"gylebook batch show --explai", "--explain"},
	{"gylebook complete-", ""},
	{"gylebook bogus T", ""},
}

// words sorts what a shell printed.
func words(out string) string {
	list := strings.Fields(out)
	slices.Sort(list)
	return strings.Join(list, " ")
}

// completes starts a shell once. script defines "complete_line LINE", which prints
// what is offered; loop calls it for every line and prints ";" after each.
func completes(t *testing.T, shell []string, script, loop string) {
	t.Helper()
	args := append(slices.Clone(shell[1:]), script+"\n"+loop)
	if filepath.Base(shell[0]) != "fish" {
		args = append(args, "shell") // its own name comes before the arguments
	}
	for _, c := range completionCases {
		args = append(args, c.line)
	}
	cmd := exec.Command(shell[0], args...)
	cmd.Env = append(os.Environ(), "GYLEBOOK_JOURNAL="+openJournal(t, "B26-2:T2", "B26-3:T10", "B26-4:"), "HOME="+t.TempDir())
	var stderr strings.Builder
	cmd.Stderr = &stderr
	out, err := cmd.Output()
	if err != nil || stderr.Len() > 0 {
		t.Errorf("%v, stderr %q", err, stderr.String())
	}
	offered := strings.Split(string(out), ";")
	if len(offered) != len(completionCases)+1 {
		t.Fatalf("%d lines completed, wanted %d:\n%s", len(offered)-1, len(completionCases), out)
	}
	for k, c := range completionCases {
		if got := words(offered[k]); got != c.want {
			t.Errorf("%q: offered %q, wanted %q", c.line, got, c.want)
		}
	}
}

func TestCompletionBash(t *testing.T) {
	completes(t, []string{shell(t, "bash"), "--norc", "--noprofile", "-c"}, `source <(gylebook completion bash)
		complete_line() {
			IFS=' ' read -ra COMP_WORDS <<<"$1x"
			COMP_CWORD=$((${#COMP_WORDS[@]} - 1))
			COMP_WORDS[COMP_CWORD]="${COMP_WORDS[COMP_CWORD]%x}"
			_gylebook
			printf '%s\n' "${COMPREPLY[@]}"
		}`, `for line; do complete_line "$line"; echo ';'; done`)
}

// Bash takes "=" for a word of its own.
func TestCompletionBashEquals(t *testing.T) {
	out, err := exec.Command(shell(t, "bash"), "--norc", "--noprofile", "-c", `source <(gylebook completion bash)
		COMP_WORDS=(gylebook today --format = js) COMP_CWORD=4; _gylebook; echo "${COMPREPLY[@]}"
		COMP_WORDS=(gylebook today --format =) COMP_CWORD=3; _gylebook; echo "${COMPREPLY[@]}"
		COMP_WORDS=(gylebook table --format = json t) COMP_CWORD=5; _gylebook; echo "${COMPREPLY[@]}"`).Output()
	if want := "json\ntext json csv markdown\ntemperature\n"; err != nil || string(out) != want {
		t.Errorf("%q, %v, wanted %q", out, err, want)
	}
}

// zsh completes inside its line editor alone: the function is called with the words
// that the editor would give it, and what it offers is caught.
func TestCompletionZsh(t *testing.T) {
	completes(t, []string{shell(t, "zsh"), "-f", "-c"}, `compdef() { : }
		compadd() { shift; print -l -- ${(M)@:#$words[CURRENT]*} }
		source <(gylebook completion zsh)
		complete_line() {
			words=("${(@s: :)1}")
			CURRENT=${#words}
			_gylebook
		}`, `for line; do complete_line "$line"; echo ';'; done`)
}

// The script also loads into zsh's own completion system.
func TestCompletionZshLoads(t *testing.T) {
	out, err := exec.Command(shell(t, "zsh"), "-f", "-c",
		`autoload -Uz compinit; compinit -D; source <(gylebook completion zsh); print $_comps[gylebook]`).CombinedOutput()
	if err != nil || string(out) != "_gylebook\n" {
		t.Errorf("%q, %v, wanted the function for gylebook", out, err)
	}
}

func TestCompletionFish(t *testing.T) {
	completes(t, []string{shell(t, "fish"), "--no-config", "-c"}, `gylebook completion fish | source
		function complete_line
			complete -C $argv[1] | string replace -r '\t.*' ''
		end`, `for line in $argv
			complete_line $line
			echo ';'
		end`)
}

// A journal that is not there, is another's or is damaged offers nothing, says
// nothing and stays as it was.
func TestCompleteOpenIsSilent(t *testing.T) {
	dir := t.TempDir()
	other := filepath.Join(dir, "other.txt")
	if err := os.WriteFile(other, []byte("no journal\n"), 0o600); err != nil {
		t.Fatal(err)
	}
	for _, line := range [][]string{
		{"--journal", filepath.Join(dir, "none.db")},
		{"--journal", other},
		{"--journal", dir},
		{"--units", "K"},
		{"--bogus"},
		{"--json", "--csv"},
	} {
		var stdout, stderr strings.Builder
		t.Setenv("GYLEBOOK_JOURNAL", filepath.Join(dir, "none.db"))
		code := run(context.Background(), append([]string{completeOpen}, line...), strings.NewReader(""), &stdout, &stderr)
		if code != exitOK || stdout.Len()+stderr.Len() > 0 {
			t.Errorf("%v: exit code %d, stdout %q, stderr %q; wanted nothing", line, code, stdout.String(), stderr.String())
		}
	}
	files, err := os.ReadDir(dir)
	if err != nil || len(files) != 1 {
		t.Errorf("files after it: %v, %v; wanted the one that was there", files, err)
	}
}

// A name that a shell could run is not offered.
func TestOpenWordsAreSafe(t *testing.T) {
	var open []*journal.Record
	for _, v := range []string{"T10", "$(reboot)", "T2", "a b", "`x`", ""} {
		open = append(open, &journal.Record{Batch: journal.Batch{ID: "B-" + v, Vessel: v}})
	}
	if got := strings.Join(openWords(open), " "); got != "T2 T10 B- B-T2 B-T10" {
		t.Errorf("offered %q", got)
	}
}
