package journal

import (
	"crypto/sha256"
	"encoding/hex"
	"encoding/json"
	"errors"
	"fmt"
	"time"
)

// Kind says what an entry is about.
type Kind string

// The kinds of entry.
const (
	KindInstrument  Kind = "instrument"  // an instrument is registered
	KindCertificate Kind = "certificate" // its calibration certificate
	KindCheck       Kind = "check"       // its check by the user
	KindRetire      Kind = "retire"      // it is out of use
	KindBatch       Kind = "batch"       // a batch is opened
	KindOG          Kind = "og"          // a reading of its original gravity
	KindLimit       Kind = "limit"       // its limit of attenuation, by a forced ferment
	KindVolume      Kind = "volume"      // its volume, where that was not known when it was opened
	KindClose       Kind = "close"       // it is closed
	KindReading     Kind = "reading"     // a gravity of a batch
	KindEvent       Kind = "event"       // what was done to a batch
	KindVoid        Kind = "void"        // an earlier entry no longer counts
)

// Body is the content of an entry, one of the types of this package.
type Body interface {
	Kind() Kind
	// Check returns an error for a body that is incomplete or out of bounds
	// whatever else the journal holds.
	Check() error
}

// Entry is one line of the journal.
type Entry struct {
	Number     int64     // 1, 2, 3 … without gaps
	RecordedAt time.Time // UTC, whole milliseconds
	By         string    // operator
	Body       Body
	Digest     string // SHA-256 of the entry, hex
	Chain      string // SHA-256 of the chain before it and its digest, hex
}

// sealed is the form in which an entry is hashed and exported; the order of its
// fields is part of the format.
type sealed struct {
	Number     int64           `json:"number"`
	RecordedAt string          `json:"recorded_at"`
	By         string          `json:"by"`
	Kind       Kind            `json:"kind"`
	Body       json.RawMessage `json:"body"`
	Digest     string          `json:"digest,omitempty"`
	Chain      string          `json:"chain,omitempty"`
}

const recordedLayout = "2006-01-02T15:04:05.000Z"

func (e Entry) sealed() (sealed, error) {
	body, err := json.Marshal(e.Body)
	if err != nil {
		return sealed{}, fmt.Errorf("entry %d: %w", e.Number, err)
	}
	return sealed{
		Number: e.Number, RecordedAt: e.RecordedAt.UTC().Format(recordedLayout), By: e.By,
		Kind: e.Body.Kind(), Body: body,
	}, nil
}

// Seal returns e with the digest of its content and the chain that follows on
// previous, the chain of the entry before it ("" for the first).
func (e Entry) Seal(previous string) (Entry, error) {
	s, err := e.sealed()
	if err != nil {
		return e, err
	}
	content, err := json.Marshal(s)
	if err != nil {
		return e, err
	}
	digest := sha256.Sum256(content)
	e.Digest = hex.EncodeToString(digest[:])
	chain := sha256.Sum256([]byte(previous + e.Digest))
	e.Chain = hex.EncodeToString(chain[:])
	return e, nil
}

// ErrTampered says that an entry does not match its digest or the chain.
var ErrTampered = errors.New("entry does not match its digest")

// Verify returns ErrTampered, with the entry's number, unless e is what was sealed
// after the chain previous.
func (e Entry) Verify(previous string) error {
	want, err := e.Seal(previous)
	if err != nil {
		return err
	}
	if want.Digest != e.Digest {
		return fmt.Errorf("entry %d: %w", e.Number, ErrTampered)
	}
	if want.Chain != e.Chain {
		return fmt.Errorf("entry %d: %w: the chain before it is another", e.Number, ErrTampered)
	}
	return nil
}

// MarshalJSON writes the export form, with digest and chain.
func (e Entry) MarshalJSON() ([]byte, error) {
	s, err := e.sealed()
	if err != nil {
		return nil, err
	}
	s.Digest, s.Chain = e.Digest, e.Chain
	return json.Marshal(s)
}

// UnmarshalJSON reads the export form. It does not verify the digest.
func (e *Entry) UnmarshalJSON(data []byte) error {
	var s sealed
	if err := json.Unmarshal(data, &s); err != nil {
		return err
	}
	body, err := newBody(s.Kind)
	if err != nil {
		return err
	}
	if err := json.Unmarshal(s.Body, body); err != nil {
		return err
	}
	at, err := time.Parse(recordedLayout, s.RecordedAt)
	if err != nil {
		return fmt.Errorf("recorded_at: %w", err)
	}
	*e = Entry{Number: s.Number, RecordedAt: at, By: s.By, Body: value(body), Digest: s.Digest, Chain: s.Chain}
	return nil
}
