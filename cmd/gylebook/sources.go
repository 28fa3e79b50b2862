package main

import (
	"strconv"
	"strings"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/selfcheck"
	"gylebook/gravity/method"
	"gylebook/tables"
)

func (b *bench) sourcesCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "sources", Usage: "every relation: who, where, valid range, how it was checked",
		ArgsUsage: "[ID…]", Description: "Without an id, all of them; with ids, those in full.",
	}, `gylebook sources
		gylebook sources asbc balling
		gylebook sources --csv`, b.sources)
}

var sourceColumns = []string{"id", "kind", "author", "year", "where", "valid_range", "check", "status"}

func (b *bench) sources(c *cli.Context) error {
	all := selfcheck.Offered().Infos()
	picked, err := pickInfos(all, c.Args().Slice())
	if err != nil {
		return err
	}
	s := sheet{name: "sources", columns: sourceColumns}
	for _, i := range picked {
		var year any
		if i.Source.Year != 0 {
			year = i.Source.Year
		}
		s.records = append(s.records, record(sourceColumns, []any{
			i.ID, i.Kind, i.Source.Author, year, i.Source.Where, ranges(i), i.Check, string(i.Source.Status),
		}))
	}
	if c.Args().Len() == 0 {
		s.ladder = sourceLadder(picked)
		return b.print(s)
	}
	for n, i := range picked {
		if n == 0 || b.set.format == tables.JSON || b.set.format == tables.CSV {
			continue
		}
		// One block a relation, each printed on its own.
		s.more = append(s.more, infoLadder(i))
	}
	s.ladder = infoLadder(picked[0])
	return b.print(s)
}

// sourceLadder lists the relations, one a rung.
func sourceLadder(all []method.Info) *tables.Ladder {
	l := &tables.Ladder{
		Answer: []string{strconv.Itoa(len(all)) + " relations"},
		Lines:  []string{"gylebook sources ID shows range, error and check of one"},
	}
	for _, i := range all {
		l.Rungs = append(l.Rungs, tables.Rung{Name: i.ID, Value: i.Kind, Remark: shortSource(i)})
	}
	return l
}

// pickInfos returns the relations with these ids, all of them without ids.
func pickInfos(all []method.Info, ids []string) ([]method.Info, error) {
	if len(ids) == 0 {
		return all, nil
	}
	var picked []method.Info
	for _, id := range ids {
		found := false
		known := make([]string, 0, len(all))
		for _, i := range all {
			known = append(known, i.ID)
			if i.ID == strings.ToLower(id) {
				picked, found = append(picked, i), true
			}
		}
		if !found {
			return nil, &method.UnknownError{What: "relation", Got: id, Known: known}
		}
	}
	return picked, nil
}

func ranges(i method.Info) string {
	parts := make([]string, len(i.Valid))
	for k, r := range i.Valid {
		parts[k] = r.String()
	}
	return strings.Join(parts, "; ")
}

// shortSource is author and year, or the place when no author is known.
func shortSource(i method.Info) string {
	who := i.Source.Author
	if who == "" {
		return i.Source.Where
	}
	if i.Source.Year != 0 {
		who += " " + strconv.Itoa(i.Source.Year)
	}
	return who
}

func infoLadder(i method.Info) *tables.Ladder {
	l := &tables.Ladder{Answer: []string{i.ID, i.Name}}
	for _, r := range []tables.Rung{
		{Name: "kind", Remark: i.Kind},
		{Name: "source", Remark: i.Source.String()},
		{Name: "seen", Remark: string(i.Source.Status)},
		{Name: "range", Remark: ranges(i)},
		{Name: "error", Remark: i.Error},
		{Name: "check", Remark: i.Check},
		{Name: "use", Remark: i.Use},
	} {
		if r.Remark != "" {
			l.Rungs = append(l.Rungs, r)
		}
	}
	return l
}
