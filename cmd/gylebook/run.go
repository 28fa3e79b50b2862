package main

import (
	"context"
	"fmt"
	"io"
	"os"
	"slices"
	"strings"

	"github.com/urfave/cli/v2"
	"golang.org/x/term"

	"gylebook/attenuation/journal"
	"gylebook/gravity/method"
)

// bench is one run of the program: its streams, its settings and the errors that
// it has shown.
type bench struct {
	in       io.Reader
	out, err io.Writer
	set      settings
	notes    []method.Note // on how values were read
	lines    bool          // values came line by line, from stdin
	help     []func()      // each writes one command's help; only when asked for

	take func(sheet)   // takes what would be printed; nil prints
	held journal.Store // is open already and used in the place of the one named; nil opens that
	wide int           // for text, in the place of the terminal's width; 0 asks that
}

// run is the whole program. It returns the exit code.
func run(ctx context.Context, args []string, in io.Reader, out, errOut io.Writer) int {
	b := &bench{in: in, out: out, err: errOut}
	only := ""
	if len(args) > 0 {
		only = args[0]
	}
	app := b.app(only)
	help := &keeper{w: out}
	app.Writer = help
	line, err := arrange(args, app.Commands)
	if slices.ContainsFunc(line, asksHelp) {
		for _, write := range b.help {
			write()
		}
	}
	if err == nil {
		err = app.RunContext(ctx, append([]string{app.Name}, line...))
	}
	if err == nil {
		err = help.err
	}
	if err == nil {
		err = ctx.Err()
	}
	return failure(errOut, err)
}

func asksHelp(arg string) bool { return arg == "--help" || arg == "-help" || arg == "-h" }

// keeper keeps the first error of a writer. The parser in use prints help and
// version through it and drops the error itself.
type keeper struct {
	w   io.Writer
	err error
}

func (k *keeper) Write(p []byte) (int, error) {
	n, err := k.w.Write(p)
	if k.err == nil {
		k.err = err
	}
	return n, err
}

// offered are the commands in the order of help. Building one is quick, building
// all of them is most of what a short command does: only names stand here.
func (b *bench) offered() []struct {
	name, group string
	build       func() *cli.Command
} {
	return []struct {
		name, group string
		build       func() *cli.Command
	}{
		{"correct", "bench", b.correctCommand},
		{"convert", "bench", b.convertCommand},
		{"abv", "bench", b.abvCommand},
		{"attenuation", "bench", b.attenuationCommand},
		{"refractometer", "bench", b.refractometerCommand},
		{"table", "bench", b.tableCommand},
		{"sources", "bench", b.sourcesCommand},
		{"selfcheck", "bench", b.selfcheckCommand},
		{"instrument", "journal", b.instrumentCommand},
		{"batch", "journal", b.batchCommand},
		{"log", "journal", b.logCommand},
		{"undo", "journal", b.undoCommand},
		{"void", "journal", b.voidCommand},
		{"event", "journal", b.eventCommand},
		{"export", "journal", b.exportCommand},
		{"import", "journal", b.importCommand},
		{"journal", "journal", b.journalCommand},
		{"rounds", "journal", b.roundsCommand},
		{"today", "journal", b.todayCommand},
		{"forecast", "journal", b.forecastCommand},
		{"terminal", "journal", b.terminalCommand},
		{"season", "journal", b.seasonCommand},
		{"why", "journal", b.whyCommand},
		{"report", "pages", b.reportCommand},
		{"card", "pages", b.cardCommand},
		{"serve", "pages", b.serveCommand},
		{"completion", "journal", b.completionCommand},
		{completeOpen, "journal", b.completeOpenCommand},
	}
}

// commands builds the command called only, or all of them when it is none of them
// or needs to know the others.
func (b *bench) commands(only string) []*cli.Command {
	var all []*cli.Command
	for _, o := range b.offered() {
		if o.name == only && only != "completion" {
			return grouped(o.group, o.build())
		}
	}
	for _, o := range b.offered() {
		all = append(all, grouped(o.group, o.build())...)
	}
	return all
}

// app is the whole program; only names the command that the line begins with.
func (b *bench) app(only string) *cli.App {
	app := &cli.App{
		Name:                  "gylebook",
		Usage:                 "hydrometer readings, corrected, converted and explained",
		Version:               version(),
		Reader:                b.in,
		Writer:                b.out,
		ErrWriter:             b.err,
		HideHelpCommand:       true,
		CustomAppHelpTemplate: appHelp,
		ExitErrHandler:        func(*cli.Context, error) {},
		OnUsageError:          onUsage,
		Commands:              b.commands(only),
	}
	app.Action = func(c *cli.Context) error {
		if c.Args().Len() == 0 {
			return cli.ShowAppHelp(c)
		}
		return unknownCommand(c.Args().First(), app.Commands)
	}
	return app
}

// command completes a command: global flags, help, settings, usage errors.
func (b *bench) command(cmd *cli.Command, examples string, action func(*cli.Context) error) *cli.Command {
	own := cmd.Flags
	cmd.Flags = append(append([]cli.Flag{}, own...), globalFlags()...)
	b.help = append(b.help, func() { cmd.CustomHelpTemplate = commandHelp(cmd, own, examples) })
	cmd.OnUsageError = onUsage
	cmd.HideHelpCommand = true
	cmd.Action = func(c *cli.Context) error {
		var err error
		if b.set, err = readSettings(c, b.out); err != nil {
			return err
		}
		if b.wide > 0 {
			b.set.width = b.wide
		}
		return action(c)
	}
	return cmd
}

// onUsage turns the parser's error into ours, in our voice.
func onUsage(c *cli.Context, err error, _ bool) error {
	text := strings.ReplaceAll(err.Error(), "flag provided but not defined: -", "unknown flag --")
	text = strings.ReplaceAll(text, "flag needs an argument: -", "a value is missing after --")
	text = strings.ReplaceAll(text, "----", "--")
	hint := "gylebook --help lists the commands"
	if c.Command != nil && c.Command.Name != "" && c.Command.Name != "gylebook" {
		hint = "gylebook " + c.Command.Name + " --help lists the flags"
	}
	return usageError(hint, "%s", text)
}

func unknownCommand(name string, commands []*cli.Command) error {
	var names []string
	for _, c := range commands {
		if !c.Hidden {
			names = append(names, c.Name)
		}
	}
	return usageError("gylebook --help lists them",
		"unknown command %.40q, known: %s", name, strings.Join(names, ", "))
}

// interactive reports whether a person sits at stdin. Prompts go to stderr.
func (b *bench) interactive() bool {
	f, ok := b.in.(*os.File)
	return ok && !b.set.noInput && term.IsTerminal(int(f.Fd()))
}

// tooMany says that more values were given than the command takes.
func tooMany(c *cli.Context, want int) error {
	return usageError("", "read %s, wanted %d; usage: gylebook %s %s", count(c.Args().Len(), "value", "values"), want, c.Command.Name, c.Command.ArgsUsage)
}

// missing is the one-line usage hint for values that are not there.
func missing(cmd *cli.Command, what string) error {
	return usageError("", "%s is missing; usage: gylebook %s %s", what, cmd.Name, cmd.ArgsUsage)
}

func (b *bench) note(format string, args ...any) {
	if !b.set.quiet {
		fmt.Fprintf(b.err, format+"\n", args...)
	}
}
