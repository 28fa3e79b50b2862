package web

import (
	"fmt"
	"net/http"
	"net/url"
	"strings"
	"unicode"
	"unicode/utf8"
)

// Bounds of what a form may hold.
const (
	maxFields = 24
	maxValue  = 120 // characters
	maxText   = 500 // of a note or a reason
	maxName   = 60  // of an operator
)

// values are the fields of a form, each once.
type values map[string]string

// badForm is a form that no page of ours has sent.
func badForm(format string, args ...any) *Refused {
	return &Refused{Status: http.StatusBadRequest, Text: fmt.Sprintf(format, args...), Hint: "go back and type it again"}
}

// parseForm reads fields in the form of a URL's query. Spaces around a value go,
// and a tab or a line end in it, which comes with pasting, is a space. Other control
// characters and marks that reorder text are refused, and so is a field that comes
// twice: which of the two would count?
func parseForm(raw string) (values, error) {
	parsed, err := url.ParseQuery(raw)
	if err != nil {
		return nil, badForm("the form cannot be read")
	}
	if len(parsed) > maxFields {
		return nil, badForm("read a form of %d fields, wanted at most %d", len(parsed), maxFields)
	}
	v := values{}
	for name, all := range parsed {
		if len(name) > 40 || len(all) != 1 {
			return nil, badForm("read the field %.40q %d times, wanted it once", name, len(all))
		}
		value, err := cleanValue(all[0])
		if err != nil {
			return nil, badForm("field %.40q: %v", name, err)
		}
		v[name] = value
	}
	return v, nil
}

// cleanValue is one line of text without anything that is not seen.
func cleanValue(s string) (string, error) {
	if !utf8.ValidString(s) {
		return "", fmt.Errorf("read bytes that are no UTF-8 text")
	}
	s = strings.Map(func(r rune) rune {
		if r == '\t' || r == '\n' || r == '\r' {
			return ' '
		}
		return r
	}, s)
	for _, r := range s {
		if unicode.IsControl(r) || unicode.Is(unicode.Bidi_Control, r) || r == '\u2028' || r == '\u2029' || unicode.Is(unicode.Noncharacter_Code_Point, r) {
			return "", fmt.Errorf("read the character U+%04X, which is not seen", r)
		}
	}
	s = strings.TrimSpace(s)
	if n := utf8.RuneCountInString(s); n > maxText {
		return "", fmt.Errorf("read %d characters, wanted at most %d", n, maxText)
	}
	return s, nil
}

// label names the fields that a person types, as the pages do.
var label = map[string]string{
	"gravity": "gravity", "temp": "temperature", "taken": "taken", "instrument": "instrument",
	"note": "note", "keep": "reason", "reason": "reason", "operator": "name",
	"reading": "reading", "value": "value", "from": "scale", "og": "original gravity", "fg": "present gravity",
}

// long fields hold sentences.
func maxOf(name string) int {
	switch name {
	case "note", "keep", "reason":
		return maxText
	case "operator":
		return maxName
	}
	return maxValue
}

// check refuses a value that is too long for its field, and then one that is
// missing; the first in the order given.
func (v values) check(names []string, needed map[string]string) error {
	for _, name := range names {
		if n := utf8.RuneCountInString(v[name]); n > maxOf(name) {
			return &Refused{Text: fmt.Sprintf("%s: read %d characters, wanted at most %d", label[name], n, maxOf(name)), Field: name}
		}
	}
	for _, name := range names {
		if hint, need := needed[name]; need && v[name] == "" {
			return &Refused{Text: label[name] + ": read nothing", Hint: hint, Field: name}
		}
	}
	return nil
}

// readingFields are those of the form of a reading, in its order.
var readingFields = []string{"gravity", "temp", "taken", "instrument", "note", "operator"}

// readingNeeds are those that a reading cannot do without, and what to type.
var readingNeeds = map[string]string{
	"gravity":  "type what the hydrometer shows, as 1.016 or 4.1P",
	"temp":     "type the temperature of the sample, as 18 or 64F",
	"operator": "type who read it",
}

// reading is the reading that the form holds.
func (v values) reading(batch string) Reading {
	return Reading{
		Batch: batch, Gravity: v["gravity"], Temp: v["temp"], Taken: v["taken"],
		Instrument: v["instrument"], Note: v["note"], Operator: v["operator"],
	}
}

// query is a reading as the fields of a form, for a link that brings it back. The
// instrument is there even when it is none: else another would be proposed.
func query(r Reading) string {
	q := url.Values{"instrument": {r.Instrument}}
	for name, value := range map[string]string{"gravity": r.Gravity, "temp": r.Temp, "taken": r.Taken, "note": r.Note} {
		if value != "" {
			q.Set(name, value)
		}
	}
	return q.Encode()
}
