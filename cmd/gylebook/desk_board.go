package main

import (
	"context"
	"fmt"
	"maps"
	"slices"
	"strings"
	"sync"
	"sync/atomic"
	"time"

	"gylebook/gravity/method"
	"gylebook/tables/web"
)

// boardAsOf is the board as it was reckoned, and from which entry each of its
// vessels.
type boardAsOf struct {
	mu   sync.Mutex
	last atomic.Pointer[shownBoard]
	from asOf
	list []standing
	each map[string]int64
}

// shownBoard is a board that was fresh at a time.
type shownBoard struct {
	list []standing
	at   time.Time
}

// boardRests is for how long a board is shown to others while somebody has a newer one
// reckoned: they would wait for the forecasts of vessels that they do not look at.
const boardRests = 2 * time.Second

// Board implements web.Desk with what today says.
func (d *desk) Board(ctx context.Context) (web.Board, error) {
	if err := d.there(); err != nil {
		return web.Board{}, err
	}
	now := d.now()
	list, err := d.standings(ctx, now)
	if err != nil {
		return web.Board{}, refused(err)
	}
	board := web.Board{Title: "Open vessels"}
	attend := 0
	for _, s := range list {
		if s.rank < inCourse {
			attend++
		}
		board.Vessels = append(board.Vessels, vesselCard(s))
	}
	board.Notes = neutral([]method.Note{{Code: "board", Text: fmt.Sprintf("%d open; %d late, rising or standing high; %s", len(list), attend, now.Format("Mon 2 Jan 15:04"))}})
	return board, nil
}

// warm reckons what the first visitors ask for: the board, then the batches on it
// with their pictures, the one that needs attention first. What fails here fails again
// for the visitor, who is told.
func (d *desk) warm(ctx context.Context) {
	board, err := d.Board(ctx)
	if err != nil {
		return
	}
	for _, v := range board.Vessels[:min(mostBatches, len(board.Vessels))] {
		for _, phone := range []bool{true, false} {
			if _, err := d.Curve(ctx, v.Batch, "svg", phone); err != nil {
				return
			}
		}
	}
}

// standings are those of today. While only readings come, the vessels that they are
// of are reckoned anew.
func (d *desk) standings(ctx context.Context, now time.Time) ([]standing, error) {
	b := &d.board
	if !b.mu.TryLock() {
		if last := b.last.Load(); last != nil && time.Since(last.at) < boardRests {
			return last.list, nil
		}
		b.mu.Lock()
	}
	defer b.mu.Unlock()
	list, err := d.freshStandings(ctx, b, now)
	if err == nil {
		b.last.Store(&shownBoard{list, time.Now()})
	}
	return list, err
}

func (d *desk) freshStandings(ctx context.Context, b *boardAsOf, now time.Time) ([]standing, error) {
	journal, err := d.follow(ctx)
	if err != nil {
		return nil, err
	}
	if b.list == nil || !b.from.holds(journal.all, now) {
		list, err := standings(ctx, d.store, now, false)
		if err != nil {
			return nil, err
		}
		b.list, b.from, b.each = list, asOf{journal.all, now}, map[string]int64{}
		for _, s := range list {
			id := s.view.Record.Batch.ID
			b.each[id] = journal.bearing(id)
		}
		return list, nil
	}
	list, each := slices.Clone(b.list), maps.Clone(b.each) // somebody may be reading them
	anew := 0
	for k := range list {
		id := list[k].view.Record.Batch.ID
		if journal.bearing(id) == b.each[id] {
			continue
		}
		if list[k], err = d.standing(ctx, id, journal.all, now); err != nil {
			return nil, err
		}
		each[id] = journal.bearing(id)
		anew++
	}
	if anew > 0 {
		slices.SortStableFunc(list, byAttention)
		b.list, b.each = list, each
	}
	return b.list, nil
}

// standing is that of one batch.
func (d *desk) standing(ctx context.Context, id string, all int64, now time.Time) (standing, error) {
	rec, err := d.store.Batch(ctx, id)
	if err != nil {
		return standing{}, err
	}
	f, h, err := d.foresight(rec, all, now)
	if err != nil {
		return standing{}, err
	}
	return f.standing(rec, plainly(f.book), h, now), nil
}

// vesselCard is a line of today.
func vesselCard(s standing) web.Vessel {
	c := s.cells()
	v := web.Vessel{
		Name: c[0], Batch: s.view.Record.Batch.ID, Product: c[1], Symbol: s.symbol, Word: s.word,
		Gravity: c[4], Day: c[2], Hours: c[3], Fall: c[5], Apparent: c[6], Next: c[8], Attend: s.rank < inCourse,
	}
	var why []string
	for _, n := range s.notes {
		if n.Code != "no-forecast" {
			why = append(why, n.Text)
		}
	}
	v.Why = strings.Join(why, "; ")
	return v
}
