// Package tables prints neutral rows: as a quiet text table, as stacked
// `name: value` lines, as Markdown, as CSV and as JSON.
//
// A [Document] is what one command hands to a machine: ordered records with
// every number at full precision. A [Table] is what it hands to a person: cells
// that are already rounded text. The package knows neither scales nor
// temperatures; rounding, units and wording belong to the caller.
//
// Every form is built in memory and handed to the writer in one piece, so a
// value that cannot be written leaves no half output behind, and a writer that
// fails is reported.
package tables
