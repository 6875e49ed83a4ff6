// Package planner works a joint back from its residual clamp to a torque.
package planner
