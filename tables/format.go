package tables

import (
	"fmt"
	"strings"
)

// Format is a form of output.
type Format string

// The forms.
const (
	Text     Format = "text"
	JSON     Format = "json"
	CSV      Format = "csv"
	Markdown Format = "markdown"
)

// Formats lists the forms in order.
func Formats() []Format { return []Format{Text, JSON, CSV, Markdown} }

// ParseFormat reads the name of a form, in any case and with spaces around it.
// An unknown name is an error that lists the known ones.
func ParseFormat(s string) (Format, error) {
	known := make([]string, 0, 4)
	for _, f := range Formats() {
		if strings.EqualFold(strings.TrimSpace(s), string(f)) {
			return f, nil
		}
		known = append(known, string(f))
	}
	return "", fmt.Errorf("unknown format %.40q, known: %s", s, strings.Join(known, ", "))
}
