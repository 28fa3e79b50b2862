package main

import (
	"cmp"
	"errors"
	"fmt"
	"strings"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/tables"
)

func (b *bench) logCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "log", Usage: "a reading of a batch: vessel, gravity, temperature", ArgsUsage: "VESSEL|BATCH READING TEMP",
		Description: `The instrument is --instrument, else the only one in use, else your last. A reading that cannot be right is
			held: on a terminal you are asked, in a pipe it is refused and nothing is written. "-" reads stdin, one reading a line.`,
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "taken", Aliases: []string{"at"}, Usage: "`TIME` when it was taken, now unless given: 14:30, \"yesterday 18:30\""},
			&cli.BoolFlag{Name: "estimated", Usage: "the time is only about right"},
			&cli.StringFlag{Name: "instrument", Usage: "`ID` that it was read with; none for none of the journal's"},
			&cli.BoolFlag{Name: "gassy", Usage: "the sample was not degassed"},
			&cli.StringFlag{Name: "keep", Usage: "`REASON` to keep a reading that is doubted, as suspect"},
			&cli.StringFlag{Name: "note", Usage: "`TEXT` anything else"},
			&cli.BoolFlag{Name: "dry-run", Usage: "judge it and show what it would mean; nothing is written"},
		},
	}, `gylebook log T4 1.012 18
		gylebook log B26-014 3.1P 18C --taken "yesterday 18:30"
		printf 'T4 1.012 18\nT6 1.010 19\n' | gylebook log -`, b.log)
}

func (b *bench) log(c *cli.Context) error {
	if c.Args().Len() == 0 {
		return missing(c.Command, "a vessel or batch, a reading and its temperature")
	}
	in := toLog{
		quality: journal.Exact, instrument: c.String("instrument"), gassy: c.Bool("gassy"),
		keep: c.String("keep"), note: c.String("note"), dry: c.Bool("dry-run"),
	}
	if c.Bool("estimated") {
		in.quality = journal.Estimated
	}
	var err error
	if in.at, err = b.at(c, "taken"); err != nil {
		return err
	}
	return b.withJournal(c.Context, func(s journal.Store) error {
		sh := sheet{name: "log", columns: names(valueRecord(journal.View{Record: new(journal.Record)}, new(journal.Value), nil))}
		done := 0
		refused := b.each(c, true, func(fields []string) error {
			if len(fields) != 3 {
				return usageError("", "read %s, wanted three; usage: gylebook log %s", count(len(fields), "value", "values"), c.Command.ArgsUsage)
			}
			one := in
			one.name, one.reading, one.temp = fields[0], fields[1], fields[2]
			l, err := b.logAsking(c, s, one)
			if err != nil {
				return err
			}
			done++
			return b.logShow(&sh, l)
		})
		if refused != nil && !errors.Is(refused, errShown) {
			return refused
		}
		if done > 0 && b.isText() {
			return refused // each was shown when it was on disk
		}
		return b.finish(refused, done, func() error { return b.print(sh) })
	})
}

// isText reports whether a person reads along, line by line.
func (b *bench) isText() bool {
	return b.set.format == tables.Text || b.set.format == tables.Markdown
}

// logShow shows one reading that is on disk, or keeps it for a machine's form.
func (b *bench) logShow(sh *sheet, l logged) error {
	if !b.isText() {
		if l.repeat {
			sh.notes = append(sh.notes, l.notes...)
		} else {
			sh.records = append(sh.records, valueRecord(l.view, l.value, l.extra()))
			if l.value.Temp.C > 40 {
				sh.notes = append(sh.notes, cautionHot)
			}
		}
		return nil
	}
	one := sheet{name: "log", notes: l.notes}
	if !l.repeat {
		one.ladder, one.logged = &tables.Ladder{Answer: logLines(l)}, &l
		if b.set.explain {
			one.explain = explainValue(l.value)
		}
		if l.value.Temp.C > 40 {
			one.notes = append(one.notes, cautionHot)
		}
	}
	err := b.print(one)
	b.notes = nil
	return err
}

// logLines are one or two lines on a reading: what was read, what it means.
func logLines(l logged) []string {
	numbered := func(line string) string {
		if l.entry.Number == unwritten {
			return line + "   nothing written"
		}
		return numberedLine(line, l.entry)
	}
	rec, one := l.view.Record, l.value
	name := strings.TrimSpace(one.Source.Vessel + " " + rec.Batch.ID + " " + rec.Batch.Product)
	with := ""
	if one.Source.Instrument != "" {
		with = ", " + one.Source.Instrument
	}
	if one.Err != nil {
		first := fmt.Sprintf("%s   read %s at %s%s, not corrected", name, one.Source.Gravity.Text, one.Source.Temp.Text, with)
		return []string{first, numbered(one.Err.Error())}
	}
	value := fixed(float64(one.Result.SG), 4)
	if scale := one.Typed.Scale; scale.IsMass() {
		value = plato(one.Result.Extract) + ", SG " + value
	}
	read := one.Typed.ReadAs()
	if one.Typed.Scale == gravity.ScaleSG {
		read = strings.TrimPrefix(read, "SG ")
	}
	first := fmt.Sprintf("%s   %s (read %s at %s%s)", name, value, read, one.Temp.ReadAs(), with)
	var parts []string
	if one.Suspect { // figures leave it out
		return []string{first, numbered("kept as suspect: " + one.Source.Keep)}
	}
	if f, ok := fallTo(l.view, one); ok {
		word := "fell"
		if f.points < 0 {
			word, f.points = "rose", -f.points
		}
		parts = append(parts, fmt.Sprintf("%s %s points in %s", word, fixed(f.points, 1), hoursText(f.hours)))
	}
	if one.Attenuation != nil {
		parts = append(parts, "apparent "+fixed(one.Attenuation.Apparent, 1)+" %")
	} else {
		parts = append(parts, "apparent "+none+" ("+cmp.Or(one.Why, "not known")+")")
	}
	return []string{first, numbered(strings.Join(parts, "   "))}
}

// hoursText is a span of time in hours, below one in minutes.
func hoursText(hours float64) string {
	if hours < 1 {
		return fixed(60*hours, 0) + " min"
	}
	return fixed(hours, 1) + " h"
}
