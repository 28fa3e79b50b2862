package main

import (
	"os"
	"strconv"
	"time"

	"github.com/urfave/cli/v2"
	"golang.org/x/term"

	"gylebook/gravity"
	"gylebook/gravity/asread"
	"gylebook/tables"
)

// settings are the flags that every command knows, with their environment.
type settings struct {
	format  tables.Format
	explain bool
	quiet   bool
	plain   bool
	noInput bool
	units   asread.Unit
	scale   gravity.Scale
	now     time.Time
	width   int

	operator string // "" when not named
	journal  string // place; "" is the data folder
}

// globalFlags are offered by every command.
func globalFlags() []cli.Flag {
	return []cli.Flag{
		&cli.StringFlag{Name: "format", Value: "text", Usage: "`FORM` text, json, csv, markdown"},
		&cli.BoolFlag{Name: "json", Usage: "short for --format json"},
		&cli.BoolFlag{Name: "csv", Usage: "short for --format csv"},
		&cli.BoolFlag{Name: "explain", Usage: "every step, coefficient and source"},
		&cli.BoolFlag{Name: "quiet", Usage: "no notes or cautions on stderr"},
		&cli.BoolFlag{Name: "plain", Usage: "no tables, one name and value a line"},
		&cli.BoolFlag{Name: "no-input", Usage: "never ask, refuse instead"},
		&cli.StringFlag{Name: "units", Usage: "`UNIT` C or F, the unit of a bare temperature", EnvVars: []string{"GYLEBOOK_UNITS"}},
		&cli.StringFlag{Name: "scale", Usage: "`ID` scale of a bare gravity: sg, plato, brix, points, oechsle, kmw, baume, twaddell, density, gpl", EnvVars: []string{"GYLEBOOK_SCALE"}},
		&cli.StringFlag{Name: "operator", Usage: "`NAME` who reads; the login name unless given", EnvVars: []string{"GYLEBOOK_OPERATOR"}},
		&cli.StringFlag{Name: "journal", Usage: "`PLACE` file of the journal; in the data folder unless given", EnvVars: []string{"GYLEBOOK_JOURNAL"}},
	}
}

// readSettings reads the global flags. Errors are usage errors.
func readSettings(c *cli.Context, out any) (settings, error) {
	s := settings{
		explain: c.Bool("explain"), quiet: c.Bool("quiet"), plain: c.Bool("plain"),
		noInput: c.Bool("no-input"), units: asread.C, now: time.Now(), width: terminalWidth(out),
		operator: c.String("operator"), journal: c.String("journal"),
	}
	var err error
	if s.format, err = tables.ParseFormat(c.String("format")); err != nil {
		return s, usageError("", "--format: %v", err)
	}
	if c.Bool("json") && c.Bool("csv") {
		return s, usageError("", "--json and --csv exclude each other")
	}
	if form := c.String("format"); c.IsSet("format") && (c.Bool("json") && form != "json" || c.Bool("csv") && form != "csv") {
		return s, usageError("", "--format %s and --json or --csv exclude each other", form)
	}
	if c.Bool("json") {
		s.format = tables.JSON
	}
	if c.Bool("csv") {
		s.format = tables.CSV
	}
	switch u := c.String("units"); u {
	case "", "C", "c":
	case "F", "f":
		s.units = asread.F
	default:
		return s, usageError("type C or F", "--units or GYLEBOOK_UNITS: read %.20q, wanted C or F", u)
	}
	if id := c.String("scale"); id != "" {
		if s.scale, err = asread.ParseScale(id); err != nil {
			return s, usageError("", "--scale or GYLEBOOK_SCALE: %v", err)
		}
	}
	if epoch := os.Getenv("SOURCE_DATE_EPOCH"); epoch != "" {
		n, err := strconv.ParseInt(epoch, 10, 64)
		if err != nil || n < 0 || n > 253402300799 {
			return s, usageError("", "SOURCE_DATE_EPOCH: read %.20q, wanted seconds since 1970", epoch)
		}
		s.now = time.Unix(n, 0)
	}
	return s, nil
}

// terminalWidth is COLUMNS, the terminal's own width, or 80.
func terminalWidth(out any) int {
	if n, err := strconv.Atoi(os.Getenv("COLUMNS")); err == nil && n >= 20 {
		return min(n, 400)
	}
	if f, ok := out.(*os.File); ok {
		if w, _, err := term.GetSize(int(f.Fd())); err == nil && w >= 20 {
			return w
		}
	}
	return 80
}
