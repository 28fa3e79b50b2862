package sqlstore

import (
	"context"
	"crypto/sha256"
	"database/sql"
	"embed"
	"encoding/hex"
	"errors"
	"fmt"
	"io/fs"

	"gylebook/attenuation/journal"
)

//go:embed migrations/*.sql
var embedded embed.FS

// migration is one step of the schema. Steps are numbered from 1 in order of their
// names.
type migration struct{ name, text string }

func (m migration) digest() string {
	sum := sha256.Sum256([]byte(m.text))
	return hex.EncodeToString(sum[:])
}

// source gives the number of steps without reading them.
type source struct {
	files fs.FS
	names []string
}

var migrations = mustList(embedded)

func mustList(files fs.FS) source {
	names, _ := fs.Glob(files, "migrations/*.sql") // the pattern is well formed
	return source{files, names}
}

func (s source) step(version int) (migration, error) {
	text, err := fs.ReadFile(s.files, s.names[version-1])
	return migration{s.names[version-1], string(text)}, err
}

// migrate brings a database from a version to the newest, one transaction a step.
// Another process may do the same at the same moment.
func migrate(ctx context.Context, db *sql.DB, version int, from source) error {
	if version > len(from.names) {
		return fmt.Errorf("schema version %d, this program knows %d: %w", version, len(from.names), journal.ErrNewer)
	}
	for ; version < len(from.names); version++ {
		m, err := from.step(version + 1)
		if err != nil {
			return err
		}
		if err := migrateStep(ctx, db, version+1, m); err != nil {
			return fmt.Errorf("%s: %w", m.name, writeErr(err))
		}
	}
	return nil
}

func migrateStep(ctx context.Context, db *sql.DB, version int, m migration) error {
	tx, err := db.BeginTx(ctx, nil)
	if err != nil {
		return err
	}
	defer func() { _ = tx.Rollback() }()
	var id, present int
	if err := tx.QueryRowContext(ctx, pragmaKind).Scan(&id, &present); err != nil {
		return err
	}
	if present >= version {
		return nil // done by another
	}
	if _, err := tx.ExecContext(ctx, m.text); err != nil {
		return err
	}
	_, err = tx.ExecContext(ctx, "INSERT INTO migration (version, name, digest) VALUES (?, ?, ?)", version, m.name, m.digest())
	if err != nil {
		return err
	}
	if _, err := tx.ExecContext(ctx, fmt.Sprintf(pragmaVersion, version)); err != nil {
		return err
	}
	return tx.Commit()
}

// volumesFrom is the version of the schema from which batches have volumes.
const volumesFrom = 2

// checkMigrations compares what was recorded, up to a version, with what the program
// holds.
func checkMigrations(ctx context.Context, tx *sql.Tx, from source, version int) error {
	for k := range from.names[:min(version, len(from.names))] {
		m, err := from.step(k + 1)
		if err != nil {
			return err
		}
		var digest string
		err = tx.QueryRowContext(ctx, "SELECT digest FROM migration WHERE version = ? AND name = ?", k+1, m.name).Scan(&digest)
		if errors.Is(err, sql.ErrNoRows) || err == nil && digest != m.digest() {
			return fmt.Errorf("%s is not recorded as it is: %w", m.name, journal.ErrTampered)
		}
		if err != nil {
			return err
		}
	}
	return nil
}
