// Package figure draws what cards and pages show: the joint diagram, the Haigh and
// the Smith diagram of the thread and the bolt pattern with its order, each as one
// drawing on a small canvas that a PDF and an SVG backend implement. It owns the
// fonts and the measuring of text.
//
// In: plans and patterns, boxes in mm on the page. Out: strokes, areas and text,
// black, white and grey only, so that nothing is told by colour. It does no
// mechanics: every number it draws is the plan's.
package figure
