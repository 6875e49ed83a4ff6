// Package report prints plans: as text a person reads and as the JSON record.
// The cards, the workbook and the figures live in its rooms.
//
// In: plans. Out: bytes. It does no mechanics: what it prints, the Plan holds.
// Limits are rounded inwards, so that a printed window never reaches beyond the
// computed one.
package report
