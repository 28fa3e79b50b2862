// Package curve foretells where a fermentation ends and when, from its first
// gravity readings and from batches that have finished, and says what the
// readings prove about the end.
//
// Gravities are points, 1000·(SG-1), falling from the original gravity OG to
// the final one FG; times are hours since pitching. A course is
//
//	y(t) = OG - AA·OG·F(t),  1 - F(t) = ((1+E)/(1+E·e^{kt}))^s
//
// the exact solution of logistic growth of the yeast, X' = k·X·(1-X), with
// first-order uptake of extract, S' = -s·k·X·S. With s = 1 it is the logistic
// of the ASBC method Yeast-14; with s and E small it is a lag followed by an
// exponential fall.
//
// Finished batches make the prior (normal-inverse-Wishart, Gelman et al. 2013,
// Bayesian Data Analysis, 3rd ed., section 3.6); the readings enter through a
// Student t likelihood, so that a wild one loses its weight (Lange, Little and
// Taylor 1989, J. Am. Stat. Assoc. 84, 881). The posterior is drawn by
// importance sampling with a fixed seed: the same readings and the same
// history give the same figures.
//
// Nothing here reads a clock or a file.
package curve
