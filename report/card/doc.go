// Package card writes the card a technician works by: what to tighten, the
// setting in large figures, the lubrication, the order drawn on the bolt pattern,
// numbered steps, what is not OK and what to do then, warnings, a record to sign;
// and on request a calculation page for the engineer.
//
// In: plans. Out: PDF, the same bytes for the same plans. Every word comes from
// templates/cards and templates/cautions.csv. It does no mechanics, and a joint
// that is infeasible never gets a page that looks like an instruction.
package card
