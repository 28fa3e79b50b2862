// Package control draws the limits of an individuals and moving-range chart from
// the points themselves, looks for the eight patterns of Nelson (1984), and says
// how often a process that nothing happens to shows one of them.
//
// Points come in their order and have no time. Sources: NIST/SEMATECH e-Handbook
// of Statistical Methods 6.3.2.2 for the limits, L. S. Nelson 1984 for the patterns.
package control
