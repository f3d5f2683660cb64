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
	Value float64 // the form at At: the greatest eigenvalue
	Next  float64 // the greatest value at right angles to At: the second one
	Size  float64 // the greatest magnitude of an element of the form
}

// Single reports whether Value and Next differ by more than this many units in
// the last place of Size. If not, rotors far from At do as well, up to an error
// of that size in the form.
func (p Peak) Single(ulps float64) bool { return p.Value-p.Next > ulps*0x1p-52*p.Size }

// Peak returns where the form is greatest. Value and Next are accurate to about
// ten units in the last place of Size, and At to that over their difference. It
// reports false when an element is not finite.
func (f Form) Peak() (Peak, bool) {
	p := Peak{At: One}
	for _, row := range f {
		for _, x := range row {
			p.Size = max(p.Size, math.Abs(x)) // NaN if one is
		}
	}
	if p.Size == 0 || !finite(p.Size) {
		return p, p.Size == 0
	}
	_, exp := math.Frexp(p.Size)
	for i := range f {
		for j := range f[i] {
			f[i][j] = math.Ldexp(f[i][j], -exp)
		}
	}
	v := f.diagonalise()
	first, second := f.greatest()
	p.At, _ = Rotor{v[0][first], v[1][first], v[2][first], v[3][first]}.Unit()
	p.Value, p.Next = math.Ldexp(f[first][first], exp), math.Ldexp(f[second][second], exp)
	return p, true
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
				if math.Abs(f[p][q]) > 0x1p-56 { // less is lost in the rounding of the rest
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
