package operation

// Identity is what a function computes, as far as samples tell.
type Identity struct {
	Readings []Reading // all that agree with every sample; none if it is no known operation
	Residual float64   // the largest error of the first reading, relative to the size of the result
	Why      string    // why nothing is said
}
