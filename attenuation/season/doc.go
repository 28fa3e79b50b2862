// Package season sums up a season: one row a batch with its figures, and one group
// a product and yeast with medians and spreads.
//
// Nothing is computed here that package journal does not derive; a row holds the
// figures of the batch's last reading that counts, the same to the last digit as
// those of the batch itself.
package season
