package journal

import (
	"fmt"
	"regexp"
	"strings"
	"sync"
	"time"
)

// TimeError says that a text is no time, or not one time. Hint says what to type.
type TimeError struct {
	Read   string // as typed, trimmed
	Wanted string
	Advice string
}

func (e *TimeError) Error() string { return fmt.Sprintf("read %.40q, wanted %s", e.Read, e.Wanted) }

// Hint says what to type instead.
func (e *TimeError) Hint() string { return e.Advice }

// Layouts of a day and of a time of day, as people write them.
var (
	dayLayouts   = []string{"2006-01-02", "2.1.2006"}
	clockLayouts = []string{"15:04", "15:04:05"}
)

// Made when they are first asked: most commands read no time.
var (
	offsetAtEnd = sync.OnceValue(func() *regexp.Regexp { return regexp.MustCompile(`\s*([+-]\d{2}:\d{2}|Z)$`) })
	onlyDay     = sync.OnceValue(func() *regexp.Regexp {
		return regexp.MustCompile(`^(\d{4}-\d{2}-\d{2}|\d{1,2}\.\d{1,2}\.\d{4}|today|yesterday)$`)
	})
)

// ParseTime reads a time: RFC 3339, "2026-10-24 12:00", "24.10.2026 12:00" (the day
// first), "12:00" (today in loc, even when that is still to come), "today 12:00",
// "yesterday 18:30" or "now". An offset such as +02:00 may follow any clock time;
// without one the time is local in loc. A local time that a change of the clocks
// makes happen twice, or not at all, is refused. The error is a *TimeError.
func ParseTime(text string, loc *time.Location, now time.Time) (time.Time, error) {
	if loc == nil {
		loc = time.UTC
	}
	in := strings.TrimSpace(text)
	if len(in) > 64 {
		return time.Time{}, &TimeError{in, "a date and a time", timeAdvice}
	}
	if in == "now" {
		return now.In(loc), nil
	}
	body, offset := in, ""
	if m := offsetAtEnd().FindStringSubmatch(in); m != nil && strings.Contains(in, ":") {
		body, offset = strings.TrimSuffix(in, m[0]), m[1]
	}
	wall, ok := wallClock(body, now.In(loc))
	if !ok {
		wanted, advice := "a date and a time", timeAdvice
		if onlyDay().MatchString(in) {
			wanted, advice = "the time of day too", "type "+in+" 12:00"
		}
		return time.Time{}, &TimeError{in, wanted, advice}
	}
	if offset != "" {
		zone, err := time.Parse("Z07:00", offset)
		if err != nil {
			return time.Time{}, &TimeError{in, "an offset such as +02:00", timeAdvice}
		}
		y, mo, d := wall.Date()
		h, mi, s := wall.Clock()
		return bounded(in, time.Date(y, mo, d, h, mi, s, wall.Nanosecond(), zone.Location()))
	}
	switch at := instants(wall, loc); len(at) {
	case 1:
		return bounded(in, at[0])
	case 0:
		return time.Time{}, &TimeError{
			in, "a time that exists: the clocks are put forward over it",
			fmt.Sprintf("%s does not exist: type the time that the clock showed, or add an offset", in),
		}
	default:
		a, b := at[0].Format("-07:00"), at[1].Format("-07:00")
		return time.Time{}, &TimeError{
			in, "an offset, " + a + " or " + b + ": the clocks are put back over it",
			fmt.Sprintf("%s happens twice: add %s or %s", in, a, b),
		}
	}
}

const timeAdvice = `type 2026-10-24 12:00, 24.10.2026 12:00, 12:00 for today, or "yesterday 18:30"`

func bounded(in string, t time.Time) (time.Time, error) {
	if checkTime("time", t) != nil {
		return time.Time{}, &TimeError{in, "a year from 1900 to 9999", timeAdvice}
	}
	return t, nil
}

// wallClock reads what the clock and the calendar on the wall show, as if in UTC.
func wallClock(text string, now time.Time) (time.Time, bool) {
	// RFC 3339 has a T where people have a space.
	if len(text) > 10 && text[10] == 'T' {
		text = text[:10] + " " + text[11:]
	}
	day, clock, both := strings.Cut(text, " ")
	if !both {
		day, clock = "today", text
	}
	var date time.Time
	switch day {
	case "today":
		date = now
	case "yesterday":
		date = now.AddDate(0, 0, -1)
	default:
		var ok bool
		if date, ok = parseAny(dayLayouts, day); !ok {
			return time.Time{}, false
		}
	}
	t, ok := parseAny(clockLayouts, strings.TrimSpace(clock))
	y, m, d := date.Date()
	return time.Date(y, m, d, t.Hour(), t.Minute(), t.Second(), t.Nanosecond(), time.UTC), ok
}

func parseAny(layouts []string, text string) (time.Time, bool) {
	for _, l := range layouts {
		if t, err := time.Parse(l, text); err == nil {
			return t, true
		}
	}
	return time.Time{}, false
}

// instants returns every time at which the clocks of loc show wall, the earlier
// first. The offsets in force a day before and a day after are all there can be.
func instants(wall time.Time, loc *time.Location) []time.Time {
	var found []time.Time
	for _, days := range []int{-1, 1} {
		_, offset := wall.AddDate(0, 0, days).In(loc).Zone()
		t := wall.Add(-time.Duration(offset) * time.Second).In(loc)
		if _, o := t.Zone(); o == offset && (len(found) == 0 || !found[0].Equal(t)) {
			found = append(found, t)
		}
	}
	return found
}
