// Package exchange takes a journal out and in.
//
// As JSON Lines it is the whole journal, every entry with its digest and chain:
// [WriteLines] and [ReadLines]. What was read back into an empty journal and written
// again is the same, byte for byte.
//
// As separated values it is the table of readings for people, with what was typed
// and with what follows from it: [WriteReadings]. [Import] takes the typed columns
// of such a table, reckons the rest anew, says where the file has another figure,
// and writes all rows or none.
package exchange
