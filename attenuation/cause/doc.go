// Package cause asks why the attenuation of a batch lies away from that of its
// peers, the finished batches of the same product and yeast. Each cause that the
// trade knows is computed by itself: how many points of apparent attenuation it
// would explain, how sure that is, and what to check next. Figures rank them;
// nothing here approves, blames or decides.
//
// Attenuation is apparent, % of the original extract. A difference is the batch
// less the median of its peers, negative when it is low, and what a cause explains
// has the same sign.
//
// The package computes on what it is given: it reads no clock and no journal.
package cause
