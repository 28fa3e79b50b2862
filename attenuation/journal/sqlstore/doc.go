// Package sqlstore keeps a journal in a database reached through database/sql:
// SQLite, embedded, in one file.
//
// Every entry has a row in the table entry and one in the typed table of its kind.
// What was typed is stored as text, so that it comes back with every digit. A
// trigger on every table aborts an update or a delete, by whatever program; what
// gets past the triggers does not match the digests (journal.VerifyAll).
//
// Writers take turns: a transaction that will write says so when it begins, and
// waits. When Append returns, the entry has been synced to the disk (write-ahead
// log, synchronous=FULL), as the SQLite documentation "Write-Ahead Logging" and
// "PRAGMA synchronous" describe.
//
// The table open_batch is a cache of which batches are open, kept in the same
// transaction as the entries that open, close or void. It lies outside the chain;
// Audit compares it with the entries and makes it anew when they differ.
//
// A journal in a folder that cannot be written is read as an immutable file: what
// another program writes at the very same moment may be missed.
package sqlstore
