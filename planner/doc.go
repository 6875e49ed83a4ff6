// Package planner works a bolted joint back from the clamp force it must still
// hold in service to the tightening instruction that gives it, after VDI 2230
// Part 1 (2015): concentric or eccentric, one bolt or a group of them.
//
// In: a Joint, complete and validated, in N, mm, MPa, N.mm. Out: a Plan, which
// carries its own trace: every line of the calculation with symbol, meaning,
// value, unit and source. Start reading at Work. The package does no I/O and
// holds no state; a Plan is safe to share.
package planner
