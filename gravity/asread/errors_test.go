package asread

import (
	"errors"
	"strings"
	"testing"
	"unicode"
	"unicode/utf8"

	"gylebook/gravity"
)

// checkError asserts what holds for every error of the package and returns its
// proposals: a *Doubt or a *Refusal, one printable lower-case line each for
// Error and Hint, no full stop.
func checkError(t interface {
	Helper()
	Errorf(string, ...any)
}, text string, err error,
) []Proposal {
	t.Helper()
	var (
		d     *Doubt
		r     *Refusal
		lines []string
		ps    []Proposal
		read  string
	)
	switch {
	case errors.As(err, &d):
		lines, ps, read = []string{d.Error(), d.Hint()}, d.Proposals, d.Read
		if len(ps) == 0 {
			t.Errorf("%q: a doubt without proposals", text)
		}
	case errors.As(err, &r):
		lines, ps, read = []string{r.Error(), r.Hint()}, r.Proposals, r.Read
	default:
		t.Errorf("%q: error is a %T", text, err)
		return nil
	}
	if read != strings.TrimSpace(text) {
		t.Errorf("%q: read %q", text, read)
	}
	if !strings.HasPrefix(lines[0], "read \"") || !strings.Contains(lines[0], ", wanted ") {
		t.Errorf("%q: error %q does not say what was read and wanted", text, lines[0])
	}
	for _, line := range lines {
		if strings.HasSuffix(line, ".") || !utf8.ValidString(line) || strings.ContainsFunc(line, func(c rune) bool { return !unicode.IsPrint(c) }) {
			t.Errorf("%q: %q is not one printable line without a full stop", text, line)
		}
		if c, _ := utf8.DecodeRuneInString(line); line != "" && !unicode.IsLower(c) {
			t.Errorf("%q: %q does not begin in lower case", text, line)
		}
	}
	return ps
}

func TestErrorText(t *testing.T) {
	tests := []struct{ text, err, hint string }{
		{
			"12.1",
			`read "12.1", wanted the scale: 12.1 °P (SG 1.0488) or 12.1 points (SG 1.0121)?`,
			"type 12.1P for 12.1 °P (SG 1.0488) or 12.1pt for 12.1 points (SG 1.0121)",
		},
		{
			"1.48",
			`read "1.48", wanted SG 0.980 to 1.180, whole 980 to 1180 or whole points 0 to 180`,
			"type 1.048 for SG 1.048",
		},
		{"", `read "", wanted a number`, ""},
		{
			"\x00\xff\u202e",
			`read "\x00\xff\u202e", wanted a number first, in the digits 0 to 9`, "",
		},
		// 24 characters are repeated, not more.
		{
			strings.Repeat("é", 30),
			`read "` + strings.Repeat("é", 24) + `"…, wanted a number first, in the digits 0 to 9`, "",
		},
		{
			strings.Repeat("é", 24),
			`read "` + strings.Repeat("é", 24) + `", wanted a number first, in the digits 0 to 9`, "",
		},
	}
	for _, tt := range tests {
		_, err := ParseReading(tt.text, gravity.ScaleSG)
		var h interface{ Hint() string }
		if !errors.As(err, &h) {
			t.Fatalf("%q: error %v has no hint", tt.text, err)
		}
		if err.Error() != tt.err || h.Hint() != tt.hint {
			t.Errorf("%q:\n got %s\n     %s\nwant %s\n     %s", tt.text, err, h.Hint(), tt.err, tt.hint)
		}
	}
}

// A mass share far outside the default fit is proposed without the comparison
// that the fit cannot give.
func TestProposalOutsideTheFit(t *testing.T) {
	_, err := ParseReading("60.5", gravity.ScaleSG)
	want := "type 60.5P for 60.5 °P or 60.5pt for 60.5 points (SG 1.0605)"
	var d *Doubt
	if !errors.As(err, &d) || d.Hint() != want {
		t.Errorf("got %v, want a doubt with %q", err, want)
	}
}

func TestEmptyDoubtHasNoHint(t *testing.T) {
	if h := (&Doubt{Read: "1", Why: "wanted more"}).Hint(); h != "" {
		t.Errorf("hint %q, want none", h)
	}
}
