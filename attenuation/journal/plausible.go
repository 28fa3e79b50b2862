package journal

import (
	"errors"
	"fmt"
	"math"
	"slices"
	"time"

	"gylebook/gravity/asread"
	"gylebook/gravity/method"
)

// Situation is what a new reading is judged against.
type Situation struct {
	Now    time.Time
	Target *Record // the batch that it is for
	Book   *Book
	Others []*Record // the other open batches
	// Find gives more of them. It is asked only when the reading does not fit its
	// own batch; nil has none.
	Find func() []*Record

	// Expect tells where a batch is expected at a time from its readings until then,
	// in SG 20/20, with the standard deviation of that. Where it has no answer, and
	// where it is nil, Expected has one.
	Expect func(rec *Record, at time.Time) (sg, sd float64, ok bool)
}

// Codes of a Hold.
const (
	HoldIncomplete  = "incomplete"    // the reading itself does not pass Check
	HoldNoBatch     = "no-batch"      // there is no target
	HoldClosed      = "closed"        // the batch is closed
	HoldDuplicate   = "duplicate"     // the same reading is there: nothing to write, no error
	HoldFuture      = "future"        // taken after now
	HoldBeforePitch = "before-pitch"  // only an OG is read before pitching
	HoldInstrument  = "instrument"    // unknown, or not a hydrometer
	HoldRetired     = "retired"       // the instrument was out of use
	HoldOutOfRange  = "out-of-range"  // of the instrument's scale
	HoldUncorrected = "not-corrected" // no liquid reads so
	HoldRise        = "rise"          // over a reading before it, or under one after it
	HoldAboveOG     = "above-og"      // over the effective original gravity
	HoldFall        = "fall"          // faster than anything ferments
	HoldSpread      = "spread"        // far from another reading of the same minute
	HoldSwapped     = "swapped"       // gravity and temperature changed places
	HoldOther       = "other-batch"   // fits another open batch far better
)

// Hold says that a reading is not to be written as it stands. Unless Final, a
// reason in Keep lets it pass as suspect; a duplicate is simply not written again.
type Hold struct {
	Code   string
	Text   string // what was read and what was wanted
	Tip    string
	Closer string // id of the batch that it fits better; "" when there is none
	Vessel string // of that batch
	Final  bool   // a reason does not help
}

func (h *Hold) Error() string { return h.Text }

// Hint says what to do instead.
func (h *Hold) Hint() string { return h.Tip }

// ahead is how far the clock of the one who types may run before this one
// (common practice, no source).
const ahead = 2 * time.Minute

// Judge tells whether r can be written for the target, with the notes that go with
// it, before anything is written. The notes stand with a nil Hold only.
func Judge(s Situation, r Reading) ([]method.Note, *Hold) {
	if s.Book == nil {
		s.Book = NewBook(nil)
	}
	if hold := s.possible(r); hold != nil {
		return nil, hold
	}
	notes, same, hold := s.sameMinute(r)
	if hold != nil {
		return nil, hold
	}
	notes, hold, comparable := s.instrument(r, notes)
	if hold != nil {
		return nil, hold
	}
	if !comparable {
		return notes, nil
	}
	// The reading among the others, as if it were written.
	after := *s.Target
	after.Readings = append(nearby(s.Target.Readings, r.TakenAt), Numbered[Reading]{Number: math.MaxInt64, Body: unsuspected(r)})
	view := Derive(&after, s.Book)
	at := slices.IndexFunc(view.Values, func(v Value) bool { return v.Number == math.MaxInt64 })
	one := &view.Values[at]
	if one.Err != nil {
		tip := hintOf(one.Err)
		if tip == "" {
			tip = "check the reading, its scale and the temperature"
		}
		return nil, &Hold{Code: HoldUncorrected, Text: one.Err.Error(), Tip: tip, Final: true}
	}
	notes = append(notes, one.Notes...)
	if hold = s.compare(view, one, same); hold != nil {
		if r.Keep == "" {
			return nil, hold
		}
		// What is suspect is in no mean.
		notes = slices.DeleteFunc(notes, func(n method.Note) bool { return n.Code == NoteReplicate })
		notes = append(notes, method.Note{Code: method.WithReason, Text: "kept as suspect: " + hold.Text})
	}
	return notes, nil
}

