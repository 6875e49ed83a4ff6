// Package sheet writes the audit workbook (XLSX): a register of all joints, a
// calculation sheet a joint whose formulas are live from the inputs to the
// torque, and a page that says how to read it.
//
// In: plans. Out: the bytes of a workbook, the same for the same plans. The
// formulas come from templates/calculation.csv and templates/checks.csv, one
// line a symbol, and restate the calculation independently of the program. The
// package does no mechanics: every number it writes is the plan's.
package sheet
