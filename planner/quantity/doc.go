// Package quantity reads and prints numbers with units.
package quantity