// nearby returns the readings that count around a time, the only ones that a new
// one is compared with: of the last six minutes until then and the first two after.
func nearby(list []Numbered[Reading], at time.Time) []Numbered[Reading] {
	var before, after []Numbered[Reading]
	for _, r := range ordered(list, func(r Reading) time.Time { return r.TakenAt }) {
		switch {
		case r.Void || r.Body.Keep != "":
		case r.Body.TakenAt.After(at):
			after = append(after, r)
		default:
			before = append(before, r)
		}
	}
	from, minutes := len(before), 0
	for from > 0 {
		if from == len(before) || !minute(before[from-1].Body.TakenAt).Equal(minute(before[from].Body.TakenAt)) {
			minutes++
		}
		if minutes > 6 {
			break
		}
		from--
	}
	to, minutes := 0, 0
	for to < len(after) {
		if to == 0 || !minute(after[to].Body.TakenAt).Equal(minute(after[to-1].Body.TakenAt)) {
			minutes++
		}
		if minutes > 2 {
			break
		}
		to++
	}
	return slices.Concat(before[from:], after[:to])
}

func unsuspected(r Reading) Reading { r.Keep = ""; return r }

func hintOf(err error) string {
	var h interface{ Hint() string }
	if errors.As(err, &h) {
		return h.Hint()
	}
	var r *method.RangeError
	if errors.As(err, &r) {
		return r.Hint
	}
	return ""
}

// possible refuses what no reason makes right.
func (s Situation) possible(r Reading) *Hold {
	final := func(code, tip, format string, args ...any) *Hold {
		return &Hold{Code: code, Text: fmt.Sprintf(format, args...), Tip: tip, Final: true}
	}
	if swapped(r) {
		return swap(r)
	}
	// The parsers know what to type instead, Check does not.
	_, errGravity := r.Gravity.Reading()
	_, errTemp := r.Temp.Temperature()
	if err := first(errGravity, errTemp, r.Check()); err != nil {
		return final(HoldIncomplete, hintOf(err), "%v", err)
	}
	if s.Target == nil {
		return final(HoldNoBatch, "open it with batch open", "batch %.40q is not in the journal", r.Batch)
	}
	b := s.Target.Batch
	switch {
	case s.Target.Closed != nil:
		return final(HoldClosed, "log to an open batch", "batch %s was closed on %s", b.ID, s.Target.Closed.Body.At.Format(time.DateOnly))
	case r.TakenAt.After(s.Now.Add(ahead)):
		return final(HoldFuture, "check the date, and the clock of this machine", "taken at %s, wanted a time that has been, it is %s", clock(r.TakenAt), clock(s.Now.In(r.TakenAt.Location())))
	// Where nobody entered it, pitching is the first reading, so an earlier one
	// only moves it.
	case b.Pitched != nil && r.TakenAt.Before(*b.Pitched):
		return final(HoldBeforePitch, "before pitching only the original gravity is read: batch og "+b.ID, "taken at %s, wanted a time after pitching at %s", clock(r.TakenAt), clock(*b.Pitched))
	}
	return nil
}

// swapped reports whether the temperature was typed as only a gravity is: near 1,
// with three decimals.
func swapped(r Reading) bool {
	t, err := asread.ParseNumber(r.Temp.Text)
	return err == nil && t.Places() >= 3 && t.Float() > 0.95 && t.Float() < 1.2
}

func swap(r Reading) *Hold {
	return &Hold{
		Code: HoldSwapped, Tip: "type " + r.Temp.Text + " " + r.Gravity.Text, Final: true,
		Text: fmt.Sprintf("read gravity %.24q at temperature %.24q, wanted the gravity first", r.Gravity.Text, r.Temp.Text),
	}
}

func clock(t time.Time) string { return t.Format("2006-01-02 15:04 -07:00") }

// sameMinute finds a repeat and replicates. same holds the replicates.
func (s Situation) sameMinute(r Reading) (notes []method.Note, same []int64, hold *Hold) {
	typed, _ := r.Gravity.Reading()
	temp, _ := r.Temp.Temperature()
	for _, e := range s.Target.Readings {
		if e.Void || !minute(e.Body.TakenAt).Equal(minute(r.TakenAt)) {
			continue
		}
		was, err := e.Body.Gravity.Reading()
		wasTemp, errTemp := e.Body.Temp.Temperature()
		alike := err == nil && errTemp == nil && was.Scale == typed.Scale && was.Value == typed.Value &&
			wasTemp.C == temp.C && e.Body.Instrument == r.Instrument
		if alike {
			return nil, nil, &Hold{
				Code: HoldDuplicate,
				Text: fmt.Sprintf("the same reading is already there (entry %d): not written again", e.Number),
				Tip:  fmt.Sprintf("to enter it anew: void %d --reason TEXT", e.Number),
			}
		}
		same = append(same, e.Number)
	}
	if len(same) > 0 {
		notes = append(notes, method.Note{Code: NoteReplicate, Text: fmt.Sprintf("read %d times in this minute: the mean is used", len(same)+1)})
	}
	return notes, same, nil
}
