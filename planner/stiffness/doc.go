// Package stiffness turns a bolt and its clamped parts into springs.
package stiffness
