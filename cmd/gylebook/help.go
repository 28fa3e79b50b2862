package main

import (
	"fmt"
	"runtime/debug"
	"strings"

	"github.com/urfave/cli/v2"

	"gylebook/tables"
)

// appHelp is what `gylebook --help` prints.
const appHelp = `gylebook - hydrometer readings, corrected, converted and explained

examples:
  gylebook correct 1.050 --temp 28C  a reading at its reference temperature
  gylebook abv 1.048 1.010           alcohol by every method, with the spread
  gylebook log T4 1.012 18           a reading into the journal
  gylebook today                     open batches, the neediest first
  gylebook season 2026               what each product and yeast came to

usage: gylebook COMMAND VALUES [flags]
{{range .VisibleCategories}}
{{.Name}}:
{{range .VisibleCommands}}  {{printf "%-15s" .Name}}{{.Usage}}
{{end}}{{end}}
gylebook COMMAND --help shows the flags. Flags may stand anywhere; --json and
--csv print for machines; --explain shows every step. Values may be 1.048, 1048,
48 (points), 12P, 12.1Bx, 90Oe, 18.2KMW, 6.9Be, 18Tw, 1046kg/m3, 104g/L.

exit codes: 0 done, 1 failed, 3 not terminal (terminal --check), 64 wrong usage,
65 bad data, 66 no such file, 73 cannot write, 130 interrupted
`

// grouped puts commands under one head in appHelp; the heads are in their own order.
func grouped(head string, commands ...*cli.Command) []*cli.Command {
	for _, c := range commands {
		c.Category = head
	}
	return commands
}

// commandHelp is a command's help: examples first, then usage and flags.
func commandHelp(cmd *cli.Command, own []cli.Flag, examples string) string {
	var b strings.Builder
	fmt.Fprintf(&b, "gylebook %s - %s\n\nexamples:\n", cmd.Name, cmd.Usage)
	for line := range strings.Lines(strings.TrimSpace(examples)) {
		fmt.Fprintf(&b, "  %s\n", strings.TrimSpace(line))
	}
	fmt.Fprintf(&b, "\nusage: gylebook %s %s [flags]\n", cmd.Name, cmd.ArgsUsage)
	if cmd.Description != "" {
		fmt.Fprintf(&b, "\n%s\n", strings.Join(tables.Wrap(strings.Join(strings.Fields(cmd.Description), " "), 78), "\n"))
	}
	if len(own) > 0 {
		b.WriteString("\nflags:\n")
		writeFlags(&b, own)
	}
	b.WriteString("\nflags of every command:\n")
	writeFlags(&b, globalFlags())
	return strings.NewReplacer("{{", `{{"{{"}}`).Replace(b.String())
}

// writeFlags lists flags in two columns, wrapped at 80.
func writeFlags(b *strings.Builder, flags []cli.Flag) {
	const column = 24
	for _, f := range flags {
		usage := ""
		if d, ok := f.(cli.DocGenerationFlag); ok {
			usage = d.GetUsage()
		}
		// The word in back quotes in front names the value.
		name := "--" + f.Names()[0]
		if before, rest, ok := strings.Cut(usage, "`"); ok {
			value, after, _ := strings.Cut(rest, "`")
			if _, isBool := f.(*cli.BoolFlag); !isBool {
				name += " " + value
			}
			usage = before + strings.TrimPrefix(after, " ")
		}
		for i, line := range tables.Wrap(usage, 80-column-2) {
			if i > 0 {
				name = ""
			} else if len(name) > column-2 {
				fmt.Fprintf(b, "  %s\n", name)
				name = ""
			}
			fmt.Fprintf(b, "  %-*s%s\n", column, name, line)
		}
	}
}

// version is the module version that the program was built from.
func version() string {
	if info, ok := debug.ReadBuildInfo(); ok && info.Main.Version != "" {
		return info.Main.Version
	}
	return "(devel)"
}
