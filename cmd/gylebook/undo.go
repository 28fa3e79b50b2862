package main

import (
	"errors"
	"fmt"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/tables"
)

func (b *bench) undoCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "undo", Usage: "take back your last entry; it stays in sight as void",
		Description: "The last entry of this operator that is not void. Nothing is erased.",
	}, `gylebook undo
		gylebook undo --operator anna`, func(c *cli.Context) error {
		if c.Args().Len() > 0 {
			return wanted(c, "none")
		}
		return b.withJournal(c.Context, func(s journal.Store) error {
			var last journal.Entry
			return b.takeBack(c, s, func(r journal.Reader) (journal.Void, error) {
				var err error
				last, err = r.LastBy(c.Context, b.by())
				if errors.Is(err, journal.ErrNotFound) {
					return journal.Void{}, dataError("gylebook void N --reason TEXT takes back any entry", "nothing of %.40s to take back", b.by())
				}
				return journal.Void{Entry: last.Number, Reason: "undo"}, err
			})
		})
	})
}

func (b *bench) voidCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "void", Usage: "take an entry out of the reckoning, with a reason", ArgsUsage: "N --reason TEXT",
		Description: "N is the number that was shown when it was entered. The entry stays in sight.",
		Flags:       []cli.Flag{&cli.StringFlag{Name: "reason", Usage: "`TEXT` why"}},
	}, `gylebook void 41 --reason "wrong tank"`, func(c *cli.Context) error {
		if c.Args().Len() != 1 {
			return wanted(c, "the number of one entry")
		}
		n, err := entryNumber(c.Args().First())
		if err != nil {
			return err
		}
		if c.String("reason") == "" {
			return usageError("", "--reason is missing; usage: gylebook void N --reason TEXT")
		}
		return b.withJournal(c.Context, func(s journal.Store) error {
			return b.takeBack(c, s, func(journal.Reader) (journal.Void, error) {
				return journal.Void{Entry: n, Reason: c.String("reason")}, nil
			})
		})
	})
}

// takeBack voids what choose names and says what it was.
func (b *bench) takeBack(c *cli.Context, s journal.Store, choose func(journal.Reader) (journal.Void, error)) error {
	entries, err := b.commit(c.Context, s, func(r journal.Reader) ([]journal.Body, error) {
		v, err := choose(r)
		if err != nil {
			return nil, err
		}
		return []journal.Body{v}, nil
	})
	if err != nil {
		return err
	}
	v, ok := entries[0].Body.(journal.Void)
	if !ok {
		return &exitError{exitFailed, fmt.Sprintf("entry %d is no void", entries[0].Number), ""}
	}
	old, err := s.Entry(c.Context, v.Entry)
	if err != nil {
		return err
	}
	about, what := entryText(old)
	rec := entryRecord(entries[0], about, nil)
	rec = append(rec[:len(rec)-1], tables.Record{
		{Name: "voided_entry", Value: int(v.Entry)},
		{Name: "voided_kind", Value: string(old.Body.Kind())},
		{Name: "voided", Value: what},
		{Name: "reason", Value: v.Reason},
		rec[len(rec)-1],
	}...)
	return b.print(sheet{
		name: "void", records: []tables.Record{rec},
		ladder: &tables.Ladder{Answer: []string{fmt.Sprintf("void: entry %d, %s (%s)", v.Entry, what, v.Reason)}},
	})
}

// entryText is what an entry is about and what it said, in a few words.
func entryText(e journal.Entry) (about, what string) {
	on := func(t time.Time) string { return ", " + minuteText(t) }
	switch x := e.Body.(type) {
	case journal.Instrument:
		return x.ID, "instrument " + x.ID
	case journal.Certificate:
		return x.Instrument, "certificate of " + x.Instrument + on(x.At)
	case journal.Check:
		return x.Instrument, "check of " + x.Instrument + " in " + x.Liquid + on(x.At)
	case journal.Retire:
		return x.Instrument, x.Instrument + " out of use: " + x.Reason
	case journal.Batch:
		return x.ID, "batch " + x.ID + " " + x.Product
	case journal.OG:
		return x.Batch, "original gravity " + x.Gravity.Text + " of " + x.Batch
	case journal.Limit:
		return x.Batch, "limit " + x.Gravity.Text + " of " + x.Batch
	case journal.Close:
		return x.Batch, "close of " + x.Batch
	case journal.Reading:
		return x.Batch, "reading " + x.Gravity.Text + " at " + x.Temp.Text + " of " + x.Batch + on(x.TakenAt)
	case journal.Event:
		return x.Batch, x.Batch + " " + eventText(x)
	}
	return "", string(e.Body.Kind())
}
