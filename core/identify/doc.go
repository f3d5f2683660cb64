// Package identify tells which conventions explain numbers.
package identify
