package cause

import (
	"time"

	"gylebook/attenuation"
	"gylebook/attenuation/journal"
	"gylebook/gravity"
	"gylebook/gravity/method"
)

// Names of the causes.
const (
	Instrument  = "instrument offset"
	Entry       = "entry error"
	Limit       = "wort limit"
	Temperature = "temperature"
	Pitch       = "pitch and generation"
	Basis       = "original gravity basis"
	Unfinished  = "not finished yet"
)

// Cost is the class of what a check costs.
type Cost int

// The classes.
const (
	Minutes Cost = iota
	Day
	Week
)

// String gives "minutes", "a day" or "a week".
func (c Cost) String() string {
	switch c {
	case Day:
		return "a day"
	case Week:
		return "a week"
	}
	return "minutes"
}

// Case is what a batch is judged from.
type Case struct {
	Batch journal.View // with all its readings
	// Peers are finished batches of the same product and yeast, with all their
	// readings. Their order does not matter; the batch itself, open ones and those
	// without attenuation are left out.
	Peers []journal.View
	// Others are finished batches of every product; the peers may be among them.
	Others []Member
	// Tanks are other batches that were read about when the batch was read last.
	Tanks []journal.View
	Book  *journal.Book // nil knows no instruments
}

// Member is how a finished batch ended, and what told so.
type Member struct {
	Batch, Product, Yeast string
	Instrument            string    // of the last reading that counts
	At                    time.Time // of that reading
	OG, FG                gravity.SG
	Apparent              float64
}

// MemberOf returns the end of a batch; ok is false while it is open or without
// attenuation. The view needs the last reading alone.
func MemberOf(v journal.View) (m Member, ok bool) {
	last := v.Last()
	if v.Record == nil || v.Open() || last == nil || last.Attenuation == nil {
		return m, false
	}
	b := v.Record.Batch
	return Member{
		Batch: b.ID, Product: b.Product, Yeast: b.Yeast, Instrument: last.Source.Instrument, At: last.Source.TakenAt,
		OG: last.OG, FG: last.SG, Apparent: last.Attenuation.Apparent,
	}, true
}

// Hypothesis is one cause, computed.
type Hypothesis struct {
	Name string
	// Explains is how many points of attenuation the cause would explain, nil where
	// that cannot be judged; Why says what lacks. U is its expanded uncertainty,
	// k = 2 or Student's t at 95 % where few batches make it; nil where it has none.
	Explains, U *float64
	Why         string
	Share       *float64 // of the difference; nil where there is none to explain
	Rank        int      // equal where the data cannot tell apart; 0 for what explains nothing
	Evidence    string   // in words and numbers
	Check       string   // the next cheapest one; "" where none helps
	Cost        Cost
	Notes       []method.Note
}

// Comparison is a batch beside its peers.
type Comparison struct {
	Value    *journal.Value // the reading that is compared
	Hours    float64        // its time after pitching; 0 when pitching is not known
	Apparent float64        // its apparent attenuation
	Peers    int
	Median   float64 // of the peers
	// Difference is Apparent less Median; U its expanded uncertainty from the
	// reading and the median; Limit is what a batch of the group stays within in
	// 95 % of cases, by the spread of the peers.
	Difference, U, Limit float64
	// Course says that the batch ended as its peers did and that they are compared
	// at the same hours after pitching instead.
	Course bool
	// Entered says that the original extract was lost by an addition, and that the
	// original gravity as entered stands for it.
	Entered bool

	spread float64 // robust standard deviation of the peers
	own    float64 // standard uncertainty of Apparent
}

// StandsOut reports whether the difference is more than the spread of the peers.
func (c Comparison) StandsOut() bool { return c.Difference > c.Limit || c.Difference < -c.Limit }

// Report is what was found. Hypotheses come in the order of their rank, then those
// that cannot be judged, then those that explain nothing.
type Report struct {
	Comparison *Comparison // nil when the batch cannot be compared
	Why        string      // for which Comparison is nil
	Hypotheses []Hypothesis
	Verdict    string
}

// apparent returns the apparent attenuation of two gravities.
func apparent(og, fg gravity.SG) (float64, bool) {
	g, err := attenuation.NewGravities(og, fg, gravity.Fits.Default())
	if err != nil {
		return 0, false
	}
	a, err := attenuation.Attenuate(g)
	return a.Apparent, err == nil && finite(a.Apparent)
}
