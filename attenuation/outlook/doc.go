// Package outlook says where a batch of the journal is going and what its readings
// prove about its end. It turns a batch into a course for attenuation/curve, makes
// the history of a product and yeast out of their finished batches, and gives back
// gravities, strengths and times.
//
// Nothing here reads a clock or a file: what is asked about comes as a view, a
// reader and a time.
package outlook
