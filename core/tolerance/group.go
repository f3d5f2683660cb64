package tolerance

import "math"

// Digits that decide how a group was printed.
const (
	// usual is the fewest significant digits that a general number format
	// prints unless told otherwise (C's %g, C++ streams: six). A whole
	// number in the group may be a value rounded there: 1 for 0.9999998.
	usual = 6
	// dropped is how many digits an entry must be shorter than its longest
	// sibling before the missing digits are taken for zeros that the writer
	// left out. A rounded value ends in six zeros once in a million; an
	// author who types one entry of a group with six digits fewer than the
	// next does not occur.
	dropped = 6
)

// Of is the precision of a group of printed numbers: half a unit of the last
// digit of the coarsest entry that is not a whole number.
//
// If no entry is Padded, the writer may print the shortest text that will do. Then entries that
// end in dropped zeros count with the digits of their longest sibling. So do
// whole numbers, with six at least. Zeros count only if they are padded.
func Of(numbers ...Number) Precision {
	longest, padded := usual, false
	for _, n := range numbers {
		longest = max(longest, n.Significant)
		padded = padded || n.Padded
	}
	half := 0.0
	for _, n := range numbers {
		half = math.Max(half, n.halfAmong(longest, padded))
	}
	return Precision{Half: half}
}

// halfAmong is the half unit of n in a group whose longest entry shows so many
// digits, and of which an entry may be padded.
func (n Number) halfAmong(longest int, padded bool) float64 {
	switch {
	case n.Padded:
		return n.Half
	case n.Significant == 0:
		return 0
	case n.Integer(), !padded && longest-n.Significant >= dropped:
		return math.Min(n.Half, halfUnit(n.Lead-longest+1))
	}
	return n.Half
}

// OfTexts is Of for entries as they stand in a file; it is false if one of
// them is no finite number.
func OfTexts(texts ...string) (Precision, bool) {
	numbers := make([]Number, len(texts))
	for i, text := range texts {
		n, ok := Read(text)
		if !ok {
			return Precision{}, false
		}
		numbers[i] = n
	}
	return Of(numbers...), true
}
