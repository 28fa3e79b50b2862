package main

import (
	"context"
	"fmt"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/gravity/asread"
)

func (b *bench) batchOG() *cli.Command {
	return b.sub("batch", &cli.Command{
		Name: "og", Usage: "enter an original gravity; several are averaged", ArgsUsage: "BATCH READING [TEMP]",
		Description: "Without a temperature it is one already corrected.",
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "instrument", Usage: "`ID` with which it was read"},
			&cli.StringFlag{Name: "at", Aliases: orTaken, Usage: "`TIME` now unless given"},
		},
	}, `gylebook batch og B26-014 1.0485 20
		gylebook batch og T4 12.0P`,
		func(c *cli.Context) error {
			args := asread.Join(c.Args().Slice())
			if len(args) < 2 || len(args) > 3 {
				return wanted(c, "a batch, a reading and its temperature")
			}
			temp := ""
			if len(args) == 3 {
				temp = args[2]
			}
			return b.amend(c, args[0], func(s journal.Store, rec *journal.Record, at time.Time) (journal.Body, string, error) {
				og, err := b.ogOf(c, s, args[1], temp, at)
				og.Batch, og.At = rec.Batch.ID, at
				return og, "original gravity", err
			})
		})
}

func (b *bench) batchLimit() *cli.Command {
	return b.sub("batch", &cli.Command{
		Name: "limit", Usage: "enter the limit of attenuation, by a forced ferment", ArgsUsage: "BATCH GRAVITY",
		Description: "The gravity, already corrected, at which a forced ferment of the same wort stood still.",
		Flags:       []cli.Flag{&cli.StringFlag{Name: "at", Aliases: orTaken, Usage: "`TIME` now unless given"}},
	}, `gylebook batch limit B26-014 1.009
		gylebook batch limit T4 2.0P`,
		func(c *cli.Context) error {
			args := asread.Join(c.Args().Slice())
			if len(args) != 2 {
				return wanted(c, "a batch and a gravity")
			}
			return b.amend(c, args[0], func(s journal.Store, rec *journal.Record, at time.Time) (journal.Body, string, error) {
				return b.forcedLimit(c.Context, s, rec, at, args[1])
			})
		})
}

func (b *bench) batchClose() *cli.Command {
	return b.sub("batch", &cli.Command{
		Name: "close", Usage: "end a batch; its vessel is free again", ArgsUsage: "BATCH",
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "at", Aliases: orTaken, Usage: "`TIME` now unless given"},
			&cli.StringFlag{Name: "note", Usage: "`TEXT` why, where to"},
		},
	}, `gylebook batch close B26-014 --note "racked to cask"`,
		func(c *cli.Context) error {
			if c.Args().Len() != 1 {
				return wanted(c, "one batch")
			}
			return b.amend(c, c.Args().First(), func(_ journal.Store, rec *journal.Record, at time.Time) (journal.Body, string, error) {
				id := rec.Batch.ID
				if last := lastOf(rec); last.After(at) {
					return nil, "", dataError("close it after that, or void what was not of this batch",
						"closing at %s, wanted a time after the last entry of %s, %s", minuteText(at), id, minuteText(last))
				}
				return journal.Close{Batch: id, At: at, Note: c.String("note")}, "closed", nil
			})
		})
}

// lastOf is the time of the last reading or event that counts.
func lastOf(rec *journal.Record) time.Time {
	var last time.Time
	for _, r := range rec.Readings {
		if !r.Void && r.Body.TakenAt.After(last) {
			last = r.Body.TakenAt
		}
	}
	for _, e := range rec.Events {
		if !e.Void && e.Body.At.After(last) {
			last = e.Body.At
		}
	}
	return last
}

// orTaken is what readings call the time of what was done.
var orTaken = []string{"taken"}

// amend adds one entry to a batch and shows how it stands after it.
func (b *bench) amend(c *cli.Context, name string, body func(s journal.Store, rec *journal.Record, at time.Time) (journal.Body, string, error)) error {
	at, err := b.past(c, "at")
	if err != nil {
		return err
	}
	return b.withJournal(c.Context, func(s journal.Store) error {
		rec, err := batchBy(c.Context, s, name)
		if err != nil {
			return err
		}
		one, what, err := body(s, rec, at)
		if err != nil {
			return err
		}
		e, err := b.commitOne(c.Context, s, one)
		if err != nil {
			return err
		}
		return b.showBatch(c.Context, s, "batch-"+string(one.Kind()), e, rec.Batch.ID, fmt.Sprintf("%s, %s", rec.Batch.ID, what))
	})
}

// showBatch derives a batch after an entry and says in a line or two how it
// stands.
func (b *bench) showBatch(ctx context.Context, s journal.Store, name string, e journal.Entry, id, text string) error {
	rec, err := s.Batch(ctx, id)
	if err != nil {
		return err
	}
	book, err := bookOf(ctx, s)
	if err != nil {
		return err
	}
	view := journal.DeriveLast(rec, book, 2)
	return b.print(afterSheet(name, e, view, text))
}
