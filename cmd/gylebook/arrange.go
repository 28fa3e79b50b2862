package main

import (
	"strings"

	"github.com/urfave/cli/v2"

	"gylebook/gravity/asread"
)

// arrange puts a command line into the order that the parser in use needs:
// command, flags, "--", values. Flags may then stand anywhere, and a value such
// as -1P is not taken for a flag. What cannot be placed (an unknown flag) stays
// among the flags, so that the parser names it. A flag at the end of the line
// without its value is an error, and so is an unknown command after help. A
// command line that asks for help loses its values.
func arrange(args []string, commands []*cli.Command) ([]string, error) {
	path, flags, values := []string{}, []string{}, []string{}
	help := false
	var takesValue map[string]bool
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
			help = help || name == "help" || name == "h"
			if takesValue == nil {
				// A flag before the command may be any command's.
				takesValue = flagsWithValue(commands)
			}
			if takesValue[name] && !hasValue {
				i++
				if i >= len(args) {
					return nil, usageError("", "a value is missing after --%s", name)
				}
				value := args[i]
				// "--temp 28 C": a space between number and unit.
				if i+1 < len(args) {
					if joined := asread.Join(args[i : i+2]); len(joined) == 1 {
						value = joined[0]
						i++
					}
				}
				flags = append(flags, value)
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
		path, values = []string{values[0]}, values[1:]
	}
	if help && len(path) > 0 && find(commands, path[0]) != nil {
		// The parser would look for help on the first value.
		values = nil
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
			switch f := f.(type) {
			case *cli.BoolFlag:
			case *cli.StringFlag: // its Names method runs a regular expression
				names[f.Name] = true
				for _, n := range f.Aliases {
					names[n] = true
				}
			default:
				for _, n := range f.Names() {
					names[n] = true
				}
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
