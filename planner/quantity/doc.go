// Package quantity reads and prints numbers with units, at the edge between
// what people write and what the mechanics compute with.
//
// In: text such as "12.5 kN", "0 to 9.5 kN", "10 um", "90 degC". Out: plain
// numbers in the internal units mm, N, N.mm, MPa, mm2, deg, degC, 1/K and plain
// ratios; and back, rounded so that a limit never moves outwards. It knows no
// joint and no file.
package quantity
