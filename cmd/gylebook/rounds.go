package main

import (
	"cmp"
	"errors"
	"os"
	"slices"
	"strings"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/gravity/method"
	"gylebook/tables"
)

func (b *bench) roundsCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "rounds", Usage: "walk the open vessels, one short line each",
		Description: `Vessels come in the order of the floor, T2 before T10. Type the reading and its temperature; a reading alone
			takes the last temperature typed. Enter skips, u takes the last entry of this round back, ? explains, q ends. Each
			accepted line is on disk before it is echoed. In a pipe the lines are VESSEL READING TEMP.`,
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "instrument", Usage: "`ID` with which all are read; none for none of the journal's"},
			&cli.BoolFlag{Name: "gassy", Usage: "the samples are not degassed"},
		},
	}, `gylebook rounds
		gylebook rounds --instrument H2
		gylebook rounds < morning.txt`, b.rounds)
}

func (b *bench) rounds(c *cli.Context) error {
	if c.Args().Len() > 0 {
		return usageError("for one reading: gylebook log VESSEL READING TEMP", "read %s, wanted none; usage: gylebook rounds", count(c.Args().Len(), "value", "values"))
	}
	return b.withJournal(c.Context, func(s journal.Store) error {
		open, err := s.OpenLast(c.Context, 0)
		if err != nil {
			return err
		}
		r := &round{bench: b, ctx: c.Context, store: s, instrument: c.String("instrument"), gassy: c.Bool("gassy")}
		for _, rec := range open {
			r.stops = append(r.stops, &stop{batch: rec.Batch.ID, vessel: vesselOf(rec)})
		}
		slices.SortFunc(r.stops, inFloorOrder)
		if len(r.stops) == 0 {
			return r.end()
		}
		b.noteAs("caution", cautionRounds)
		if b.interactive() {
			err = r.walk()
		} else {
			err = r.pipe()
		}
		if err != nil && !errors.Is(err, errShown) {
			return err
		}
		if ended := r.end(); ended != nil {
			return ended
		}
		return err
	})
}

var cautionRounds = caution("fermenting rooms can hold dangerous CO2; ventilate, follow site rules; do not return samples to the vessel")

// noteAs puts one note on stderr, wrapped.
func (b *bench) noteAs(kind string, n method.Note) {
	for i, line := range tables.Wrap(kind+": "+n.Text, max(b.set.width-2, 40)) {
		if i > 0 {
			line = "  " + line
		}
		b.note("%s", line)
	}
}

// stop is one vessel of a round.
type stop struct {
	batch, vessel string
	read          int // entries of this round that stand
	passed        bool
}

// name is what the vessel is called; a batch without one goes by its id.
func (s *stop) name() string { return cmp.Or(s.vessel, s.batch) }

// inFloorOrder puts vessels in natural order, batches without one last.
func inFloorOrder(a, b *stop) int {
	if (a.vessel == "") != (b.vessel == "") {
		return cmp.Compare(b.vessel, a.vessel)
	}
	return cmp.Or(naturalCompare(a.vessel, b.vessel), naturalCompare(a.batch, b.batch))
}

// tick sets "now": a round takes its time. SOURCE_DATE_EPOCH holds it still.
func (b *bench) tick() {
	if os.Getenv("SOURCE_DATE_EPOCH") == "" {
		b.set.now = time.Now()
	}
}

// typed reads one reading of this moment of the vessel or batch with this name.
func (r *round) typed(name, reading, temp string) (journal.Reading, error) {
	r.tick()
	return r.typedReading(r.ctx, r.store, toLog{
		name: name, reading: reading, temp: temp, at: r.set.now.In(time.Local).Truncate(time.Second), quality: journal.Exact,
		instrument: r.instrument, gassy: r.gassy,
	})
}

// log writes one reading and shows the notes on it; the cautions of a round stand
// at its start.
func (r *round) log(name string, reading journal.Reading) (logged, error) {
	done, err := r.logTyped(r.ctx, r.store, name, reading, nil, false)
	if err != nil {
		return done, err
	}
	for _, n := range append(r.bench.notes, done.notes...) {
		if n.Code != method.Caution {
			r.noteAs("note", n)
		}
	}
	r.bench.notes = nil
	return done, nil
}

// pipe reads lines VESSEL READING TEMP.
func (r *round) pipe() error {
	return r.eachLine(func(fields []string) error {
		if len(fields) != 3 {
			return dataError("", "read %s, wanted VESSEL READING TEMP", count(len(fields), "value", "values"))
		}
		reading, err := r.typed(fields[0], fields[1], fields[2])
		if err != nil {
			return err
		}
		done, err := r.log(fields[0], reading)
		var hold *journal.Hold
		if errors.As(err, &hold) && !hold.Final {
			hint := "keep it as suspect: gylebook log " + strings.Join(fields, " ") + " --keep REASON"
			if hold.Closer != "" {
				hint = "log it to " + nameOf(hold) + " if it is that one, or " + hint
			}
			return dataError(hint, "%v", hold)
		}
		if err != nil {
			return err
		}
		return r.keep(done, "")
	})
}
