// Package published holds the printed rows that the relations are checked
// against: one CSV file a source, embedded, with its source, status and units
// in the head of the file. The tests and the self-check read the same rows.
//
// A file begins with lines of the form "# key: value" (source, status, units
// and any number of notes), then a line of column names, then the rows as
// printed, trailing zeros included. Two more columns stand in every file: tol,
// a list of tolerances where half a unit of the last printed place does not
// serve, and why, the reason for them.
//
// The go command leaves a folder named testdata out of "./..."; name this
// package by its path to vet or test it.
package published
