package main

import (
	"fmt"
	"slices"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/tables"
)

func (b *bench) instrumentList() *cli.Command {
	return b.sub("instrument", &cli.Command{
		Name: "list", Usage: "the instruments, with the correction now in force",
	}, `gylebook instrument list
		gylebook instrument list --csv`, func(c *cli.Context) error {
		if c.Args().Len() > 0 {
			return wanted(c, "none")
		}
		return b.withJournal(c.Context, func(s journal.Store) error {
			list, err := s.Instruments(c.Context)
			if err != nil {
				return err
			}
			sh := sheet{name: "instrument-list", columns: names(instrumentRecord(new(journal.InstrumentRecord), b.set.now))}
			t := tables.Table{Columns: []tables.Column{{Head: "id"}, {Head: "instrument"}, {Head: "correction"}, {Head: "since"}, {Head: "state"}}}
			for _, rec := range list {
				sh.records = append(sh.records, instrumentRecord(rec, b.set.now))
				kind, state := rec.Instrument.Type, "in use"
				if rec.Instrument.Type != journal.Thermometer {
					kind = rec.Instrument.Type + " " + scaleSymbol(rec.Instrument.Scale) + " " + rec.Instrument.Basis
				}
				if rec.Retired != nil {
					state = "out of use"
				}
				text, since := inForce(rec, b.set.now)
				t.Rows = append(t.Rows, []string{rec.Instrument.ID, kind, text, day(since), state})
			}
			if len(t.Rows) == 0 {
				b.note("note: no instrument yet; gylebook instrument add registers one")
			} else {
				sh.tables = []tables.Table{t}
			}
			return b.print(sh)
		})
	})
}

// inForce is the correction of an instrument at a time in words, and since when.
func inForce(rec *journal.InstrumentRecord, at time.Time) (string, time.Time) {
	text, since := "none", time.Time{}
	deeds := history(rec)
	for _, d := range deeds {
		if !d.at.After(at) && d.correction != "" {
			text, since = d.correction, d.at
		}
	}
	return text, since
}

// deed is one entry in the life of an instrument.
type deed struct {
	number     int64
	at         time.Time
	by         string
	kind       string
	what       string
	correction string // that it brings into force; "" for none
}

// history is the life of an instrument in the order of time.
func history(rec *journal.InstrumentRecord) []deed {
	var all []deed
	for _, x := range rec.Certificates {
		span := x.Body.Points[0].Correction
		if n := len(x.Body.Points); n > 1 {
			span += " to " + x.Body.Points[n-1].Correction
		}
		what := "certificate, " + counted(len(x.Body.Points), "point")
		if x.Body.Reference != "" {
			what += ", " + x.Body.Reference
		}
		all = append(all, deed{x.Number, x.Body.At, x.By, "certificate", what, span})
	}
	for _, x := range rec.Checks {
		liquid := x.Body.Liquid
		if x.Body.Strength != "" {
			liquid += " " + x.Body.Strength + " %"
		}
		what := fmt.Sprintf("check in %s: found %s, expected %s at %s", liquid, x.Body.Found.Text, x.Body.Expected.Text, x.Body.Temp.Text)
		all = append(all, deed{x.Number, x.Body.At, x.By, "check", what, x.Body.Correction})
	}
	if x := rec.Retired; x != nil {
		all = append(all, deed{x.Number, x.Body.At, x.By, "retired", "out of use: " + x.Body.Reason, ""})
	}
	slices.SortStableFunc(all, func(x, y deed) int {
		if d := x.at.Compare(y.at); d != 0 {
			return d
		}
		return int(x.number - y.number)
	})
	return all
}

func (b *bench) instrumentShow() *cli.Command {
	return b.sub("instrument", &cli.Command{
		Name: "show", Usage: "one instrument with its checks and certificates", ArgsUsage: "ID",
	}, `gylebook instrument show H1
		gylebook instrument show H1 --json`, func(c *cli.Context) error {
		if c.Args().Len() != 1 {
			return wanted(c, "one id")
		}
		return b.withJournal(c.Context, func(s journal.Store) error {
			rec, err := instrumentBy(c.Context, s, c.Args().First())
			if err != nil {
				return err
			}
			return b.print(b.instrumentSheet(rec))
		})
	})
}

func (b *bench) instrumentSheet(rec *journal.InstrumentRecord) sheet {
	i := rec.Instrument
	s := sheet{name: "instrument-show", records: []tables.Record{instrumentRecord(rec, b.set.now)}}
	if b.set.format == tables.JSON {
		s.records[0] = append(s.records[0], historyFields(rec)...)
	}
	state := "in use since " + day(i.Since)
	if rec.Retired != nil {
		state = "out of use: " + rec.Retired.Body.Reason
	}
	text, since := inForce(rec, b.set.now)
	l := &tables.Ladder{Answer: []string{i.ID + " " + describe(i), state}}
	rung := func(name, value, remark string) {
		if value != "" {
			l.Rungs = append(l.Rungs, tables.Rung{Name: name, Value: value, Remark: remark})
		}
	}
	remark := "add it to the reading"
	if !since.IsZero() {
		remark += "; since " + day(since)
	}
	rung("correction", text, remark)
	rung("maximum error", i.MaxError, "of its maker")
	rung("stem", i.StemMM, "mm")
	rung("mass", i.MassG, "g")
	rung("tension", i.Tension, "mN/m, adjusted for")
	rung("read at", i.ReadAt, "of the meniscus")
	if i.Note != "" {
		l.Lines = append(l.Lines, i.Note)
	}
	s.ladder = l
	t := tables.Table{Columns: []tables.Column{{Head: "#", Align: tables.Right}, {Head: "when"}, {Head: "by"}, {Head: "correction"}, {Head: "what"}}}
	for _, d := range history(rec) {
		t.Rows = append(t.Rows, []string{fmt.Sprint(d.number), minuteText(d.at), d.by, d.correction, d.what})
	}
	if len(t.Rows) > 0 {
		s.tables = []tables.Table{b.hanging(t)}
	}
	return s
}
