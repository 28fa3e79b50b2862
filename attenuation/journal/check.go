package journal

import (
	"errors"
	"fmt"
	"strings"
	"time"
	"unicode"
	"unicode/utf8"
)

// ErrIncomplete says that a body lacks something or is out of bounds.
var ErrIncomplete = errors.New("incomplete entry")

// incomplete is an ErrIncomplete that says what is wrong and nothing else.
type incomplete struct{ text string }

func (e *incomplete) Error() string { return e.text }

// Unwrap returns ErrIncomplete.
func (e *incomplete) Unwrap() error { return ErrIncomplete }

func wrapf(err error, format string, args ...any) error {
	if err == ErrIncomplete { //nolint:errorlint // the sentinel itself, whose text says nothing to who typed
		return &incomplete{fmt.Sprintf(format, args...)}
	}
	return fmt.Errorf("%s: %w", fmt.Sprintf(format, args...), err)
}

// Bounds of what people type.
const (
	maxID   = 40
	maxText = 1000
)

// CheckID returns an error for an id or a vessel that could not be typed again: 1
// to 40 letters, digits and . _ / - without spaces, beginning with a letter or a
// digit.
func CheckID(what, id string) error {
	bad := id == "" || utf8.RuneCountInString(id) > maxID
	for i, r := range id {
		ok := unicode.IsLetter(r) || unicode.IsDigit(r) || i > 0 && strings.ContainsRune("._/-", r)
		bad = bad || !ok
	}
	if bad {
		return wrapf(ErrIncomplete, "%s: read %.60q, wanted 1 to %d letters, digits, . _ / or -", what, id, maxID)
	}
	return nil
}

func checkText(what, text string, required bool) error {
	if required && strings.TrimSpace(text) == "" {
		return wrapf(ErrIncomplete, "%s is missing", what)
	}
	if utf8.RuneCountInString(text) > maxText || !utf8.ValidString(text) {
		return wrapf(ErrIncomplete, "%s: wanted at most %d characters of text", what, maxText)
	}
	return nil
}

func checkTime(what string, t time.Time) error {
	if t.IsZero() || t.Year() < 1900 || t.Year() > 9999 {
		return wrapf(ErrIncomplete, "%s is missing or out of bounds", what)
	}
	return nil
}

// first returns the first error that is not nil.
func first(errs ...error) error {
	for _, err := range errs {
		if err != nil {
			return err
		}
	}
	return nil
}
