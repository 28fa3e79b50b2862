package main

import (
	"context"
	"slices"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
)

func (b *bench) todayCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "today", Usage: "open batches, the one that needs attention first",
		Description: `The order: no reading for longest, for its stage (1.5 times what is usual: 24 h while it falls, 72 h once it
			falls by less than 1 point in 24 h, 168 h from day 30 on); rising; not falling though far above the expected (the
			limit of attenuation, else 50 % apparent attenuation); then by hours since the last reading. The words come from
			the readings alone and approve of nothing; unchanged means within 0.5 point.`,
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "at", Usage: "`TIME` as the journal stood then: 2026-10-24 12:00, yesterday 18:30"},
		},
	}, `gylebook today
		gylebook today --at "yesterday 18:00"
		gylebook today --json`, b.today)
}

func (b *bench) today(c *cli.Context) error {
	if c.Args().Len() > 0 {
		return usageError("", "read %d values, wanted none; usage: gylebook today [--at TIME]", c.Args().Len())
	}
	at, err := b.at(c, "at")
	if err != nil {
		return err
	}
	return b.withJournal(c.Context, func(s journal.Store) error {
		list, err := standings(c.Context, s, at, c.IsSet("at"))
		if err != nil {
			return err
		}
		return b.print(b.todaySheet(list, at))
	})
}

// standings are the open batches at a time, those that want attention first.
// With past set the journal is taken as it stood then.
func standings(ctx context.Context, r journal.Reader, at time.Time, past bool) ([]standing, error) {
	book, err := bookOf(ctx, r)
	if err != nil {
		return nil, err
	}
	var open []*journal.Record
	if past {
		open, err = openAt(ctx, r, at)
	} else {
		open, err = r.Open(ctx)
	}
	if err != nil {
		return nil, err
	}
	list := make([]standing, len(open))
	for i, rec := range open {
		list[i] = standingOf(journal.DeriveLast(rec, book, 3), at)
	}
	slices.SortStableFunc(list, byAttention)
	return list, nil
}

// openAt returns the batches that were open at a time, without what came later.
func openAt(ctx context.Context, r journal.Reader, at time.Time) ([]*journal.Record, error) {
	var open []*journal.Record
	for rec, err := range r.Batches(ctx, journal.Filter{}) {
		if err != nil {
			return nil, err
		}
		if rec.Batch.Opened.After(at) || rec.Closed != nil && !rec.Closed.Body.At.After(at) {
			continue
		}
		then := *rec
		then.Closed = nil
		then.OGs = until(rec.OGs, at, func(o journal.OG) time.Time { return o.At })
		then.Limits = until(rec.Limits, at, func(l journal.Limit) time.Time { return l.At })
		then.Readings = until(rec.Readings, at, func(r journal.Reading) time.Time { return r.TakenAt })
		then.Events = until(rec.Events, at, func(e journal.Event) time.Time { return e.At })
		open = append(open, &then)
	}
	return open, nil
}

func until[B any](list []journal.Numbered[B], at time.Time, of func(B) time.Time) []journal.Numbered[B] {
	return slices.DeleteFunc(slices.Clone(list), func(n journal.Numbered[B]) bool { return of(n.Body).After(at) })
}
