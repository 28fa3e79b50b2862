// Package method is the vocabulary of provenance: what a published relation is
// called, where it was printed, the range it was fitted on and how it was
// checked. A registry is a plain slice of such entries; flags, help, tables and
// the checks all read the same one.
//
// The package imports the standard library only and knows no physics.
package method
