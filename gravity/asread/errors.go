package asread

import (
	"strconv"
	"strings"
)

// Proposal is one thing that could be typed instead.
type Proposal struct {
	Type  string // what to type: "12.1P"
	Means string // how it would be read: "12.1 °P (SG 1.0488)"
}

// Doubt says that a text can be read in more than one way. A terminal may ask
// which of the proposals was meant; a pipe has to refuse.
type Doubt struct {
	Read      string // as typed, trimmed
	Why       string // what was wanted: "wanted the scale"
	Proposals []Proposal
}

// Error gives one line such as
//
//	read "12.1", wanted the scale: 12.1 °P (SG 1.0488) or 12.1 points (SG 1.0121)?
func (d *Doubt) Error() string {
	means := make([]string, len(d.Proposals))
	for i, p := range d.Proposals {
		means[i] = p.Means
	}
	return "read " + show(d.Read) + ", " + d.Why + ": " + strings.Join(means, " or ") + "?"
}

// Hint says in one line what to type for each meaning.
func (d *Doubt) Hint() string { return hint(d.Proposals) }

// Refusal says that a text cannot be meant or is out of bounds.
type Refusal struct {
	Read      string // as typed, trimmed
	Wanted    string // what would have done: "SG 0.980 to 1.180"
	Advice    string // the hint when there is nothing to propose; may be empty
	Proposals []Proposal
}

// Error gives one line such as
//
//	read "1.48", wanted SG 0.980 to 1.180
func (r *Refusal) Error() string { return "read " + show(r.Read) + ", wanted " + r.Wanted }

// Hint says in one line what to type instead, "" if nothing comes to mind.
func (r *Refusal) Hint() string {
	if len(r.Proposals) == 0 {
		return r.Advice
	}
	return hint(r.Proposals)
}

func hint(ps []Proposal) string {
	if len(ps) == 0 {
		return ""
	}
	parts := make([]string, len(ps))
	for i, p := range ps {
		parts[i] = p.Type + " for " + p.Means
	}
	return "type " + strings.Join(parts, " or ")
}

// shown is how many characters of a refused text an error repeats.
const shown = 24

// show quotes a text for an error line: control characters and bytes that are
// no text come out escaped, a long text is cut.
func show(text string) string {
	n := 0
	for i := range text {
		if n == shown {
			return strconv.Quote(text[:i]) + "…"
		}
		n++
	}
	return strconv.Quote(text)
}
