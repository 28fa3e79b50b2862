package main

import (
	"context"
	"runtime"
	"slices"
	"sync"
	"time"

	"github.com/urfave/cli/v2"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/outlook"
)

func (b *bench) todayCommand() *cli.Command {
	return b.command(&cli.Command{
		Name: "today", Usage: "open batches, the one that needs attention first",
		Description: `The order: no reading for longest, for its stage (1.5 times what is usual: 24 h while it falls, 72 h once it
			falls by less than 1 point in 24 h, 168 h from day 30 on); rising; not falling though far above the expected (the
			limit of attenuation, else 50 % apparent attenuation) or stalled; then by hours since the last reading. From three
			readings on the word is that of gylebook terminal, and next is the gravity that the forecast expects now. Before, and
			where a batch is late, rises or stands high, the word comes from the readings alone: unchanged is within 0.5 point. A
			word approves of nothing; --explain says why there is no forecast.`,
		Flags: []cli.Flag{
			&cli.StringFlag{Name: "at", Usage: "`TIME` as the journal stood then: 2026-10-24 12:00, yesterday 18:30"},
		},
	}, `gylebook today
		gylebook today --at "yesterday 18:00"
		gylebook today --json`, b.today)
}

func (b *bench) today(c *cli.Context) error {
	if c.Args().Len() > 0 {
		return usageError("", "read %s, wanted none; usage: gylebook today [--at TIME]", count(c.Args().Len(), "value", "values"))
	}
	at, err := b.at(c, "at")
	if err != nil {
		return err
	}
	defer b.hasty()()
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
	f, err := newForesight(ctx, r, at, outlook.Drink{})
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
	plain := plainly(f.book)
	list := make([]standing, len(open))
	// Histories are read one after the other, and in the meantime the batches of those
	// that are known are judged.
	var work sync.WaitGroup
	jobs := make(chan func(), len(open))
	for range runtime.GOMAXPROCS(0) {
		work.Go(func() {
			for do := range jobs {
				do()
			}
		})
	}
	for i, rec := range open {
		var h outlook.History
		if h, err = f.history(rec); err != nil {
			break
		}
		one := func() { list[i] = f.standing(rec, plain, h, at) }
		if blended(rec) {
			one() // the book asks the reader about the other batch, and that stays in here
		} else {
			jobs <- one
		}
	}
	close(jobs)
	work.Wait()
	if err != nil {
		return nil, err
	}
	slices.SortStableFunc(list, byAttention)
	return list, ctx.Err()
}

// plainly is a book without uncertainties, for what shows none.
func plainly(book *journal.Book) *journal.Book {
	plain := *book
	plain.Plain = true
	return &plain
}

// standing is one of standings.
func (f *foresight) standing(rec *journal.Record, plain *journal.Book, h outlook.History, at time.Time) standing {
	s := standingOf(journal.DeriveLast(rec, plain, 3), at)
	e, err := outlook.EvidenceOf(f.view(rec), h, at, false)
	s.foresee(e, err)
	return s
}

func blended(rec *journal.Record) bool {
	return slices.ContainsFunc(rec.Events, func(e journal.Numbered[journal.Event]) bool { return e.Body.What == journal.Blend })
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
		open = append(open, cutAt(rec, at))
	}
	return open, nil
}
