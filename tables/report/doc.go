// Package report writes whole HTML documents that need nothing beside them: a
// [Report] to read, send and print, and a [Card] to print and hang by the tank.
//
// Each is one file with its stylesheet and its pictures inside, without script and
// without any address to fetch from; a Content-Security-Policy in the file says so
// to the browser. The same input gives the same bytes: the time a document was
// made is given by the caller.
//
// The package knows neither gravities nor batches; figures come as text, rounded
// and named.
package report
