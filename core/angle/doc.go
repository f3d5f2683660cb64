// Package angle turns three angles into rotations and back: the 24 sequences, and the
// labels by which authors name them.
package angle
