package main

import (
	"context"
	"errors"
	"fmt"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/tables"
)

func (b *bench) undoCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "undo", Usage: "take back your last command; it stays in sight as void",
		Description: "All that the last command of this operator wrote, if it is not void. Nothing is erased.",
	}, `gylebook undo
		gylebook undo --operator anna`, func(c *cli.Context) error {
		if c.Args().Len() > 0 {
			return wanted(c, "none")
		}
		return b.withJournal(c.Context, func(s journal.Store) error {
			whole := func(r journal.Reader) ([]journal.Body, error) { return b.lastCommand(c.Context, r) }
			err := b.takeBack(c, s, whole)
			if errors.Is(err, journal.ErrVoided) {
				// A part of it was voided by itself: the rest goes one by one.
				err = b.takeBack(c, s, func(r journal.Reader) ([]journal.Body, error) {
					bodies, err := whole(r)
					return bodies[:min(1, len(bodies))], err
				})
			}
			return err
		})
	})
}

// lastCommand voids what the last command of this operator wrote, newest first. Two
// commands write two entries: a batch with its original gravity, and a reading with
// the addition that was typed when it was held.
func (b *bench) lastCommand(ctx context.Context, r journal.Reader) ([]journal.Body, error) {
	last, err := r.LastBy(ctx, b.by())
	if errors.Is(err, journal.ErrNotFound) {
		return nil, dataError("gylebook void N --reason TEXT takes back any entry", "nothing of %.40s to take back", b.by())
	}
	if err != nil {
		return nil, err
	}
	bodies := []journal.Body{journal.Void{Entry: last.Number, Reason: "undo"}}
	if last.Number == 1 {
		return bodies, nil
	}
	before, err := r.Entry(ctx, last.Number-1)
	if err == nil && before.By == last.By && before.RecordedAt.Equal(last.RecordedAt) && together(before.Body, last.Body) {
		bodies = append(bodies, journal.Void{Entry: before.Number, Reason: "undo"})
	}
	return bodies, err
}

// together reports whether one command can have written both.
func together(before, last journal.Body) bool {
	switch x := last.(type) {
	case journal.OG:
		batch, ok := before.(journal.Batch)
		return ok && batch.ID == x.Batch && x.At.Equal(batch.Opened)
	case journal.Reading:
		event, ok := before.(journal.Event)
		return ok && event.Batch == x.Batch && event.At.Equal(x.TakenAt.Add(-addedBefore))
	}
	return false
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
			return b.takeBack(c, s, func(journal.Reader) ([]journal.Body, error) {
				return []journal.Body{journal.Void{Entry: n, Reason: c.String("reason")}}, nil
			})
		})
	})
}

// takeBack voids what choose names and says what it was.
func (b *bench) takeBack(c *cli.Context, s journal.Store, choose func(journal.Reader) ([]journal.Body, error)) error {
	entries, err := b.commit(c.Context, s, func(r journal.Reader) ([]journal.Body, error) {
		bodies, err := choose(r)
		if err == nil {
			err = afterVoids(c.Context, r, bodies)
		}
		return bodies, err
	})
	if err != nil {
		return err
	}
	sh := sheet{name: "void", ladder: &tables.Ladder{}}
	for _, e := range entries {
		v, ok := e.Body.(journal.Void)
		if !ok {
			return &exitError{exitFailed, fmt.Sprintf("entry %d is no void", e.Number), ""}
		}
		old, err := s.Entry(c.Context, v.Entry)
		if err != nil {
			return err
		}
		about, what := entryText(old)
		rec := entryRecord(e, about, nil)
		rec = append(rec[:len(rec)-1], tables.Record{
			{Name: "voided_entry", Value: int(v.Entry)},
			{Name: "voided_kind", Value: string(old.Body.Kind())},
			{Name: "voided", Value: what},
			{Name: "reason", Value: v.Reason},
			rec[len(rec)-1],
		}...)
		sh.records = append(sh.records, rec)
		line := numberedLine(fmt.Sprintf("void: entry %d, %s (%s)", v.Entry, what, v.Reason), e)
		if len(sh.ladder.Answer) == 0 {
			sh.ladder.Answer = []string{line}
		} else {
			sh.ladder.Lines = append(sh.ladder.Lines, line)
		}
	}
	return b.print(sh)
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
	case journal.Volume:
		return x.Batch, "volume " + x.Volume + " L of " + x.Batch
	case journal.Close:
		return x.Batch, "close of " + x.Batch
	case journal.Reading:
		return x.Batch, "reading " + x.Gravity.Text + " at " + x.Temp.Text + " of " + x.Batch + on(x.TakenAt)
	case journal.Event:
		return x.Batch, x.Batch + " " + eventText(x)
	}
	return "", string(e.Body.Kind())
}
