package main

import (
	"fmt"
	"slices"
	"strings"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/tables"
)

// completeOpen is the command that the scripts ask for open vessels and batches.
const completeOpen = "complete-open"

func (b *bench) completionCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "completion", Usage: "commands, flags and open vessels on the Tab key",
		ArgsUsage: "bash|zsh|fish",
		Description: `Prints a script for the shell. It completes commands, flags and, from the journal in use, open vessels
			and batches. Load it in the start file of the shell, as the examples show.`,
	}, `source <(gylebook completion bash)      in ~/.bashrc
		source <(gylebook completion zsh)       in ~/.zshrc, after compinit
		gylebook completion fish | source       in ~/.config/fish/config.fish`, b.completion)
}

func (b *bench) completion(c *cli.Context) error {
	scripts := map[string]func([]completed) string{"bash": bashScript, "zsh": zshScript, "fish": fishScript}
	if c.Args().Len() != 1 {
		return missing(c.Command, "the shell")
	}
	script, ok := scripts[c.Args().First()]
	if !ok {
		return usageError("", "unknown shell %.40q, known: bash, zsh, fish", c.Args().First())
	}
	_, err := fmt.Fprint(b.out, script(completions(c.App.Commands)))
	return err
}

// What may stand in the place of a value, besides words of its own.
const (
	openNames = "@open"  // open vessels and batches
	fileNames = "@files" // files and folders
)

// completed is one command as the scripts complete it. The first one, with an
// empty path, stands for the line before any command.
type completed struct {
	path, usage string
	below       []completed // commands below it
	flags       []completedFlag
	values      [][]string // by place: words, or openNames or fileNames alone
}

type completedFlag struct {
	name, usage string
	takesValue  bool
	values      []string
}

// completions lists the program itself and every command that is not hidden,
// each before those below it.
func completions(commands []*cli.Command) []completed {
	top := completed{flags: completedFlags(globalFlags())}
	return top.with("", commands)
}

func (of completed) with(path string, commands []*cli.Command) []completed {
	var all []completed
	for _, c := range commands {
		if c.Hidden {
			continue
		}
		name := strings.TrimSpace(path + " " + c.Name)
		one := completed{path: name, usage: c.Usage, flags: completedFlags(c.Flags)}
		if len(c.Subcommands) == 0 {
			one.values = valuesOf(c.ArgsUsage)
		}
		list := one.with(name, c.Subcommands)
		of.below = append(of.below, list[0])
		all = append(all, list...)
	}
	return append([]completed{of}, all...)
}

// name is the last word of the path.
func (of completed) name() string { return of.path[strings.LastIndex(of.path, " ")+1:] }

// names lists the commands below.
func (of completed) names() []string {
	names := make([]string, len(of.below))
	for i, c := range of.below {
		names[i] = c.name()
	}
	return names
}

func completedFlags(flags []cli.Flag) []completedFlag {
	var all []completedFlag
	for _, f := range flags {
		one := completedFlag{name: f.Names()[0]}
		if d, ok := f.(cli.DocGenerationFlag); ok {
			one.takesValue = d.TakesValue()
			one.usage = strings.ReplaceAll(d.GetUsage(), "`", "")
		}
		switch one.name {
		case "format":
			one.values = []string{string(tables.Text), string(tables.JSON), string(tables.CSV), string(tables.Markdown)}
		case "units":
			one.values = []string{"C", "F"}
		case "scale":
			for _, s := range gravity.Scales() {
				one.values = append(one.values, s.ID)
			}
		case "journal":
			one.values = []string{fileNames}
		}
		all = append(all, one)
	}
	return all
}

// valuesOf reads from a usage line what may stand in each place.
func valuesOf(usage string) [][]string {
	var all [][]string
	for _, word := range strings.Fields(usage) {
		word = strings.Trim(word, "[]…")
		var values []string
		switch {
		case word != "" && word == strings.ToLower(word):
			values = strings.Split(word, "|")
		case strings.Contains(word, "VESSEL") || strings.Contains(word, "BATCH"):
			values = []string{openNames}
		case word == "FILE" || word == "PLACE":
			values = []string{fileNames}
		case word == "KIND":
			values = journal.EventKinds
		}
		all = append(all, values)
	}
	return all
}

// openWords lists the open vessels in floor order, then the open batches, each
// name once. Names that a shell could take for anything else are left out.
func openWords(open []*journal.Record) []string {
	var vessels, batches []string
	for _, rec := range open {
		vessels = append(vessels, journal.View{Record: rec}.Vessel())
		batches = append(batches, rec.Batch.ID)
	}
	slices.SortFunc(vessels, naturalCompare)
	slices.SortFunc(batches, naturalCompare)
	var words []string
	for _, name := range append(vessels, batches...) {
		if journal.CheckID("name", name) == nil && !slices.Contains(words, name) {
			words = append(words, name)
		}
	}
	return words
}

// completeOpenCommand prints open vessels and batches, one a line. It is silent
// whatever goes wrong: the line that is being typed must not be disturbed.
func (b *bench) completeOpenCommand() *cli.Command {
	cmd := b.command(&cli.Command{
		Name: completeOpen, Hidden: true, Usage: "open vessels and batches, for the completion scripts",
	}, "gylebook "+completeOpen, func(c *cli.Context) error {
		return b.withJournal(c.Context, func(s journal.Store) error {
			open, err := s.OpenLast(c.Context, 0)
			if err != nil {
				return err
			}
			for _, word := range openWords(open) {
				fmt.Fprintln(b.out, word)
			}
			return nil
		})
	})
	loud := cmd.Action
	cmd.Action = func(c *cli.Context) error {
		_ = loud(c)
		return nil
	}
	cmd.OnUsageError = func(*cli.Context, error, bool) error { return nil }
	return cmd
}
