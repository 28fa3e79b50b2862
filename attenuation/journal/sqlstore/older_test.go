package sqlstore

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"path/filepath"
	"testing"
	"testing/fstest"
	"time"

	"gylebook/attenuation/journal"
)

// older makes a journal of version 1 of the schema with a batch, a reading of it and
// a blend of it into another.
func older(t *testing.T, place string) {
	t.Helper()
	ctx := context.Background()
	first, err := migrations.step(1)
	if err != nil {
		t.Fatal(err)
	}
	name, err := dsn(place, create, time.Second)
	if err != nil {
		t.Fatal(err)
	}
	db, err := sql.Open("sqlite", name)
	if err != nil {
		t.Fatal(err)
	}
	if _, err := db.Exec(fmt.Sprintf(pragmaMark, applicationID)); err != nil {
		t.Fatal(err)
	}
	if err := migrate(ctx, db, 0, mustList(fstest.MapFS{first.name: {Data: []byte(first.text)}})); err != nil {
		t.Fatal(err)
	}
	s := &Store{path: place, db: db, turn: make(chan struct{}, 1), version: 1}
	a, b := benchBatch(1), benchBatch(2)
	blend := journal.Event{Batch: b.ID, At: benchDay.Add(time.Hour), What: journal.Blend, VolumeL: "5", From: a.ID}
	r := benchReading(a, 1)
	r.Instrument = ""
	write(t, s, a, b, r, blend)
	if err := s.Close(); err != nil {
		t.Fatal(err)
	}
}

func write(t *testing.T, s *Store, bodies ...journal.Body) {
	t.Helper()
	_, err := s.Append(context.Background(), "ada", benchDay, func(journal.Reader) ([]journal.Body, error) { return bodies, nil })
	if err != nil {
		t.Fatal(err)
	}
}

// looksWhole fails the test unless the journal that older made can be read, with
// volumes of its first batch.
func looksWhole(t *testing.T, s *Store, entries int64, volumes int) {
	t.Helper()
	ctx := context.Background()
	if n, err := journal.VerifyAll(ctx, s); n != entries || err != nil {
		t.Errorf("%d entries verify, error %v, wanted %d", n, err, entries)
	}
	if _, err := s.Audit(ctx); err != nil {
		t.Errorf("audit: %v", err)
	}
	rec, err := s.Batch(ctx, benchBatch(1).ID)
	if err != nil || len(rec.Readings) != 1 || len(rec.Given) != 1 || len(rec.Volumes) != volumes {
		t.Errorf("record %+v, error %v, wanted a reading, a blend and %d volumes", rec, err, volumes)
	}
	if list, err := s.Open(ctx); err != nil || len(list) != 2 {
		t.Errorf("%d open, error %v, wanted 2", len(list), err)
	}
}

func TestOlderIsReadAsItIs(t *testing.T) {
	place := filepath.Join(t.TempDir(), "journal")
	older(t, place)
	s, err := openAs(context.Background(), place, immutable, apply(nil))
	if err != nil {
		t.Fatal(err)
	}
	defer s.Close()
	looksWhole(t, s, 4, 0)
	var version int
	if err := s.db.QueryRow("SELECT user_version FROM pragma_user_version").Scan(&version); err != nil || version != 1 {
		t.Errorf("version %d, error %v, wanted 1: it was opened to be read", version, err)
	}
	_, err = s.Append(context.Background(), "ada", benchDay, func(journal.Reader) ([]journal.Body, error) {
		return []journal.Body{journal.Volume{Batch: benchBatch(1).ID, At: benchDay, Volume: "90"}}, nil
	})
	if !errors.Is(err, journal.ErrReadOnly) {
		t.Errorf("a write: %v, wanted %v", err, journal.ErrReadOnly)
	}
}

func TestOlderIsBroughtUp(t *testing.T) {
	place := filepath.Join(t.TempDir(), "journal")
	older(t, place)
	s := openAt(t, place)
	looksWhole(t, s, 4, 0)
	write(t, s, journal.Volume{Batch: benchBatch(1).ID, At: benchDay, Volume: "90"})
	looksWhole(t, s, 5, 1)
}
