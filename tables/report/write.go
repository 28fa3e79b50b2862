package report

import (
	"bytes"
	"fmt"
	"html/template"
	"io"
	"time"
)

// write renders into memory first, so that a failure leaves no half document.
func write(w io.Writer, of func() *template.Template, data any) error {
	var b bytes.Buffer
	t := of()
	if err := t.Execute(&b, data); err != nil {
		return fmt.Errorf("%s: %w", t.Name(), err)
	}
	n, err := w.Write(b.Bytes())
	if err == nil && n < b.Len() {
		err = io.ErrShortWrite
	}
	return err
}

func madeAt(text string) (time.Time, error) {
	at, err := time.Parse(time.RFC3339, text)
	if err != nil {
		return at, fmt.Errorf("made: read %.40q, wanted a time as in RFC 3339, such as 2026-03-01T08:30:00Z", text)
	}
	return at, nil
}

// shown is the time for people, with its offset.
func shown(at time.Time) string {
	if _, offset := at.Zone(); offset == 0 {
		return at.Format("2006-01-02 15:04") + " UTC"
	}
	return at.Format("2006-01-02 15:04 -07:00")
}
