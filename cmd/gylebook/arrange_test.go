package main

import (
	"slices"
	"strings"
	"testing"

	"github.com/google/go-cmp/cmp"
)

func TestArrange(t *testing.T) {
	commands := (&bench{}).commands("")
	for line, want := range map[string]string{
		"":                                 "",
		"convert 48":                       "convert -- 48",
		"convert 48 --json":                "convert --json -- 48",
		"--json convert 48":                "convert --json -- 48",
		"--to sg convert 48":               "convert --to sg -- 48",
		"abv 1.048 --rule us-malt 1.010":   "abv --rule us-malt -- 1.048 1.010",
		"abv 1.048 --rule=us-malt 1.010":   "abv --rule=us-malt -- 1.048 1.010",
		"convert -1P -.5P --csv":           "convert --csv -- -1P -.5P",
		"convert -":                        "convert -- -",
		"convert --quiet -- --json -1P --": "convert --quiet -- --json -1P --",
		"correct 1.050 --temp -1C":         "correct --temp -1C -- 1.050",
		"convert 48 convert":               "convert -- 48 convert",
		"abv --bogus 1 2":                  "abv --bogus -- 1 2",
		"bogus 1 2 --json":                 "bogus --json -- 1 2",
		"help":                             "--help",
		"help abv":                         "abv --help",
		"help abv --json":                  "abv --help",
		"--help":                           "--help",
		"convert 48 --help":                "convert --help",
		"convert -h 48 --json":             "convert -h --json",
		"bogus 48 --help":                  "bogus --help -- 48",
		"correct 48 --og --help":           "correct --og --help -- 48",
	} {
		got, err := arrange(strings.Fields(line), commands)
		if diff := cmp.Diff(strings.Fields(want), got); err != nil || (diff != "" && len(want)+len(got) > 0) {
			t.Errorf("%q: %v, -want +got\n%s", line, err, diff)
		}
	}
	for _, line := range []string{"convert 48 --to", "correct --temp", "abv 1 2 --rule", "help bogus"} {
		if got, err := arrange(strings.Fields(line), commands); err == nil || failure(&strings.Builder{}, err) != exitUsage {
			t.Errorf("%q: %q, %v; wanted a usage error", line, got, err)
		}
	}
}

// FuzzArrange takes a line apart in two ways. As raw words it may be any: no
// word may be lost or made up. As roles, one byte a word, it is a line whose
// right arrangement is known.
func FuzzArrange(f *testing.F) {
	f.Add("convert\n-1P\n--json\n--\n--to", "0102030405")
	f.Add("help\nabv\n--json", "543210")
	f.Add("--temp\n--\n--\n-\n\n-", "11220")
	f.Add("correct\n1.050\n--temp=\n28C", "")
	commands := (&bench{}).commands("")
	f.Fuzz(func(t *testing.T, raw, roles string) {
		words := strings.Split(raw, "\n")
		got, err := arrange(slices.Clone(words), commands)
		if err == nil && !slices.ContainsFunc(words, asksForHelp) {
			checkSameWords(t, words, got)
		}
		checkRoles(t, roles, func(args []string) ([]string, error) { return arrange(args, commands) })
	})
}

// asksForHelp finds what makes arrange drop values on purpose.
func asksForHelp(word string) bool {
	name, _, _ := strings.Cut(strings.TrimLeft(word, "-"), "=")
	return name == "help" || name == "h"
}

// checkSameWords compares the words but "--", of which one may come or go.
func checkSameWords(t *testing.T, in, out []string) {
	t.Helper()
	split := func(words []string) (rest []string, dashes int) {
		for _, w := range words {
			if w == "--" {
				dashes++
			} else {
				rest = append(rest, w)
			}
		}
		slices.Sort(rest)
		return rest, dashes
	}
	inWords, inDashes := split(in)
	outWords, outDashes := split(out)
	if !slices.Equal(inWords, outWords) {
		t.Errorf("%q became %q: -in +out\n%s", in, out, cmp.Diff(inWords, outWords))
	}
	if outDashes < inDashes-1 || outDashes > inDashes+1 {
		t.Errorf("%q became %q: %d times \"--\", then %d", in, out, inDashes, outDashes)
	}
}

// checkRoles builds a line of "correct" from the roles and demands command,
// flags, "--", values, each in the order typed.
func checkRoles(t *testing.T, roles string, arrange func([]string) ([]string, error)) {
	t.Helper()
	words := []string{"correct"}
	flags, values := []string{"correct"}, []string{}
	for i, role := range []byte(roles) {
		switch role % 6 {
		case 0, 1:
			v := []string{"1.050", "-1P", "-", "−1P", "", "-.5", "correct", "help"}[i%8]
			words, values = append(words, v), append(values, v)
		case 2:
			words, flags = append(words, "--json"), append(flags, "--json")
		case 3:
			words, flags = append(words, "--temp", "28C"), append(flags, "--temp", "28C")
		case 4:
			words, flags = append(words, "-og=1.048"), append(flags, "-og=1.048")
		case 5:
			// A value of a flag may look like a flag or a negative value.
			words, flags = append(words, "--og", "-1P", "--body", "--"), append(flags, "--og", "-1P", "--body", "--")
		}
	}
	want := flags
	if len(values) > 0 {
		want = append(append(want, "--"), values...)
	}
	got, err := arrange(words)
	if err != nil {
		t.Fatalf("%q: %v", words, err)
	}
	if !slices.Equal(want, got) {
		t.Errorf("%q: -want +got\n%s", words, cmp.Diff(want, got))
	}
}

// The names that choose a command are those of the commands themselves.
func TestOfferedNames(t *testing.T) {
	b := &bench{}
	for _, o := range b.offered() {
		if name := o.build().Name; name != o.name {
			t.Errorf("%s builds %s", o.name, name)
		}
		if one := b.commands(o.name); o.name != "completion" && (len(one) != 1 || one[0].Name != o.name) {
			t.Errorf("%s alone gives %d commands", o.name, len(one))
		}
	}
}
