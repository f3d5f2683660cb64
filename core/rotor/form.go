package rotor

import "math"

// Form is a quadratic form on rotors as 4-vectors (S, E23, E31, E12), a
// symmetric matrix. Both the mean of rotations and the rotation nearest to
// a matrix are the unit rotor at which such a form is greatest.
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

// Maximum returns the unit rotor at which the form is greatest and its value
// there. It reports false, with One, when the form is not finite or the
// greatest eigenvalue is not single: the second lies within the rounding of the
// computation, 16 units in the last place of the largest.
func (f Form) Maximum() (best Rotor, value float64, ok bool) {
	vectors, finite := f.diagonalise()
	if !finite {
		return One, 0, false
	}
	top, second, size := 0, -1, 0.0
	for i := range 4 {
		size = max(size, math.Abs(f[i][i]))
		if f[i][i] > f[top][top] {
			top = i
		}
	}
	for i := range 4 {
		if i != top && (second < 0 || f[i][i] > f[second][second]) {
			second = i
		}
	}
	if f[top][top]-f[second][second] <= 16*0x1p-52*size {
		return One, f[top][top], false
	}
	v := Rotor{vectors[0][top], vectors[1][top], vectors[2][top], vectors[3][top]}
	v, _ = v.Unit()
	return v, f[top][top], true
}

// diagonalise applies Jacobi's rotations until the form is diagonal and
// returns the eigenvectors as columns.
func (f *Form) diagonalise() (vectors [4][4]float64, ok bool) {
	for i := range 4 {
		vectors[i][i] = 1
		for j := range 4 {
			if !finite(f[i][j]) {
				return vectors, false
			}
		}
	}
	for range 50 { // converges quadratically; six or seven sweeps do
		clean := true
		for p := range 4 {
			for q := p + 1; q < 4; q++ {
				if math.Abs(f[p][q]) > 0x1p-60*math.Sqrt(math.Abs(f[p][p]*f[q][q])) && math.Abs(f[p][q]) > 0x1p-1000 {
					f.turn(&vectors, p, q)
					clean = false
				}
			}
		}
		if clean {
			break
		}
	}
	return vectors, true
}

// turn makes the element p, q zero.
func (f *Form) turn(vectors *[4][4]float64, p, q int) {
	theta := (f[q][q] - f[p][p]) / (2 * f[p][q])
	t := math.Copysign(1/(math.Abs(theta)+math.Hypot(theta, 1)), theta)
	c := 1 / math.Hypot(t, 1)
	s := t * c
	for k := range 4 {
		f[k][p], f[k][q] = c*f[k][p]-s*f[k][q], s*f[k][p]+c*f[k][q]
	}
	for k := range 4 {
		f[p][k], f[q][k] = c*f[p][k]-s*f[q][k], s*f[p][k]+c*f[q][k]
		vectors[k][p], vectors[k][q] = c*vectors[k][p]-s*vectors[k][q], s*vectors[k][p]+c*vectors[k][q]
	}
	f[p][q], f[q][p] = 0, 0
}
