// Package journal keeps what was read at the tank: instruments, batches,
// readings and what was done to a batch. It is append-only. A reading is never
// edited: it is voided with a reason and entered anew, and both stay.
//
// What was typed is kept as typed; every corrected value is derived when it is
// read, from what was typed and from the instrument's record as it was when the
// reading was taken. Entries are numbered and chained by SHA-256, so that a change
// behind the program's back shows.
//
// The package holds the domain: the kinds of entry, their checks, what is derived
// from them, what is plausible, and the Store that keeps them. It knows no
// database; journal/sqlstore does.
package journal
