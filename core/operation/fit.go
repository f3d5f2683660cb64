package operation

import "math"

// linear is a least-squares problem with many right-hand sides, factored once by
// Householder reflections (G. H. Golub, Numer. Math. 7 (1965) 206; from memory).
type linear struct {
	rows, cols int
	a          []float64 // column by column; the reflections below the diagonal
	diag       []float64
	full       bool // the columns are independent
}

// factor takes rows samples of cols functions, value(i, j).
func factor(rows, cols int, value func(i, j int) float64) *linear {
	l := &linear{rows: rows, cols: cols, a: make([]float64, rows*cols), diag: make([]float64, cols), full: rows >= cols}
	if !l.full {
		return l
	}
	for j := range cols {
		for i := range rows {
			l.a[j*rows+i] = value(i, j)
		}
	}
	for j := range cols {
		c := l.a[j*rows : (j+1)*rows]
		before := norm(c)
		n := norm(c[j:])
		if !(n > 1e-9*before) {
			l.full = false
			return l
		}
		if c[j] > 0 {
			n = -n
		}
		l.diag[j] = n
		c[j] -= n
		for k := j + 1; k < cols; k++ {
			reflect(c[j:], l.a[k*rows+j:(k+1)*rows])
		}
	}
	return l
}

func norm(v []float64) float64 {
	sum := 0.0
	for _, x := range v {
		sum += x * x
	}
	return math.Sqrt(sum)
}

// reflect applies the reflection of direction v to x.
func reflect(v, x []float64) {
	vv, vx := 0.0, 0.0
	for i, y := range v {
		vv += y * y
		vx += y * x[i]
	}
	if vv == 0 {
		return
	}
	f := 2 * vx / vv
	for i, y := range v {
		x[i] -= f * y
	}
}

// solve returns the coefficients that come nearest to b, and the largest that is left
// of any row, relative to the size of b. It changes b.
func (l *linear) solve(b []float64) (x []float64, left float64) {
	size := norm(b) / math.Sqrt(float64(len(b)))
	for j := range l.cols {
		reflect(l.a[j*l.rows+j:(j+1)*l.rows], b[j:])
	}
	x = make([]float64, l.cols)
	for j := l.cols - 1; j >= 0; j-- {
		sum := b[j]
		for k := j + 1; k < l.cols; k++ {
			sum -= l.a[k*l.rows+j] * x[k]
		}
		x[j] = sum / l.diag[j]
	}
	return x, norm(b[l.cols:]) / math.Sqrt(float64(max(1, l.rows-l.cols))) / math.Max(1, size)
}
