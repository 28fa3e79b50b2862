package main

import (
	"context"
	"fmt"
	"maps"
	"slices"
	"strings"
	"sync"
	"time"

	"gylebook/gravity/method"
	"gylebook/tables/web"
)

// boardAsOf is the board as it was reckoned, and from which entry each of its
// vessels.
type boardAsOf struct {
	mu   sync.Mutex
	from asOf
	list []standing
	each map[string]int64
}

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

// standings are those of today. While only readings come, the vessels that they are
// of are reckoned anew.
func (d *desk) standings(ctx context.Context, now time.Time) ([]standing, error) {
	b := &d.board
	b.mu.Lock()
	defer b.mu.Unlock()
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
