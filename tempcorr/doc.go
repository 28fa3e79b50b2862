// Package tempcorr corrects a hydrometer reading to the instrument's reference
// temperature. It treats the hydrometer as what it is, a body that floats: its
// volume grows with temperature, the liquid's density falls, and the mark at the
// surface is the one where weight and buoyancy balance,
//
//	rho(t)·[1 + g·(t − t0)] = rho_mark
//
// with g the cubic expansion of the body (ISO 1768), t0 the instrument's
// reference temperature and rho_mark the density that the mark stands for.
//
// The order is meniscus, certificate, temperature. Each step comes back on its
// own, with an uncertainty budget after JCGM 100 (GUM).
package tempcorr
