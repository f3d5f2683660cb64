package operation

// Reading is one operation with its conventions.
type Reading struct {
	Op     string  // its name
	Orders []Order // of the quaternions among inputs and results, in order
}
