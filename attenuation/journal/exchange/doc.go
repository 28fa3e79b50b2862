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
//
// The table does not carry instruments with their checks and certificates, what was
// added to a batch or done with it, limits of attenuation, closings, yeast and
// parent of a batch, notes, nor the digests. A gravity comes back as it was typed
// with the file's decimal mark; a temperature typed in °F stands in °C with two
// decimals more than were typed, and a void reading that was suspect has the reason
// of its void alone.
package exchange

// Caveat is what whoever takes in a table of readings is to know.
const Caveat = "a table of readings carries no checks of instruments, no additions and no closings: figures that rest on them differ; JSON Lines carry all"
