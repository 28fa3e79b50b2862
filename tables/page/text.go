package page

import (
	"html/template"
	"strings"
	"sync"
	"unicode"

	"gylebook/tables"
)

// Text makes user text safe to show in HTML: what [tables.Clean] takes out of a
// line of a terminal, and also the invisible marks that set a direction and the
// code points that are no characters, which HTML forbids. It does not escape:
// html/template does.
func Text(s string) string {
	return strings.Map(func(r rune) rune {
		switch {
		case r == '\u200e' || r == '\u200f' || r == '\u061c':
			return -1
		case unicode.Is(unicode.Noncharacter_Code_Point, r):
			return -1
		}
		return r
	}, tables.Clean(s))
}

// Texts is [Text] of every line, without the lines that are empty then.
func Texts(lines []string) []string {
	out := make([]string, 0, len(lines))
	for _, line := range lines {
		if line = strings.TrimSpace(Text(line)); line != "" {
			out = append(out, line)
		}
	}
	return out
}

// Anchor turns s into the value of an id: lower-case letters, digits and single
// hyphens, "" if nothing is left. Two texts may give the same anchor.
func Anchor(s string) string {
	var b strings.Builder
	for _, r := range strings.ToLower(s) {
		switch {
		case r < 0x80 && (unicode.IsLetter(r) || unicode.IsDigit(r)):
			b.WriteRune(r)
		case b.Len() > 0 && !strings.HasSuffix(b.String(), "-"):
			b.WriteByte('-')
		}
	}
	return strings.TrimSuffix(b.String(), "-")
}

// fill renders data. The templates are constant and the data are of this
// package, so it fails only where a test fails; what went wrong is then shown
// in place of the fragment, for an empty place would look like an answer.
func fill(t func() *template.Template, data any) template.HTML {
	var b strings.Builder
	if err := t().Execute(&b, data); err != nil {
		return template.HTML("<p>" + template.HTMLEscapeString(err.Error()) + "</p>\n")
	}
	return template.HTML(b.String())
}

// Parsed parses a template when it is first used: most runs of the program show no
// page, and every one of them would pay for it. A text that is no template panics then.
func Parsed(name, text string) func() *template.Template {
	return sync.OnceValue(func() *template.Template { return template.Must(template.New(name).Parse(text)) })
}
