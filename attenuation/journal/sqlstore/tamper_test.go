package sqlstore

import (
	"bytes"
	"context"
	"database/sql"
	"errors"
	"fmt"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"gylebook/attenuation/journal"
)

// everyKind fills a journal with one entry of each kind, the first of its kind
// always filled in, and some more.
func everyKind(t *testing.T, s *Store) {
	t.Helper()
	day, b := benchDay, benchBatch(1)
	gravity, temp := journal.Typed{Text: "1.0480", Scale: "sg"}, journal.TypedTemp{Text: "18.50", Unit: "C"}
	h := journal.Instrument{
		ID: "H1", Type: journal.Hydrometer, Scale: "sg", Basis: "20/20", Division: "0.001", RangeLo: "0.990", RangeHi: "1.060", Body: "glass",
		ReadAt: "bottom", MaxError: "0.001", StemMM: "4.5", MassG: "60", Tension: "72.8", Note: "blue", Since: day,
	}
	points := []journal.CertificatePoint{{Reading: "1.000", Correction: "+0.001", U: "0.0003"}, {Reading: "1.050", Correction: "0", U: "0.0003"}}
	bodies := []journal.Body{
		h,
		journal.Certificate{Instrument: "H1", At: day, Reference: "C-1", Points: points},
		journal.Check{
			Instrument: "H1", At: day, Liquid: journal.InSucrose, Strength: "10.0", Found: gravity, Expected: gravity, Temp: temp, Correction: "0.000",
		},
		b,
		journal.OG{Batch: b.ID, At: day, Gravity: gravity, Temp: temp, Instrument: "H1"},
		journal.Limit{Batch: b.ID, At: day, Gravity: gravity},
		journal.Reading{
			Batch: b.ID, Vessel: "T1", TakenAt: day, Quality: journal.Exact, Gravity: gravity, Temp: temp, Instrument: "H1", Keep: "sure", Note: "hand-written-marker",
		},
		journal.Event{Batch: b.ID, At: day, What: journal.Sugar, MassKg: "2.0", VolumeL: "3.0", Gravity: gravity, From: "B-0", Vessel: "T2", Note: "cane"},
		journal.Void{Entry: 6, Reason: "typed wrong"},
		journal.Volume{Batch: b.ID, At: day, Volume: "98.5"},
		journal.Close{Batch: b.ID, At: day, Note: "packed"},
		journal.Retire{Instrument: "H1", At: day, Reason: "broken"},
		benchBatch(2),
	}
	if _, err := s.Append(context.Background(), "ada", day, func(journal.Reader) ([]journal.Body, error) { return bodies, nil }); err != nil {
		t.Fatal(err)
	}
}

// sealedTables are those whose every column the digests cover.
var sealedTables = []string{
	"entry", "instrument", "certificate", "certificate_point", "instrument_check", "retirement", "batch", "batch_og", "batch_limit",
	"batch_close", "reading", "batch_event", "batch_volume", "void_entry",
}

// raw opens the file as any other program would.
func raw(t *testing.T, place string) *sql.DB {
	t.Helper()
	db, err := sql.Open("sqlite", place)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { _ = db.Close() })
	return db
}

func columnsOf(t *testing.T, db *sql.DB, table string) []string {
	t.Helper()
	rows, err := db.Query("SELECT name FROM pragma_table_info(?)", table)
	if err != nil {
		t.Fatal(err)
	}
	defer rows.Close()
	var names []string
	for rows.Next() {
		var name string
		if err := rows.Scan(&name); err != nil {
			t.Fatal(err)
		}
		names = append(names, name)
	}
	if len(names) == 0 {
		t.Fatalf("no column in %s", table)
	}
	return names
}

// A change of any value, in any column of any table, is found, and the entry named.
func TestEveryColumnIsSealed(t *testing.T) {
	place := filepath.Join(t.TempDir(), "journal")
	everyKind(t, openAt(t, place))
	db := raw(t, place)
	tried := 0
	for _, table := range sealedTables {
		for _, column := range columnsOf(t, db, table) {
			tx, err := db.Begin()
			if err != nil {
				t.Fatal(err)
			}
			var number int64
			if err := tx.QueryRow("SELECT min(number) FROM " + table).Scan(&number); err != nil {
				t.Fatal(err)
			}
			// The triggers go first, as they would for whoever wants to change something.
			change := fmt.Sprintf(`DROP TRIGGER %[1]s_no_update; UPDATE %[1]s SET %[2]s = CASE typeof(%[2]s) WHEN 'integer' THEN %[2]s + 1000
				WHEN 'null' THEN '2026-01-01T00:00:00Z' ELSE substr(%[2]s, 1, length(%[2]s) - 1) || char(unicode(substr('x' || %[2]s, -1)) + 5) END
				WHERE number = %[3]d`, table, column, number)
			if _, err := tx.Exec(change); err != nil {
				t.Fatalf("%s.%s: %v", table, column, err)
			}
			_, err = journal.VerifyAll(context.Background(), newView(tx, len(migrations.names)))
			named := strings.Contains(fmt.Sprint(err), fmt.Sprintf("entry %d", number))
			if !errors.Is(err, journal.ErrTampered) || !named {
				t.Errorf("%s.%s of entry %d changed: verify says %v, wanted %v and the entry's number", table, column, number, err, journal.ErrTampered)
			}
			if err := tx.Rollback(); err != nil {
				t.Fatal(err)
			}
			tried++
		}
	}
	if tried < 90 {
		t.Errorf("%d columns tried, wanted them all", tried)
	}
}

