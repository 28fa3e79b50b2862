package web

import (
	"context"

	"gylebook/tables"
)

// Answer is what a command says.
type Answer struct {
	Ladders []tables.Ladder
	Tables  []tables.Table
	Notes   []tables.Note
}

// Vessel is one open batch on the board. All figures are text as it is shown; ""
// leaves one out.
type Vessel struct {
	Name, Batch, Product string
	Symbol, Word         string // the state, as a sign and in words
	Gravity              string // the last one
	Day                  string // since pitching
	Hours                string // since the last reading
	Fall                 string // points in 24 h
	Apparent             string // attenuation, %
	Next                 string // gravity expected now
	Attend               bool   // needs attention
	Why                  string // it does
}

// Board is every open batch, the most urgent first.
type Board struct {
	Title   string // the heading; "" is "Open vessels"
	Vessels []Vessel
	Notes   []tables.Note
}

// Choice is one line of a list to choose from.
type Choice struct{ Value, Text string }

// Form is what the form of a reading offers.
type Form struct {
	Instruments []Choice
	Instrument  string   // the one chosen already
	Scales      []Choice // that a value of convert may be in, as its "from"; none leaves that out
}

// Batch is the page of one batch.
type Batch struct {
	Batch, Vessel, Product string
	Open                   bool // takes readings
	Answer                 Answer
	Form                   Form
	Curve                  string // what the picture shows, in one sentence; "" for no picture
	CurveText              []string
	LastEntry              string // the entry that undo by this operator would void, "" for none
}

// Reading is a reading as it was typed. Taken "" is now.
type Reading struct {
	Batch, Gravity, Temp, Taken, Instrument, Keep, Note, Operator string
}

// Judged is a reading as it was read.
type Judged struct {
	Answer Answer
	Held   string  // why it is doubted; "" when it is not
	Hint   string  // what to do then
	Other  *Choice // another vessel that it may belong to: Value is its batch
	Taken  string  // the moment it was judged for, in a form that Log reads; "" keeps what was typed
}

// Desk answers what the pages ask. It is called from many goroutines at once. An
// error that is no [*Refused] is shown as a plain failure, with nothing of its text.
type Desk interface {
	// Board is every open batch.
	Board(ctx context.Context) (Board, error)
	// Batch is one batch by its id. operator is who looks, "" if not known.
	Batch(ctx context.Context, name, operator string) (Batch, error)
	// Judge reads r and says what it means. It writes nothing.
	Judge(ctx context.Context, r Reading) (Judged, error)
	// Log stores r and returns the number of its entry, "" when the same reading
	// was stored before. A *Refused has written nothing: it may be sent again.
	Log(ctx context.Context, r Reading) (Answer, string, error)
	// Undo voids an entry of this operator. A *Refused has written nothing.
	Undo(ctx context.Context, entry, operator, reason string) (Answer, error)
	// Bench computes: "correct" (reading, temp, og, instrument), "convert" (value,
	// from) or "abv" (og, fg). A value that was left empty is not in the map.
	Bench(ctx context.Context, what string, values map[string]string) (Answer, error)
	// BenchForm is what the form of a correction offers.
	BenchForm(ctx context.Context) (Form, error)
	// Curve is the picture of a batch, form "svg" or "png", drawn for a telephone
	// or for a wide screen.
	Curve(ctx context.Context, name, form string, phone bool) ([]byte, error)
}

// Refused is an error in the words of the command: what was read, what was wanted,
// and what to type instead.
type Refused struct {
	Status int // of HTTP: 404, 409, 422, 503 …; 0 is 422
	Text   string
	Hint   string
	Field  string // the field of the form that it is about, "" for the whole
}

func (r *Refused) Error() string { return r.Text }
