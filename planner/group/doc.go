// Package group shares the loads on a whole bolted joint out over its bolts.
//
// In: bolt positions and load cases, or a table of bolt forces that a
// finite-element run gave. Out: what each bolt gets in each load case.
//
// The sharing is the elementary one for joints whose plates are stiff against
// their bolts (VDI 2230 Part 2, class I: the calculation by rigid-body mechanics):
// the plates stay plane, all bolts are equally stiff, and nothing presses on
// an edge. The axial force then is linear over the pattern, and the transverse
// one is an equal part of the force plus a part of the torsion about the
// centroid that grows with the distance from it. Plates that bend, gape or lean
// on an edge need a finite-element run; its bolt forces are read by ReadCSV.
//
// Units are N, mm and N.mm. It does no I/O and knows neither joint nor register.
package group
