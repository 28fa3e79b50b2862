// Package selfcheck recomputes the published rows that are built into the
// program with the very relations the program uses, and says for each source
// and relation how far the worst row lies from what was printed.
//
// A row passes when the value recomputed is within the row's tolerance of the
// one printed: half a unit of the last printed place, or what the row's file
// states with a reason. A relation is named by its kind and id, since two kinds
// may share an id: there is a fit and an alcohol method called balling.
package selfcheck
