// Package friction turns friction into numbers a planner can use: named
// conditions into ranges of the coefficients of friction, and coefficients
// into the torque that goes with a clamp force.
//
// In: thread and bearing dimensions in mm, coefficients of friction. Out:
// levers in mm, so that torque (N.mm) = lever (mm) x clamp force (N). It knows
// no bolt, no tool and no file.
package friction
