package sqlstore

import (
	"context"
	"errors"
	"fmt"
	"io/fs"
	"os"
	"path/filepath"
	"runtime"
	"sync"
	"syscall"
	"testing"
	"testing/fstest"
	"time"

	"gylebook/attenuation/journal"
)

func TestCreate(t *testing.T) {
	ctx := context.Background()
	place := filepath.Join(t.TempDir(), "one", "two 100%?#&", "journal?x=1")
	if _, err := Open(ctx, place); !errors.Is(err, fs.ErrNotExist) {
		t.Errorf("open before it is there: %v, wanted %v", err, fs.ErrNotExist)
	}
	s, err := Create(ctx, place)
	if err != nil {
		t.Fatal(err)
	}
	everyKind(t, s)
	if err := s.Close(); err != nil {
		t.Fatal(err)
	}
	if _, err := Create(ctx, place); !errors.Is(err, journal.ErrExists) {
		t.Errorf("created twice: %v, wanted %v", err, journal.ErrExists)
	}
	s, made, err := OpenOrCreate(ctx, place)
	if err != nil || made {
		t.Fatalf("opened again: made %t, error %v", made, err)
	}
	defer s.Close()
	if n, err := journal.VerifyAll(ctx, s); n != 13 || err != nil {
		t.Errorf("%d entries verify, error %v, wanted 13", n, err)
	}
	if runtime.GOOS == "windows" {
		return
	}
	for path, want := range map[string]fs.FileMode{place: 0o600, filepath.Dir(place): 0o700, place + "-wal": 0o600} {
		if info, err := os.Stat(path); err != nil || info.Mode().Perm() != want {
			t.Errorf("%s: mode %v, error %v, wanted %o", path, info.Mode().Perm(), err, want)
		}
	}
}

func TestSettings(t *testing.T) {
	s := openAt(t, filepath.Join(t.TempDir(), "journal"))
	for pragma, want := range map[string]string{
		"journal_mode": "wal", "synchronous": "2", "foreign_keys": "1", "busy_timeout": "15000", "application_id": fmt.Sprint(applicationID), "user_version": "2",
	} {
		var got string
		if err := s.db.QueryRow("PRAGMA " + pragma).Scan(&got); err != nil || got != want {
			t.Errorf("%s is %s, error %v, wanted %s", pragma, got, err, want)
		}
	}
}

func TestNoJournal(t *testing.T) {
	whole := closedFile(t)
	other := filepath.Join(t.TempDir(), "other")
	if _, err := raw(t, other).Exec("CREATE TABLE t (x)"); err != nil {
		t.Fatal(err)
	}
	unmarked, err := os.ReadFile(other)
	if err != nil {
		t.Fatal(err)
	}
	for name, data := range map[string][]byte{
		"empty": nil, "text": []byte("batch,reading\nB-1,1.048\n"), "short": []byte("SQLite"), "long text": make([]byte, 10_000), "another database": unmarked,
		"head alone": whole[:100], "one page": whole[:4096], "half": whole[:len(whole)/2], "half a page": whole[:len(whole)-2048], "one byte short": whole[:len(whole)-1],
	} {
		place := fileOf(t, data)
		if s, err := Open(context.Background(), place); !errors.Is(err, journal.ErrNoJournal) {
			t.Errorf("%s: store %v, error %v, wanted %v", name, s, err, journal.ErrNoJournal)
		}
		if s, made, err := OpenOrCreate(context.Background(), place); !errors.Is(err, journal.ErrNoJournal) || made {
			t.Errorf("%s: store %v, made %t, error %v, wanted %v", name, s, made, err, journal.ErrNoJournal)
		}
		if after, err := os.ReadFile(place); err != nil || string(after) != string(data) {
			t.Errorf("%s: the file was changed", name)
		}
	}
	if _, err := Open(context.Background(), t.TempDir()); !errors.Is(err, journal.ErrNoJournal) {
		t.Errorf("a folder: %v, wanted %v", err, journal.ErrNoJournal)
	}
}

func TestNewer(t *testing.T) {
	place := filepath.Join(t.TempDir(), "journal")
	if err := openAt(t, place).Close(); err != nil {
		t.Fatal(err)
	}
	if _, err := raw(t, place).Exec("PRAGMA user_version = 3"); err != nil {
		t.Fatal(err)
	}
	if _, err := Open(context.Background(), place); !errors.Is(err, journal.ErrNewer) {
		t.Errorf("a newer schema: %v, wanted %v", err, journal.ErrNewer)
	}
}

