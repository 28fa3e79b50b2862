package main

import (
	"fmt"
	"time"
)

// rowsProgress shows on a terminal how many rows are done, how fast, and how long
// the rest will take when the size of the input is known.
type rowsProgress struct {
	count *counter
	size  int64
	begun time.Time
}

func (b *bench) rowsProgress(size int64) *rowsProgress {
	return &rowsProgress{count: b.counter("rows"), size: size, begun: time.Now()}
}

func (p *rowsProgress) to(rows int, bytes int64) {
	if !p.count.on {
		return
	}
	p.count.what = rowsRate(rows, bytes, p.size, time.Since(p.begun))
	p.count.to(rows)
}

func (p *rowsProgress) end() { p.count.end() }

// rowsRate is what stands behind the number of rows.
func rowsRate(rows int, bytes, size int64, spent time.Duration) string {
	seconds := spent.Seconds()
	if seconds <= 0 {
		return "rows"
	}
	text := fmt.Sprintf("rows, %.0f a second", float64(rows)/seconds)
	if size > 0 && bytes > 0 {
		left := max(0, seconds*float64(size-bytes)/float64(bytes))
		text += fmt.Sprintf(", %2.0f %%, %.0f s left ", 100*min(1, float64(bytes)/float64(size)), left)
	}
	return text
}
