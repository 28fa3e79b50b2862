// Gylebook corrects hydrometer readings, converts gravity scales, estimates
// alcohol and attenuation, and says where every figure comes from.
//
//	gylebook COMMAND VALUES [flags]
//
// The voice of the program: stdout carries data only. Notes, cautions and errors
// go to stderr in lower case without a full stop; an error says what was read and
// what was wanted, and a line "hint:" says what to type instead. Prompts appear
// only when stdin is a terminal.
//
// This package translates and nothing else: it parses the line, calls the
// packages below and hands their rows to package tables. A command file that
// grows past a hundred lines has logic in the wrong room.
package main
