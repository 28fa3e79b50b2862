package sqlstore

import (
	"database/sql"
	"errors"
	"fmt"
	"time"
)

// Times are stored the way they are hashed: RFC 3339 with the offset that was
// typed.
func stamp(t time.Time) string { return t.Format(time.RFC3339Nano) }

// millisecond is the time that stamp's text means, in milliseconds since 1970 UTC.
// The text knows no offset finer than a minute.
func millisecond(t time.Time) int64 {
	_, offset := t.Zone()
	return t.Add(time.Duration(offset%60) * time.Second).UnixMilli()
}

// stampOf scans such a text.
type stampOf struct{ t *time.Time }

// Scan implements sql.Scanner.
func (s stampOf) Scan(src any) error {
	text, ok := src.(string)
	if !ok {
		return fmt.Errorf("read %T, wanted a time as text", src)
	}
	t, err := time.Parse(time.RFC3339Nano, text)
	*s.t = t
	return err
}

// optionalStamp scans such a text or nothing.
type optionalStamp struct{ t **time.Time }

// Scan implements sql.Scanner.
func (s optionalStamp) Scan(src any) error {
	if src == nil {
		*s.t = nil
		return nil
	}
	var t time.Time
	err := stampOf{&t}.Scan(src)
	*s.t = &t
	return err
}

// millisOf scans the milliseconds of a time that was scanned before it, and
// returns an error when they differ from it.
type millisOf struct{ of func() time.Time }

var errMillis = errors.New("the time for ordering is another than the time as text")

// Scan implements sql.Scanner.
func (m millisOf) Scan(src any) error {
	if ms, ok := src.(int64); !ok || ms != millisecond(m.of()) {
		return errMillis
	}
	return nil
}

// The text of an entry's own time, UTC with milliseconds.
const recordedLayout = "2006-01-02T15:04:05.000Z"

func recorded(t time.Time) string { return t.UTC().Format(recordedLayout) }

// recordedOf scans it.
type recordedOf struct{ t *time.Time }

// Scan implements sql.Scanner.
func (r recordedOf) Scan(src any) error {
	text, ok := src.(string)
	if !ok {
		return fmt.Errorf("read %T, wanted a time as text", src)
	}
	t, err := time.Parse(recordedLayout, text)
	*r.t = t
	return err
}

var (
	_ sql.Scanner = stampOf{}
	_ sql.Scanner = optionalStamp{}
	_ sql.Scanner = millisOf{}
	_ sql.Scanner = recordedOf{}
)
