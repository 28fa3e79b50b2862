package method

import (
	"fmt"
	"math"
	"strconv"
	"strings"
)

// Status says how a relation was seen by those who wrote it down.
type Status string

// The ways a relation can have been seen.
const (
	Read           Status = "read"            // seen on the page cited
	Quoted         Status = "quoted"          // seen as a quotation, the page itself was not reached
	FromMemory     Status = "from memory"     // stated without a page at hand
	CommonPractice Status = "common practice" // a fact of the trade, no source
	Derived        Status = "derived"         // follows from other relations listed here
)

// Source is where a relation was published. Year 0 means that none is known.
type Source struct {
	Author string
	Year   int
	Where  string // journal and page, standard and clause
	Status Status
}

// String gives "Tanaka et al. 2001, Metrologia 38, 301".
func (s Source) String() string {
	var parts []string
	who := s.Author
	if s.Year != 0 {
		who = strings.TrimSpace(who + " " + strconv.Itoa(s.Year))
	}
	if who != "" {
		parts = append(parts, who)
	}
	if s.Where != "" {
		parts = append(parts, s.Where)
	}
	if len(parts) == 0 {
		return string(s.Status)
	}
	return strings.Join(parts, ", ")
}

// Range is a closed interval of one input, in the unit named.
type Range struct {
	Of     string // "OG", "sample temperature"
	Lo, Hi float64
	Unit   string // "SG 20/20", "°C"
}

// Contains reports whether x lies in the range. Half a millionth is forgiven,
// so that a limit typed in decimals counts as inside.
func (r Range) Contains(x float64) bool { return x >= r.Lo-5e-7 && x <= r.Hi+5e-7 }

// String gives "OG 1.000..1.083 SG 20/20".
func (r Range) String() string {
	return fmt.Sprintf("%s %s..%s %s", r.Of, num(r.Lo), num(r.Hi), r.Unit)
}

// Note is a warning that travels with a value. It does not make the value void.
type Note struct {
	Code string `json:"code"`
	Text string `json:"text"`
}

// Codes of the notes that more than one package gives.
const (
	OutOfRange   = "out-of-range" // outside the range a relation was fitted on
	Extrapolated = "extrapolated" // no published table reaches here
	HotSample    = "hot-sample"   // burns, and a weaker correction
	Assumed      = "assumed"      // something was not given and a usual value was taken
	NotCovered   = "not-covered"  // the uncertainty leaves something out
	InAir        = "in-air"       // true and in-air relative density differ
	NoAlcohol    = "no-alcohol"   // the reading leaves no room for alcohol
	Historic     = "historic"     // withdrawn or superseded
	WithReason   = "with-reason"  // accepted against a rule, on a stated reason
	OtherBasis   = "other-basis"  // made for another reference pair
	Caution      = "caution"      // the work can hurt someone, or a declared figure
	Interpreted  = "interpreted"  // what was typed was read in a way worth saying
	NoValue      = "no-value"     // a figure is left out, and why
	Unchecked    = "not-checked"  // no published row covers this
)

// Info is everything about a relation except the relation.
type Info struct {
	ID     string // lower-case key used in flags, CSV and reports
	Kind   string // "fit", "density", "correction", "abv" …
	Name   string // what a person calls it
	Source Source
	Valid  []Range // one an input, in the order of Check's arguments
	Error  string  // stated or measured error
	Check  string  // how it is checked: FormulaOnly, or against what
	Use    string  // when to take it, and its caution
	Better string  // id of the relation that serves outside the range
}

// FormulaOnly marks a relation for which no published row was found.
const FormulaOnly = "formula only"

// InRange returns a note for every value outside its fitted range. Values come
// in the order of Valid; fewer values than ranges check only the first ones.
func (i Info) InRange(values ...float64) []Note {
	var notes []Note
	for k, v := range values {
		if k >= len(i.Valid) || i.Valid[k].Contains(v) {
			continue
		}
		r := i.Valid[k]
		text := fmt.Sprintf("%s: %s %s is outside the fitted range %s to %s %s",
			i.ID, r.Of, brief(v), num(r.Lo), num(r.Hi), r.Unit)
		if i.Better != "" {
			text += "; " + i.Better + " serves there"
		}
		notes = append(notes, Note{OutOfRange, text})
	}
	return notes
}

// Entry is a relation with its provenance.
type Entry[F any] struct {
	Info
	Fn F
}

// Set is an ordered registry; the first entry is the default.
type Set[F any] []Entry[F]

// Default returns the first entry. An empty set is a programming error.
func (s Set[F]) Default() Entry[F] { return s[0] }

// Find returns the entry with this id, the default for "", or an *UnknownError.
func (s Set[F]) Find(id string) (Entry[F], error) {
	if id == "" {
		return s.Default(), nil
	}
	for _, e := range s {
		if e.ID == strings.ToLower(strings.TrimSpace(id)) {
			return e, nil
		}
	}
	kind := "method"
	if len(s) > 0 && s[0].Kind != "" {
		kind = s[0].Kind
	}
	return Entry[F]{}, &UnknownError{What: kind, Got: id, Known: s.IDs()}
}

// IDs lists the ids in order.
func (s Set[F]) IDs() []string {
	ids := make([]string, len(s))
	for i, e := range s {
		ids[i] = e.ID
	}
	return ids
}

// Infos lists the provenance in order.
func (s Set[F]) Infos() []Info {
	infos := make([]Info, len(s))
	for i, e := range s {
		infos[i] = e.Info
	}
	return infos
}

// UnknownError says that an id is not in a registry.
type UnknownError struct {
	What  string // "fit", "abv method"
	Got   string
	Known []string
}

func (e *UnknownError) Error() string {
	return fmt.Sprintf("unknown %s %.40q, known: %s", e.What, e.Got, strings.Join(e.Known, ", "))
}

// RangeError says that a value is impossible or cannot be answered for; a value
// merely outside a fitted range gets a Note instead.
type RangeError struct {
	What   string // "sample temperature"
	Got    float64
	Lo, Hi float64
	Unit   string
	Hint   string // what to do instead; may be empty
}

func (e *RangeError) Error() string {
	if math.IsNaN(e.Got) || math.IsInf(e.Got, 0) {
		return fmt.Sprintf("%s is not a finite number, wanted %s to %s %s", e.What, num(e.Lo), num(e.Hi), e.Unit)
	}
	return fmt.Sprintf("%s is %s %s, wanted %s to %s %s", e.What, num(e.Got), e.Unit, num(e.Lo), num(e.Hi), e.Unit)
}

// num prints up to five decimals without trailing zeros.
func num(x float64) string {
	s := strconv.FormatFloat(x, 'f', 5, 64)
	s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	if s == "-0" || s == "" {
		return "0"
	}
	return s
}

// brief prints five significant digits, enough for an SG in a note.
func brief(x float64) string { return strconv.FormatFloat(x, 'g', 5, 64) }