func TestBusy(t *testing.T) {
	place := filepath.Join(t.TempDir(), "journal")
	everyKind(t, openAt(t, place))
	s, err := Open(context.Background(), place, Wait(20*time.Millisecond))
	if err != nil {
		t.Fatal(err)
	}
	defer s.Close()
	holder, err := raw(t, place).Begin()
	if err != nil {
		t.Fatal(err)
	}
	if _, err := holder.Exec("UPDATE open_batch SET vessel = vessel"); err != nil { // takes the write lock
		t.Fatal(err)
	}
	draft := func(journal.Reader) ([]journal.Body, error) {
		return []journal.Body{benchReading(benchBatch(2), 1)}, nil
	}
	noInstrument := func(r journal.Reader) ([]journal.Body, error) {
		reading := benchReading(benchBatch(2), 1)
		reading.Instrument = ""
		return []journal.Body{reading}, nil
	}
	if _, err := s.Append(context.Background(), "ada", benchDay, draft); !errors.Is(err, journal.ErrBusy) {
		t.Errorf("while another holds the journal: %v, wanted %v", err, journal.ErrBusy)
	}
	if err := holder.Rollback(); err != nil {
		t.Fatal(err)
	}
	if _, err := s.Append(context.Background(), "ada", benchDay, noInstrument); err != nil {
		t.Errorf("when the other is done: %v", err)
	}
}

// Where the file system has no links, one of several makers still wins.
func TestPublishWithoutLinks(t *testing.T) {
	link = func(string, string) error { return &os.LinkError{Op: "link", Err: syscall.EPERM} }
	defer func() { link = os.Link }()
	place := filepath.Join(t.TempDir(), "journal")
	var mu sync.Mutex
	var wg sync.WaitGroup
	makers := 0
	for k := range 20 {
		wg.Go(func() {
			s, made, err := OpenOrCreate(context.Background(), place)
			if err != nil {
				t.Error(err)
				return
			}
			defer s.Close()
			_, err = s.Append(context.Background(), "ada", benchDay, func(journal.Reader) ([]journal.Body, error) {
				return []journal.Body{benchBatch(k)}, nil
			})
			if err != nil {
				t.Error(err)
			}
			mu.Lock()
			defer mu.Unlock()
			if made {
				makers++
			}
		})
	}
	wg.Wait()
	if makers != 1 {
		t.Errorf("%d say that they made it, wanted 1", makers)
	}
	if n := checkAcknowledged(t, place, nil); n != 20 {
		t.Errorf("%d entries, wanted 20", n)
	}
}

func TestMigrate(t *testing.T) {
	ctx := context.Background()
	first, err := migrations.step(1)
	if err != nil {
		t.Fatal(err)
	}
	second, err := migrations.step(2)
	if err != nil {
		t.Fatal(err)
	}
	three := mustList(fstest.MapFS{
		first.name:                  {Data: []byte(first.text)},
		second.name:                 {Data: []byte(second.text)},
		"migrations/0003_later.sql": {Data: []byte("CREATE TABLE later (x INTEGER) STRICT; INSERT INTO later VALUES (1);")},
	})
	broken := mustList(fstest.MapFS{
		first.name:                  {Data: []byte(first.text)},
		second.name:                 {Data: []byte(second.text)},
		"migrations/0003_later.sql": {Data: []byte("CREATE TABLE later (x INTEGER) STRICT; INSERT INTO nowhere VALUES (1);")},
	})
	place := filepath.Join(t.TempDir(), "journal")
	s := openAt(t, place)
	everyKind(t, s)
	if err := migrate(ctx, s.db, 2, broken); !errors.Is(err, journal.ErrNotWritten) {
		t.Errorf("a broken step: %v, wanted %v", err, journal.ErrNotWritten)
	}
	var wg sync.WaitGroup
	for range 8 { // each believes that it must
		wg.Go(func() {
			if err := migrate(ctx, s.db, 2, three); err != nil {
				t.Error(err)
			}
		})
	}
	wg.Wait()
	var rows, steps, version int
	err = s.db.QueryRow("SELECT (SELECT count(*) FROM later), (SELECT count(*) FROM migration), user_version FROM pragma_user_version").Scan(&rows, &steps, &version)
	if err != nil || rows != 1 || steps != 3 || version != 3 {
		t.Errorf("%d rows, %d steps, version %d, error %v, wanted 1, 3, 3", rows, steps, version, err)
	}
	if n, err := journal.VerifyAll(ctx, s); n != 13 || err != nil {
		t.Errorf("%d entries verify, error %v, wanted 13", n, err)
	}
	if err := s.Close(); err != nil {
		t.Fatal(err)
	}
	if _, err := Open(ctx, place); !errors.Is(err, journal.ErrNewer) {
		t.Errorf("opened by the older program: %v, wanted %v", err, journal.ErrNewer)
	}
}
