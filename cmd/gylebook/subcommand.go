package main

import (
	"strings"

	"github.com/urfave/cli/v2"
)

// group is a command that only holds others. Without one it shows its help.
func (b *bench) group(name, usage, examples string, subs ...*cli.Command) *cli.Command {
	verbs := make([]string, len(subs))
	for i, s := range subs {
		verbs[i] = s.Name
	}
	cmd := &cli.Command{
		Name: name, Usage: usage, ArgsUsage: strings.Join(verbs, "|") + " VALUES",
		Description: "gylebook " + name + " WORD --help shows the flags of each.",
		Subcommands: subs,
	}
	return b.command(cmd, examples, func(c *cli.Context) error {
		if c.Args().Len() == 0 {
			for _, write := range b.help {
				write()
			}
			cli.HelpPrinter(c.App.Writer, cmd.CustomHelpTemplate, cmd)
			return nil
		}
		return unknownCommand(c.Args().First(), subs)
	})
}

// sub completes a command inside a group; examples begin with the whole name.
func (b *bench) sub(parent string, cmd *cli.Command, examples string, action func(*cli.Context) error) *cli.Command {
	own := cmd.Flags
	b.command(cmd, examples, action)
	whole := *cmd
	whole.Name = parent + " " + cmd.Name
	b.help = append(b.help, func() { cmd.CustomHelpTemplate = commandHelp(&whole, own, examples) })
	cmd.OnUsageError = func(c *cli.Context, err error, isSub bool) error {
		named := cli.NewContext(c.App, nil, c)
		named.Command = &whole
		return onUsage(named, err, isSub)
	}
	return cmd
}

// wanted is the usage error for a wrong number of values, with the whole name.
func wanted(c *cli.Context, what string) error {
	name := strings.TrimPrefix(c.Command.HelpName, "gylebook ")
	usage := strings.TrimSpace("gylebook " + name + " " + c.Command.ArgsUsage)
	return usageError("", "read %s, wanted %s; usage: %s", count(c.Args().Len(), "value", "values"), what, usage)
}
