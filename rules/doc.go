// Package rules decides what counts as a contradiction.
//
// It knows nothing of files. A reader (package analyzers and below) hands it
// orientation values: numbers, the claims that somebody made about them, and
// the places where both stand. A rule recomputes what the claims promise and,
// where numbers and claim cannot both be right, returns a Finding that carries
// the recomputed numbers.
//
// Four words are used throughout, in code and in messages:
//
//	claim     what an author states about an orientation
//	evidence  what the rotor core recomputes from the numbers
//	finding   a claim and its evidence that cannot both be right
//	waiver    a finding that somebody accepted, with a reason, an owner and an end
//
// A claim has a strength, its Source. The strongest claim on a subject decides
// how a value is read; a weaker one that disagrees is kept as a conflict. Where
// nothing decides, a reading stays undecided and the rules stay silent.
package rules
