package main

import (
	"strings"

	"github.com/urfave/cli/v2"
)

// arrange puts a command line into the order that the parser in use needs:
// command, flags, "--", values. Flags may then stand anywhere, and a value such
// as -1P is not taken for a flag. What cannot be placed (an unknown flag) stays
// among the flags, so that the parser names it. A flag at the end of the line
// without its value is an error, and so is an unknown command after help.
func arrange(args []string, commands []*cli.Command) ([]string, error) {
	path, flags, values := []string{}, []string{}, []string{}
	takesValue := flagsWithValue(commands)
	level := commands
	for i := 0; i < len(args); i++ {
		arg := args[i]
		switch {
		case arg == "--":
			values = append(values, args[i+1:]...)
			i = len(args)
		case isValue(arg):
			next := find(level, arg)
			// The first words name the command; after a value none does.
			if next != nil && len(values) == 0 {
				path = append(path, arg)
				level = next.Subcommands
				takesValue = flagsWithValue([]*cli.Command{next})
				continue
			}
			values = append(values, arg)
		default:
			flags = append(flags, arg)
			name, _, hasValue := strings.Cut(strings.TrimLeft(arg, "-"), "=")
			if takesValue[name] && !hasValue {
				i++
				if i >= len(args) {
					return nil, usageError("", "a value is missing after --%s", name)
				}
				flags = append(flags, args[i])
			}
		}
	}
	if len(path) == 0 && len(values) > 0 && values[0] == "help" {
		// "help abv" is "abv --help".
		if len(values) > 1 && find(commands, values[1]) == nil {
			return nil, unknownCommand(values[1], commands)
		}
		return append(values[1:], "--help"), nil
	}
	if len(path) == 0 && len(values) > 0 {
		// An unknown command: its name leads, so that it can be named.
		path, values = values[:1], values[1:]
	}
	out := append(path, flags...)
	if len(values) > 0 {
		out = append(append(out, "--"), values...)
	}
	return out, nil
}

// isValue reports whether arg is a value: no dash in front, a dash alone
// (standard input), or a negative number.
func isValue(arg string) bool {
	if !strings.HasPrefix(arg, "-") || arg == "-" {
		return true
	}
	rest := arg[1:]
	return rest[0] >= '0' && rest[0] <= '9' || rest[0] == '.' || rest[0] == ','
}

// flagsWithValue names the flags of all commands (and those below them) that
// take a value.
func flagsWithValue(commands []*cli.Command) map[string]bool {
	names := map[string]bool{}
	for _, c := range commands {
		for _, f := range c.Flags {
			if _, ok := f.(*cli.BoolFlag); ok {
				continue
			}
			for _, n := range f.Names() {
				names[n] = true
			}
		}
		for n := range flagsWithValue(c.Subcommands) {
			names[n] = true
		}
	}
	return names
}

func find(commands []*cli.Command, name string) *cli.Command {
	for _, c := range commands {
		if c.HasName(name) {
			return c
		}
	}
	return nil
}
