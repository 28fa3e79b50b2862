package sqlstore

import (
	"context"
	"database/sql"
	"errors"
	"fmt"
	"io"
	"io/fs"
	"os"
	"sync/atomic"
	"time"

	"gylebook/attenuation/journal"
)

// Store is a journal in one SQLite file.
type Store struct {
	path    string
	version int // of the schema
	db      *sql.DB
	turn    chan struct{} // held by the one goroutine that writes
	closed  atomic.Bool
	frozen  bool // opened as an immutable file
}

var _ journal.Store = (*Store)(nil)

// Option changes how a journal is opened.
type Option func(*settings)

type settings struct{ wait time.Duration }

// Wait says how long a write waits for other writers before it gives ErrBusy; 15 s
// unless given. A context's deadline ends the wait too.
func Wait(d time.Duration) Option { return func(s *settings) { s.wait = d } }

func apply(opts []Option) settings {
	s := settings{wait: 15 * time.Second}
	for _, o := range opts {
		o(&s)
	}
	return s
}

// Open opens the journal at path. A missing file is fs.ErrNotExist, a file of
// another kind, empty or truncated journal.ErrNoJournal, one of a newer version
// journal.ErrNewer, one that cannot be read fs.ErrPermission. A journal that cannot
// be written opens; its writes give journal.ErrReadOnly.
func Open(ctx context.Context, path string, opts ...Option) (*Store, error) {
	set := apply(opts)
	if err := lookAt(path); err != nil {
		return nil, fmt.Errorf("journal %s: %w", path, err)
	}
	s, err := openAs(ctx, path, readWrite, set)
	// In a folder that cannot be written, the files beside the journal that readers
	// share cannot be made. Without a log there is nothing in them to miss.
	if errors.Is(err, fs.ErrPermission) || errors.Is(err, journal.ErrReadOnly) {
		if info, statErr := os.Stat(path + "-wal"); statErr != nil || info.Size() == 0 {
			s, err = openAs(ctx, path, immutable, set)
		}
	}
	if err != nil {
		return nil, fmt.Errorf("journal %s: %w", path, err)
	}
	return s, nil
}

// lookAt refuses what is no database before SQLite sees it.
func lookAt(path string) error {
	// Asked before it is opened: a pipe would wait for its other end.
	info, err := os.Stat(path)
	if err != nil {
		return err
	}
	if !info.Mode().IsRegular() {
		return fmt.Errorf("%w: not a file that keeps anything", journal.ErrNoJournal)
	}
	f, err := os.Open(path)
	if err != nil {
		return err
	}
	defer f.Close()
	magic := make([]byte, len(fileMagic))
	switch _, err := io.ReadFull(f, magic); {
	case err == io.EOF:
		return fmt.Errorf("%w: the file is empty", journal.ErrNoJournal)
	case err == io.ErrUnexpectedEOF, err == nil && string(magic) != fileMagic:
		return fmt.Errorf("%w: a file of another kind", journal.ErrNoJournal)
	default:
		return err
	}
}

func openAs(ctx context.Context, path string, how access, set settings) (*Store, error) {
	name, err := dsn(path, how, set.wait)
	if err != nil {
		return nil, err
	}
	db, err := sql.Open("sqlite", name)
	if err != nil {
		return nil, err
	}
	db.SetMaxIdleConns(4)
	s := &Store{path: path, db: db, turn: make(chan struct{}, 1), frozen: how == immutable}
	if err := s.checkKind(ctx); err != nil {
		_ = db.Close()
		return nil, err
	}
	return s, nil
}

// checkKind tells a journal from other databases and brings an older one up.
func (s *Store) checkKind(ctx context.Context) error {
	var id, version int
	if err := s.db.QueryRowContext(ctx, pragmaKind).Scan(&id, &version); err != nil {
		if code(err) == codeReadOnly {
			return wrap(journal.ErrReadOnly, err)
		}
		return readErr(err)
	}
	if id != applicationID {
		return fmt.Errorf("%w: a database of another program", journal.ErrNoJournal)
	}
	s.version = len(migrations.names)
	err := migrate(ctx, s.db, version, migrations)
	if version > 0 && errors.Is(err, journal.ErrReadOnly) {
		// Read as it is: all that later versions added is missing in it.
		s.version, err = version, nil
	}
	return err
}

// Close implements journal.Store.
func (s *Store) Close() error {
	s.closed.Store(true)
	return s.db.Close()
}

// view calls fn with a view of the journal in one read transaction.
func (s *Store) view(ctx context.Context, fn func(*view) error) error {
	if s.closed.Load() {
		return closedErr()
	}
	tx, err := s.db.BeginTx(ctx, &sql.TxOptions{ReadOnly: true})
	if err != nil {
		return s.failed(ctx, err, readErr)
	}
	defer func() { _ = tx.Rollback() }()
	v := newView(tx, s.version)
	defer v.over.Store(true)
	return s.failed(ctx, fn(v), readErr)
}

// failed says what an error was: the context's end, the store's or the database's.
func (s *Store) failed(ctx context.Context, err error, mapped func(error) error) error {
	switch {
	case err == nil:
		return nil
	case ctx.Err() != nil:
		return ctx.Err()
	case s.closed.Load():
		return closedErr()
	}
	return mapped(err)
}

func closedErr() error { return fmt.Errorf("journal: %w", journal.ErrClosed) }
