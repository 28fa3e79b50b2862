package journal

import (
	"context"
	"errors"
	"iter"
	"time"
)

// Errors that a Store returns, wrapped with what they are about. Callers ask with
// errors.Is.
var (
	ErrNotFound   = errors.New("not in the journal")
	ErrExists     = errors.New("already in the journal") // an id is never used again
	ErrClosed     = errors.New("closed")                 // the batch or the store
	ErrRetired    = errors.New("out of use")             // the instrument
	ErrVoided     = errors.New("already void")
	ErrNotEmpty   = errors.New("the journal is not empty")
	ErrNoJournal  = errors.New("not a journal")                     // a file of another kind, or damaged
	ErrNewer      = errors.New("written by a newer version")        // schema unknown to this program
	ErrReadOnly   = errors.New("cannot be written")                 // file or folder read-only
	ErrDiskFull   = errors.New("no space left")                     // nothing of the entry was kept
	ErrBusy       = errors.New("another program holds the journal") // waited in vain; nothing was written
	ErrNotWritten = errors.New("not written")                       // any other failure of a write
)

// Record is the state of one batch as the journal holds it, nothing derived.
// Slices are in the order of their own time (TakenAt, At), then of their number.
type Record struct {
	Batch    Batch
	Number   int64 // of the entry that opened it
	OGs      []Numbered[OG]
	Limits   []Numbered[Limit]
	Volumes  []Numbered[Volume]
	Readings []Numbered[Reading]
	Events   []Numbered[Event]
	// Given are the blends of this batch into others: events of those.
	Given  []Numbered[Event]
	Closed *Numbered[Close] // nil while open; a void close is left out
	// Void marks a batch whose opening is void. Only a filter that asks for them
	// returns such a record.
	Void       bool
	VoidReason string
}

// Volume returns the volume [L at 20 °C] as typed: the one entered last, else that
// of the opening; "" when not known.
func (r *Record) Volume() string {
	text := r.Batch.Volume
	for _, v := range ordered(r.Volumes, func(v Volume) time.Time { return v.At }) {
		if !v.Void {
			text = v.Body.Volume
		}
	}
	return text
}

// Numbered is a body with its entry.
type Numbered[B any] struct {
	Number     int64
	RecordedAt time.Time
	By         string
	Body       B
	Void       bool
	VoidReason string
}

// InstrumentRecord is an instrument with its history in the order of At; void
// certificates, checks and retirements are left out.
type InstrumentRecord struct {
	Instrument   Instrument
	Number       int64
	Certificates []Numbered[Certificate]
	Checks       []Numbered[Check]
	Retired      *Numbered[Retire]
}

// Filter narrows batches. Zero fields do not narrow.
type Filter struct {
	Product string
	Yeast   string
	Year    int // of the pitch, else of the opening, in UTC
	Open    bool
	Closed  bool
	Batch   string // this one alone
	Void    bool   // void ones too, marked
	// Lean leaves out what no figure is made of, where that is quicker: who entered
	// what hangs on the batch and when, and of its readings the vessel, how sure the
	// time is and the note.
	Lean bool
}

