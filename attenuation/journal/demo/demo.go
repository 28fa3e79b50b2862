package demo

import (
	"cmp"
	"context"
	"fmt"
	"slices"
	"time"

	"gylebook/attenuation/journal"
)

// Summary says what was written.
type Summary struct {
	Cellar      string
	Entries     int64
	Instruments int
	Batches     int
	Open        int
	Readings    int // the void ones too
	Voids       int
	Stuck       []string  // batches that stopped high
	Low         []string  // batches read with H2 while it read low
	Cold        []string  // batches in a cold tank
	From, Until time.Time // first and last entry
}

// Write fills an empty journal with the demo season. It returns
// journal.ErrNotEmpty for a journal that is not empty, and the errors of the store.
// A failure on the way leaves what was written until then.
func Write(ctx context.Context, store journal.Store) (Summary, error) {
	items, sum, err := year()
	if err != nil {
		return Summary{}, err
	}
	for start := 0; start < len(items); {
		stop := group(items, start)
		last := items[stop-1].at
		bodies := make([]journal.Body, 0, stop-start)
		for _, it := range items[start:stop] {
			bodies = append(bodies, it.body)
		}
		// The round is typed in from the slate when it is over.
		_, err := store.Append(ctx, onDuty(last), last.Add(2*time.Minute), func(r journal.Reader) ([]journal.Body, error) {
			n, _, err := r.Head(ctx)
			if err != nil {
				return nil, err
			}
			if n != int64(start) {
				return nil, fmt.Errorf("%w: entry %d is the last, wanted %d", journal.ErrNotEmpty, n, start)
			}
			return bodies, nil
		})
		if err != nil {
			return Summary{}, err
		}
		start = stop
	}
	return sum, nil
}

// pause ends a group of entries that are typed in together.
const pause = 100 * time.Minute

func group(items []item, start int) int {
	k := start + 1
	for k < len(items) && items[k].at.Sub(items[k-1].at) < pause {
		k++
	}
	return k
}

// year returns the entries of the season in the order they are made; what would
// come after its end is left out.
func year() ([]item, Summary, error) {
	items := instruments()
	for k := range season {
		more, err := brewed(k)
		if err != nil {
			return nil, Summary{}, err
		}
		items = append(items, more...)
	}
	items = slices.DeleteFunc(items, func(i item) bool { return i.at.After(end) })
	items = sorted(items)
	sum := Summary{Cellar: Name, Entries: int64(len(items)), From: items[0].at, Until: items[len(items)-1].at}
	low := make(map[string]bool)
	for _, it := range items {
		switch b := it.body.(type) {
		case journal.Instrument:
			sum.Instruments++
		case journal.Batch:
			sum.Batches++
			sum.Open++
		case journal.Close:
			sum.Open--
		case journal.Void:
			sum.Voids++
		case journal.Reading:
			sum.Readings++
			if b.Instrument == cellar && !b.TakenAt.Before(slipped) && b.TakenAt.Before(checked) {
				low[b.Batch] = true
			}
		}
	}
	for _, p := range season {
		if p.stuck > 0 {
			sum.Stuck = append(sum.Stuck, p.id)
		}
		if p.cold {
			sum.Cold = append(sum.Cold, p.id)
		}
		if low[p.id] {
			sum.Low = append(sum.Low, p.id)
		}
	}
	return items, sum, nil
}

// sorted puts items in the order of time. A slip, its void and what replaces it
// are a minute apart, so another batch's reading may come between: each void finds
// its own entry again.
func sorted(items []item) []item {
	order := make([]int, len(items))
	for k := range order {
		order[k] = k
	}
	slices.SortStableFunc(order, func(a, b int) int { return cmp.Or(items[a].at.Compare(items[b].at), cmp.Compare(a, b)) })
	number := make([]int64, len(items)) // by place before sorting
	for n, k := range order {
		number[k] = int64(n + 1)
	}
	out := make([]item, len(items))
	for n, k := range order {
		out[n] = items[k]
		if v, ok := items[k].body.(journal.Void); ok && items[k].fixes {
			v.Entry = number[k-1]
			out[n].body = v
		}
	}
	return out
}
