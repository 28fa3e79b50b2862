// Package volume works through whole files of readings: separated values in, the
// same rows out with the figures of each, in the same form or as JSON Lines.
//
// [Run] cuts the input at record boundaries, works the pieces on several processors
// and writes them in order. Memory does not grow with the file, and a row that is
// worked costs no allocation. What a row means is a [Worker]'s to say; a [Corrector]
// is one for temperature corrections of SG readings.
package volume
