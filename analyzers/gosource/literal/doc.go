// Package literal finds the orientations that Go composite literals state.
//
// # Analyzer orientationliteral
//
// orientationliteral: find orientations written as constants
package literal
