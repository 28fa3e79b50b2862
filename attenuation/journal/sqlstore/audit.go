package sqlstore

import (
	"context"
	"fmt"

	"gylebook/attenuation/journal"
)

// batches that are open by the entries
const openByEntries = `SELECT b.id, b.vessel FROM batch b
	WHERE NOT EXISTS (SELECT 1 FROM void_entry x WHERE x.entry = b.number)
	AND NOT EXISTS (SELECT 1 FROM batch_close c WHERE c.batch = b.id
		AND NOT EXISTS (SELECT 1 FROM void_entry x WHERE x.entry = c.number))`

// Audit checks what journal.VerifyAll does not see: the structure of the file and
// its indexes, the recorded migrations (journal.ErrTampered), and the cache of open
// batches, which is made anew where it differs from the entries. It returns how
// many batches were wrong in the cache. A cache that is right is not written.
func (s *Store) Audit(ctx context.Context) (int, error) {
	wrong := 0
	err := s.view(ctx, func(v *view) error {
		if err := checkMigrations(ctx, v.tx, migrations, v.version); err != nil {
			return err
		}
		var verdict string
		if err := v.tx.QueryRowContext(ctx, pragmaCheck).Scan(&verdict); err != nil {
			return err
		}
		if verdict != "ok" {
			return fmt.Errorf("%w: %s", journal.ErrTampered, verdict)
		}
		var err error
		wrong, err = v.wrongOpen(ctx)
		return err
	})
	if err != nil || wrong == 0 {
		return 0, err
	}
	err = s.write(ctx, func(v *view) (bool, error) {
		if err := v.exec(ctx, "DELETE FROM open_batch"); err != nil {
			return false, err
		}
		return true, v.exec(ctx, "INSERT INTO open_batch (batch, vessel) "+openByEntries)
	})
	return wrong, err
}

// wrongOpen counts the batches of which the cache and the entries disagree.
func (v *view) wrongOpen(ctx context.Context) (int, error) {
	type row struct{ id, vessel string }
	var r row
	diff := make(map[row]int)
	for query, sign := range map[string]int{"SELECT batch, vessel FROM open_batch": 1, openByEntries: -1} {
		err := v.each(ctx, query, nil, []any{&r.id, &r.vessel}, func() error {
			if diff[r] += sign; diff[r] == 0 {
				delete(diff, r)
			}
			return nil
		})
		if err != nil {
			return 0, err
		}
	}
	ids := make(map[string]bool)
	for r := range diff {
		ids[r.id] = true
	}
	return len(ids), nil
}
