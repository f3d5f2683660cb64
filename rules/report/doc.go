// Package report writes what an audit found: as text for people, as SARIF for
// machines, and as the list of all readings, by which silence can be checked.
//
// # Text
//
// A finding opens with one line that editors can follow,
//
//	path:line:col: rule: message
//
// and below it stand, each under its own word in the left margin, the level and
// the claim, the evidence as a table, related places, the remedy, and the
// command that computes the evidence again. Numbers carry the digits that
// matter to a reader: residuals three, a norm as many as show how far it is
// from one, and the points of one column stand below each other. Full precision
// is for the machine formats.
//
// On a terminal lines are wrapped below their places; in files and pipes the first
// line is whole. Of three or more findings with one cause (see cause.go) the first is
// shown in full. What a file of waivers accepts is counted in the summary, so that a
// backlog does not hide what is new.
//
// All text that comes from audited files is made harmless first: control
// characters and those that reverse the direction of writing are printed as
// escapes, so that no file can paint over its own findings.
//
// # Determinism
//
// The same Report gives the same bytes. Nothing here looks at the clock, the
// environment or the terminal; the caller decides on colour and width.
package report
