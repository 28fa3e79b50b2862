// Package season sums up a season: one row a batch with its figures, one group a
// product and yeast with medians and spreads, control charts of a product and what
// the generations of a yeast did.
//
// The figures of a row are those of the batch's last reading that counts, as package
// journal derives it: the same to the last digit as those of the batch itself. The
// course of the fall is interpolated between readings.
package season
