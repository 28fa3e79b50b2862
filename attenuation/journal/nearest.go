package journal

import (
	"cmp"
	"slices"
	"strings"
)

// Nearest returns at most n of ids, the most alike to id first: by the number of
// letters to put in, take out, change or swap with their neighbour, capitals not
// counting; equals by name.
func Nearest(id string, ids []string, n int) []string {
	type candidate struct {
		id       string
		distance int
	}
	want := folded(id)
	list := make([]candidate, 0, len(ids))
	for _, c := range ids {
		list = append(list, candidate{c, distance(want, folded(c))})
	}
	slices.SortFunc(list, func(a, b candidate) int {
		return cmp.Or(cmp.Compare(a.distance, b.distance), strings.Compare(a.id, b.id))
	})
	near := make([]string, 0, max(0, min(n, len(list))))
	for _, c := range list {
		if len(near) >= n {
			break
		}
		if !slices.Contains(near, c.id) {
			near = append(near, c.id)
		}
	}
	return near
}

// folded is an id in small letters, cut where no id reaches.
func folded(id string) []rune {
	r := []rune(strings.ToLower(id))
	return r[:min(len(r), 2*maxID)]
}

// distance is the optimal string alignment distance.
func distance(a, b []rune) int {
	before, row, next := []int(nil), make([]int, len(b)+1), make([]int, len(b)+1)
	for j := range row {
		row[j] = j
	}
	for i := 1; i <= len(a); i++ {
		next[0] = i
		for j := 1; j <= len(b); j++ {
			change := 1
			if a[i-1] == b[j-1] {
				change = 0
			}
			next[j] = min(row[j]+1, next[j-1]+1, row[j-1]+change)
			if before != nil && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				next[j] = min(next[j], before[j-2]+1)
			}
		}
		if before == nil {
			before = make([]int, len(b)+1)
		}
		before, row, next = row, next, before
	}
	return row[len(b)]
}
