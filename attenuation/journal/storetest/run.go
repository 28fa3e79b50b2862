package storetest

import (
	"path/filepath"
	"testing"

	"gylebook/attenuation/journal"
)

// Run tests stores one by one. Each call of open gives an empty store that the
// test closes.
func Run(t *testing.T, open func(t *testing.T) journal.Store) {
	for _, c := range []struct {
		name string
		test func(*testing.T, journal.Store)
	}{
		{"empty", testEmpty},
		{"numbers", testNumbers},
		{"every kind comes back", testEveryKind},
		{"pointers to bodies", testPointers},
		{"odd text comes back", testOddText},
		{"offsets come back", testOffsets},
		{"clock goes back", testClock},
		{"all or none", testAllOrNone},
		{"draft", testDraft},
		{"draft's own view", testDraftView},
		{"one by one", testEach},
		{"one by one, all or none", testEachAllOrNone},
		{"one by one, own view", testEachView},
		{"one by one, cancelled", testEachCancelled},
		{"ids are never used again", testIDs},
		{"what is not there", testNotFound},
		{"closed batch", testClosed},
		{"retired instrument", testRetired},
		{"instrument retired later", testRetiredBefore},
		{"volume", testVolume},
		{"blended into others", testGiven},
		{"void", testVoid},
		{"void batch", testVoidBatch},
		{"void ones asked for", testVoidOnes},
		{"void instrument", testVoidInstrument},
		{"incomplete", testIncomplete},
		{"record", testRecord},
		{"instruments", testInstruments},
		{"open", testOpen},
		{"newest readings of open batches", testOpenLast},
		{"places of open batches", testOpenPlaces},
		{"lean batches", testLean},
		{"filters", testFilters},
		{"finished", testFinished},
		{"last by", testLastBy},
		{"last instrument by", testLastInstrument},
		{"iteration stopped early", testStopped},
		{"snapshot", testSnapshot},
		{"cancelled", testCancelled},
		{"goroutines", testGoroutines},
		{"closed store", testClosedStore},
	} {
		t.Run(c.name, func(t *testing.T) {
			s := open(t)
			defer s.Close()
			c.test(t, s)
		})
	}
	t.Run("restore", func(t *testing.T) { testRestore(t, open) })
	t.Run("restore refused", func(t *testing.T) { testRestoreRefused(t, open) })
}

// RunShared tests several stores that hold one journal. open makes the journal at
// place when it is not there, and may be called for one place any number of times.
func RunShared(t *testing.T, open func(t *testing.T, place string) journal.Store) {
	for _, c := range []struct {
		name string
		test func(t *testing.T, a, b journal.Store)
	}{
		{"two stores", testTwoStores},
		{"two writers", testTwoWriters},
		{"reader beside a writer", testReaderBeside},
		{"reader beside many", testReaderBesideEach},
	} {
		t.Run(c.name, func(t *testing.T) {
			place := filepath.Join(t.TempDir(), "journal")
			a := open(t, place)
			defer a.Close()
			b := open(t, place)
			defer b.Close()
			c.test(t, a, b)
		})
	}
	t.Run("kept", func(t *testing.T) {
		place := filepath.Join(t.TempDir(), "journal")
		testKept(t, func() journal.Store { return open(t, place) })
	})
	t.Run("backup", func(t *testing.T) { testBackup(t, open) })
	t.Run("backup while writing", func(t *testing.T) { testBackupWriting(t, open) })
}
