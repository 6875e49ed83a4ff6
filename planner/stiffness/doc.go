// Package stiffness turns a bolt and the parts it clamps into springs, after
// VDI 2230 Part 1 (2015), chapter 5.1: the bolt as rods in series, the clamped
// parts as a deformation cone and sleeve integrated layer by layer, and the
// load factor that follows.
//
// In: lengths and diameters in mm, moduli in MPa. Out: compliances in mm/N,
// and integrals of 1/area in 1/mm that become compliances when divided by a
// modulus. It handles concentric clamping only, and never checks a joint: what
// it is given must be possible (validated by package planner).
package stiffness
