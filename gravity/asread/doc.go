// Package asread turns what a person typed into typed values and back, and
// holds the one rounding function of the project.
//
// A reading keeps its digits: 1.0480 and 1.048 are the same density read on
// two different divisions, so the last typed place travels with the value as
// Step. Text that can be read in more than one way is a *Doubt, text that
// cannot be meant is a *Refusal; both say what was read, what was wanted and
// what to type instead.
//
// Decimal arithmetic stays inside this package: callers see float64 values that
// are nearest to the typed decimal, and Round and Fixed work on the shortest
// decimal that gives a float64, so 1.0485 is 1.0485 and a tie is a tie.
package asread
