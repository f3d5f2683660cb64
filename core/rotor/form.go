package rotor

import "math"

// Form is a quadratic form of rotors as 4-vectors (S, E23, E31, E12): a
// symmetric matrix. The mean of rotations, the rotation nearest to a matrix
// and the rotation that best carries vectors onto others are each the unit
// rotor at which such a form is greatest (P. B. Davenport's q-method, in J. R.
// Wertz, ed., "Spacecraft Attitude Determination and Control", 1978, section
// 12.1; from memory).
type Form [4][4]float64

// AddSquare adds weight times the square of the scalar product with r.
func (f *Form) AddSquare(r Rotor, weight float64) {
	c := [4]float64{r.S, r.E23, r.E31, r.E12}
	for i := range c {
		for j := range c {
			f[i][j] += weight * c[i] * c[j]
		}
	}
}

// Peak is where a form is greatest over the unit rotors.
type Peak struct {
	At    Rotor   // of norm one; its sign is arbitrary
	Value float64 // the greatest eigenvalue
	Next  float64 // the second: the greatest value at right angles to At
}

// Single reports whether the two greatest eigenvalues differ by more than the
// given part of the greatest magnitude among Value and Next; otherwise other rotors than
// At do as well, up to errors of that size in the form.
func (p Peak) Single(rounding float64) bool {
	return p.Value-p.Next > rounding*max(math.Abs(p.Value), math.Abs(p.Next))
}

// Peak returns where the form is greatest. Value and Next are accurate to a
// few units in the last place of the largest element, and At to that over their
// difference. It reports false when an element is not finite.
func (f Form) Peak() (Peak, bool) {
	size := 0.0
	for _, row := range f {
		for _, x := range row {
			size = max(size, math.Abs(x)) // NaN if one is
		}
	}
	if !finite(size) {
		return Peak{At: One}, false
	}
	if size == 0 {
		return Peak{At: One}, true
	}
	_, exp := math.Frexp(size)
	for i := range f {
		for j := range f[i] {
			f[i][j] = math.Ldexp(f[i][j], -exp)
		}
	}
	vectors := f.diagonalise()
	first, second := f.greatest()
	at, _ := Rotor{vectors[0][first], vectors[1][first], vectors[2][first], vectors[3][first]}.Unit()
	return Peak{at, math.Ldexp(f[first][first], exp), math.Ldexp(f[second][second], exp)}, true
}

// greatest returns the places of the two greatest diagonal elements.
func (f *Form) greatest() (first, second int) {
	first, second = 0, 1
	if f[1][1] > f[0][0] {
		first, second = 1, 0
	}
	for i := 2; i < 4; i++ {
		if f[i][i] > f[first][first] {
			first, second = i, first
		} else if f[i][i] > f[second][second] {
			second = i
		}
	}
	return first, second
}

// diagonalise makes a form with elements of order one diagonal, by Jacobi's
// method, and returns its eigenvectors as columns. Sweeping all six elements
// off the diagonal in turn, by angles of at most 45 degrees, always converges,
// and quadratically in the end (G. E. Forsythe and P. Henrici, Trans. AMS 94
// (1960) 1; from memory); the bound on the sweeps is there for its own sake.
func (f *Form) diagonalise() (vectors [4][4]float64) {
	for i := range 4 {
		vectors[i][i] = 1
	}
	for range 32 {
		diagonal := true
		for p := range 4 {
			for q := p + 1; q < 4; q++ {
				if math.Abs(f[p][q]) > 0x1p-56 { // below the rounding of the rest
					f.annihilate(&vectors, p, q)
					diagonal = false
				}
			}
		}
		if diagonal {
			break
		}
	}
	return vectors
}

// annihilate turns in the plane of p and q so that their element becomes zero.
func (f *Form) annihilate(vectors *[4][4]float64, p, q int) {
	cot := (f[q][q] - f[p][p]) / (2 * f[p][q]) // of twice the angle
	tan := math.Copysign(1/(math.Abs(cot)+math.Sqrt(1+cot*cot)), cot)
	cos := 1 / math.Sqrt(1+tan*tan)
	sin := tan * cos
	turn := func(a, b *float64) { *a, *b = cos**a-sin**b, sin**a+cos**b }
	for k := range 4 {
		turn(&f[k][p], &f[k][q])
		turn(&vectors[k][p], &vectors[k][q])
	}
	for k := range 4 {
		turn(&f[p][k], &f[q][k])
	}
	f[p][q], f[q][p] = 0, 0
}
