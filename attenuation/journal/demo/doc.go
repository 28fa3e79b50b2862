// Package demo writes an invented season into an empty journal: the Alder Lane
// Cellar of 2026, with the slips, additions and instruments of a working year.
// Nothing in it was measured. It is the same on every run, digests included, so
// that a tour of the program shows the same figures everywhere.
//
// A reading starts from a true gravity, taken from a curve of growth and uptake.
// What stands in the journal is what a hydrometer would have shown at the sample's
// temperature, rounded to its division and typed the way people type, so that
// correcting it leads back to the curve within what the instrument can tell.
package demo
