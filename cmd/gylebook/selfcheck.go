package main

import (
	"fmt"
	"strconv"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/selfcheck"
	"gylebook/tables"
)

func (b *bench) selfcheckCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "selfcheck", Usage: "recompute the published rows built into the program",
		Description: "Exit 1 when a row lies outside its tolerance.",
	}, `gylebook selfcheck
		gylebook selfcheck --json`, b.selfcheck)
}

var selfcheckColumns = []string{"source", "rows", "worst", "tolerance", "passed", "relation", "compared", "unit"}

func (b *bench) selfcheck(c *cli.Context) error {
	if c.Args().Len() > 0 {
		return usageError("", "read %s, wanted none; usage: gylebook selfcheck", count(c.Args().Len(), "value", "values"))
	}
	outcomes, err := selfcheck.Run(selfcheck.Offered())
	if err != nil {
		return &exitError{exitFailed, err.Error(), ""}
	}
	return b.reportChecks(outcomes)
}

// reportChecks prints every check; one that misses makes it an error, exit 1.
func (b *bench) reportChecks(outcomes []selfcheck.Outcome) error {
	s, failed := selfcheckSheet(outcomes)
	if err := b.print(s); err != nil {
		return err
	}
	if len(failed) > 0 {
		return &exitError{exitFailed, fmt.Sprintf("%d of %d checks miss: %s", len(failed), len(outcomes), failed[0]), "gylebook selfcheck --csv lists them"}
	}
	return nil
}

// selfcheckSheet holds every check for a machine and one line a source for a
// person; it returns the misses in words.
func selfcheckSheet(outcomes []selfcheck.Outcome) (sheet, []string) {
	s := sheet{name: "selfcheck", columns: selfcheckColumns}
	t := tables.Table{Columns: []tables.Column{
		{Head: "source"}, {Head: "checks", Align: tables.Right}, {Head: "rows", Align: tables.Right}, {Head: "passed"},
	}}
	var failed []string
	rows := 0
	for i := 0; i < len(outcomes); {
		source, checks, n, verdict := outcomes[i].Source, 0, 0, "yes"
		for ; i < len(outcomes) && outcomes[i].Source == source; i++ {
			o := outcomes[i]
			checks++
			n += o.Rows
			if !o.Passed {
				verdict = "NO"
				failed = append(failed, o.Source+" by "+o.Relation+": "+firstOf(o.Misses))
			}
			s.records = append(s.records, record(selfcheckColumns, []any{
				o.Source, o.Rows, o.Worst, o.Tolerance, o.Passed, o.Relation, o.Compared, o.Unit,
			}))
			s.explain = append(s.explain, fmt.Sprintf("%s, %s by %s %s: %s, worst %.2g for a tolerance of %.2g %s",
				o.Source, o.Compared, o.Kind, o.Relation, count(o.Rows, "row", "rows"), o.Worst, o.Tolerance, o.Unit))
		}
		rows += n
		t.Rows = append(t.Rows, []string{source, strconv.Itoa(checks), strconv.Itoa(n), verdict})
	}
	s.tables = []tables.Table{t}
	s.ladder = &tables.Ladder{Answer: []string{
		fmt.Sprintf("%d of %d checks passed", len(outcomes)-len(failed), len(outcomes)),
		fmt.Sprintf("%d rows of %d sources", rows, len(t.Rows)),
	}}
	return s, failed
}

func firstOf(lines []string) string {
	if len(lines) == 0 {
		return ""
	}
	return lines[0]
}
