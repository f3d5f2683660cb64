package operation

import (
	"math"

	"dextral/core/matrix"
)

func init() {
	for _, n := range []int{3, 4} {
		k := map[int]string{3: "m", 4: "h"}[n]
		known(k+k, k, func() []hypothesis { return matrixPairs(n) })
		known(k, k, func() []hypothesis { return matrixOne(n) })
		known(k, "s", func() []hypothesis { return matrixNumbers(n) })
		known(k+"s", k, func() []hypothesis { return matrixScaled(n * n) })
	}
	known("vvv", "m", axes)
}

func matrixPairs(n int) []hypothesis {
	size := n * n
	var all []hypothesis
	for i := range 8 {
		reading := Reading{Op: MatrixProduct, Swapped: i&1 != 0, Reversed: [2]bool{i&2 != 0, i&4 != 0}}
		all = append(all, hypothesis{reading: reading, eval: func(in, out []float64) {
			a, b := in[:size], in[size:]
			ta, tb := reading.Reversed[0], reading.Reversed[1]
			if reading.Swapped {
				a, b, ta, tb = b, a, tb, ta
			}
			for i := range n {
				for j := range n {
					sum := 0.0
					for k := range n {
						sum += element(a, n, ta, i, k) * element(b, n, tb, k, j)
					}
					out[i*n+j] = sum
				}
			}
		}})
	}
	componentwise := func(op Op, f func(a, b float64) float64) {
		all = append(all, hypothesis{reading: Reading{Op: op}, eval: func(in, out []float64) {
			for i := range out {
				out[i] = f(in[i], in[size+i])
			}
		}})
	}
	componentwise(Sum, func(a, b float64) float64 { return a + b })
	componentwise(Difference, func(a, b float64) float64 { return a - b })
	return all
}

func element(m []float64, n int, transposed bool, i, j int) float64 {
	if transposed {
		i, j = j, i
	}
	return m[i*n+j]
}

func matrixOne(n int) []hypothesis {
	all := []hypothesis{
		{reading: Reading{Op: Copy}, eval: func(in, out []float64) { copy(out, in) }},
		{reading: Reading{Op: Transpose}, eval: func(in, out []float64) {
			for i := range n {
				for j := range n {
					out[i*n+j] = in[j*n+i]
				}
			}
		}},
		{reading: Reading{Op: Negative}, eval: func(in, out []float64) {
			for i := range out {
				out[i] = -in[i]
			}
		}},
		{reading: Reading{Op: MatrixInverse}, eval: func(in, out []float64) { invert(in, out, n) }},
		{reading: Reading{Op: MatrixInverse, Detail: "transposed"}, eval: func(in, out []float64) {
			invert(in, out, n)
			for i := range n {
				for j := range i {
					out[i*n+j], out[j*n+i] = out[j*n+i], out[i*n+j]
				}
			}
		}},
	}
	if n == 4 {
		for _, transposed := range [2]bool{false, true} {
			all = append(all, hypothesis{reading: Reading{Op: RigidInverse, Reversed: [2]bool{transposed}}, valid: proper, eval: func(in, out []float64) { rigidInverse(in, out, transposed) }})
		}
	}
	return all
}

// rigidInverse is (R^T, -R^T t), of the transpose if the translation stands in the
// last row.
func rigidInverse(in, out []float64, transposed bool) {
	r := block(in).Transpose()
	put(out, r)
	for i := range 3 {
		sum := 0.0
		for k := range 3 {
			sum += element(in, 4, transposed, k, i) * element(in, 4, transposed, k, 3)
		}
		if transposed {
			out[12+i] = -sum
		} else {
			out[4*i+3] = -sum
		}
	}
}

// invert solves by elimination with pivots.
func invert(in, out []float64, n int) {
	var a [16]float64
	copy(a[:], in[:n*n])
	clear(out)
	for i := range n {
		out[i*n+i] = 1
	}
	for c := range n {
		p := c
		for r := c; r < n; r++ {
			if math.Abs(a[r*n+c]) > math.Abs(a[p*n+c]) {
				p = r
			}
		}
		for k := range n {
			a[c*n+k], a[p*n+k] = a[p*n+k], a[c*n+k]
			out[c*n+k], out[p*n+k] = out[p*n+k], out[c*n+k]
		}
		d := 1 / a[c*n+c]
		for k := range n {
			a[c*n+k] *= d
			out[c*n+k] *= d
		}
		for r := range n {
			if r == c {
				continue
			}
			f := a[r*n+c]
			for k := range n {
				a[r*n+k] -= f * a[c*n+k]
				out[r*n+k] -= f * out[c*n+k]
			}
		}
	}
}

func determinant(in []float64, n int) float64 {
	if n == 3 {
		return mat(in).Det()
	}
	sum := 0.0
	for c := range 4 {
		var m matrix.Mat3
		for i := range 3 {
			k := 0
			for j := range 4 {
				if j != c {
					m[i][k] = in[4*(i+1)+j]
					k++
				}
			}
		}
		term := in[c] * m.Det()
		if c%2 == 1 {
			term = -term
		}
		sum += term
	}
	return sum
}

func matrixNumbers(n int) []hypothesis {
	return []hypothesis{
		{reading: Reading{Op: Determinant}, eval: func(in, out []float64) { out[0] = determinant(in, n) }},
		{reading: Reading{Op: Trace}, eval: func(in, out []float64) {
			out[0] = 0
			for i := range n {
				out[0] += in[i*n+i]
			}
		}},
		{reading: Reading{Op: TurnAngle}, valid: proper, eval: func(in, out []float64) {
			out[0] = 2 * halfTurn(block(in).Rotor())
		}},
	}
}

func matrixScaled(size int) []hypothesis {
	return []hypothesis{{reading: Reading{Op: Scaled}, eval: func(in, out []float64) {
		for i := range out {
			out[i] = in[i] * in[size]
		}
	}}}
}

// axes put three vectors side by side.
func axes() []hypothesis {
	var all []hypothesis
	for _, reversed := range [2]bool{false, true} {
		all = append(all, hypothesis{reading: Reading{Op: Copy, Reversed: [2]bool{reversed}, Detail: map[bool]string{false: "vectors as columns", true: "vectors as rows"}[reversed]}, eval: func(in, out []float64) {
			m := mat(in)
			if !reversed {
				m = m.Transpose()
			}
			putMatrix(out, m)
		}})
	}
	return all
}
