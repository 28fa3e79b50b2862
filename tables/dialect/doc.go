// Package dialect reads separated values as people's programs write them: with
// comma, semicolon or tab, with a decimal point or a decimal comma, with or without
// a byte order mark, with any line end. [Detect] finds out which from whole columns
// and refuses a mixture; a [Reader] then gives records with the lines they stand on.
//
// The form of quoting is that of RFC 4180. The package knows no column by name.
package dialect
