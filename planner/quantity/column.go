package quantity

// Factor returns what brings a number in a unit to the internal unit of a
// dimension: of a column, whose numbers have their unit in its head. The error is
// an *Error.
func Factor(unitName string, d Dimension) (float64, error) {
	u, err := resolve(unitName, unitName, d)
	return u.factor, err
}
