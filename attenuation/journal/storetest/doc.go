// Package storetest is what every journal.Store must pass: the errors it
// documents, numbering, what is void, the views a reader gets, what was typed
// coming back as typed, writers side by side, restore and backup.
//
// Run takes stores that are empty and independent, RunShared stores that hold one
// journal between them, copies included.
package storetest
