package main

import (
	"math"
	"time"

	"gylebook/attenuation/journal"
)

// prompt is where one stands, what is in there and its last reading. On a line of
// width it leaves room for the values.
func prompt(s *stop, v journal.View, now time.Time, width int) string {
	text := clip(s.name(), 12) + " " + clip(v.Record.Batch.Product, min(24, max(8, width-52))) + ", "
	last := v.Last()
	if last == nil {
		return text + "no reading > "
	}
	return text + fixed(float64(last.SG), 4) + " " + ago(last.Source.TakenAt, now) + " > "
}

// ago is a time as people on the same clock say it.
func ago(t, now time.Time) string {
	t, now = t.In(time.Local), now.In(time.Local)
	midnight := func(t time.Time) time.Time { return time.Date(t.Year(), t.Month(), t.Day(), 0, 0, 0, 0, time.UTC) }
	switch days := int(math.Round(midnight(now).Sub(midnight(t)).Hours() / 24)); {
	case days == 0:
		return "today " + t.Format("15:04")
	case days == 1:
		return "yesterday " + t.Format("15:04")
	case days > 1 && days < 7:
		return t.Format("Mon 15:04")
	}
	return t.Format("2006-01-02")
}
