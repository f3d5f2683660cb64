// Package frame names coordinate frames by the directions of their axes, maps
// one naming onto another, places them on the earth and chains them.
package frame
