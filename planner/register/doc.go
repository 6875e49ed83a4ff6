// Package register reads joint registers: YAML files in which a joint engineer
// states what each joint must hold, into complete and validated planner.Joints.
//
// In: the bytes of one or more files, and a way to the files that these name
// (tables of bolt forces, libraries of the user's own materials and fasteners).
// Out: joints, or a *ProblemsError with every problem of all files, each with
// file, line, column, the line itself, what is wrong and how to mend it. Syntax,
// units and names are judged here; the rules of a possible joint are planner's,
// and only get their position here. Reading is linear in the size of the files
// and refuses what could make it
// otherwise: aliases, deep nesting, oversized files. It does no mechanics.
package register
