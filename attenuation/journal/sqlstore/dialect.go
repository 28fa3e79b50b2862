package sqlstore

import (
	"errors"
	"fmt"
	"io/fs"
	"path/filepath"
	"strings"
	"time"

	"modernc.org/sqlite"

	"gylebook/attenuation/journal"
)

// All that is SQLite's own is in this file and in the migrations.

const (
	// applicationID is "gyle" in ASCII; it marks the file as a journal.
	applicationID  = 0x67796c65
	pragmaKind     = "SELECT application_id, user_version FROM pragma_application_id, pragma_user_version"
	pragmaMark     = "PRAGMA application_id = %d"
	pragmaVersion  = "PRAGMA user_version = %d"
	pragmaWAL      = "PRAGMA journal_mode = WAL"
	pragmaCheck    = "PRAGMA integrity_check(1)"
	pragmaUnsynced = "PRAGMA synchronous = OFF"
	copyInto       = "VACUUM INTO ?"

	fileMagic = "SQLite format 3\x00"
)

// Result codes, https://www.sqlite.org/rescode.html. The primary code is the low
// byte of an extended one.
const (
	codeBusy     = 5
	codeLocked   = 6
	codeReadOnly = 8
	codeCorrupt  = 11
	codeFull     = 13
	codeCantOpen = 14
	codeNotADB   = 26
)

// access says how the file is opened.
type access string

const (
	readWrite access = "mode=rw"
	create    access = "mode=rwc"
	immutable access = "mode=ro&immutable=1" // neither log nor lock beside it
)

// escaped hides what has a meaning in a URI.
var escaped = strings.NewReplacer("%", "%25", "?", "%3f", "#", "%23")

// dsn names a file for the driver. A transaction that may write takes the write
// lock at its beginning: of writers that upgrade from a read, all but one fail.
func dsn(path string, how access, wait time.Duration) (string, error) {
	abs, err := filepath.Abs(path)
	if err != nil {
		return "", err
	}
	slash := filepath.ToSlash(abs)
	if !strings.HasPrefix(slash, "/") {
		slash = "/" + slash // a drive letter
	}
	return fmt.Sprintf("file://%s?%s&_txlock=immediate&_pragma=busy_timeout(%d)&_pragma=foreign_keys(1)&_pragma=synchronous(FULL)&_pragma=cache_size(-4000)",
		escaped.Replace(slash), how, wait.Milliseconds()), nil
}

// code returns the primary result code of a driver's error, 0 for another error.
func code(err error) int {
	var e *sqlite.Error
	if !errors.As(err, &e) {
		return 0
	}
	return e.Code() & 0xff
}

// readErr maps an error met while reading to those of the journal.
func readErr(err error) error {
	switch code(err) {
	case codeBusy, codeLocked:
		return wrap(journal.ErrBusy, err)
	case codeCorrupt, codeNotADB:
		return wrap(journal.ErrNoJournal, err)
	case codeCantOpen:
		return wrap(fs.ErrPermission, err)
	}
	return err
}

// writeErr maps an error met while writing to those of the journal.
func writeErr(err error) error {
	switch code(err) {
	case 0:
		return err
	case codeReadOnly, codeCantOpen:
		return wrap(journal.ErrReadOnly, err)
	case codeFull:
		return wrap(journal.ErrDiskFull, err)
	case codeBusy, codeLocked, codeCorrupt, codeNotADB:
		return readErr(err)
	}
	return wrap(journal.ErrNotWritten, err)
}

func wrap(kind, err error) error {
	return fmt.Errorf("%w (%v)", kind, err)
}