// Reader is a consistent view of the journal.
type Reader interface {
	// Instruments returns every instrument that is not void, by id.
	Instruments(ctx context.Context) ([]*InstrumentRecord, error)
	// Batch returns one batch with all that hangs on it. ErrNotFound.
	Batch(ctx context.Context, id string) (*Record, error)
	// Open returns every open batch with all that hangs on it, by vessel, then id.
	Open(ctx context.Context) ([]*Record, error)
	// OpenLast is Open with the newest n readings of each batch, void ones counted
	// too, and others taken at the same time as the oldest of these. A batch whose
	// pitching was not entered has all of them: the first tells when it began. With n
	// of 0 or less no batch has any.
	OpenLast(ctx context.Context, n int) ([]*Record, error)
	// OpenPlaces returns every open batch with its events alone, without who entered
	// them and when: what tells where each is. The order is that of Open.
	OpenPlaces(ctx context.Context) ([]*Record, error)
	// Batches runs over the batches that pass f, by product, then pitch, then id,
	// holding one at a time.
	Batches(ctx context.Context, f Filter) iter.Seq2[*Record, error]
	// Finished runs over the batches of a product and a yeast that were closed before
	// a time, the one that began last first, holding one at a time. Whoever stops
	// early has not paid for those before.
	Finished(ctx context.Context, product, yeast string, before time.Time) iter.Seq2[*Record, error]
	// BatchIDs lists every id ever used, void batches too.
	BatchIDs(ctx context.Context) ([]string, error)
	// Entry returns one entry. ErrNotFound.
	Entry(ctx context.Context, number int64) (Entry, error)
	// LastBy returns the newest entry of an operator that is neither a void nor
	// void itself. ErrNotFound.
	LastBy(ctx context.Context, by string) (Entry, error)
	// LastInstrumentBy returns the instrument of the operator's newest reading
	// that is not void; "" when there is none.
	LastInstrumentBy(ctx context.Context, by string) (string, error)
	// Entries runs over all entries in order of number.
	Entries(ctx context.Context) iter.Seq2[Entry, error]
	// Head returns the number of the newest entry and its chain; 0 and "" when
	// the journal is empty.
	Head(ctx context.Context) (int64, string, error)
}

// Store keeps a journal. Every method may return a context's error. Methods may
// be called from several goroutines, and several stores, in several processes,
// may hold the same journal.
type Store interface {
	Reader
	// Append calls draft with a view of the journal that no other writer can
	// change, and appends the bodies it returns as consecutive entries of one
	// transaction, all or none. An error of draft is returned as it is, and nothing
	// is written. No bodies and no error write nothing. When Append returns nil the
	// entries are on disk.
	//
	// Each body must pass Check and what the journal holds: an id that is new
	// (ErrExists), an instrument and a batch that exist (ErrNotFound), a batch that
	// is open (ErrClosed; a void of any entry, a limit and a volume are allowed on a
	// closed one), an instrument in use at the body's own time (ErrRetired; a second
	// retirement always), a voided entry that exists
	// (ErrNotFound), is not void (ErrVoided) and is no void itself (ErrNotFound).
	// Other errors: ErrReadOnly, ErrDiskFull, ErrBusy, ErrNotWritten.
	Append(ctx context.Context, by string, now time.Time, draft func(Reader) ([]Body, error)) ([]Entry, error)
	// AppendEach is Append for more bodies than memory holds: draft returns what gives
	// them one by one, and the numbers of the first and the last entry are returned
	// instead of the entries, 0 and 0 when there were none. The bodies are run over
	// once, in the same transaction. An error among them is returned as it is, and
	// nothing is written. The view may be asked until they end, and has those in it
	// that were taken before.
	AppendEach(ctx context.Context, by string, now time.Time, draft func(Reader) (iter.Seq2[Body, error], error)) (first, last int64, err error)
	// Restore fills an empty journal with entries as they are, numbers, times and
	// digests included, all or none, and verifies each. ErrNotEmpty, ErrTampered,
	// and the errors of Append.
	Restore(ctx context.Context, entries iter.Seq2[Entry, error]) (int64, error)
	// Backup writes a consistent copy to a new file, while others write. An
	// existing file is left alone: ErrExists.
	Backup(ctx context.Context, path string) error
	// Close releases the journal.
	Close() error
}

// VerifyAll runs over r and returns how many entries hold. The error, ErrTampered
// or what reading them gave, names the first that does not.
func VerifyAll(ctx context.Context, r Reader) (int64, error) {
	var n int64
	chain := ""
	for e, err := range r.Entries(ctx) {
		if err != nil {
			return n, err
		}
		if e.Number != n+1 {
			return n, wrapf(ErrTampered, "entry %d is missing", n+1)
		}
		if err := e.Verify(chain); err != nil {
			return n, err
		}
		n, chain = e.Number, e.Chain
	}
	return n, nil
}
