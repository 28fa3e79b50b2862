package sqlstore

import (
	"context"
	"path/filepath"
	"testing"

	"gylebook/attenuation/journal"
	"gylebook/attenuation/journal/storetest"
)

func TestStore(t *testing.T) {
	storetest.Run(t, func(t *testing.T) journal.Store { return openAt(t, filepath.Join(t.TempDir(), "journal")) })
	storetest.RunShared(t, func(t *testing.T, place string) journal.Store { return openAt(t, place) })
}

func openAt(t testing.TB, place string) *Store {
	t.Helper()
	s, _, err := OpenOrCreate(context.Background(), place)
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { _ = s.Close() })
	return s
}