// A row taken out or put in is found too.
func TestRowsAreSealed(t *testing.T) {
	place := filepath.Join(t.TempDir(), "journal")
	everyKind(t, openAt(t, place))
	db := raw(t, place)
	for _, table := range sealedTables {
		for what, change := range map[string]string{
			"last row taken out": "DELETE FROM %[1]s WHERE number = (SELECT max(number) FROM %[1]s)",
			"first row doubled": "CREATE TEMP TABLE t AS SELECT * FROM %[1]s WHERE number = (SELECT min(number) FROM %[1]s) LIMIT 1; " +
				"UPDATE t SET number = 5000; %[2]s INSERT INTO main.%[1]s SELECT * FROM t; DROP TABLE t",
		} {
			other := map[string]string{
				"instrument": "UPDATE t SET id = 'other';", "batch": "UPDATE t SET id = 'other';", "void_entry": "UPDATE t SET entry = 1;",
			}[table]
			if table == "certificate_point" && what == "first row doubled" {
				continue // points of no certificate are read by nobody
			}
			tx, err := db.Begin()
			if err != nil {
				t.Fatal(err)
			}
			if _, err := tx.Exec("DROP TRIGGER " + table + "_no_delete; " + fmt.Sprintf(change, table, other)); err != nil {
				t.Fatalf("%s, %s: %v", table, what, err)
			}
			n, err := journal.VerifyAll(context.Background(), newView(tx, len(migrations.names)))
			if table == "entry" && what == "last row taken out" {
				// The chain alone cannot miss its own end, the content left over can.
				if !strings.Contains(fmt.Sprint(err), "entry 13") {
					t.Errorf("last entry taken out: %d verify, error %v, wanted entry 13 named", n, err)
				}
			}
			if !errors.Is(err, journal.ErrTampered) {
				t.Errorf("%s, %s: %d verify, error %v, wanted %v", table, what, n, err, journal.ErrTampered)
			}
			if err := tx.Rollback(); err != nil {
				t.Fatal(err)
			}
		}
	}
}

func TestAppendOnly(t *testing.T) {
	place := filepath.Join(t.TempDir(), "journal")
	s := openAt(t, place)
	everyKind(t, s)
	db := raw(t, place)
	for _, table := range append([]string{"migration"}, sealedTables...) {
		key := columnsOf(t, db, table)[0]
		for _, change := range []string{"UPDATE " + table + " SET " + key + " = " + key, "DELETE FROM " + table} {
			_, err := db.Exec(change)
			if code(err) != 19 { // SQLITE_CONSTRAINT, which RAISE(ABORT) gives
				t.Errorf("%s: %v, wanted that a trigger aborts it", change, err)
			}
		}
	}
	if n, err := journal.VerifyAll(context.Background(), s); n != 13 || err != nil {
		t.Errorf("%d entries verify, error %v, wanted 13", n, err)
	}
}

// closedFile is a whole journal as bytes.
func closedFile(t *testing.T) []byte {
	t.Helper()
	place := filepath.Join(t.TempDir(), "journal")
	s := openAt(t, place)
	everyKind(t, s)
	if err := s.Close(); err != nil {
		t.Fatal(err)
	}
	data, err := os.ReadFile(place)
	if err != nil {
		t.Fatal(err)
	}
	return data
}

func fileOf(t *testing.T, data []byte) string {
	t.Helper()
	place := filepath.Join(t.TempDir(), "journal")
	if err := os.WriteFile(place, data, 0o600); err != nil {
		t.Fatal(err)
	}
	return place
}

func TestOneByteOfAReading(t *testing.T) {
	data := closedFile(t)
	at := bytes.Index(data, []byte("hand-written-marker"))
	if at < 0 || bytes.Count(data, []byte("hand-written-marker")) != 1 {
		t.Fatal("the note of the reading is not once in the file")
	}
	data[at+3] ^= 1
	s := openAt(t, fileOf(t, data))
	n, err := journal.VerifyAll(context.Background(), s)
	if !errors.Is(err, journal.ErrTampered) || !strings.Contains(err.Error(), "entry 7:") || n != 6 {
		t.Errorf("%d entries verify, error %v, wanted 6 and entry 7 named", n, err)
	}
}

// Wherever a byte is changed, the journal opens or says why not; if every entry
// verifies, every entry is what it was.
func TestAnyByte(t *testing.T) {
	data := closedFile(t)
	want := lines(t, openAt(t, fileOf(t, data)))
	tries, found := 600, 0
	if testing.Short() {
		tries = 100
	}
	for range tries {
		at, bit := rand.IntN(len(data)), byte(1)<<rand.IntN(8)
		changed := bytes.Clone(data)
		changed[at] ^= bit
		s, err := Open(context.Background(), fileOf(t, changed))
		if err != nil {
			found++
			continue
		}
		_, err = journal.VerifyAll(context.Background(), s)
		if err != nil {
			found++
		} else if got := lines(t, s); got != want {
			t.Errorf("byte %d changed by %#x: every entry verifies, though they are now\n%s\nand were\n%s", at, bit, got, want)
		}
		_, _ = s.Audit(context.Background())
		if err := s.Close(); err != nil {
			t.Logf("byte %d: close: %v", at, err)
		}
	}
	t.Logf("%d of %d changes found; the others hit free space, indexes or settings", found, tries)
	if found == 0 {
		t.Error("no change was found")
	}
}

func lines(t *testing.T, r journal.Reader) string {
	t.Helper()
	var out strings.Builder
	for e, err := range r.Entries(context.Background()) {
		if err != nil {
			t.Fatal(err)
		}
		text, err := e.MarshalJSON()
		if err != nil {
			t.Fatal(err)
		}
		out.Write(append(text, '\n'))
	}
	return out.String()
}
